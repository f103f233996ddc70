/**
 * Arguments of functions: elementary numbers, that is terms made of rationals, i, roots of unity, π, e, the golden ratio,
 * powers, and elementary functions of such numbers. They can be evaluated without the registry of families.
 */
import type { Ball } from '../number/ball.ts';
import { fromInteger } from '../number/ball.ts';
import { add, divide, isComplex, negate, subtract, toComplex, type Value } from '../number/complex.ts';
import * as functions from '../number/complex-elementary.ts';
import { InputError, PrecisionError } from '../number/errors.ts';
import { piBall } from '../number/reduction.ts';
import { toAccuracy } from './accurate.ts';
import { type Atom, evaluateStructure, isOperation, isRealStructure, operand } from './structure.ts';
import type { Term } from './term.ts';

type Function1 = (x: Value, bits: number) => Value;

const ONE = fromInteger(1n);

/** sin/cos with a PrecisionError where the cosine may vanish. */
const tan: Function1 = (x, bits) => divide(functions.sin(x, bits + 8), functions.cos(x, bits + 8), bits);

/** sinh x = (e^x − e^−x)/2 and its kin. */
function hyperbolic(combine: (plus: Value, minus: Value, bits: number) => Value): Function1 {
  return (x, bits) => combine(functions.exp(x, bits + 8), functions.exp(negate(x), bits + 8), bits);
}

export const ELEMENTARY: Readonly<Record<string, Function1>> = {
  log: functions.log,
  exp: functions.exp,
  sin: functions.sin,
  cos: functions.cos,
  tan,
  atan: functions.atan,
  asin: functions.asin,
  acos: functions.acos,
  sinh: hyperbolic((p, m, bits) => divide(subtract(p, m), fromInteger(2n), bits)),
  cosh: hyperbolic((p, m, bits) => divide(add(p, m), fromInteger(2n), bits)),
  tanh: hyperbolic((p, m, bits) => divide(subtract(p, m), add(p, m), bits)),
  asinh: functions.asinh,
  acosh: functions.acosh,
  atanh: functions.atanh,
};

/** Whether the term is an elementary number in the sense above. */
export function isElementary(term: Term): boolean {
  switch (term.kind) {
    case 'rational':
      return true;
    case 'sum':
      return term.terms.every(isElementary);
    case 'product':
      return term.factors.every(isElementary);
    case 'power':
      return isElementary(term.base) && isElementary(term.exponent);
    case 'symbol':
      return isOperation(term) || term.name === 'pi' || term.name === 'e';
    case 'call':
      return (isOperation(term) || term.name in ELEMENTARY) && isElementary(operand(term));
  }
}

function elementaryAtom(atom: Atom, work: number): Value {
  if (atom.kind === 'symbol') {
    if (atom.name === 'pi') return piBall(work);
    if (atom.name === 'e') return functions.exp(ONE, work);
    throw new TypeError(`elementaryAtom: expected an elementary number, got ${atom.name}`);
  }
  const f = ELEMENTARY[atom.name];
  if (f === undefined) throw new TypeError(`elementaryAtom: expected an elementary function, got ${atom.name}`);
  return f(evaluateStructure(operand(atom), work + 8, elementaryAtom), work);
}

/** The value of an elementary term to a radius of at most 2^−bits. Throws InputError where a division by zero or a logarithm of zero cannot be excluded. */
export function elementaryValue(term: Term, bits: number): Value {
  try {
    return toAccuracy(bits, 16, (work) => evaluateStructure(term, work, elementaryAtom));
  } catch (error) {
    throw undecided(error);
  }
}

/** Turns "cannot be told" and "too large" into sentences for whoever typed the expression. */
export function undecided(error: unknown): unknown {
  if (error instanceof RangeError && /^(exp|sinCos): /.test(error.message)) {
    return new InputError('too-large', 'This expression has an exponential or an angle that is too large.');
  }
  if (!(error instanceof PrecisionError)) return error;
  return new InputError(
    'undecided',
    'This expression has a divisor, a logarithm or a branch point that cannot be told from zero.',
  );
}

/** Fraction bits of the samples that decide signs and regions. */
const SAMPLE_BITS = 256;

export function isRealElementary(term: Term): boolean {
  return isRealStructure(
    term,
    (atom) => (atom.kind === 'symbol' ? true : isRealFunction(atom)),
    (t) => elementaryValue(t, SAMPLE_BITS),
  );
}

function isRealFunction(atom: Extract<Atom, { kind: 'call' }>): boolean {
  const argument = operand(atom);
  if (!isRealElementary(argument)) return false;
  return !isComplex(elementaryValue({ ...atom, groups: [[argument]] }, SAMPLE_BITS));
}

/** A sample of an elementary term as a pair of doubles, for choosing a method. */
export function approximate(term: Term): { re: number; im: number } {
  const { re, im } = toComplex(elementaryValue(term, 80));
  return { re: asNumber(re), im: asNumber(im) };
}

export function asNumber(x: Ball): number {
  const shift = x.bits - 80;
  const scaled = shift > 0 ? x.mid >> BigInt(shift) : x.mid << BigInt(-shift);
  return Number(scaled) * 2 ** -80;
}

/** The one argument of a call as an elementary term. Throws InputError otherwise. */
export function elementaryArgument(name: string, term: Term | undefined): Term {
  if (term === undefined || !isElementary(term)) {
    throw new InputError(
      'bad-argument',
      `${name} takes arguments made of rationals, roots, i, pi, e and elementary functions.`,
    );
  }
  return term;
}

/** Compares a sample with an exact integer: −1, 0 or 1, where 0 means "equal to 250 bits". */
export function compareSample(term: Term, to: bigint): -1 | 0 | 1 {
  const x = toComplex(elementaryValue(term, SAMPLE_BITS)).re;
  const difference = x.mid - (to << BigInt(x.bits));
  const close = x.rad + (1n << BigInt(Math.max(0, x.bits - 250)));
  if (difference > close) return 1;
  return difference < -close ? -1 : 0;
}

/** Whether the term is built of rationals, i, roots of unity and rational powers alone. */
export function isAlgebraic(term: Term): boolean {
  switch (term.kind) {
    case 'rational':
      return true;
    case 'sum':
      return term.terms.every(isAlgebraic);
    case 'product':
      return term.factors.every(isAlgebraic);
    case 'power':
      return isAlgebraic(term.base) && term.exponent.kind === 'rational';
    case 'symbol':
      return isOperation(term);
    case 'call':
      return isOperation(term) && isAlgebraic(operand(term));
  }
}
