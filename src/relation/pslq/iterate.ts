/**
 * PSLQ iterations in Float64: Ferguson, Bailey and Arno, "Analysis of PSLQ, an integer relation finding algorithm",
 * Math. Comp. 68 (1999) 351, with several disjoint exchanges at once as in Bailey and Broadhurst, "Parallel integer relation
 * detection: techniques and applications", Math. Comp. 70 (2001) 1719.
 *
 * The exact state is a unimodular matrix B (rows bᵢ) and residuals yᵢ = bᵢ·x. H is the lower triangular factor of
 * (D·Dᵀ)⁻¹, where D has the rows [bᵢ | yᵢⱼ/ρⱼ]. Classical PSLQ is the limit ρ → 0, in which the last m diagonal entries
 * vanish; ρ is lowered in stages instead, so that no multiplier ever exceeds what a double holds. Nothing here needs
 * trusting: H only proposes unimodular steps, which are applied to the exact state.
 */

import type { Factor } from './factor.ts';

/** Numerics of one stage: n rows; `h` and `u` row-major n×n. */
export interface Stage {
  readonly n: number;
  /** Lower triangular H. */
  readonly h: Float64Array;
  /** The unimodular transform found so far: new bᵢ = Σ uᵢⱼ·bⱼ. Integers below 2^53. */
  readonly u: Float64Array;
  /** Absolute uncertainty of row i of D, from rounding: multipliers that it drowns are not worth making. */
  readonly noise: Float64Array;
  /** The same of the rows that `u` started from. */
  readonly source: Float64Array;
  /** Largest |uᵢⱼ| of row i. */
  readonly growth: Float64Array;
}

const GAMMA_LOG2 = Math.log2(2 / Math.sqrt(3));
/** An exchange must shrink the diagonal entry by this factor: guarantees progress in spite of rounding. */
const SHRINK = 0.99;
/** Transforms stay below this, so that one more reduction step is exact in a double. */
const GROWTH_LIMIT = 2 ** 40;
const EXACT_LIMIT = 2 ** 52;
/**
 * Only every second round reduces below the subdiagonal, which alone decides about exchanges. A longer wait (8 rounds) lets entries
 * grow until rounding spoils the subdiagonal too: measured, relations were then missed.
 */
const FULL_EVERY = 2;
/** A multiplier above this waits until no exchange is left: it often vanishes when the rows it acts on have become shorter. */
const PATIENCE_LIMIT = 2 ** 20;
export function newStage({ h, noise }: Factor, n: number): Stage {
  const u = new Float64Array(n * n);
  for (let i = 0; i < n; i++) u[i * n + i] = 1;
  return { n, h, u, noise, source: noise.slice(), growth: new Float64Array(n).fill(1) };
}

/**
 * Exchanges and reduces until no exchange helps ('done'), or only multipliers too large for the transform are left ('wide'),
 * or the transform has grown to its limit ('grown'), or `limit` rounds have been made ('more'). Adds the rounds made to `count`.
 */
export function iterate(stage: Stage, limit: number, count: { rounds: number }): 'done' | 'wide' | 'grown' | 'more' {
  for (let round = 0; round < limit; round++) {
    reduce(stage, round % FULL_EVERY === 0 ? stage.n : 1);
    let pairs = choosePairs(stage);
    if (pairs.length === 0) {
      const reduced = reduce(stage, stage.n);
      pairs = choosePairs(stage);
      if (pairs.length === 0) return reduced ? 'done' : 'wide';
    }
    count.rounds++;
    for (const r of pairs) exchange(stage, r);
    if (stage.growth.some((size) => size > GROWTH_LIMIT)) return 'grown';
  }
  return 'more';
}

/**
 * Hermite reduction with multipliers of any size: `act(i, j, t)` must do b_j += t·b_i exactly, t an integer of any size in a double.
 * Only for rows whose lengths differ by more than a transform in doubles can bridge.
 */
export function reduceWide({ h, noise }: Factor, n: number, act: (i: number, j: number, t: number) => void): void {
  for (let i = 1; i < n; i++) {
    for (let j = i - 1; j >= 0; j--) {
      const ratio = (h[i * n + j] as number) / (h[j * n + j] as number);
      if (!significant(ratio, h[i * n + i] as number, noise[j] as number)) continue;
      const t = Math.round(ratio);
      for (let k = 0; k <= j; k++) h[i * n + k] = (h[i * n + k] as number) - t * (h[j * n + k] as number);
      act(i, j, t);
    }
  }
}

