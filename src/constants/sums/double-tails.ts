/**
 * Nested sums at roots of unity by double tails: Akhilesh, J. Number Theory 170 (2017) 228, extended here to letters other
 * than 0 and 1.
 *
 * J_n(w) = ∫ (1 − t₁)ⁿ Π ω(a_j, t_j) t_kⁿ; the answer is J₀(w). From (1−t)ⁿ/(a−t) = (1−a)(1−t)ⁿ⁻¹/(a−t) + (1−t)ⁿ⁻¹ and its
 * mirror image, with α = 1/(1−a), σ = −1 (for a = 0: α = 1, σ = 1), β = 1/b and J = J_n on the right:
 *
 *   J_{n−1}(avb) = αβ [J(avb) + σ J(vb)/n + J(av)/n + σ J(v)/n²],   J_{n−1}(a) = αβ [J(a) + (1 − 2a) J(∅)/n],
 *   J_n(1w) = J_n(w0) = J_n(w)/n,   J_n(∅) = 1/C(2n, n).
 *
 * The pass starts at n = N from zero and runs down to n = 0 in fixed point with W fraction bits ("units" of 2^−W).
 *
 * **Truncation.** (1−t₁)^N t_k^N ≤ 4^−(N−k) Π t_j(1−t_j) and t(1−t)/|a−t| ≤ 1 for every letter on the unit circle (and 0), so
 * |J_N(w)| ≤ 4^−(N−k)/k!. With N ≥ W/2 + k the start is wrong by at most one unit.
 *
 * **Rounding.** |αβ| ≤ 1 for the letters 0, 1 and the roots of unity of order 2, 4 and 6. Let e_k be the largest error, in
 * units, of a word of up to k letters; ρ the units that one step adds (real: three truncated divisions and a halving, 4;
 * two coordinates: twice that, 8). J_n(∅) is computed upward with an error of at most 2 units; put e₀ = 3, which also covers
 * the factor |1 − 2a| ≤ 3 of a single letter. Then e_k(n−1) ≤ e_k(n) + (2/n + 1/n²) e_{k−1}(n) + ρ, hence
 *
 *   e_k(0) ≤ (ρN + 3) Σ_{j≤k} G^j/j!,   G = Σ_{n≤N} (2/n + 1/n²) ≤ 2 (1 + ln N) + 1.65,
 *
 * by induction on k (the sums over n are lower Riemann sums of the exponential series). `tailsRadius` is that bound.
 */
import { gcdOf } from '../../number/integer.ts';
import type { EvaluationContext } from '../family.ts';
import type { Plan } from './plan.ts';

export interface TailsSize {
  /** Fraction bits W of the pass. */
  readonly work: number;
  /** Number N of steps. */
  readonly steps: number;
  /** Proven bound of the error of every answer, in units of 2^−work. */
  readonly radius: bigint;
}

/** Units that one step can add, see the header. */
export const REAL_STEP = 4;
export const PAIR_STEP = 8;

/** Sizes of a pass whose answers are to have a radius of at most 2^−bits for words of up to `length` letters; errors may grow by 2^log2Growth a step. */
export function tailsSize(bits: number, length: number, unitsPerStep: number, log2Growth = 0): TailsSize {
  for (let guard = 16; ; ) {
    const work = bits + guard;
    const steps = Math.ceil(work / 2) + length;
    const log2Radius = tailsRadius(steps, length, unitsPerStep) + steps * log2Growth;
    if (log2Radius <= guard) return { work, steps, radius: 1n << BigInt(Math.ceil(log2Radius)) };
    guard += Math.max(4, Math.floor((log2Radius - guard) / 2));
  }
}

/** log2 of the bound of the header, rounded up by far more than the double arithmetic can lose. */
export function tailsRadius(steps: number, length: number, unitsPerStep: number): number {
  const g = 2 * (1 + Math.log(steps)) + 1.65;
  let sum = 1;
  let term = 1;
  for (let j = 1; j <= length; j++) {
    term *= g / j;
    sum += term;
  }
  return Math.log2((unitsPerStep * steps + 3) * sum) + 0.001;
}

