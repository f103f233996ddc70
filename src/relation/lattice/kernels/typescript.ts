/** The kernels in plain TypeScript: the fallback where WebAssembly SIMD is missing, and the reference for its answers. */
import { type Kernels, ROUND } from './contract.ts';

const LIMB = 4194304; // 2^22
const PER_LIMB = 1 / LIMB;
/** LLL on doubles may cycle when rounding errors reach the size of the diagonal; then it stops, and the checksum decides. */
const MAX_SWAPS_PER_ROW = 400;
/** Only the neighbour decides whether to swap; against the other rows a row is size-reduced when it has grown by this much, and at the end. */
const LONG = 4;

export function typescriptKernels(): Kernels {
  let memory = new Float64Array(4096);
  let used = 0;
  /** Scratch for one matrix product in place; grown on demand. */
  let scratch = new Float64Array(4096);
  const room = (length: number): Float64Array => {
    if (scratch.length < length) scratch = new Float64Array(2 * length);
    return scratch;
  };
  return {
    kind: 'typescript',
    allocate(length) {
      const at = used;
      used += length + (length & 1);
      if (used > memory.length) {
        const larger = new Float64Array(Math.max(used, 2 * memory.length));
        larger.set(memory);
        memory = larger;
      }
      return at;
    },
    view: () => memory,
    multiply: (...args) => multiply(memory, ...args),
    multiplyLeft: (m, mStride, u, uStride, w, cols) =>
      multiplyLeft(memory, room(w * cols), m, mStride, u, uStride, w, cols),
    multiplyRight: (m, mStride, q, qStride, rows, w) => multiplyRight(memory, room(w), m, mStride, q, qStride, rows, w),
    update: (...args) => update(memory, ...args),
    reduce: (l, lStride, start, w, u, q, stride, delta) =>
      reduce(memory, room(w * w + w), l, lStride, start, w, u, q, stride, delta),
    sizeReduce: (...args) => sizeReduce(memory, ...args),
    carry: (...args) => carry(memory, ...args),
  };
}

function multiply(
  f: Float64Array,
  c: number,
  cStride: number,
  a: number,
  aStride: number,
  b: number,
  bStride: number,
  rows: number,
  inner: number,
  cols: number,
  band: number,
  accumulate: number,
): void {
  const even = cols + (cols & 1);
  for (let i = 0; i < rows; i++) {
    const ci = c + i * cStride;
    if (accumulate === 0) f.fill(0, ci, ci + even);
    const end = Math.min(inner, (i & ~3) + 4 + band);
    for (let k = 0; k < end; k++) {
      const x = f[a + i * aStride + k] as number;
      const bk = b + k * bStride;
      for (let j = 0; j < even; j++) f[ci + j] = (f[ci + j] as number) + x * (f[bk + j] as number);
    }
  }
}

function multiplyLeft(
  f: Float64Array,
  s: Float64Array,
  m: number,
  mStride: number,
  u: number,
  uStride: number,
  w: number,
  cols: number,
): void {
  for (let i = 0; i < w; i++) s.set(f.subarray(m + i * mStride, m + i * mStride + cols), i * cols);
  for (let i = 0; i < w; i++) {
    const mi = m + i * mStride;
    f.fill(0, mi, mi + cols);
    for (let k = 0; k < w; k++) {
      const x = f[u + i * uStride + k] as number;
      for (let j = 0; j < cols; j++) f[mi + j] = (f[mi + j] as number) + x * (s[k * cols + j] as number);
    }
  }
}

function multiplyRight(
  f: Float64Array,
  s: Float64Array,
  m: number,
  mStride: number,
  q: number,
  qStride: number,
  rows: number,
  w: number,
): void {
  for (let i = 0; i < rows; i++) {
    const mi = m + i * mStride;
    for (let k = 0; k < w; k++) {
      s[k] = f[mi + k] as number;
      f[mi + k] = 0;
    }
    for (let k = 0; k < w; k++) {
      const x = s[k] as number;
      for (let j = 0; j < w; j++) f[mi + j] = (f[mi + j] as number) + x * (f[q + k * qStride + j] as number);
    }
  }
}

function update(f: Float64Array, l: number, lStride: number, v: number, n: number): void {
  for (let k = 0; k < n; k++) {
    const y = f[v + k] as number;
    if (y === 0) continue;
    const x = f[l + k * lStride + k] as number;
    const r = Math.sqrt(x * x + y * y);
    const c = x / r;
    const s = y / r;
    f[l + k * lStride + k] = r;
    for (let i = k + 1; i < n; i++) {
      const at = l + i * lStride + k;
      const p = f[at] as number;
      const t = f[v + i] as number;
      f[at] = c * p + s * t;
      f[v + i] = c * t - s * p;
    }
  }
}

