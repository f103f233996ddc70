/**
 * B(j, s) = Σ_{k≥0} (−1)^k/(mk + j)^s for residues 1 ≤ j ≤ m, the one kernel behind ζ, β, L-values, Clausen, Hurwitz and
 * polygamma values: algorithm 1 of Cohen, Rodriguez Villegas and Zagier, "Convergence acceleration of alternating series",
 * Exper. Math. 9 (2000) 3.
 *
 * **Truncation.** 1/(mk + j)^s = ∫₀¹ y^k dμ(y) with a positive measure of mass j^−s ≤ 1. With the Chebyshev polynomial
 * P(y) = T_n(1 − 2y), |P| ≤ 1 on [0, 1] and d = P(−1) = T_n(3) ≥ (3 + √8)ⁿ/2 the error is |∫ P(y)/(P(−1)(1 + y)) dμ| ≤ 1/d.
 * **Rounding.** The weights c_k are exact integers; each truncated division c_k/(mk + j)^s loses less than 1 in units of 1/d,
 * n + 1 together with the truncation: at most one unit of 2^−work once d ≥ 2^work (n + 1). The quotient by d loses less than
 * one more unit.
 */
import type { EvaluationContext } from './family.ts';

/** log2(3 + √8), rounded down. */
const BITS_PER_TERM = 2.5431;

/** Terms n with (3 + √8)ⁿ/2 ≥ 2^work (n + 1). */
function termCount(work: number): number {
  let n = Math.ceil((work + 2) / BITS_PER_TERM);
  while (n * BITS_PER_TERM - 1 < work + Math.log2(n + 1) + 0.01) n++;
  return n;
}

/** T_n(3), by doubling. */
function chebyshevAtThree(n: number): bigint {
  let low = 1n;
  let high = 3n;
  for (const digit of n.toString(2)) {
    const middle = 2n * low * high - 3n;
    if (digit === '1') [low, high] = [middle, 2n * high * high - 1n];
    else [low, high] = [2n * low * low - 1n, middle];
  }
  return low;
}

/** Every B(j, s) for the given residues and exponents s ≥ 1 as integers in units of 2^−work, each within 2 units: result[exponent][residue]. */
export function alternatingSums(
  period: number,
  residues: readonly number[],
  exponents: readonly number[],
  work: number,
  context: EvaluationContext,
): bigint[][] {
  const n = termCount(work);
  const d = chebyshevAtThree(n);
  // By ascending exponent each further division is by a small power: ⌊⌊c/a⌋/b⌋ = ⌊c/(ab)⌋ loses nothing more.
  const order = exponents.map((_, e) => e).sort((x, y) => (exponents[x] as number) - (exponents[y] as number));
  const steps = order.map((e, j) =>
    BigInt((exponents[e] as number) - (j === 0 ? 0 : (exponents[order[j - 1] as number] as number))),
  );
  const sums = exponents.map(() => residues.map(() => 0n));
  let b = -1n;
  let c = -d;
  for (let k = 0; k < n; k++) {
    c = b - c;
    for (let r = 0; r < residues.length; r++) {
      const base = BigInt(period * k + (residues[r] as number));
      let share = c;
      for (let j = 0; j < order.length; j++) {
        share /= base ** (steps[j] as bigint);
        const row = sums[order[j] as number] as bigint[];
        row[r] = (row[r] as bigint) + share;
      }
    }
    b = (b * BigInt(2 * (k + n) * (k - n))) / BigInt((2 * k + 1) * (k + 1));
    if (k % 64 === 63) {
      context.signal?.throwIfAborted();
      context.onProgress?.(k / n);
    }
  }
  const bits = BigInt(work);
  return sums.map((row) => row.map((sum) => (sum << bits) / d));
}

/** Error of each result of `alternatingSums`, in its units. */
export const ALTERNATING_ERROR = 2n;
