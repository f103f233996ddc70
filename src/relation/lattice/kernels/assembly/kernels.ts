/**
 * The kernels in WebAssembly SIMD, in AssemblyScript. What each one does is said in ../contract.ts; ../typescript.ts does the
 * same floating-point operations in the same order on each element, without SIMD. Arguments are indices of doubles, not bytes.
 */
import { micro1x2, micro1x4, micro4x2, micro4x4, scalarColumn } from './micro';

const ROUND: f64 = 6755399441055744.0; // 1.5·2^52
const LIMB: f64 = 4194304.0; // 2^22
const PER_LIMB: f64 = 1.0 / 4194304.0;
const MAX_SWAPS_PER_ROW: i32 = 400;
const LONG: f64 = 4;

let scratch: usize = 0;

/** Where the kernels may keep 8,192 doubles of their own. */
export function setScratch(at: i32): void {
  scratch = bytes(at);
}

@inline
function bytes(index: i32): usize {
  return (<usize>index) << 3;
}

export function multiply(
  cAt: i32,
  cStride: i32,
  aAt: i32,
  aStride: i32,
  bAt: i32,
  bStride: i32,
  rows: i32,
  inner: i32,
  cols: i32,
  band: i32,
  accumulate: i32,
): void {
  const cs = bytes(cStride);
  const as_ = bytes(aStride);
  const bs = bytes(bStride);
  const even = cols + (cols & 1);
  const panel = scratch;
  for (let j = 0; j < even; j += 4) {
    const wide = j + 4 <= even;
    let from = bytes(bAt + j);
    let to = panel;
    for (let k = 0; k < inner; k++) {
      v128.store(to, v128.load(from));
      if (wide) v128.store(to, v128.load(from, 16), 16);
      from += bs;
      to += 32;
    }
    let c = bytes(cAt + j);
    let a = bytes(aAt);
    let i = 0;
    for (; i + 4 <= rows; i += 4) {
      const end = min(inner, i + 4 + band);
      if (wide) micro4x4(c, cs, a, as_, panel, 32, end, accumulate);
      else micro4x2(c, cs, a, as_, panel, 32, end, accumulate);
      c += 4 * cs;
      a += 4 * as_;
    }
    const end = min(inner, i + 4 + band);
    for (; i < rows; i++) {
      if (wide) micro1x4(c, a, panel, 32, end, accumulate);
      else micro1x2(c, a, panel, 32, end, accumulate);
      c += cs;
      a += as_;
    }
  }
}

export function multiplyLeft(mAt: i32, mStride: i32, uAt: i32, uStride: i32, w: i32, cols: i32): void {
  const ms = bytes(mStride);
  const us = bytes(uStride);
  const panel = scratch;
  let j = 0;
  while (j < cols) {
    const left = cols - j;
    const width = left >= 4 ? 4 : left >= 2 ? 2 : 1;
    let m = bytes(mAt + j);
    let to = panel;
    for (let k = 0; k < w; k++) {
      if (width == 1) f64.store(to, f64.load(m));
      else {
        v128.store(to, v128.load(m));
        if (width == 4) v128.store(to, v128.load(m, 16), 16);
      }
      m += ms;
      to += 32;
    }
    m = bytes(mAt + j);
    let u = bytes(uAt);
    if (width == 1) scalarColumn(m, ms, u, us, panel, 32, w, w);
    else {
      let i = 0;
      for (; i + 4 <= w; i += 4) {
        if (width == 4) micro4x4(m, ms, u, us, panel, 32, w, 0);
        else micro4x2(m, ms, u, us, panel, 32, w, 0);
        m += 4 * ms;
        u += 4 * us;
      }
      for (; i < w; i++) {
        if (width == 4) micro1x4(m, u, panel, 32, w, 0);
        else micro1x2(m, u, panel, 32, w, 0);
        m += ms;
        u += us;
      }
    }
    j += width;
  }
}

