/**
 * Real balls in binary fixed point: a ball stands for every real in [mid − rad, mid + rad]·2^−bits.
 *
 * Every function here obeys one law: the result contains f(x, y, …) for every point of every operand. Radii are bounds,
 * never estimates. Functions that can round take the working precision `bits` last; those that cannot take none.
 * The model for these semantics is Johansson, "Arb: efficient arbitrary-precision midpoint-radius interval arithmetic",
 * IEEE Trans. Comput. 66 (2017) 1281.
 */
import { PrecisionError } from './errors.ts';
import { absolute, bitLength, integerSqrt, roundShift } from './integer.ts';

export interface Ball {
  readonly mid: bigint;
  /** Non-negative. */
  readonly rad: bigint;
  /** Fraction bits; non-negative. */
  readonly bits: number;
}

/** The exact ball of an integer. */
export function fromInteger(value: bigint): Ball {
  return { mid: value, rad: 0n, bits: 0 };
}

/** p/q to `bits` fraction bits, radius at most one unit. Throws RangeError for q = 0. */
export function fromRational(p: bigint, q: bigint, bits: number): Ball {
  if (q === 0n) throw new RangeError('fromRational: expected a non-zero denominator, got 0');
  const scaled = p << BigInt(bits);
  const mid = scaled / q;
  return { mid, rad: mid * q === scaled ? 0n : 1n, bits };
}

/** The same set (or a superset one unit wider) at another number of fraction bits. */
export function withBits(x: Ball, bits: number): Ball {
  const shift = x.bits - bits;
  if (shift === 0) return x;
  if (shift < 0) return { mid: x.mid << BigInt(-shift), rad: x.rad << BigInt(-shift), bits };
  const mid = roundShift(x.mid, shift);
  const exact = mid << BigInt(shift) === x.mid;
  const rad = ceilShift(x.rad, shift) + (exact ? 0n : 1n);
  return { mid, rad, bits };
}

function ceilShift(value: bigint, shift: number): bigint {
  return -(-value >> BigInt(shift));
}

export function add(x: Ball, y: Ball): Ball {
  const bits = Math.max(x.bits, y.bits);
  const a = withBits(x, bits);
  const b = withBits(y, bits);
  return { mid: a.mid + b.mid, rad: a.rad + b.rad, bits };
}

export function negate(x: Ball): Ball {
  return { mid: -x.mid, rad: x.rad, bits: x.bits };
}

export function subtract(x: Ball, y: Ball): Ball {
  return add(x, negate(y));
}

/** Exact product with an integer. */
export function timesInteger(x: Ball, k: bigint): Ball {
  return { mid: x.mid * k, rad: x.rad * absolute(k), bits: x.bits };
}

/** x/k for an integer k ≠ 0, at the fraction bits of x. */
export function overInteger(x: Ball, k: bigint): Ball {
  if (k === 0n) throw new RangeError('overInteger: expected a non-zero integer, got 0');
  const mid = x.mid / k;
  const size = absolute(k);
  const rad = (x.rad + size - 1n) / size + (mid * k === x.mid ? 0n : 1n);
  return { mid, rad, bits: x.bits };
}

/** Exact product with 2^k. */
export function timesPowerOfTwo(x: Ball, k: number): Ball {
  if (k >= 0) return { mid: x.mid << BigInt(k), rad: x.rad << BigInt(k), bits: x.bits };
  return { mid: x.mid, rad: x.rad, bits: x.bits - k };
}

export function multiply(x: Ball, y: Ball, bits: number): Ball {
  const mid = x.mid * y.mid;
  const rad = absolute(x.mid) * y.rad + absolute(y.mid) * x.rad + x.rad * y.rad;
  return withBits({ mid, rad, bits: x.bits + y.bits }, bits);
}

export function square(x: Ball, bits: number): Ball {
  return multiply(x, x, bits);
}

