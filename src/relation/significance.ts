/** Could this relation be chance? Counting arguments shared by both methods. */
import { absolute, bitLength, gcdOf, log10Of } from '../number/integer.ts';
import { log10Determinant, plusRow } from './gram.ts';
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
 *
 * Where c leaves out the largest numbers, chance among the smaller ones alone may be likelier, since these have fewer right digits: the
 * count is made for every set {numbers up to some size} that contains those of c, and the largest count decides.
 *
 * A heuristic, good to about a digit; never part of a proof. Infinity when the numbers that take part are exact: then
 * there is no chance about it.
 */
export function surplusDigits(prepared: Prepared, coefficients: readonly bigint[]): number {
  return surplusOf(prepared)(coefficients);
}

/** The same for many vectors over the same numbers: what depends on the numbers alone is worked out once. */
export function surplusOf(prepared: Prepared): (coefficients: readonly bigint[]) => number {
  const sizes = prepared.integers.map((row) =>
    Math.max(...row.map((x, j) => bitLength(x) - (prepared.columnErrorBits[j] as number))),
  );
  const order = [...sizes.keys()].sort((a, b) => (sizes[a] as number) - (sizes[b] as number));
  const place = new Map(order.map((i, at) => [i, at]));
  // grams[k] belongs to the k + 1 smallest numbers.
  const grams: bigint[][][] = [];
  for (const i of order) grams.push(plusRow(grams.at(-1), prepared.integers[i] as readonly bigint[]));
  return (coefficients) => {
    const errors = errorsOf(prepared, coefficients);
    if (errors.every((e) => e === 0n)) return Number.POSITIVE_INFINITY;
    const square = coefficients.reduce((sum, c) => sum + c * c, 0n);
    const last = Math.max(...coefficients.map((c, i) => (c === 0n ? 0 : (place.get(i) as number))));
    let surplus = Number.POSITIVE_INFINITY;
    for (let k = last; k < grams.length; k++) {
      surplus = Math.min(surplus, surplusAmong(grams[k] as bigint[][], k + 1, square, errors));
    }
    return surplus;
  };
}

/** The surplus when n numbers with this Gram matrix of columns were offered. */
function surplusAmong(
  gram: readonly (readonly bigint[])[],
  n: number,
  square: bigint,
  errors: readonly bigint[],
): number {
  const normLog10 = log10Of(square) / 2;
  const widened = normLog10 > 8 ? normLog10 : Math.log10(10 ** (2 * normLog10) + n / 12) / 2;
  const vectors = log10BallVolume(n) + n * widened;
  // Probability of |c·x̂ⱼ| ≤ Eⱼ for all j: Π 2Eⱼ over √det(2π·(covariance + E²)), times n + 2 to stay in integers.
  const blurred = gram.map((row, j) =>
    row.map((dot, k) => square * dot + (j === k ? BigInt(n + 2) * ((errors[j] as bigint) + 1n) ** 2n : 0n)),
  );
  let chance = -(log10Determinant(blurred) - errors.length * Math.log10(n + 2)) / 2;
  for (const error of errors) chance += log10Of(error + 1n) + Math.log10(2 / Math.sqrt(2 * Math.PI));
  return -vectors - Math.min(0, chance);
}

/** Σ |cᵢ|·eᵢⱼ per column: how far from zero the sum over the integers may be for a relation of the true numbers. */
export function errorsOf(prepared: Prepared, coefficients: readonly bigint[]): bigint[] {
  return prepared.columns.map((_, j) =>
    coefficients.reduce((sum, c, i) => (c === 0n ? sum : sum + absolute(c) * (prepared.errors[i]?.[j] as bigint)), 0n),
  );
}

/** Whether residuals of the given coefficients are all within what the errors of the numbers allow. */
export function withinErrors(
  prepared: Prepared,
  coefficients: readonly bigint[],
  residuals: readonly bigint[],
): boolean {
  const allowed = errorsOf(prepared, coefficients);
  return residuals.every((y, j) => absolute(y) <= (allowed[j] as bigint));
}

export function log10Norm(coefficients: readonly bigint[]): number {
  return log10Of(coefficients.reduce((sum, c) => sum + c * c, 0n)) / 2;
}

/** The vector divided by its content, first non-zero entry positive. */
export function primitive(coefficients: readonly bigint[]): bigint[] {
  const content = gcdOf(coefficients);
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
