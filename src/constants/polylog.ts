/**
 * Polylogarithms Li_s(x) at elementary x; on the cut x > 1 the value continued from below, Im Li_s(x) = −π log^{s−1} x/(s − 1)!.
 *
 * Methods: ζ at 1; residues modulo the order at roots of unity (clausen.ts); Fibonacci numbers at ±φ^−m; the direct sum at
 * rationals |x| ≤ 0.7; acceleration elsewhere with |x| ≤ 3 (polylog-kernels.ts and power-series.ts, where the radii are derived); beyond, and on
 * the cut, inversion: Li_s(z) = −(2πi)^s/s! B_s(1/2 + log(−z)/2πi) − (−1)^s Li_s(1/z) in ball arithmetic.
 */
import { type Ball, fromInteger, negate as negateReal, timesPowerOfTwo } from '../number/ball.ts';
import { add, divide, multiply, negate, subtract, toComplex, type Value } from '../number/complex.ts';
import { integerPower, log } from '../number/complex-elementary.ts';
import { InputError } from '../number/errors.ts';
import { piBall } from '../number/reduction.ts';
import { allToAccuracy } from './accurate.ts';
import {
  approximate,
  elementaryArgument,
  elementaryValue,
  isAlgebraic,
  isRealElementary,
  undecided,
} from './arguments.ts';
import { type Angle, bernoulliPart, clausenAt, LARGEST_BERNOULLI, multipleOfPi, reduceAngle } from './clausen.ts';
import { bernoulliNumbers, binomial, type Fraction, factorial } from './exact.ts';
import type { EvaluationContext, Family } from './family.ts';
import { acceleratedSums, bitsPerTerm, type Point } from './polylog-kernels.ts';
import { directSums, goldenSums } from './power-series.ts';
import { goldenPower, type Quadratic, quadraticOf } from './quadratic.ts';
import { rootOfUnity } from './sums/roots.ts';
import { call, rational, type Term } from './term.ts';
import { termLatex } from './term-latex.ts';
import { termText } from './term-text.ts';

export const LARGEST_ORDER = 1000;
/** Below this many bits a term the argument counts as too close to 1 (or to the cut) to be summed in reasonable time. */
const LEAST_RATE = 0.02;
const FAR = 3;
const DIRECT = 0.7;

type Method =
  | { readonly kind: 'zero' | 'one' | 'invert' | 'general' }
  | { readonly kind: 'root'; readonly angle: Angle }
  | { readonly kind: 'golden'; readonly m: number; readonly sign: 1 | -1 }
  | { readonly kind: 'direct'; readonly p: bigint; readonly q: bigint };

interface PolylogArgs {
  readonly s: number;
  readonly x: Term;
  readonly method: Method;
}

/** The angle of a root of unity however it is typed, or null. */
function rootAngle(x: Term, exact: Quadratic | null): Angle | null {
  const typed = rootOfUnity(x);
  if (typed !== null) return reduceAngle(2n * BigInt(typed.exponent), BigInt(typed.order));
  if (x.kind === 'call' && x.name === 'exp') return exponentialAngle(x.groups[0]?.[0]);
  if (exact === null || exact.d >= 0n) return null;
  const { a, b, d } = exact;
  if (d === -1n && a.p === 0n && b.q === 1n && (b.p === 1n || b.p === -1n)) return reduceAngle(b.p, 2n);
  const halves = a.q === 2n && b.q === 2n && a.p * a.p === 1n && b.p * b.p === 1n;
  return d === -3n && halves ? reduceAngle(b.p * (a.p > 0n ? 1n : 2n), 3n) : null;
}

/** exp(r·π·i). */
function exponentialAngle(exponent: Term | undefined): Angle | null {
  if (exponent?.kind !== 'product') return null;
  const rest = exponent.factors.filter((f) => !(f.kind === 'symbol' && f.name === 'i'));
  if (rest.length !== exponent.factors.length - 1) return null;
  const [only] = rest;
  const turn = multipleOfPi(rest.length === 1 && only !== undefined ? only : { kind: 'product', factors: rest });
  return turn === null ? null : reduceAngle(turn.p, turn.q);
}

/** How Li at x is computed. Throws InputError where the sum is too slow. */
function methodFor(x: Term): Method {
  const exact = quadraticOf(x);
  if (exact !== null && exact.b.p === 0n) {
    const { p, q } = exact.a;
    if (p === 0n) return { kind: 'zero' };
    if (p === q) return { kind: 'one' };
    const size = Number((p << 60n) / q) * 2 ** -60;
    if (p !== -q && Math.abs(size) <= DIRECT) return { kind: 'direct', p, q };
  }
  const angle = rootAngle(x, exact);
  if (angle !== null) return angle.p === 0 ? { kind: 'one' } : { kind: 'root', angle };
  const golden = exact === null ? null : goldenPower(exact);
  if (golden !== null) return { kind: 'golden', ...golden };
  const { re, im } = approximate(x);
  const invert = Math.hypot(re, im) > FAR || (im === 0 && re > 1 && isRealElementary(x));
  if (re === 0 && im === 0) throw tooClose(x, '0');
  const norm = re * re + im * im;
  if (bitsPerTerm(invert ? re / norm : re, invert ? -im / norm : im) < LEAST_RATE) throw tooClose(x, '1');
  return { kind: invert ? 'invert' : 'general' };
}