/** x/y. Throws PrecisionError when y may be zero. */
export function divide(x: Ball, y: Ball, bits: number): Ball {
  const size = absolute(y.mid);
  if (size <= y.rad) throw new PrecisionError('divide: the divisor cannot be told from zero at this precision');
  const shift = bits + y.bits - x.bits;
  const up = shift > 0 ? BigInt(shift) : 0n;
  const down = shift < 0 ? BigInt(-shift) : 0n;
  const divisor = y.mid << down;
  const mid = (x.mid << up) / divisor;
  // |x/y − mx/my| ≤ (|mx|·ry + |my|·rx) / (|my|·(|my| − ry)); all in the scale of the quotient, rounded up.
  const numerator = (absolute(x.mid) * y.rad + size * x.rad) << up;
  const denominator = (size * (size - y.rad)) << down;
  return { mid, rad: (numerator + denominator - 1n) / denominator + 1n, bits };
}

/** √x. Throws PrecisionError when x may be negative and RangeError when it is. */
export function sqrt(x: Ball, bits: number): Ball {
  if (x.mid + x.rad < 0n) throw new RangeError('sqrt: expected a non-negative number');
  if (x.mid - x.rad < 0n) throw new PrecisionError('sqrt: the argument cannot be told from a negative number');
  const scale = (value: bigint): bigint => {
    const shift = 2 * bits - x.bits;
    return shift >= 0 ? value << BigInt(shift) : value >> BigInt(-shift);
  };
  if (x.rad === 0n) {
    const mid = integerSqrt(scale(x.mid));
    return { mid, rad: 1n, bits };
  }
  const low = integerSqrt(scale(x.mid - x.rad));
  const high = integerSqrt(scale(x.mid + x.rad)) + 1n;
  const mid = (low + high) >> 1n;
  return { mid, rad: high - mid > mid - low ? high - mid : mid - low, bits };
}

/** x^n for an integer n (n < 0 divides). */
export function power(x: Ball, n: number, bits: number): Ball {
  if (n < 0) return divide(fromInteger(1n), power(x, -n, bits + 2 * Math.max(0, -magnitude(x)) * -n + 8), bits);
  const guard = bits + 8 + 2 * bitLength(BigInt(n)) + Math.max(0, magnitude(x) * n);
  let result = fromInteger(1n);
  let base = x;
  for (let k = n; k > 0; k >>= 1) {
    if (k & 1) result = multiply(result, base, guard);
    if (k > 1) base = multiply(base, base, guard);
  }
  return withBits(result, bits);
}

/** Least e with |x| < 2^e for every point of x; −Infinity for the exact zero. */
export function magnitude(x: Ball): number {
  const top = absolute(x.mid) + x.rad;
  return top === 0n ? Number.NEGATIVE_INFINITY : bitLength(top) - x.bits;
}

/** The sign shared by every point of x, or 'unknown' when the ball contains zero and other points. */
export function sign(x: Ball): -1 | 0 | 1 | 'unknown' {
  if (x.mid > x.rad) return 1;
  if (-x.mid > x.rad) return -1;
  return x.mid === 0n && x.rad === 0n ? 0 : 'unknown';
}

export function containsZero(x: Ball): boolean {
  return absolute(x.mid) <= x.rad;
}

/** Whether x and y share a point. */
export function overlaps(x: Ball, y: Ball): boolean {
  return containsZero(subtract(x, y));
}

/** Whether every point of `inner` lies in `outer`. */
export function contains(outer: Ball, inner: Ball): boolean {
  const bits = Math.max(outer.bits, inner.bits);
  const o = withBits(outer, bits);
  const i = withBits(inner, bits);
  return absolute(o.mid - i.mid) + i.rad <= o.rad;
}

/** Fraction bits that the radius leaves right: the radius is at most 2^−accuracy. Infinity for an exact ball. */
export function accuracy(x: Ball): number {
  return x.rad === 0n ? Number.POSITIVE_INFINITY : x.bits - bitLength(x.rad - 1n);
}

/** The ball widened by `rad` units of its own last place. */
export function widen(x: Ball, rad: bigint): Ball {
  return { mid: x.mid, rad: x.rad + rad, bits: x.bits };
}