function reduce(
  f: Float64Array,
  block: Float64Array,
  l: number,
  lStride: number,
  start: number,
  w: number,
  u: number,
  q: number,
  stride: number,
  delta: number,
): number {
  const inverse = w * w; // 1 / diagonal, kept behind the block
  for (let i = 0; i < w; i++) {
    const from = l + (start + i) * lStride + start;
    for (let j = 0; j < w; j++) block[i * w + j] = f[from + j] as number;
    block[inverse + i] = 1 / (block[i * w + i] as number);
    f.fill(0, u + i * stride, u + i * stride + stride);
    f.fill(0, q + i * stride, q + i * stride + stride);
    f[u + i * stride + i] = 1;
    f[q + i * stride + i] = 1;
  }
  let operations = 0;
  let swapsLeft = MAX_SWAPS_PER_ROW * w;
  const subtract = (k: number, j: number): void => {
    const factor = (block[k * w + j] as number) * (block[inverse + j] as number) + ROUND - ROUND;
    if (factor === 0) return;
    operations++;
    for (let i = 0; i <= j; i++)
      block[k * w + i] = (block[k * w + i] as number) - factor * (block[j * w + i] as number);
    const uk = u + k * stride;
    const uj = u + j * stride;
    for (let i = 0; i < w; i++) f[uk + i] = (f[uk + i] as number) - factor * (f[uj + i] as number);
  };
  let k = 1;
  while (k < w) {
    subtract(k, k - 1);
    const a = block[k * w + k - 1] as number;
    const b = block[k * w + k] as number;
    const d = block[(k - 1) * w + k - 1] as number;
    const square = a * a + b * b;
    if (square < delta * (d * d)) {
      if (--swapsLeft < 0) {
        operations = -1;
        break;
      }
      operations++;
      swap(f, block, w, u, q, stride, k, Math.sqrt(square));
      k = k > 1 ? k - 1 : 1;
    } else {
      if (isLong(block, k * w, inverse, k - 1)) for (let j = k - 2; j >= 0; j--) subtract(k, j);
      k++;
    }
  }
  for (let i = 1; i < w; i++) for (let j = i - 1; j >= 0; j--) subtract(i, j);
  for (let i = 0; i < w; i++) {
    const to = l + (start + i) * lStride + start;
    for (let j = 0; j <= i; j++) f[to + j] = block[i * w + j] as number;
  }
  transpose(f, q, stride, w);
  return operations;
}

function isLong(block: Float64Array, row: number, inverse: number, count: number): boolean {
  for (let j = 0; j < count; j++) {
    if (Math.abs((block[row + j] as number) * (block[inverse + j] as number)) > LONG) return true;
  }
  return false;
}

/** Exchanges rows k − 1 and k of the block and reflects columns k − 1 and k so that it is lower triangular again, diagonal positive. */
function swap(
  f: Float64Array,
  block: Float64Array,
  w: number,
  u: number,
  q: number,
  stride: number,
  k: number,
  r: number,
): void {
  const low = (k - 1) * w;
  const high = k * w;
  const inverse = w * w;
  const c = (block[high + k - 1] as number) / r;
  const s = (block[high + k] as number) / r;
  const d = block[low + k - 1] as number;
  for (let i = 0; i < k - 1; i++) {
    const x = block[low + i] as number;
    block[low + i] = block[high + i] as number;
    block[high + i] = x;
  }
  block[low + k - 1] = r;
  block[high + k - 1] = c * d;
  block[high + k] = s * d;
  block[inverse + k - 1] = 1 / r;
  block[inverse + k] = 1 / (s * d);
  for (let i = k + 1; i < w; i++) {
    const x = block[i * w + k - 1] as number;
    const y = block[i * w + k] as number;
    block[i * w + k - 1] = c * x + s * y;
    block[i * w + k] = s * x - c * y;
  }
  const ul = u + (k - 1) * stride;
  const uh = u + k * stride;
  const ql = q + (k - 1) * stride;
  const qh = q + k * stride;
  for (let i = 0; i < w; i++) {
    const x = f[ul + i] as number;
    f[ul + i] = f[uh + i] as number;
    f[uh + i] = x;
    const y = f[ql + i] as number;
    const z = f[qh + i] as number;
    f[ql + i] = c * y + s * z;
    f[qh + i] = s * y - c * z;
  }
}

function transpose(f: Float64Array, q: number, stride: number, w: number): void {
  for (let i = 0; i < w; i++) {
    for (let j = 0; j < i; j++) {
      const x = f[q + i * stride + j] as number;
      f[q + i * stride + j] = f[q + j * stride + i] as number;
      f[q + j * stride + i] = x;
    }
  }
}

function sizeReduce(
  f: Float64Array,
  l: number,
  lStride: number,
  t: number,
  tStride: number,
  from: number,
  to: number,
  cols: number,
  band: number,
): void {
  for (let i = from; i < to; i++) {
    const li = l + i * lStride;
    const ti = t + i * tStride;
    for (let j = i - 1; j >= 0; j--) {
      const lj = l + j * lStride;
      const factor = (f[li + j] as number) / (f[lj + j] as number) + ROUND - ROUND;
      if (factor === 0) continue;
      for (let k = 0; k <= j; k++) f[li + k] = (f[li + k] as number) - factor * (f[lj + k] as number);
      const tj = t + j * tStride;
      const end = Math.min(cols, j + band);
      for (let k = 0; k < end; k++) f[ti + k] = (f[ti + k] as number) - factor * (f[tj + k] as number);
    }
  }
}

function carry(
  f: Float64Array,
  x: number,
  rowStride: number,
  rows: number,
  groups: number,
  groupStride: number,
  length: number,
): void {
  for (let i = 0; i < rows; i++) {
    for (let g = 0; g < groups; g++) {
      const at = x + i * rowStride + g * groupStride;
      let over = 0;
      for (let k = 0; k < length; k++) {
        const value = (f[at + k] as number) + over;
        over = value * PER_LIMB + ROUND - ROUND;
        f[at + k] = value - over * LIMB;
      }
    }
  }
}