function tooClose(x: Term, to: string): InputError {
  return new InputError('too-close', `${termText(x)} is too close to ${to} for this function to be summed.`);
}

/** The point of an elementary term for the kernels. */
export function pointOf(x: Term): Point {
  const { re, im } = approximate(x);
  const real = isRealElementary(x);
  return {
    re,
    im: real ? 0 : im,
    value: (bits) => (real ? toComplex(elementaryValue(x, bits)).re : elementaryValue(x, bits)),
    exact: exactPoint(quadraticOf(x)),
  };
}

/** Integer coordinates of a rational or quadratic number, unless they are so large, or the conjugate so far outside the unit circle (or, for 1/x, so far inside), that rounded ones are as good. */
function exactPoint(x: Quadratic | null): Point['exact'] {
  if (x === null) return null;
  const gamma = x.a.q * x.b.q;
  const alpha = x.a.p * x.b.q;
  const beta = x.b.p * x.a.q;
  const large = [gamma, alpha, beta, x.d].some((n) => n > 1n << 30n || n < -(1n << 30n));
  if (large) return null;
  if (x.b.p === 0n) return { alpha, beta, gamma, root: -1n };
  const conjugate = Math.abs((Number(alpha) - Number(beta) * Math.sqrt(Math.max(0, Number(x.d)))) / Number(gamma));
  if (x.d > 0n && (conjugate > 4 || conjugate < 0.25)) return null;
  return { alpha, beta, gamma, root: x.d };
}

/** Li_s at e^{iθ}: the Clausen part and the Bernoulli part. */
function atRoot(s: number, angle: Angle, work: number, context: EvaluationContext): Value {
  const clausen = clausenAt(s, angle, work, context);
  const real = angle.p === angle.q;
  const other = s <= LARGEST_BERNOULLI ? bernoulliPart(s, angle, work) : null;
  if (other === null)
    throw new InputError('too-large', `At roots of unity Li is known here up to order ${LARGEST_BERNOULLI}.`);
  if (real) return s % 2 === 0 ? other : clausen;
  return s % 2 === 0 ? { re: other, im: clausen } : { re: clausen, im: other };
}

/** (2πi)^s B_s(1/2 + L/2πi)/s! = Σ_{k even} C(s,k) (2^{1−k} − 1) B_k (−4π²)^{k/2} L^{s−k}/s!. */
function inversionPolynomial(s: number, logarithm: Value, work: number): Value {
  const numbers = bernoulliNumbers(s);
  const square = negateReal(timesPowerOfTwo(multiply(piBall(work), piBall(work), work) as Ball, 2));
  let sum: Value = fromInteger(0n);
  for (let k = 0; k <= s; k += 2) {
    const b = numbers[k] as Fraction;
    // (2^{1−k} − 1) = (2 − 2^k)/2^k
    const p = binomial(s, k) * (2n - (1n << BigInt(k))) * b.p;
    const q = (1n << BigInt(k)) * b.q * factorial(s);
    const power = multiply(integerPower(square, k / 2, work), integerPower(logarithm, s - k, work), work);
    sum = add(sum, divide(multiply(fromInteger(p), power, work), fromInteger(q), work));
  }
  return sum;
}

function inverted(list: readonly number[], x: Term, bits: number, context: EvaluationContext): Value[] {
  const inverse: Term = { kind: 'power', base: x, exponent: rational(-1n) };
  const near = x.kind === 'rational' ? rational(x.q, x.p) : inverse;
  const others = evaluateAt(list, near, methodFor(near), bits + 4, context);
  return allToAccuracy(bits, 32, (work) => {
    const logarithm = log(negate(elementaryValue(x, work + 8)), work + 8);
    return list.map((s, j) => {
      const other = others[j] as Value;
      const polynomial = inversionPolynomial(s, logarithm, work + 8);
      return negate(s % 2 === 0 ? add(polynomial, other) : subtract(polynomial, other));
    });
  });
}

