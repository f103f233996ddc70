/** Complex balls: a rectangle of two real balls. */
import {
  add as addReal,
  type Ball,
  divide as divideReal,
  fromInteger,
  multiply as multiplyReal,
  negate as negateReal,
  subtract as subtractReal,
} from './ball.ts';

export interface ComplexBall {
  readonly re: Ball;
  readonly im: Ball;
}

/** A computed number: real balls stay real, so that reality is known and not guessed from a small imaginary part. */
export type Value = Ball | ComplexBall;

export function isComplex(x: Value): x is ComplexBall {
  return 're' in x;
}

export function toComplex(x: Value): ComplexBall {
  return isComplex(x) ? x : { re: x, im: fromInteger(0n) };
}

export function add(x: Value, y: Value): Value {
  if (!isComplex(x) && !isComplex(y)) return addReal(x, y);
  const a = toComplex(x);
  const b = toComplex(y);
  return { re: addReal(a.re, b.re), im: addReal(a.im, b.im) };
}

export function negate(x: Value): Value {
  return isComplex(x) ? { re: negateReal(x.re), im: negateReal(x.im) } : negateReal(x);
}

export function subtract(x: Value, y: Value): Value {
  return add(x, negate(y));
}

export function multiply(x: Value, y: Value, bits: number): Value {
  if (!isComplex(x) && !isComplex(y)) return multiplyReal(x, y, bits);
  if (!isComplex(x)) return multiply(y, x, bits);
  if (!isComplex(y)) return { re: multiplyReal(x.re, y, bits), im: multiplyReal(x.im, y, bits) };
  const guard = bits + 2;
  return {
    re: subtractReal(multiplyReal(x.re, y.re, guard), multiplyReal(x.im, y.im, guard)),
    im: addReal(multiplyReal(x.re, y.im, guard), multiplyReal(x.im, y.re, guard)),
  };
}

/** x/y. Throws PrecisionError when y may be zero. */
export function divide(x: Value, y: Value, bits: number): Value {
  if (!isComplex(y)) {
    if (!isComplex(x)) return divideReal(x, y, bits);
    return { re: divideReal(x.re, y, bits), im: divideReal(x.im, y, bits) };
  }
  const a = toComplex(x);
  const exact = y.re.bits + y.im.bits + bits;
  const norm = addReal(multiplyReal(y.re, y.re, exact), multiplyReal(y.im, y.im, exact));
  const product = toComplex(multiply(a, { re: y.re, im: negateReal(y.im) }, exact));
  return { re: divideReal(product.re, norm, bits), im: divideReal(product.im, norm, bits) };
}