export function multiplyRight(mAt: i32, mStride: i32, qAt: i32, qStride: i32, rows: i32, w: i32): void {
  const ms = bytes(mStride);
  const qs = bytes(qStride);
  const copy = scratch;
  const copyStride = bytes(w + (w & 1));
  let m = bytes(mAt);
  let i = 0;
  while (i < rows) {
    const group = rows - i >= 4 ? 4 : 1;
    for (let r: usize = 0; r < <usize>group; r++) memory.copy(copy + r * copyStride, m + r * ms, bytes(w));
    let j = 0;
    for (; j + 4 <= w; j += 4) {
      if (group == 4) micro4x4(m + bytes(j), ms, copy, copyStride, bytes(qAt + j), qs, w, 0);
      else micro1x4(m + bytes(j), copy, bytes(qAt + j), qs, w, 0);
    }
    if (j + 2 <= w) {
      if (group == 4) micro4x2(m + bytes(j), ms, copy, copyStride, bytes(qAt + j), qs, w, 0);
      else micro1x2(m + bytes(j), copy, bytes(qAt + j), qs, w, 0);
      j += 2;
    }
    if (j < w) scalarColumn(m + bytes(j), ms, copy, copyStride, bytes(qAt + j), qs, group, w);
    m += <usize>group * ms;
    i += group;
  }
}

/** Rows in groups of four, so that their independent chains of rotations overlap; the rotations are kept in scratch. */
export function update(lAt: i32, lStride: i32, vAt: i32, n: i32): void {
  const ls = bytes(lStride);
  let l = bytes(lAt);
  let v = bytes(vAt);
  let i = 0;
  for (; i + 4 <= n; i += 4) {
    let t0 = f64.load(v);
    let t1 = f64.load(v, 8);
    let t2 = f64.load(v, 16);
    let t3 = f64.load(v, 24);
    let p = l;
    let rotation = scratch;
    for (let k = 0; k < i; k++) {
      const c = f64.load(rotation);
      const s = f64.load(rotation, 8);
      const x0 = f64.load(p);
      const x1 = f64.load(p + ls);
      const x2 = f64.load(p + 2 * ls);
      const x3 = f64.load(p + 3 * ls);
      f64.store(p, c * x0 + s * t0);
      f64.store(p + ls, c * x1 + s * t1);
      f64.store(p + 2 * ls, c * x2 + s * t2);
      f64.store(p + 3 * ls, c * x3 + s * t3);
      t0 = c * t0 - s * x0;
      t1 = c * t1 - s * x1;
      t2 = c * t2 - s * x2;
      t3 = c * t3 - s * x3;
      p += 8;
      rotation += 16;
    }
    f64.store(v, t0);
    f64.store(v, t1, 8);
    f64.store(v, t2, 16);
    f64.store(v, t3, 24);
    for (let r: usize = 0; r < 4; r++) finishRow(l + r * ls, v + (r << 3), i, i + <i32>r);
    l += 4 * ls;
    v += 32;
  }
  for (; i < n; i++) {
    finishRow(l, v, 0, i);
    l += ls;
    v += 8;
  }
}

/** Applies rotations from … i − 1 to row i and makes rotation i. */
function finishRow(l: usize, v: usize, from: i32, i: i32): void {
  let t = f64.load(v);
  let p = l + bytes(from);
  let rotation = scratch + (<usize>from << 4);
  for (let k = from; k < i; k++) {
    const c = f64.load(rotation);
    const s = f64.load(rotation, 8);
    const x = f64.load(p);
    f64.store(p, c * x + s * t);
    t = c * t - s * x;
    p += 8;
    rotation += 16;
  }
  if (t == 0) {
    f64.store(rotation, 1);
    f64.store(rotation, 0, 8);
    return;
  }
  const x = f64.load(p);
  const r = sqrt(x * x + t * t);
  f64.store(p, r);
  f64.store(rotation, x / r);
  f64.store(rotation, t / r, 8);
}

/** Row k of block and U minus `factor` times row j: columns 0 … j of the block (zeros follow), all of U. */
function subtractRow(bk: usize, bj: usize, j: i32, uk: usize, uj: usize, w: i32, factor: f64): void {
  const f = f64x2.splat(factor);
  for (let i = 0; i <= j; i += 2) {
    v128.store(bk, f64x2.sub(v128.load(bk), f64x2.mul(f, v128.load(bj))));
    bk += 16;
    bj += 16;
  }
  for (let i = 0; i < w; i += 2) {
    v128.store(uk, f64x2.sub(v128.load(uk), f64x2.mul(f, v128.load(uj))));
    uk += 16;
    uj += 16;
  }
}