/** Li_s(x) for several s > 1 at one x. */
function evaluateAt(
  list: readonly number[],
  x: Term,
  method: Method,
  bits: number,
  context: EvaluationContext,
): Value[] {
  switch (method.kind) {
    case 'zero':
      return list.map(() => fromInteger(0n));
    case 'one':
      return list.map((s) => context.argument(call('zeta', rational(BigInt(s))), bits));
    case 'invert':
      return inverted(list, x, bits, context);
    case 'root':
      return list.flatMap((s) => allToAccuracy(bits, 16, (work) => [atRoot(s, method.angle, work, context)]));
    case 'golden':
      return allToAccuracy(bits, 8, (work) => goldenSums(method.m, method.sign, list, work, context));
    case 'direct': {
      const guard = 8 + Math.ceil(Math.log2(bits + 64));
      return allToAccuracy<Value>(bits, guard + 8, (work) => directSums(method.p, method.q, list, work, context));
    }
    case 'general': {
      const point = pointOf(x);
      const d = { stride: 1, offset: 1, exponents: list };
      return allToAccuracy(bits, 12, (work) => acceleratedSums(point, d, work, context));
    }
  }
}

/** Li_1(x) = −log(1 − x). */
function logarithmic(x: Term, bits: number): Value {
  const difference: Term = { kind: 'sum', terms: [rational(1n), { kind: 'product', factors: [rational(-1n), x] }] };
  return negate(elementaryValue(call('log', difference), bits));
}

function evaluateMany(all: readonly PolylogArgs[], bits: number, context: EvaluationContext): Value[] {
  const values: Value[] = [];
  const groups = new Map<string, number[]>();
  all.forEach(({ s, x }, j) => {
    if (s === 1) values[j] = logarithmic(x, bits);
    else groups.set(termText(x), [...(groups.get(termText(x)) ?? []), j]);
  });
  for (const places of groups.values()) {
    const members = places.map((j) => all[j] as PolylogArgs);
    const { x, method } = members[0] as PolylogArgs;
    const list = members.map(({ s }) => s);
    evaluateAt(list, x, method, bits, context).forEach((value, k) => {
      values[places[k] as number] = value;
    });
  }
  return values;
}

function isRealPolylog({ x, method }: PolylogArgs): boolean {
  if (method.kind === 'root') return method.angle.p === method.angle.q;
  if (!isRealElementary(x)) return false;
  return approximate(x).re < 1 || method.kind === 'one';
}

/** The order and the argument of Li, Cl and Ti. Throws InputError. */
export function orderAndArgument(
  name: string,
  example: string,
  term: Parameters<Family['parse']>[0],
): { s: number; x: Term } {
  const list: readonly Term[] = term.kind === 'call' && term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  const [order, argument] = list;
  if (list.length !== 2 || order?.kind !== 'rational' || order.q !== 1n) {
    throw new InputError('wrong-arguments', `${name} takes an integer order and an argument, as in ${example}.`);
  }
  if (order.p < 1n || order.p > BigInt(LARGEST_ORDER)) {
    throw new InputError(
      'bad-argument',
      `The order of ${name} must lie between 1 and ${LARGEST_ORDER}, as in ${example}.`,
    );
  }
  return { s: Number(order.p), x: elementaryArgument(name, argument) };
}

function parse(term: Parameters<Family['parse']>[0]): PolylogArgs {
  const { s, x } = orderAndArgument('Li', 'Li(4,1/2)', term);
  try {
    const method = methodFor(x);
    if (s === 1 && method.kind === 'one') throw new InputError('divergent', 'Li(1,1) diverges.');
    return { s, x, method };
  } catch (error) {
    throw undecided(error);
  }
}

export const polylogFamily: Family<PolylogArgs> = {
  key: 'polylogarithm',
  title: 'Polylogarithms',
  names: ['Li'],
  parse,
  weight: ({ s, x }) => (isAlgebraic(x) ? s : null),
  latex: ({ s, x }) => `\\mathrm{Li}_{${s}}\\bigl(${termLatex(x)}\\bigr)`,
  text: ({ s, x }) => `Li(${s},${termText(x)})`,
  isReal: isRealPolylog,
  evaluate: (args, bits, context) => evaluateMany([args], bits, context)[0] as Value,
  evaluateMany,
  definition:
    '\\mathrm{Li}_s(x)=\\sum_{n\\ge1}\\frac{x^n}{n^s},\\quad\\text{continued to }\\mathbb C\\setminus[1,\\infty)\\text{, from below for }x>1',
  source:
    'Lewin, "Polylogarithms and Associated Functions" (1981); acceleration of Cohen, Rodriguez Villegas and Zagier, Exper. Math. 9 (2000) 3.',
  examples: [
    'Li(4,1/2)',
    'Li(5,1/2)',
    'Li(2,1/4)',
    'Li(3,1/3)',
    'Li(3,(sqrt(5)-1)/2)',
    'Li(3,i)',
    'Li(2,r6)',
    'Li(3,(1+sqrt(-3))/4)',
  ],
};
