/**
 * Fixed-point kernels of the elementary functions on reduced arguments. "Units" are units of 2^−work of the kernel's own
 * result. Each kernel works with `work + extra` bits, `extra` chosen so that the errors derived beside it come to less than
 * one unit; the final rounding adds less than one: every result errs by less than 2 units.
 *
 * Series are summed by concurrent columns (Smith, Math. Comp. 52 (1989) 131): Σ_k c_k z^k with c_k/c_{k−1} = ±1/(small
 * integer) as Σ_{i<m} z^i C_i, where the column C_i collects the terms k ≡ i (mod m): about 2√N full products for N terms.
 */
import { bitLength, integerSqrt, roundShift } from './integer.ts';
import { SMOOTH_PRIMES, smoothLog } from './reduction.ts';

export interface Columns {
  /** Number of terms. */
  readonly count: number;
  /** Number of columns m. */
  readonly columns: number;
}

/** Least number of terms after which Σ z^k/(2k+shift)! with 0 ≤ z < 2^(−2·drop) leaves less than one unit of 2^−work. */
function factorialTerms(work: number, drop: number, shift: number): number {
  let count = 1;
  let logFactorial = 0;
  while (2 * drop * count + logFactorial < work + 2) {
    logFactorial += Math.log2((2 * count - 1 + shift) * (2 * count + shift));
    count++;
  }
  return count + 1;
}

/**
 * Σ_{k<count} sign^k z^k Π_{j=1…k} 1/d(j), d(j) = (2j−1+shift)(2j+shift), in units of 2^−work; 0 ≤ z < 1/4.
 *
 * A running term errs by less than 1 unit for each truncation, and every step divides the older error by at least 2: less
 * than 4 units at all times. A column has at most count/m + 1 terms; the Horner pass over columns multiplies by z < 1/4:
 * the sum errs by less than (4/3)(4(count/m + 1) + 2) < 6·count + 8 units, without the tail.
 */
function factorialSeries(z: bigint, work: number, shift: number, sign: 1 | -1, size: Columns): bigint {
  const { count, columns } = size;
  const bits = BigInt(work);
  const top = powerFixed(z, columns, bits);
  const sums = Array.from({ length: columns }, () => 0n);
  let term = 1n << bits;
  for (let k = 0; k < count; k++) {
    const column = k % columns;
    if (k > 0) {
      term /= BigInt((2 * k - 1 + shift) * (2 * k + shift));
      if (column === 0) term = (term * top) >> bits;
    }
    const signed = sign < 0 && k % 2 === 1 ? -term : term;
    sums[column] = (sums[column] as bigint) + signed;
  }
  return hornerFixed(sums, z, bits);
}

function hornerFixed(coefficients: readonly bigint[], z: bigint, bits: bigint): bigint {
  let sum = 0n;
  for (let i = coefficients.length - 1; i >= 0; i--) sum = ((sum * z) >> bits) + (coefficients[i] as bigint);
  return sum;
}

/** z^n for 0 ≤ z < 1/4, n ≥ 1, short by less than 2 units: a product of two such errs by less than (2 + 2)/4 and its own floor. */
function powerFixed(z: bigint, n: number, bits: bigint): bigint {
  let result: bigint | undefined;
  let base = z;
  for (let k = n; k > 0; k >>= 1) {
    if (k & 1) result = result === undefined ? base : (result * base) >> bits;
    if (k > 1) base = (base * base) >> bits;
  }
  return result as bigint;
}

/** Halvings that balance squarings against series terms; the factor is the best of those between 0.06 and 0.37 in V8 at 300 to 66,000 bits. */
function halvings(work: number): number {
  return 3 + Math.round(0.1 * Math.sqrt(work));
}

/**
 * Ratios p/q of numbers without prime factors above 7, from 3/2 down to 78125000/78121827, as exponents of 2, 3, 5, 7: taking
 * each as often as it fits brings a number in [0, 1) below 2^−14.
 */