export function reduce(
  lAt: i32,
  lStride: i32,
  start: i32,
  w: i32,
  uAt: i32,
  qAt: i32,
  stride: i32,
  delta: f64,
): i32 {
  const ls = bytes(lStride);
  const us = bytes(stride);
  const u = bytes(uAt);
  const q = bytes(qAt);
  const even = w + (w & 1);
  const bs = bytes(even);
  const block = scratch;
  const inverse = scratch + <usize>w * bs;
  const corner = bytes(lAt + start * lStride + start);
  memory.fill(u, 0, <usize>w * us);
  memory.fill(q, 0, <usize>w * us);
  for (let i = 0; i < w; i++) {
    const row = block + <usize>i * bs;
    memory.fill(row, 0, bs);
    memory.copy(row, corner + <usize>i * ls, bytes(i + 1));
    f64.store(inverse + bytes(i), 1.0 / f64.load(row + bytes(i)));
    f64.store(u + <usize>i * us + bytes(i), 1);
    f64.store(q + <usize>i * us + bytes(i), 1);
  }
  let operations = 0;
  let swapsLeft = MAX_SWAPS_PER_ROW * w;
  let k = 1;
  while (k < w) {
    const high = block + <usize>k * bs;
    const low = high - bs;
    const uh = u + <usize>k * us;
    const at = bytes(k - 1);
    const factor = f64.load(high + at) * f64.load(inverse + at) + ROUND - ROUND;
    if (factor != 0) {
      operations++;
      subtractRow(high, low, k - 1, uh, uh - us, w, factor);
    }
    const a = f64.load(high + at);
    const b = f64.load(high + at, 8);
    const d = f64.load(low + at);
    const square = a * a + b * b;
    if (square < delta * (d * d)) {
      if (--swapsLeft < 0) {
        operations = -1;
        break;
      }
      operations++;
      exchange(block, bs, inverse, w, u, q, us, k, sqrt(square));
      k = k > 1 ? k - 1 : 1;
    } else {
      if (isLong(high, inverse, k - 1)) operations += reduceRow(block, bs, inverse, u, us, k, k - 2, w);
      k++;
    }
  }
  for (let i = 1; i < w; i++) operations += reduceRow(block, bs, inverse, u, us, i, i - 1, w);
  for (let i = 0; i < w; i++) memory.copy(corner + <usize>i * ls, block + <usize>i * bs, bytes(i + 1));
  transpose(q, us, w);
  return operations;
}

/** Whether any of the first `count` entries exceeds LONG times its diagonal. */
function isLong(row: usize, inverse: usize, count: i32): bool {
  let most = f64x2.splat(0);
  const stop = bytes(count & ~1);
  let at: usize = 0;
  for (; at < stop; at += 16) {
    most = f64x2.max(most, f64x2.abs(f64x2.mul(v128.load(row + at), v128.load(inverse + at))));
  }
  if (count & 1 && abs(f64.load(row + at) * f64.load(inverse + at)) > LONG) return true;
  return max(f64x2.extract_lane(most, 0), f64x2.extract_lane(most, 1)) > LONG;
}

/** Size-reduces row k of the block against rows `from` … 0: singly until a multiple of four is left, then four together. */
function reduceRow(
  block: usize,
  bs: usize,
  inverse: usize,
  u: usize,
  us: usize,
  k: i32,
  from: i32,
  w: i32,
): i32 {
  const x = block + <usize>k * bs;
  const uk = u + <usize>k * us;
  let operations = 0;
  let j = from;
  for (; j >= 0 && (j & 3) != 3; j--) {
    const f = f64.load(x + bytes(j)) * f64.load(inverse + bytes(j)) + ROUND - ROUND;
    if (f == 0) continue;
    operations++;
    subtractRow(x, block + <usize>j * bs, j, uk, u + <usize>j * us, w, f);
  }
  for (; j >= 0; j -= 4) {
    const at = bytes(j - 3);
    const r3 = block + <usize>j * bs + at;
    const r2 = r3 - bs;
    const r1 = r2 - bs;
    const r0 = r1 - bs;
    let x3 = f64.load(x + at, 24);
    let x2 = f64.load(x + at, 16);
    let x1 = f64.load(x + at, 8);
    let x0 = f64.load(x + at);
    const f3 = x3 * f64.load(inverse + at, 24) + ROUND - ROUND;
    x3 -= f3 * f64.load(r3, 24);
    x2 -= f3 * f64.load(r3, 16);
    x1 -= f3 * f64.load(r3, 8);
    x0 -= f3 * f64.load(r3);
    const f2 = x2 * f64.load(inverse + at, 16) + ROUND - ROUND;
    x2 -= f2 * f64.load(r2, 16);
    x1 -= f2 * f64.load(r2, 8);
    x0 -= f2 * f64.load(r2);
    const f1 = x1 * f64.load(inverse + at, 8) + ROUND - ROUND;
    x1 -= f1 * f64.load(r1, 8);
    x0 -= f1 * f64.load(r1);
    const f0 = x0 * f64.load(inverse + at) + ROUND - ROUND;
    x0 -= f0 * f64.load(r0);
    const count = i32(f3 != 0) + i32(f2 != 0) + i32(f1 != 0) + i32(f0 != 0);
    if (count == 0) continue;
    operations += count;
    f64.store(x + at, x3, 24);
    f64.store(x + at, x2, 16);
    f64.store(x + at, x1, 8);
    f64.store(x + at, x0);
    subtractFour(x, r3 - at, bs, j - 3, f3, f2, f1, f0);
    subtractFour(uk, u + <usize>j * us, us, w, f3, f2, f1, f0);
  }
  return operations;
}

