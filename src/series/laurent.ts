/**
 * Laurent series in one variable, truncated, with balls as coefficients.
 *
 * A series stands for Σ_{k=0}^{n−1} c_k x^(low+k) + O(x^(low+n)); the coefficients are real or complex balls, and each operation
 * returns coefficients that contain the true ones for every choice inside the operands. Working precision `bits` comes last.
 * exp and log use the recurrences from g' = f'·g (Knuth, TAOCP 2, §4.7).
 */
import { type Ball, fromInteger, magnitude, overInteger, timesInteger, withBits } from '../number/ball.ts';
import { add, divide, isComplex, multiply, negate, subtract, toComplex, type Value } from '../number/complex.ts';
import { exp as expValue, log as logValue } from '../number/complex-elementary.ts';
import { InputError } from '../number/errors.ts';

export interface Series {
  /** Exponent of the first coefficient. */
  readonly low: number;
  readonly coefficients: readonly Value[];
}

export const ZERO: Value = fromInteger(0n);
export const ONE: Value = fromInteger(1n);

/** Exponent of the first power that is not known. */
export function endOf(s: Series): number {
  return s.low + s.coefficients.length;
}

export function isExactZero(x: Value): boolean {
  const { re, im } = toComplex(x);
  return re.mid === 0n && re.rad === 0n && im.mid === 0n && im.rad === 0n;
}

function isExactOne(x: Value): boolean {
  return !isComplex(x) && x.rad === 0n && x.mid === 1n << BigInt(x.bits);
}

/** log2 of the larger part, rounded up; −Infinity for the exact zero. */
export function sizeOf(x: Value): number {
  return isComplex(x) ? Math.max(magnitude(x.re), magnitude(x.im)) : magnitude(x);
}

/** The constant c as a series known below x^end. */
export function constant(c: Value, end: number): Series {
  return { low: 0, coefficients: padded([c], end) };
}

/** x itself, known below x^end. */
export function variable(end: number): Series {
  return { low: 1, coefficients: padded([ONE], end - 1) };
}

function padded(values: readonly Value[], length: number): Value[] {
  return Array.from({ length: Math.max(0, length) }, (_, k) => values[k] ?? ZERO);
}

/** Coefficient of x^exponent; the exact zero below the first one. Throws RangeError beyond the known ones. */
export function coefficientOf(s: Series, exponent: number): Value {
  if (exponent >= endOf(s))
    throw new RangeError(`coefficientOf: expected an exponent below ${endOf(s)}, got ${exponent}`);
  return s.coefficients[exponent - s.low] ?? ZERO;
}

/** Leading coefficients that are exactly zero left out. */
export function stripped(s: Series): Series {
  const first = s.coefficients.findIndex((c) => !isExactZero(c));
  if (first <= 0) return s;
  return { low: s.low + first, coefficients: s.coefficients.slice(first) };
}

export function truncated(s: Series, end: number): Series {
  return end >= endOf(s) ? s : { low: s.low, coefficients: s.coefficients.slice(0, Math.max(0, end - s.low)) };
}

export function addSeries(a: Series, b: Series): Series {
  const low = Math.min(a.low, b.low);
  const end = Math.min(endOf(a), endOf(b));
  const coefficients = Array.from({ length: Math.max(0, end - low) }, (_, k) =>
    add(coefficientOf(a, low + k), coefficientOf(b, low + k)),
  );
  return { low, coefficients };
}

export function negateSeries(s: Series): Series {
  return { low: s.low, coefficients: s.coefficients.map(negate) };
}

export function subtractSeries(a: Series, b: Series): Series {
  return addSeries(a, negateSeries(b));
}

export function multiplySeries(a: Series, b: Series, bits: number): Series {
  const n = Math.min(a.coefficients.length, b.coefficients.length);
  const coefficients = Array.from({ length: n }, (_, k) => {
    let sum: Value = ZERO;
    for (let j = 0; j <= k; j++) {
      const [x, y] = [a.coefficients[j] as Value, b.coefficients[k - j] as Value];
      if (!isExactZero(x) && !isExactZero(y)) sum = add(sum, multiply(x, y, bits));
    }
    return sum;
  });
  return { low: a.low + b.low, coefficients };
}