/** 2^work/C(2n, n) for n = 0 … steps, each too small by less than 2. */
export function centralInverses(steps: number, work: number): bigint[] {
  const values = [1n << BigInt(work)];
  for (let n = 1; n <= steps; n++) {
    values.push(((values[n - 1] as bigint) * BigInt(n)) / BigInt(4 * n - 2));
  }
  return values;
}

/** n^e for e = 0 … top. */
export function powersOf(n: number, top: number): bigint[] {
  const base = BigInt(n);
  const powers = [1n];
  for (let e = 1; e <= top; e++) powers.push((powers[e - 1] as bigint) * base);
  return powers;
}

/** Called between steps: hears a cancel and reports progress every 64 of them. */
export function pulse(n: number, steps: number, context: EvaluationContext): void {
  if (n % 64 !== 0) return;
  context.signal?.throwIfAborted();
  context.onProgress?.(1 - n / steps);
}

/** J₀ of every core, in units of 2^−work, where the only letters are 0, 1 and −1 (codes 0, 1, 2). */
export function realTails(plan: Plan, size: TailsSize, context: EvaluationContext): bigint[] {
  const { cores, quotients } = plan;
  const empty = centralInverses(size.steps, size.work);
  const values = cores.map(() => 0n);
  const shares = quotients.map(() => 0n);
  const halved = cores.map((core) => core.first === 2);
  const negated = cores.map((core) => core.last === 2);
  // 1 − 2a = 3 for the single letter −1.
  const references = cores.map((core) =>
    core.word.length === 1 ? core.references.map((r) => ({ ...r, factor: 3 })) : core.references,
  );
  for (let n = size.steps; n >= 1; n--) {
    const powers = powersOf(n, plan.maxExponent);
    for (let q = 0; q < quotients.length; q++) {
      const { core, exponent } = quotients[q] as { core: number; exponent: number };
      shares[q] = (core < 0 ? (empty[n] as bigint) : (values[core] as bigint)) / (powers[exponent] as bigint);
    }
    for (let c = 0; c < cores.length; c++) {
      let sum = values[c] as bigint;
      for (const { quotient, factor } of references[c] as readonly { quotient: number; factor: number }[]) {
        sum = addMultiple(sum, factor, shares[quotient] as bigint);
      }
      if (halved[c]) sum >>= 1n;
      values[c] = negated[c] ? -sum : sum;
    }
    pulse(n, size.steps, context);
  }
  return values;
}

function addMultiple(sum: bigint, factor: number, x: bigint): bigint {
  if (factor === 1) return sum + x;
  if (factor === -1) return sum - x;
  return factor === 0 ? sum : sum + BigInt(factor) * x;
}

/** The number x + yτ of ℤ[τ], where τ = i (order 4) or τ = e^{iπ/3} (order 6). */
export interface Pair {
  readonly x: number;
  readonly y: number;
}

/** A ring of two coordinates: τ² = trace·τ − 1. */
export interface PairRing {
  readonly order: 4 | 6;
  readonly trace: 0 | 1;
}

export const gaussian: PairRing = { order: 4, trace: 0 };
export const eisenstein: PairRing = { order: 6, trace: 1 };

function pairProduct(a: Pair, b: Pair, ring: PairRing): Pair {
  const yy = a.y * b.y;
  return { x: a.x * b.x - yy, y: a.x * b.y + a.y * b.x + ring.trace * yy };
}

function pairConjugate(a: Pair, ring: PairRing): Pair {
  return { x: a.x + ring.trace * a.y, y: -a.y };
}

/** τ^e. */
export function pairRoot(exponent: number, ring: PairRing): Pair {
  let root: Pair = { x: 1, y: 0 };
  for (let k = 0; k < exponent; k++) root = pairProduct(root, { x: 0, y: 1 }, ring);
  return root;
}