function exchange(
  block: usize,
  bs: usize,
  inverse: usize,
  w: i32,
  u: usize,
  q: usize,
  us: usize,
  k: i32,
  r: f64,
): void {
  const low = block + <usize>(k - 1) * bs;
  const high = low + bs;
  const at = bytes(k - 1);
  const c = f64.load(high + at) / r;
  const s = f64.load(high + at, 8) / r;
  const d = f64.load(low + at);
  for (let i: usize = 0; i < at; i += 8) {
    const x = f64.load(low + i);
    f64.store(low + i, f64.load(high + i));
    f64.store(high + i, x);
  }
  f64.store(low + at, r);
  f64.store(high + at, c * d);
  f64.store(high + at, s * d, 8);
  f64.store(inverse + at, 1.0 / r);
  f64.store(inverse + at, 1.0 / (s * d), 8);
  const first = f64x2.replace_lane(f64x2.splat(c), 1, s);
  const second = f64x2.replace_lane(f64x2.splat(s), 1, -c);
  let p = high + bs + at;
  for (let i = k + 1; i < w; i++) {
    const v = v128.load(p);
    const x = v128.shuffle<f64>(v, v, 0, 0);
    const y = v128.shuffle<f64>(v, v, 1, 1);
    v128.store(p, f64x2.add(f64x2.mul(first, x), f64x2.mul(second, y)));
    p += bs;
  }
  let ul = u + <usize>(k - 1) * us;
  let ql = q + <usize>(k - 1) * us;
  const cc = f64x2.splat(c);
  const ss = f64x2.splat(s);
  for (let i = 0; i < w; i += 2) {
    const uh = ul + us;
    const qh = ql + us;
    const x = v128.load(ul);
    v128.store(ul, v128.load(uh));
    v128.store(uh, x);
    const y = v128.load(ql);
    const z = v128.load(qh);
    v128.store(ql, f64x2.add(f64x2.mul(cc, y), f64x2.mul(ss, z)));
    v128.store(qh, f64x2.sub(f64x2.mul(ss, y), f64x2.mul(cc, z)));
    ul += 16;
    ql += 16;
  }
}

function transpose(q: usize, qs: usize, w: i32): void {
  for (let i = 0; i < w; i++) {
    for (let j = 0; j < i; j++) {
      const p = q + <usize>i * qs + bytes(j);
      const r = q + <usize>j * qs + bytes(i);
      const x = f64.load(p);
      f64.store(p, f64.load(r));
      f64.store(r, x);
    }
  }
}