/** a/b. Throws PrecisionError when the leading coefficient of b cannot be told from zero. */
export function divideSeries(a: Series, b: Series, bits: number): Series {
  const divisor = stripped(b);
  const lead = divisor.coefficients[0];
  if (lead === undefined || isExactZero(lead)) {
    throw new InputError('zero-series', 'The series divided by is zero as far as it is known.');
  }
  const n = Math.min(a.coefficients.length, divisor.coefficients.length);
  const quotient: Value[] = [];
  for (let k = 0; k < n; k++) {
    let rest = a.coefficients[k] as Value;
    for (let j = 0; j < k; j++) {
      const d = divisor.coefficients[k - j] as Value;
      if (!isExactZero(d)) rest = subtract(rest, multiply(quotient[j] as Value, d, bits));
    }
    quotient.push(isExactOne(lead) ? rest : divide(rest, lead, bits));
  }
  return { low: a.low - divisor.low, coefficients: quotient };
}

/** x/k, exact where the quotient ends within `bits` fraction bits. */
export function over(x: Value, k: number, bits: number): Value {
  if (k === 1) return x;
  const part = (b: Ball): Ball => overInteger(withBits(b, Math.max(bits, b.bits)), BigInt(k));
  return isComplex(x) ? { re: part(x.re), im: part(x.im) } : part(x);
}

/** Exact product with an integer. */
export function times(x: Value, k: number): Value {
  const factor = BigInt(k);
  return isComplex(x) ? { re: timesInteger(x.re, factor), im: timesInteger(x.im, factor) } : timesInteger(x, factor);
}

/** Coefficients of x^0, x^1, … Throws InputError for a pole, which exp and log do not have an expansion at. */
function fromZero(s: Series, what: string): Value[] {
  const f = stripped(s);
  if (f.low < 0 && f.coefficients.length > 0) {
    throw new InputError('pole', `${what} of a series with negative powers has no Laurent expansion.`);
  }
  return Array.from({ length: Math.max(0, endOf(f)) }, (_, k) => coefficientOf(f, k));
}

export function expSeries(s: Series, bits: number): Series {
  const f = fromZero(s, 'exp');
  const start = f[0];
  if (start === undefined) return { low: 0, coefficients: [] };
  const g: Value[] = [isExactZero(start) ? ONE : expValue(start, bits)];
  for (let n = 1; n < f.length; n++) {
    let sum: Value = ZERO;
    for (let k = 1; k <= n; k++) {
      const fk = f[k] as Value;
      if (!isExactZero(fk)) sum = add(sum, multiply(times(fk, k), g[n - k] as Value, bits));
    }
    g.push(over(sum, n, bits));
  }
  return { low: 0, coefficients: g };
}

/** log of a series that starts with x^0. Throws InputError for any other, where log(x) would appear. */
export function logSeries(s: Series, bits: number): Series {
  const f = fromZero(s, 'log');
  const start = f[0];
  if (start === undefined || isExactZero(start)) {
    throw new InputError(
      'log-of-variable',
      'This would need the logarithm of the variable, which a Laurent series has not.',
    );
  }
  const u = isExactOne(start) ? f : f.map((c) => divide(c, start, bits));
  const l: Value[] = [isExactOne(start) ? ZERO : logValue(start, bits)];
  for (let n = 1; n < f.length; n++) {
    let sum = times(u[n] as Value, n);
    for (let k = 1; k < n; k++) {
      const rest = u[n - k] as Value;
      if (!isExactZero(rest)) sum = subtract(sum, multiply(times(l[k] as Value, k), rest, bits));
    }
    l.push(over(sum, n, bits));
  }
  return { low: 0, coefficients: l };
}

/** s^n for an integer n. */
export function powerSeries(s: Series, n: number, bits: number): Series {
  if (n < 0) {
    const one: Series = { low: 0, coefficients: padded([ONE], stripped(s).coefficients.length) };
    return divideSeries(one, powerSeries(s, -n, bits), bits);
  }
  let result: Series = { low: 0, coefficients: padded([ONE], s.coefficients.length) };
  let base = stripped(s);
  for (let k = n; k > 0; k >>= 1) {
    if (k & 1) result = multiplySeries(result, base, bits);
    if (k > 1) base = multiplySeries(base, base, bits);
  }
  return result;
}

/** The series after x → a·x; `inverse` is 1/a. */
export function rescaled(s: Series, a: Value, inverse: Value, bits: number): Series {
  const powers = (of: Value, count: number): Value[] => {
    const list: Value[] = [ONE];
    for (let k = 1; k <= count; k++) list.push(multiply(list[k - 1] as Value, of, bits));
    return list;
  };
  const up = powers(a, Math.max(0, endOf(s)));
  const down = powers(inverse, Math.max(0, -s.low));
  const coefficients = s.coefficients.map((c, k) => {
    const exponent = s.low + k;
    return multiply(c, (exponent < 0 ? down[-exponent] : up[exponent]) as Value, bits);
  });
  return { low: s.low, coefficients };
}
