/** Feeding bits of the numbers: the weight of the residuals grows by 2^b, a rank-m update of the triangular factor. */
import { LIMB_BITS, leading, timesPowerOfTwo } from './limbs.ts';
import { type LatticeState, runAt } from './state.ts';

/** log2 of the diagonal: how far it falls, and its ends, in units of L. */
export interface Profile {
  /** Largest log2 l_ii/l_jj over i < j; at least 0. */
  readonly drop: number;
  readonly least: number;
  readonly largest: number;
  readonly first: number;
  /** Σ log2 l_ii. */
  readonly sum: number;
}

export function profile(state: LatticeState): Profile {
  const { active, l, stride } = state;
  const f = state.kernels.view();
  let drop = 0;
  let least = Number.POSITIVE_INFINITY;
  let largest = Number.NEGATIVE_INFINITY;
  let sum = 0;
  for (let i = 0; i < active; i++) {
    const x = Math.log2(f[l + i * stride + i] as number);
    sum += x;
    if (x > largest) largest = x;
    if (x < least) least = x;
    if (largest - x > drop) drop = largest - x;
  }
  return { drop, least, largest, first: Math.log2(f[l] as number), sum };
}

const parts: [number, number] = [0, 0];

/** log2 of the largest residual of a row, from the window; −Infinity for zero. */
export function residualBits(state: LatticeState, f: Float64Array, i: number): number {
  let size = Number.NEGATIVE_INFINITY;
  for (let j = 0; j < state.m; j++) {
    leading(f, runAt(state.window, i, j), state.window.used, parts);
    if (parts[0] !== 0) size = Math.max(size, Math.log2(Math.abs(parts[0])) + parts[1] + LIMB_BITS * state.windowLow);
  }
  return size;
}

/**
 * The number of bits the next stage feeds. The update spreads the diagonal by at most that many bits beyond its present
 * drop; the total stays below `range`, so that double precision still resolves the smallest entry.
 */
export function bitsToFeed(
  state: LatticeState,
  shape: Profile,
  largestResidual: number,
  range: number,
  end: number,
): number {
  const height = largestResidual - state.e - state.scale - shape.least;
  const b = Math.floor(Math.min(range - shape.drop, range + 4 - Math.max(0, height)));
  return Math.min(Math.max(1, b), state.e - end);
}

/** Feeds b bits. */
export function feed(state: LatticeState, b: number): void {
  const { active, m, window, feedVector, kernels, l, stride } = state;
  const f = kernels.view();
  const gain = Math.sqrt(4 ** b - 1);
  const exponent = LIMB_BITS * state.windowLow - state.e - state.scale;
  for (let j = 0; j < m; j++) {
    for (let i = 0; i < active; i++) {
      leading(f, runAt(window, i, j), window.used, parts);
      f[feedVector + i] = timesPowerOfTwo(parts[0], parts[1] + exponent) * gain;
    }
    kernels.update(l, stride, feedVector, active);
  }
  state.e -= b;
}