export function sizeReduce(
  lAt: i32,
  lStride: i32,
  tAt: i32,
  tStride: i32,
  from: i32,
  to: i32,
  cols: i32,
  band: i32,
): void {
  const ls = bytes(lStride);
  const ts = bytes(tStride);
  const l = bytes(lAt);
  const t = bytes(tAt);
  for (let i = from; i < to; i++) {
    const x = l + <usize>i * ls;
    const ti = t + <usize>i * ts;
    let j = i - 1;
    for (; j >= 0 && (j & 3) != 3; j--) {
      const lj = l + <usize>j * ls;
      const f = f64.load(x + bytes(j)) / f64.load(lj + bytes(j)) + ROUND - ROUND;
      if (f == 0) continue;
      for (let k = 0; k <= j; k++) {
        const y = x + bytes(k);
        f64.store(y, f64.load(y) - f * f64.load(lj + bytes(k)));
      }
      const end = min(cols, j + band);
      const tj = t + <usize>j * ts;
      const ff = f64x2.splat(f);
      for (let k = 0; k < end; k += 2) {
        const y = ti + bytes(k);
        v128.store(y, f64x2.sub(v128.load(y), f64x2.mul(ff, v128.load(tj + bytes(k)))));
      }
    }
    for (; j >= 0; j -= 4) {
      const at = bytes(j - 3);
      const r3 = l + <usize>j * ls + at;
      const r2 = r3 - ls;
      const r1 = r2 - ls;
      const r0 = r1 - ls;
      let x3 = f64.load(x + at, 24);
      let x2 = f64.load(x + at, 16);
      let x1 = f64.load(x + at, 8);
      let x0 = f64.load(x + at);
      const f3 = x3 / f64.load(r3, 24) + ROUND - ROUND;
      x3 -= f3 * f64.load(r3, 24);
      x2 -= f3 * f64.load(r3, 16);
      x1 -= f3 * f64.load(r3, 8);
      x0 -= f3 * f64.load(r3);
      const f2 = x2 / f64.load(r2, 16) + ROUND - ROUND;
      x2 -= f2 * f64.load(r2, 16);
      x1 -= f2 * f64.load(r2, 8);
      x0 -= f2 * f64.load(r2);
      const f1 = x1 / f64.load(r1, 8) + ROUND - ROUND;
      x1 -= f1 * f64.load(r1, 8);
      x0 -= f1 * f64.load(r1);
      const f0 = x0 / f64.load(r0) + ROUND - ROUND;
      x0 -= f0 * f64.load(r0);
      if (f3 == 0 && f2 == 0 && f1 == 0 && f0 == 0) continue;
      f64.store(x + at, x3, 24);
      f64.store(x + at, x2, 16);
      f64.store(x + at, x1, 8);
      f64.store(x + at, x0);
      subtractFour(x, r3 - at, ls, j - 3, f3, f2, f1, f0);
      subtractFour(ti, t + <usize>j * ts, ts, min(cols, j + band), f3, f2, f1, f0);
    }
  }
}

/** x −= f3·r − f2·(row above r) …, columns below `end` rounded up to even. */
function subtractFour(x: usize, r: usize, stride: usize, end: i32, f3: f64, f2: f64, f1: f64, f0: f64): void {
  const g3 = f64x2.splat(f3);
  const g2 = f64x2.splat(f2);
  const g1 = f64x2.splat(f1);
  const g0 = f64x2.splat(f0);
  const r2 = r - stride;
  const r1 = r2 - stride;
  const r0 = r1 - stride;
  const stop: usize = bytes(end);
  for (let k: usize = 0; k < stop; k += 16) {
    let y = f64x2.sub(v128.load(x + k), f64x2.mul(g3, v128.load(r + k)));
    y = f64x2.sub(y, f64x2.mul(g2, v128.load(r2 + k)));
    y = f64x2.sub(y, f64x2.mul(g1, v128.load(r1 + k)));
    v128.store(x + k, f64x2.sub(y, f64x2.mul(g0, v128.load(r0 + k))));
  }
}

export function carry(xAt: i32, rowStride: i32, rows: i32, groups: i32, groupStride: i32, length: i32): void {
  const rs = bytes(rowStride);
  for (let g = 0; g < groups; g++) {
    let x = bytes(xAt + g * groupStride);
    let i = 0;
    for (; i + 4 <= rows; i += 4) {
      let o0: f64 = 0;
      let o1: f64 = 0;
      let o2: f64 = 0;
      let o3: f64 = 0;
      let p = x;
      for (let k = 0; k < length; k++) {
        const v0 = f64.load(p) + o0;
        const v1 = f64.load(p + rs) + o1;
        const v2 = f64.load(p + 2 * rs) + o2;
        const v3 = f64.load(p + 3 * rs) + o3;
        o0 = v0 * PER_LIMB + ROUND - ROUND;
        o1 = v1 * PER_LIMB + ROUND - ROUND;
        o2 = v2 * PER_LIMB + ROUND - ROUND;
        o3 = v3 * PER_LIMB + ROUND - ROUND;
        f64.store(p, v0 - o0 * LIMB);
        f64.store(p + rs, v1 - o1 * LIMB);
        f64.store(p + 2 * rs, v2 - o2 * LIMB);
        f64.store(p + 3 * rs, v3 - o3 * LIMB);
        p += 8;
      }
      x += 4 * rs;
    }
    for (; i < rows; i++) {
      let over: f64 = 0;
      let p = x;
      for (let k = 0; k < length; k++) {
        const v = f64.load(p) + over;
        over = v * PER_LIMB + ROUND - ROUND;
        f64.store(p, v - over * LIMB);
        p += 8;
      }
      x += rs;
    }
  }
}