/** Whether a multiplier is worth making: above a half, and above what rounding of row j leaves uncertain. */
function significant(ratio: number, diagonal: number, noise: number): boolean {
  const size = Math.abs(ratio);
  return size > 0.501 && size > 4 * Math.abs(diagonal) * noise;
}

/** Disjoint neighbours (r, r+1), best weight γ^r·|H_rr| first, whose exchange shrinks H_rr. */
function choosePairs(stage: Stage): number[] {
  const { n, h } = stage;
  const order: { r: number; weight: number }[] = [];
  for (let r = 0; r < n - 1; r++) {
    const here = Math.abs(h[r * n + r] as number);
    const below = (r + 1) * n + r;
    const after = Math.sqrt((h[below] as number) ** 2 + (h[below + 1] as number) ** 2);
    if (after < SHRINK * here) order.push({ r, weight: r * GAMMA_LOG2 + Math.log2(here) });
  }
  order.sort((a, b) => b.weight - a.weight || a.r - b.r);
  const taken = new Uint8Array(n + 1);
  const pairs: number[] = [];
  for (const { r } of order) {
    if (taken[r] || taken[r + 1]) continue;
    taken[r] = 1;
    taken[r + 1] = 1;
    pairs.push(r);
    if (pairs.length >= Math.max(1, 0.4 * n)) break;
  }
  return pairs;
}

function exchange(stage: Stage, r: number): void {
  const { n, h, u } = stage;
  const a = r * n;
  const b = a + n;
  for (const list of [stage.noise, stage.growth]) {
    const t = list[r] as number;
    list[r] = list[r + 1] as number;
    list[r + 1] = t;
  }
  for (let k = 0; k < n; k++) {
    const t = u[a + k] as number;
    u[a + k] = u[b + k] as number;
    u[b + k] = t;
  }
  for (let k = 0; k <= r + 1; k++) {
    const t = h[a + k] as number;
    h[a + k] = h[b + k] as number;
    h[b + k] = t;
  }
  const x = h[a + r] as number;
  const y = h[a + r + 1] as number;
  const d = Math.sqrt(x * x + y * y);
  const c = x / d;
  const s = y / d;
  for (let i = r; i < n; i++) {
    const at = i * n + r;
    const p = h[at] as number;
    const q = h[at + 1] as number;
    h[at] = c * p + s * q;
    h[at + 1] = c * q - s * p;
  }
  h[a + r + 1] = 0;
}

/**
 * Hermite reduction: |H_ij| ≤ |H_jj|/2 for i − band ≤ j < i, as far as rounding lets one see. Multipliers above PATIENCE_LIMIT are made only
 * next to the diagonal, and none that would take the transform past exact doubles. False when one was left out.
 */
function reduce(stage: Stage, band: number): boolean {
  const { n, h, noise, growth } = stage;
  let complete = true;
  for (let i = 1; i < n; i++) {
    const diagonal = h[i * n + i] as number;
    const last = Math.max(0, i - band);
    for (let j = i - 1; j >= last; j--) {
      const ratio = (h[i * n + j] as number) / (h[j * n + j] as number);
      if (ratio <= 0.501 && ratio >= -0.501) continue;
      if (!significant(ratio, diagonal, noise[j] as number)) continue;
      const size = Math.abs(ratio);
      const room = (EXACT_LIMIT - (growth[j] as number)) / (growth[i] as number);
      if ((size > PATIENCE_LIMIT && j < i - 1) || size > room) complete = false;
      else addMultiple(stage, i, j, Math.round(ratio));
    }
  }
  return complete;
}

/** H_i −= t·H_j, and on the other side b_j += t·b_i. */
function addMultiple(stage: Stage, i: number, j: number, t: number): void {
  const { n, h, u, noise, source, growth } = stage;
  for (let k = 0; k <= j; k++) h[i * n + k] = (h[i * n + k] as number) - t * (h[j * n + k] as number);
  let top = 0;
  let level = 0;
  for (let k = 0; k < n; k++) {
    const value = (u[j * n + k] as number) + t * (u[i * n + k] as number);
    u[j * n + k] = value;
    const size = Math.abs(value);
    if (size > top) top = size;
    const part = size * (source[k] as number);
    if (part > level) level = part;
  }
  growth[j] = top;
  noise[j] = level;
}
