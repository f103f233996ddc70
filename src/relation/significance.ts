/** Could this relation be chance? Counting arguments shared by both methods. */
import { absolute, log10Of } from '../number/integer.ts';
import { columnGram, log10Determinant } from './gram.ts';
import type { Prepared } from './prepare.ts';

/**
 * A candidate is called a relation only when chance would give fewer than 10^−this such vectors. Below it the digits
 * have run out: something of this size vanishes to this accuracy for almost any numbers.
 */
export const SURPLUS_DIGITS = 5;

/** log10 of the volume of the unit ball in n dimensions, from V(n) = V(n−2)·2π/n. */
export function log10BallVolume(n: number): number {
  let log = n % 2 === 0 ? 0 : Math.log10(2);
  for (let k = n % 2 === 0 ? 2 : 3; k <= n; k += 2) log += Math.log10((2 * Math.PI) / k);
  return log;
}

/**
 * −log10 of the expected number of integer vectors that are as short as c and vanish to the accuracy of the numbers by
 * chance. Vectors of norm at most N are counted by the volume of a ball of radius² N² + n/12 (each integer point
 * carries its unit cube); their sums over the columns are taken as normal with covariance N²·x̂ᵀx̂/(n + 2), blurred by the errors E,
 * so that columns which say the same thing (real and imaginary part of one phase times real numbers, say) count once.
 * A heuristic, good to about a digit; never part of a proof. Infinity when the numbers that take part are exact: then
 * there is no chance about it.
 */
export function surplusDigits(prepared: Prepared, coefficients: readonly bigint[]): number {
  const n = coefficients.length;
  const square = coefficients.reduce((sum, c) => sum + c * c, 0n);
  const normLog10 = log10Of(square) / 2;
  const widened = normLog10 > 8 ? normLog10 : Math.log10(10 ** (2 * normLog10) + n / 12) / 2;
  const vectors = log10BallVolume(n) + n * widened;
  const errors = prepared.columns.map((_, j) =>
    coefficients.reduce((sum, c, i) => sum + absolute(c) * (prepared.errors[i]?.[j] as bigint), 0n),
  );
  if (errors.every((e) => e === 0n)) return Number.POSITIVE_INFINITY;
  // Probability of |c·x̂ⱼ| ≤ Eⱼ for all j: Π 2Eⱼ over √det(2π·(covariance + E²)), times n + 2 to stay in integers.
  const blurred = columnGram(prepared).map((row, j) =>
    row.map((dot, k) => square * dot + (j === k ? BigInt(n + 2) * ((errors[j] as bigint) + 1n) ** 2n : 0n)),
  );
  let chance = -(log10Determinant(blurred) - prepared.columns.length * Math.log10(n + 2)) / 2;
  for (const error of errors) chance += log10Of(error + 1n) + Math.log10(2 / Math.sqrt(2 * Math.PI));
  return -vectors - Math.min(0, chance);
}

/** Whether residuals of the given coefficients are all within what the errors of the numbers allow. */
export function withinErrors(
  prepared: Prepared,
  coefficients: readonly bigint[],
  residuals: readonly bigint[],
): boolean {
  return residuals.every((y, j) => {
    if (y === 0n) return true;
    let allowed = 0n;
    coefficients.forEach((c, k) => {
      if (c !== 0n) allowed += absolute(c) * (prepared.errors[k]?.[j] as bigint);
    });
    return absolute(y) <= allowed;
  });
}

export function log10Norm(coefficients: readonly bigint[]): number {
  return log10Of(coefficients.reduce((sum, c) => sum + c * c, 0n)) / 2;
}

/** The vector divided by its content, first non-zero entry positive. */
export function primitive(coefficients: readonly bigint[]): bigint[] {
  let content = 0n;
  for (const c of coefficients) {
    let [a, b] = [content, absolute(c)];
    while (b !== 0n) [a, b] = [b, a % b];
    content = a;
  }
  if (content === 0n) throw new RangeError('primitive: expected a non-zero vector');
  const first = coefficients.find((c) => c !== 0n) as bigint;
  const divisor = first < 0n ? -content : content;
  return coefficients.map((c) => c / divisor);
}

/** About how many digits a search of n numbers in m columns needs to rule out every norm up to 10^maxNormLog10. */
export function digitsNeeded(n: number, m: number, maxNormLog10: number): number {
  // Lattice reduction leaves its shortest vector within about 1.02^n of the root of the determinant (Gama and Nguyen 2008).
  return Math.ceil((n * (maxNormLog10 + n * Math.log10(1.02) + 0.3)) / m) + 1;
}