const SMOOTH_STEPS: readonly (readonly number[])[] = [
  [-1, 1, 0, 0],
  [3, 0, 0, -1],
  [2, -3, 0, 1],
  [1, 2, -3, 1],
  [-5, 2, 2, -1],
  [-15, 8, 1, 0],
  [-1, -7, 4, 1],
  [3, -13, 10, -2],
];
const SMOOTH_DEPTH = 14;
/** Σ |exponents| stays below this: the steps fit at most 2, 3, 3, 4, 1, 3, 4, 5 times, which adds up to 336, and one more is 28. */
const SMOOTH_WEIGHT = 512;

/** x in units as rest + log(above/below); the rest is in [0, 2^−14) where x was, and errs by less than 2·SMOOTH_WEIGHT units. */
function reduceSmooth(x: bigint, work: number): { rest: bigint; above: bigint; below: bigint } {
  const primes = [2, 3, 5, 7];
  const exponents = [0, 0, 0, 0];
  const take = (step: readonly number[], times: number): void => {
    step.forEach((e, j) => {
      exponents[j] = (exponents[j] as number) + times * e;
    });
  };
  let left = Number(x >> BigInt(work - 53)) / 2 ** 53;
  for (const step of SMOOTH_STEPS) {
    const size = step.reduce((sum, e, j) => sum + e * Math.log(primes[j] as number), 0);
    const times = Math.floor(left / size);
    take(step, times);
    left -= times * size;
  }
  const shares = SMOOTH_PRIMES.map((p) => smoothLog(p, work).mid);
  const remainder = (): bigint => x - shares.reduce((sum, log, j) => sum + BigInt(exponents[j] as number) * log, 0n);
  let rest = remainder();
  if (rest < 0n) {
    // The doubles took one smallest step too many.
    take(SMOOTH_STEPS.at(-1) as readonly number[], -1);
    rest = remainder();
  }
  let above = 1n;
  let below = 1n;
  exponents.forEach((e, j) => {
    if (e > 0) above *= (SMOOTH_PRIMES[j] as bigint) ** BigInt(e);
    else below *= (SMOOTH_PRIMES[j] as bigint) ** BigInt(-e);
  });
  return { rest, above, below };
}

/** Below this many bits the reduction by smooth ratios costs more than the squarings it saves. */
const LEAST_SMOOTH = 1500;

/**
 * e^x for x in [0, 1) given in units: x less the logarithm of a smooth ratio (Johansson, "Computing elementary functions using
 * multi-prime argument reduction", 2022), then sinh + √(1 + sinh²) of y = x/2^r, squared r times, times the ratio.
 *
 * sinh errs by less than e₀ = 7N + 12 units (N terms), the root by as much again, so the start by less than 2e₀ + 2; squaring
 * doubles the relative error and adds 1, and the product of all the factors is below e: less than 3·2^r (2e₀ + 3) units. The
 * reduction adds less than 2·SMOOTH_WEIGHT·e < 8·SMOOTH_WEIGHT units.
 */
export function expFixed(x: bigint, work: number): bigint {
  const smooth = work >= LEAST_SMOOTH && x >> BigInt(work - SMOOTH_DEPTH) !== 0n;
  const drop = halvings(work) + (smooth ? SMOOTH_DEPTH : 0);
  const r = smooth ? drop - SMOOTH_DEPTH : drop;
  const estimate = factorialTerms(work + 2 * drop + 32, drop, 1);
  const extra = r + 4 + bitLength(BigInt(14 * estimate + 27 + (smooth ? 8 * SMOOTH_WEIGHT : 0)));
  const inner = work + extra;
  const bits = BigInt(inner);
  const count = factorialTerms(inner, drop, 1);
  const reduced = smooth ? reduceSmooth(x << BigInt(extra), inner) : { rest: x << BigInt(extra), above: 1n, below: 1n };
  const y = reduced.rest >> BigInt(r);
  const z = (y * y) >> bits;
  const series = factorialSeries(z, inner, 1, 1, { count, columns: Math.max(1, Math.round(Math.sqrt(count))) });
  const sinh = (y * series) >> bits;
  let value = sinh + integerSqrt((1n << (2n * bits)) + sinh * sinh);
  for (let i = 0; i < r; i++) value = (value * value) >> bits;
  if (smooth) value = (value * reduced.above) / reduced.below;
  return roundShift(value, extra);
}