/** The product with (x + yτ)/norm as a matrix on coordinates. */
interface PairMap {
  readonly xx: number;
  readonly xy: number;
  readonly yx: number;
  readonly yy: number;
  readonly norm: bigint;
}

/** The product with αβ = 1/((1 − a)b). */
function tailMap(first: number, last: number, ring: PairRing): PairMap {
  const root = pairRoot(last - 1, ring);
  let factor = pairConjugate(root, ring);
  let norm = 1;
  if (first !== 0) {
    const a = pairRoot(first - 1, ring);
    const difference = { x: 1 - a.x, y: -a.y };
    const conjugate = pairConjugate(difference, ring);
    norm = pairProduct(difference, conjugate, ring).x;
    factor = pairProduct(factor, conjugate, ring);
  }
  const common = Number(gcdOf([BigInt(factor.x), BigInt(factor.y), BigInt(norm)]));
  const x = factor.x / common;
  const y = factor.y / common;
  return { xx: x, xy: -y, yx: y, yy: x + ring.trace * y, norm: BigInt(norm / common) };
}

/** J₀ of every core as coordinates in ℤ[τ] in units of 2^−work, for letters 0 and e^{2πi·(code − 1)/order}. */
export function pairTails(
  plan: Plan,
  ring: PairRing,
  size: TailsSize,
  context: EvaluationContext,
): { x: bigint[]; y: bigint[] } {
  const { cores, quotients } = plan;
  const empty = centralInverses(size.steps, size.work);
  const x = cores.map(() => 0n);
  const y = cores.map(() => 0n);
  const shareX = quotients.map(() => 0n);
  const shareY = quotients.map(() => 0n);
  const maps = cores.map((core) => tailMap(core.first, core.last, ring));
  for (let n = size.steps; n >= 1; n--) {
    const powers = powersOf(n, plan.maxExponent);
    for (let q = 0; q < quotients.length; q++) {
      const { core, exponent } = quotients[q] as { core: number; exponent: number };
      const divisor = powers[exponent] as bigint;
      if (core < 0) shareX[q] = (empty[n] as bigint) / divisor;
      else {
        shareX[q] = (x[core] as bigint) / divisor;
        shareY[q] = (y[core] as bigint) / divisor;
      }
    }
    for (let c = 0; c < cores.length; c++) {
      const core = cores[c] as Plan['cores'][number];
      let sumX = x[c] as bigint;
      let sumY = y[c] as bigint;
      if (core.word.length === 1) {
        const a = pairRoot(core.first - 1, ring);
        const share = shareX[(core.references[0] as { quotient: number }).quotient] as bigint;
        sumX = addMultiple(sumX, 1 - 2 * a.x, share);
        sumY = addMultiple(sumY, -2 * a.y, share);
      } else {
        for (const { quotient, factor, conjugate } of core.references) {
          const partY = shareY[quotient] as bigint;
          const partX = shareX[quotient] as bigint;
          sumX = addMultiple(sumX, factor, partX);
          if (conjugate && ring.trace === 1) sumX = addMultiple(sumX, factor, partY);
          sumY = addMultiple(sumY, conjugate ? -factor : factor, partY);
        }
      }
      const { xx, xy, yx, yy, norm } = maps[c] as PairMap;
      const newX = addMultiple(multiple(xx, sumX), xy, sumY);
      const newY = addMultiple(multiple(yx, sumX), yy, sumY);
      x[c] = norm === 1n ? newX : newX / norm;
      y[c] = norm === 1n ? newY : newY / norm;
    }
    pulse(n, size.steps, context);
  }
  return { x, y };
}

function multiple(factor: number, x: bigint): bigint {
  if (factor === 1) return x;
  if (factor === -1) return -x;
  return factor === 0 ? 0n : BigInt(factor) * x;
}
