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
 * units, of a word of up to k letters; ρ the units that one step adds (real: a truncated division and a halving, 2; two
 * coordinates: twice that, 4). J_n(∅) is computed upward with an error of at most 2 units; put e₀ = 3, which also covers
 * the factor |1 − 2a| ≤ 3 of a single letter. Then e_k(n−1) ≤ e_k(n) + (2/n + 1/n²) e_{k−1}(n) + ρ, hence
 *
 *   e_k(0) ≤ (ρN + 3) Σ_{j≤k} G^j/j!,   G = Σ_{n≤N} (2/n + 1/n²) ≤ 2 (1 + ln N) + 1.65,
 *
 * by induction on k (the sums over n are lower Riemann sums of the exponential series). `tailsRadius` is that bound.
 */
import type { EvaluationContext } from '../family.ts';
import type { Core, Plan, Quotient } from './plan.ts';

export interface TailsSize {
  /** Fraction bits W of the pass. */
  readonly work: number;
  /** Number N of steps. */
  readonly steps: number;
  /** Proven bound of the error of every answer, in units of 2^−work. */
  readonly radius: bigint;
}

/** Units that one step can add, see the header. */
export const REAL_STEP = 2;
export const PAIR_STEP = 4;

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

/** A multiple of a carried value in the bracket of a recursion. */
export interface GatheredTerm {
  /** −1 for the empty word. */
  readonly core: number;
  readonly conjugate: boolean;
  /** Coefficients of powers of n, lowest first. */
  readonly polynomial: readonly number[];
}

/** The bracket of a core without J_n of the core itself: Σ polynomial(n)·J_n(term), over n^exponent. One division serves them all, at four times the price of a product. */
export interface Bracket {
  readonly exponent: number;
  readonly terms: readonly GatheredTerm[];
}

/** `single` is the factor of J(∅)/n for a core of one letter. */
export function gatherBracket(core: Core, plan: Plan, single: number): Bracket {
  const references = core.word.length === 1 ? core.references.map((r) => ({ ...r, factor: single })) : core.references;
  const exponentOf = (r: { quotient: number }): number => (plan.quotients[r.quotient] as Quotient).exponent;
  const exponent = Math.max(...references.map(exponentOf));
  const terms = new Map<string, { core: number; conjugate: boolean; polynomial: number[] }>();
  for (const reference of references) {
    const { core: source } = plan.quotients[reference.quotient] as Quotient;
    const key = `${source}${reference.conjugate ? '*' : ''}`;
    const term = terms.get(key) ?? { core: source, conjugate: reference.conjugate, polynomial: [] };
    const degree = exponent - exponentOf(reference);
    while (term.polynomial.length <= degree) term.polynomial.push(0);
    term.polynomial[degree] = (term.polynomial[degree] as number) + reference.factor;
    terms.set(key, term);
  }
  return { exponent, terms: [...terms.values()] };
}

/** sum + factor·x, without a product for the factors that are common. */
export function addMultiple(sum: bigint, factor: number, x: bigint): bigint {
  if (factor === 1) return sum + x;
  if (factor === -1) return sum - x;
  return factor === 0 ? sum : sum + BigInt(factor) * x;
}

/** polynomial(n)·x. */
export function timesPolynomial(polynomial: readonly number[], n: number, x: bigint): bigint {
  let value = 0;
  for (let i = polynomial.length - 1; i >= 0; i--) value = value * n + (polynomial[i] as number);
  if (value === 1) return x;
  if (Math.abs(value) < Number.MAX_SAFE_INTEGER) return BigInt(value) * x;
  const base = BigInt(n);
  return polynomial.reduceRight((sum, c) => sum * base + BigInt(c), 0n) * x;
}