/**
 * sin x and cos x for x in [0, 1) given in units, through the versine v = 1 − cos of x/2^r, doubled r times by
 * v(2x) = 2v(2 − v); without doubling where x < 2^−r.
 *
 * sin(x/2^r) errs by less than e₀ = 7N + 12 units at the start and v by less than e₀ + 2; a doubling multiplies the error by at
 * most 4 and adds 1: less than 4^r (e₀ + 3) units at the end. sin = √(v(2 − v)) divides that by sin x ≥ 0.84·2^−r: less than
 * 2^(3r + 1) (7N + 16) units.
 */
export function sinCosFixed(x: bigint, work: number): { sin: bigint; cos: bigint } {
  const depth = halvings(work);
  const r = x >> BigInt(Math.max(0, work - depth)) === 0n ? 0 : depth;
  const estimate = factorialTerms(work + 3 * depth + 32, depth, 1);
  const extra = 3 * r + 3 + bitLength(BigInt(7 * estimate + 16));
  const inner = work + extra;
  const bits = BigInt(inner);
  const one = 1n << bits;
  const count = factorialTerms(inner, depth, 1);
  const y = x << BigInt(extra - r);
  const z = (y * y) >> bits;
  const columns = Math.max(1, Math.round(Math.sqrt(count)));
  let sin = (y * factorialSeries(z, inner, 1, -1, { count, columns })) >> bits;
  let versine = one - integerSqrt((one << bits) - sin * sin);
  for (let i = 0; i < r; i++) versine = (versine * (2n * one - versine)) >> (bits - 1n);
  if (r > 0) sin = integerSqrt(versine * (2n * one - versine));
  return { sin: roundShift(sin, extra), cos: roundShift(one - versine, extra) };
}

/**
 * log(1 + d) for |d| < 2^−8 given in units: 2 artanh u with u = d/(2 + d).
 *
 * |u| < 2^−(drop+1)·1.01 where |d| < 2^−drop; N terms with 2(drop + 1)N·0.99 > work. u errs by less than 1 unit, every running
 * power by less than 2, its division adds 1: less than 2(3N + 3) units together.
 */
export function logNearOneFixed(d: bigint, work: number): bigint {
  if (d === 0n) return 0n;
  const drop = Math.max(8, work - bitLength(d));
  const count = Math.ceil((work + 2) / (2 * drop)) + 1;
  const extra = 2 + bitLength(BigInt(6 * count + 6));
  const bits = BigInt(work + extra);
  const shifted = d << BigInt(extra);
  const u = (shifted << bits) / ((2n << bits) + shifted);
  return roundShift(2n * oddSeries(u, count, bits, 1), extra);
}

/** atan t for |t| < 2^−8 given in units; the errors are those of `logNearOneFixed` without the factor 2. */
export function atanSmallFixed(t: bigint, work: number): bigint {
  if (t === 0n) return 0n;
  const drop = Math.max(8, work - bitLength(t));
  const count = Math.ceil((work + 2) / (2 * drop)) + 1;
  const extra = 2 + bitLength(BigInt(6 * count + 6));
  return roundShift(oddSeries(t << BigInt(extra), count, BigInt(work + extra), -1), extra);
}

/** Σ_{k<count} sign^k u^{2k+1}/(2k+1). */
function oddSeries(u: bigint, count: number, bits: bigint, sign: 1 | -1): bigint {
  const square = (u * u) >> bits;
  let term = u;
  let sum = u;
  for (let k = 1; k < count; k++) {
    term = (term * square) >> bits;
    const share = term / BigInt(2 * k + 1);
    sum += sign < 0 && k % 2 === 1 ? -share : share;
  }
  return sum;
}
