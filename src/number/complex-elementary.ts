/** Elementary functions of real and complex balls, principal values with the cut along the negative axis (continuous from above). */

import * as real from './ball.ts';
import { type Ball, fromInteger, magnitude, sign, sqrt as sqrtReal } from './ball.ts';
import { add, type ComplexBall, divide, isComplex, multiply, negate, subtract, type Value } from './complex.ts';
import { atan2, atan as atanReal, exp as expReal, log as logReal, sinCos } from './elementary.ts';
import { PrecisionError } from './errors.ts';
import { piBall } from './reduction.ts';
import { root as rootReal } from './roots.ts';

export const I: ComplexBall = { re: fromInteger(0n), im: fromInteger(1n) };
const ZERO = fromInteger(0n);
const ONE = fromInteger(1n);

/** The sign of a real ball; PrecisionError when it cannot be told. */
export function knownSign(x: Ball): -1 | 0 | 1 {
  const s = sign(x);
  if (s === 'unknown') throw new PrecisionError('knownSign: the sign cannot be told at this precision');
  return s;
}

function isExactZero(x: Ball): boolean {
  return x.mid === 0n && x.rad === 0n;
}

/** Least e with |x| < 2^e (within one bit above). */
export function sizeOf(x: Value): number {
  return isComplex(x) ? Math.max(magnitude(x.re), magnitude(x.im)) + 1 : magnitude(x);
}

export function absoluteValue(x: Value, bits: number): Ball {
  if (!isComplex(x)) return knownSign(x) < 0 ? real.negate(x) : x;
  const work = 2 * bits + 8;
  return sqrtReal(real.add(real.multiply(x.re, x.re, work), real.multiply(x.im, x.im, work)), bits);
}

export function exp(x: Value, bits: number): Value {
  if (!isComplex(x)) return expReal(x, bits);
  const size = expReal(x.re, bits + 4);
  const { sin, cos } = sinCos(x.im, bits + 4 + Math.max(0, magnitude(size)));
  return { re: real.multiply(size, cos, bits), im: real.multiply(size, sin, bits) };
}

/** The angle in (−π, π]. */
export function argument(x: Value, bits: number): Ball {
  if (!isComplex(x)) return knownSign(x) < 0 ? piBall(bits) : ZERO;
  return atan2(x.im, x.re, bits);
}

/** The principal logarithm; a real negative number gets imaginary part π. */
export function log(x: Value, bits: number): Value {
  if (!isComplex(x)) {
    const s = knownSign(x);
    if (s === 0) throw new PrecisionError('log: the argument is zero');
    if (s > 0) return logReal(x, bits);
    return { re: logReal(real.negate(x), bits), im: piBall(bits) };
  }
  if (isExactZero(x.im)) return log(x.re, bits);
  const exact = 2 * bits + 16;
  const norm = real.add(real.multiply(x.re, x.re, exact), real.multiply(x.im, x.im, exact));
  return { re: real.timesPowerOfTwo(logReal(norm, bits + 1), -1), im: argument(x, bits) };
}

export function sqrt(x: Value, bits: number): Value {
  return root(x, 2, bits);
}

/** The principal n-th root. */
export function root(x: Value, n: number, bits: number): Value {
  if (!isComplex(x)) {
    const s = knownSign(x);
    if (s === 0) return ZERO;
    if (s > 0) return rootReal(x, n, bits);
    if (n === 2) return { re: ZERO, im: rootReal(real.negate(x), 2, bits) };
  } else if (isExactZero(x.im)) return root(x.re, n, bits);
  const scaled = log(x, bits + 8 + Math.max(0, sizeOf(x)));
  return exp(divide(scaled, fromInteger(BigInt(n)), bits + 8), bits);
}

