/**
 * Γ(a + δ) for rational a and a series δ without constant term.
 *
 * log Γ(1+x) = −γx + Σ_{k≥2} ζ(k)(−x)^k/k and log Γ(1/2+x) = log √π + ψ(1/2)x + Σ_{k≥2} (2^k−1)ζ(k)(−x)^k/k
 * (DLMF 5.7.3, 5.4.6, 5.4.13, 5.15.3); other rationals by ψ^(k−1)(a). Γ(z+1) = zΓ(z) carries integers and half-integers to
 * these, with a pole at 0, −1, −2, …
 */
import { call, rational, symbol, type Term } from '../constants/term.ts';
import { makeProduct, makeSum } from '../expression/parse.ts';
import type { Value } from '../number/complex.ts';
import { InputError } from '../number/errors.ts';
import {
  addSeries,
  constant,
  divideSeries,
  endOf,
  expSeries,
  isExactZero,
  multiplySeries,
  ONE,
  type Series,
  stripped,
  ZERO,
} from './laurent.ts';

type Rational = Extract<Term, { kind: 'rational' }>;

/** Largest integer distance that the recurrence is carried over. */
const LARGEST_SHIFT = 1000n;

export function gammaSeries(at: Rational, delta: Series, bits: number, value: (term: Term) => Value): Series {
  const shift = shiftOf(at);
  if (shift > LARGEST_SHIFT || shift < -LARGEST_SHIFT) {
    throw new InputError('too-large', `Gamma is expanded around numbers of at most ${LARGEST_SHIFT} in size.`);
  }
  const start = makeSum([at, rational(-shift)]) as Rational;
  const end = endOf(delta);
  let result = expSeries(logRatio(start, delta, bits, value), bits);
  if (start.q !== 1n) result = multiplySeries(result, constant(value(call('Gamma', start)), end), bits);
  const linear = (j: bigint): Series => stripped(addSeries(constant(value(makeSum([start, rational(j)])), end), delta));
  for (let j = 0n; j < shift; j++) result = multiplySeries(result, linear(j), bits);
  for (let j = -1n; j >= shift; j--) {
    const divisor = linear(j);
    if (divisor.coefficients.every(isExactZero)) {
      throw new InputError('gamma-pole', 'Gamma is infinite here for every value of the variable.');
    }
    result = divideSeries(result, divisor, bits);
  }
  return result;
}

/** The integer by which `at` lies above 1 (integers), 1/2 (half-integers) or its fractional part in (0, 1). */
function shiftOf(at: Rational): bigint {
  if (at.q === 1n) return at.p - 1n;
  return at.p >= 0n ? at.p / at.q : (at.p - at.q + 1n) / at.q;
}

/** log Γ(start + δ) − log Γ(start). */
function logRatio(start: Rational, delta: Series, bits: number, value: (term: Term) => Value): Series {
  const end = endOf(delta);
  const order = stripped(delta).low;
  let sum = constant(ZERO, end);
  if (delta.coefficients.every(isExactZero)) return sum;
  let power = constant(ONE, end);
  for (let k = 1; k * order < end; k++) {
    power = multiplySeries(power, delta, bits);
    sum = addSeries(sum, multiplySeries(power, constant(value(taylor(start, k)), end), bits));
  }
  return sum;
}

/** Coefficient of x^k in log Γ(start + x), k ≥ 1. */
function taylor(start: Rational, k: number): Term {
  const sign = k % 2 === 0 ? 1n : -1n;
  const half = start.q === 2n;
  if (k === 1) {
    const gamma = makeProduct([rational(-1n), symbol('euler_gamma')]);
    if (start.q === 1n) return gamma;
    if (half) return makeSum([gamma, makeProduct([rational(-2n), call('log', rational(2n))])]);
    return call('polygamma', rational(0n), start);
  }
  if (start.q === 1n || half) {
    const factor = half ? 2n ** BigInt(k) - 1n : 1n;
    return makeProduct([rational(sign * factor, BigInt(k)), call('zeta', rational(BigInt(k)))]);
  }
  return makeProduct([rational(1n, factorial(k)), call('polygamma', rational(BigInt(k - 1)), start)]);
}

function factorial(k: number): bigint {
  let f = 1n;
  for (let j = 2n; j <= BigInt(k); j++) f *= j;
  return f;
}
