/**
 * Evaluation of what terms are built with: rationals, sums, products, powers, i, roots of unity, and the operations
 * `sqrt`, `re`, `im`, `abs`, `conj`. Every other symbol or call is an atom, and the caller knows its value.
 */
import { type Ball, fromInteger, fromRational, negate as negateReal, timesPowerOfTwo } from '../number/ball.ts';
import { add, divide, isComplex, multiply, type Value } from '../number/complex.ts';
import { absoluteValue, I, integerPower, power, root, sizeOf } from '../number/complex-elementary.ts';
import { sinCos } from '../number/elementary.ts';
import { InputError } from '../number/errors.ts';
import { piBall } from '../number/reduction.ts';
import { isRational, type Term } from './term.ts';

export type Atom = Extract<Term, { kind: 'symbol' | 'call' }>;
/** The value of an atom, to an absolute error of 2^−bits. */
export type AtomEvaluator = (atom: Atom, bits: number) => Value;

/** Calls that are structure and not constants of a family. */
export const OPERATIONS: readonly string[] = ['sqrt', 're', 'im', 'abs', 'conj'];
/** r_n = e^{2πi/n}. */
export const ROOT_SYMBOLS: Readonly<Record<string, number>> = { i: 4, r3: 3, r4: 4, r6: 6, r8: 8, r12: 12 };

/** Largest |n| and largest denominator of an exponent p/q that is carried out. */
const LARGEST_POWER = 100_000n;

export function isOperation(term: Atom): boolean {
  return term.kind === 'symbol' ? term.name in ROOT_SYMBOLS : OPERATIONS.includes(term.name);
}

/** The single argument of an operation. Throws InputError for a wrong number of arguments. */
export function operand(term: Extract<Term, { kind: 'call' }>): Term {
  const [group, ...more] = term.groups;
  const [only, ...others] = group ?? [];
  if (only === undefined || others.length > 0 || more.length > 0) {
    throw new InputError('wrong-arguments', `${term.name} takes one argument, as in ${term.name}(2).`);
  }
  return only;
}

/** The value with working precision `work`; the ball tells what accuracy came out. Throws PrecisionError when a divisor or a sign cannot be told. */
export function evaluateStructure(term: Term, work: number, atom: AtomEvaluator): Value {
  const inner = (t: Term): Value => evaluateStructure(t, work, atom);
  switch (term.kind) {
    case 'rational':
      return term.q === 1n ? fromInteger(term.p) : fromRational(term.p, term.q, work);
    case 'sum':
      return term.terms.map(inner).reduce(add);
    case 'product':
      return productOf(term.factors.map(inner), work);
    case 'power':
      return powerOf(term.base, term.exponent, work, inner);
    case 'symbol': {
      const order = ROOT_SYMBOLS[term.name];
      return order === undefined ? atom(term, work) : rootOfUnityValue(order, work);
    }
    case 'call':
      return OPERATIONS.includes(term.name) ? operate(term.name, inner(operand(term)), work) : atom(term, work);
  }
}

/** Rounds after each product with bits in proportion to the sizes that still come, so that large factors cost no accuracy. */
function productOf(factors: readonly Value[], work: number): Value {
  const growth = factors.reduce((sum, f) => sum + Math.max(0, Math.min(sizeOf(f), 1 << 22)), 0);
  return factors.reduce((product, f) => multiply(product, f, work + growth));
}

function rootOfUnityValue(order: number, work: number): Value {
  if (order === 4) return I;
  const { sin, cos } = sinCos(divideBall(timesPowerOfTwo(piBall(work + 4), 1), order, work + 4), work);
  return { re: cos, im: sin };
}

function divideBall(x: Ball, n: number, bits: number): Ball {
  return divide(x, fromInteger(BigInt(n)), bits) as Ball;
}

function operate(name: string, x: Value, work: number): Value {
  switch (name) {
    case 'sqrt':
      return root(x, 2, work);
    case 're':
      return isComplex(x) ? x.re : x;
    case 'im':
      return isComplex(x) ? x.im : fromInteger(0n);
    case 'abs':
      return absoluteValue(x, work);
    default:
      return isComplex(x) ? { re: x.re, im: negateReal(x.im) } : x;
  }
}

function powerOf(base: Term, exponent: Term, work: number, inner: (t: Term) => Value): Value {
  const x = inner(base);
  if (!isRational(exponent)) return power(x, inner(exponent), work);
  const { p, q } = exponent;
  const size = p < 0n ? -p : p;
  if (size > LARGEST_POWER || q > LARGEST_POWER) {
    throw new InputError('too-large', `An exponent may have at most ${LARGEST_POWER} above and below.`);
  }
  const n = Number(p);
  if (q === 1n) return integerPower(x, n, work);
  const growth = Math.max(0, Math.abs(sizeOf(x))) * Math.abs(n);
  const guard = work + 8 + (Number.isFinite(growth) ? 2 * Math.ceil(growth / Number(q)) : 0);
  return integerPower(root(x, Number(q), guard), n, work);
}

/**
 * Whether a term is real as it is built: parts real, and roots taken of numbers that are not negative. `sample` gives a
 * value of moderate precision for that last question; where its sign cannot be told the answer is false.
 */
export function isRealStructure(term: Term, atom: (atom: Atom) => boolean, sample: (term: Term) => Value): boolean {
  const inner = (t: Term): boolean => isRealStructure(t, atom, sample);
  const notNegative = (t: Term): boolean => {
    if (!inner(t)) return false;
    const x = sample(t);
    return !isComplex(x) && x.mid - x.rad >= 0n;
  };
  switch (term.kind) {
    case 'rational':
      return true;
    case 'sum':
      return term.terms.every(inner);
    case 'product':
      return term.factors.every(inner);
    case 'power': {
      if (isRational(term.exponent) && term.exponent.q === 1n) return inner(term.base);
      return inner(term.exponent) && notNegative(term.base);
    }
    case 'symbol':
      return isOperation(term) ? false : atom(term);
    case 'call':
      if (!isOperation(term)) return atom(term);
      if (term.name === 'sqrt') return notNegative(operand(term));
      return term.name === 'conj' ? inner(operand(term)) : true;
  }
}
