/**
 * Block reduction for the end of a search, where every bit of quality counts: in each block of the factor the shortest vector is
 * looked for by enumeration, and inserted when it is shorter than the block's first (BKZ: Schnorr and Euchner, "Lattice basis
 * reduction: improved practical algorithms and solving subset sum problems", Math. Programming 66 (1994) 181).
 */
import { identity, type LatticeState } from './state.ts';
import { reduceWindow } from './sweep.ts';

/** A block is searched only if its first vector exceeds this multiple of the length expected of the shortest. */
const WORTHWHILE = 1.05;
/** Nodes of one enumeration; past them the block is left as it is. */
const NODES_PER_BLOCK = 20_000;
const NODES_PER_STEP = 100_000;

export interface Tour {
  readonly insertions: number;
  readonly nodes: number;
  readonly reach: number;
}

/**
 * One tour over all blocks of `size` rows, each made LLL-reduced again after an insertion. U ← its transform, whose row i is
 * zero from column i + reach on; L ← the factor after it, not wholly size-reduced. A generator: it yields now and then.
 */
export function* tour(state: LatticeState, size: number, delta: number): Generator<void, Tour, void> {
  const { active, kernels, u, stride } = state;
  identity(kernels.view(), u, stride, active);
  // A row moves down by less than a block and takes its columns with it; windows then mix the rows of a block.
  const reach = 2 * size;
  let insertions = 0;
  let nodes = 0;
  let pause = NODES_PER_STEP;
  for (let start = 0; start + 1 < active; start++) {
    const count = Math.min(size, active - start);
    const found = shortVector(state, start, count);
    nodes += found.nodes;
    if (found.x !== undefined) {
      insert(state, start, found.x);
      reduceWindow(state, start, count, delta, reach);
      insertions++;
    }
    if (nodes + 1000 * insertions > pause) {
      pause = nodes + 1000 * insertions + NODES_PER_STEP;
      yield;
    }
  }
  return { insertions, nodes, reach };
}

/** Integers x with the projection of Σ xᵢ·row(start + i) shorter than row `start`, and the last non-zero one ±1. */
function shortVector(state: LatticeState, start: number, count: number): { x: Int32Array | undefined; nodes: number } {
  const { l, stride, kernels } = state;
  const f = kernels.view();
  const mu = new Float64Array(count * count);
  const square = new Float64Array(count);
  let logVolume = 0;
  for (let i = 0; i < count; i++) {
    const d = f[l + (start + i) * (stride + 1)] as number;
    square[i] = d * d;
    logVolume += Math.log(d);
    for (let j = 0; j < i; j++) {
      mu[j * count + i] =
        (f[l + (start + i) * stride + start + j] as number) / (f[l + (start + j) * (stride + 1)] as number);
    }
  }
  const expected = Math.exp(logVolume / count + logBallRadius(count));
  if (Math.sqrt(square[0] as number) < WORTHWHILE * expected) return { x: undefined, nodes: 0 };
  return enumerate(mu, square, count, 0.98 * (square[0] as number));
}

/** log of the radius of the ball of volume 1 in n dimensions, by Stirling's series. */
function logBallRadius(n: number): number {
  const z = n / 2 + 1;
  const logGamma = (z - 0.5) * Math.log(z) - z + 0.5 * Math.log(2 * Math.PI) + 1 / (12 * z);
  return logGamma / n - 0.5 * Math.log(Math.PI);
}

/** Depth-first enumeration in the order of Schnorr and Euchner; mu[j·n + i] is the coefficient of row i along row j < i. */
function enumerate(
  mu: Float64Array,
  square: Float64Array,
  n: number,
  limit: number,
): { x: Int32Array | undefined; nodes: number } {
  const x = new Int32Array(n);
  const centre = new Float64Array(n);
  const rest = new Float64Array(n + 1); // squared length of the part from level k up
  const side = new Int32Array(n); // next step of the zigzag
  let bound = limit;
  let best: Int32Array | undefined;
  let nodes = 0;
  let top = 0;
  let k = 0;
  x[0] = 1;
  side[0] = 1;
  while (nodes++ < NODES_PER_BLOCK) {
    const away = (x[k] as number) + (centre[k] as number);
    const length = (rest[k + 1] as number) + away * away * (square[k] as number);
    if (length < bound) {
      rest[k] = length;
      if (k === 0) {
        if (Math.abs(x[top] as number) === 1) {
          bound = 0.999 * length;
          best = x.slice();
        }
      } else {
        k--;
        let sum = 0;
        for (let i = k + 1; i <= top; i++) sum += (x[i] as number) * (mu[k * n + i] as number);
        centre[k] = sum;
        x[k] = Math.round(-sum);
        side[k] = (x[k] as number) + sum <= 0 ? 1 : -1;
        continue;
      }
    } else if (++k === n) break;
    if (k >= top) {
      // Above the highest non-zero entry only one sign is needed.
      top = k;
      x[k] = (x[k] as number) + 1;
    } else {
      x[k] = (x[k] as number) + (side[k] as number);
      side[k] = (side[k] as number) > 0 ? -(side[k] as number) - 1 : -(side[k] as number) + 1;
    }
  }
  return { x: best, nodes };
}

/** Row `start` ← Σ xᵢ·row(start + i), the rows up to the last non-zero xᵢ move down by one; L is made triangular again. */
function insert(state: LatticeState, start: number, x: Int32Array): void {
  const { l, u, stride, kernels, active } = state;
  const f = kernels.view();
  let last = x.length - 1;
  while (x[last] === 0) last--;
  for (const matrix of [l, u]) {
    const combined = new Float64Array(active);
    for (let i = 0; i <= last; i++) {
      const at = matrix + (start + i) * stride;
      for (let j = 0; j < active; j++) combined[j] = (combined[j] as number) + (x[i] as number) * (f[at + j] as number);
    }
    for (let i = last; i > 0; i--)
      f.copyWithin(
        matrix + (start + i) * stride,
        matrix + (start + i - 1) * stride,
        matrix + (start + i - 1) * stride + active,
      );
    f.set(combined, matrix + start * stride);
  }
  for (let c = start + last; c > start; c--) rotate(f, l, stride, start, c, active);
}

/** Reflects columns c − 1 and c so that entry (row, c) becomes zero and entry (row, c − 1) positive. */
function rotate(f: Float64Array, l: number, stride: number, row: number, c: number, active: number): void {
  const a = f[l + row * stride + c - 1] as number;
  const b = f[l + row * stride + c] as number;
  const r = Math.hypot(a, b);
  if (r === 0) return;
  const [p, q] = [a / r, b / r];
  for (let i = row; i < active; i++) {
    const at = l + i * stride + c;
    const y = f[at - 1] as number;
    const z = f[at] as number;
    f[at - 1] = p * y + q * z;
    f[at] = q * y - p * z;
  }
  f[l + row * stride + c] = 0;
}