/** x^n for an integer n. */
export function integerPower(x: Value, n: number, bits: number): Value {
  if (!isComplex(x)) return real.power(x, n, bits);
  if (n < 0) return divide(ONE, integerPower(x, -n, bits + 8 - 2 * n * Math.max(0, -sizeOf(x))), bits);
  const guard = bits + 8 + 2 * Math.max(0, sizeOf(x)) * n;
  let result: Value = ONE;
  let base: Value = x;
  for (let k = n; k > 0; k = Math.floor(k / 2)) {
    if (k % 2 === 1) result = multiply(result, base, guard);
    if (k > 1) base = multiply(base, base, guard);
  }
  return result;
}

/** x^y = exp(y log x) for x ≠ 0. */
export function power(x: Value, y: Value, bits: number): Value {
  const work = bits + 8;
  return exp(multiply(y, log(x, work + Math.max(0, sizeOf(y))), work), bits);
}

export function sin(x: Value, bits: number): Value {
  if (!isComplex(x)) return sinCos(x, bits).sin;
  const e = exponentials(x, bits);
  // (e^{ix} − e^{−ix})/(2i)
  return divide(subtract(e.plus, e.minus), { re: ZERO, im: fromInteger(2n) }, bits);
}

export function cos(x: Value, bits: number): Value {
  if (!isComplex(x)) return sinCos(x, bits).cos;
  const e = exponentials(x, bits);
  return divide(add(e.plus, e.minus), fromInteger(2n), bits);
}

function exponentials(x: Value, bits: number): { plus: Value; minus: Value } {
  const turned = multiply(I, x, bits + 8);
  return { plus: exp(turned, bits + 4), minus: exp(negate(turned), bits + 4) };
}

/** atan x = (i/2)(log(1 − ix) − log(1 + ix)). */
export function atan(x: Value, bits: number): Value {
  if (!isComplex(x)) return atanReal(x, bits);
  const turned = multiply(I, x, bits + 8);
  const difference = subtract(log(subtract(ONE, turned), bits + 4), log(add(ONE, turned), bits + 4));
  return multiply({ re: ZERO, im: real.timesPowerOfTwo(ONE, -1) }, difference, bits);
}

/** atanh x = (log(1 + x) − log(1 − x))/2. */
export function atanh(x: Value, bits: number): Value {
  const difference = subtract(log(add(ONE, x), bits + 4), log(subtract(ONE, x), bits + 4));
  return multiply(real.timesPowerOfTwo(ONE, -1), difference, bits);
}

/** asinh x = log(x + √(1 + x²)), with odd symmetry for negative reals. */
export function asinh(x: Value, bits: number): Value {
  if (!isComplex(x) && x.mid < 0n) return negate(asinh(negate(x), bits));
  const work = bits + 8;
  const radical = sqrt(add(ONE, multiply(x, x, 2 * work)), work);
  return log(add(x, radical), bits);
}

/** acosh x = log(x + √(x + 1) √(x − 1)). */
export function acosh(x: Value, bits: number): Value {
  const work = bits + 8;
  const radical = multiply(sqrt(add(x, ONE), work), sqrt(subtract(x, ONE), work), work);
  return log(add(x, radical), bits);
}

/** asin x: the angle of (√(1 − x²), x) for real |x| ≤ 1, otherwise −i log(ix + √(1 − x²)). */
export function asin(x: Value, bits: number): Value {
  const work = bits + 8;
  const rest = subtract(ONE, multiply(x, x, 2 * work));
  if (!isComplex(x) && !isComplex(rest)) {
    const s = knownSign(rest);
    if (s === 0) return real.timesPowerOfTwo(x.mid < 0n ? real.negate(piBall(bits)) : piBall(bits), -1);
    if (s > 0) return atan2(x, sqrtReal(rest, work), bits);
  }
  const inner = add(multiply(I, x, work), sqrt(rest, work));
  return negate(multiply(I, log(inner, work), bits));
}

/** acos x = π/2 − asin x. */
export function acos(x: Value, bits: number): Value {
  return subtract(real.timesPowerOfTwo(piBall(bits + 1), -1), asin(x, bits));
}
