/**
 * Hurwitz zeta values ζ(s, p/q) and polygamma values ψ^{(n)}(p/q).
 *
 * With η(s, a) = Σ (−1)^k/(k + a)^s: ζ(s, a/2) = 2^{s−1} (ζ(s, a) + η(s, a)) halves an even denominator. For odd q the step
 * ζ(s, a) = 2^{1−s} ζ(s, a/2) − η(s, a) for even p, ζ(s, a) = 2^{1−s} ζ(s, (a+1)/2) + η(s, a) for odd p, runs through a cycle of
 * fractions with the same denominator; after L steps it is back, so (1 − 2^{(1−s)L}) ζ(s, a) is an exact combination of η's.
 * η(s, p/q) = q^s B(p, s) with period q comes from alternating.ts (2 units each); all else is ball arithmetic with exact
 * rational weights.
 */
import {
  add,
  type Ball,
  divide,
  fromInteger,
  fromRational,
  multiply,
  negate,
  timesInteger,
  timesPowerOfTwo,
} from '../number/ball.ts';
import { log, sinCos } from '../number/elementary.ts';
import { InputError } from '../number/errors.ts';
import { piBall } from '../number/reduction.ts';
import { allToAccuracy, toAccuracy } from './accurate.ts';
import { ALTERNATING_ERROR, alternatingSums } from './alternating.ts';
import { addFractions, type Fraction, factorial, fraction } from './exact.ts';
import type { EvaluationContext, Family } from './family.ts';
import { call, rational, symbol, type Term } from './term.ts';
import { rationalLatex } from './term-latex.ts';

interface HurwitzArgs {
  readonly s: number;
  readonly p: bigint;
  readonly q: bigint;
}

const LARGEST_ORDER = 1000;
const LARGEST_DENOMINATOR = 1000n;
const LARGEST_SHIFT = 1000n;

/** A combination of B(residue, s) with period `period`, of ζ(s), and a rational. */
interface LinearForm {
  readonly etas: { period: number; residue: number; weight: Fraction }[];
  zeta: Fraction;
  rational: Fraction;
}

const ZERO: Fraction = { p: 0n, q: 1n };

function times(a: Fraction, b: Fraction): Fraction {
  return fraction(a.p * b.p, a.q * b.q);
}

/** Adds weight·ζ(s, p/q), 0 < p/q, to the form. */
function addHurwitz(form: LinearForm, s: number, p: bigint, q: bigint, weight: Fraction): void {
  const power = BigInt(s);
  if (p > q) {
    // ζ(s, a + 1) = ζ(s, a) − a^−s
    const below = p - q;
    addHurwitz(form, s, below, q, weight);
    form.rational = addFractions(form.rational, times(weight, fraction(-(q ** power), below ** power)));
  } else if (q === 1n) form.zeta = addFractions(form.zeta, weight);
  else if (q % 2n === 0n) addEven(form, s, p, q / 2n, times(weight, { p: 1n << (power - 1n), q: 1n }));
  else addCycle(form, s, p, q, weight);
}

/** weight·(ζ(s, a) + η(s, a)) at a = p/h; for 1 < a < 2 that is ζ(s, a − 1) − η(s, a − 1). */
function addEven(form: LinearForm, s: number, p: bigint, h: bigint, weight: Fraction): void {
  const beyond = p > h;
  const residue = beyond ? p - h : p;
  addHurwitz(form, s, residue, h, weight);
  addEta(form, s, residue, h, beyond ? times(weight, { p: -1n, q: 1n }) : weight);
}

function addEta(form: LinearForm, s: number, p: bigint, q: bigint, weight: Fraction): void {
  form.etas.push({ period: Number(q), residue: Number(p), weight: times(weight, { p: q ** BigInt(s), q: 1n }) });
}

function addCycle(form: LinearForm, s: number, p: bigint, q: bigint, weight: Fraction): void {
  const cycle: bigint[] = [];
  for (let t = p; cycle.length === 0 || t !== p; t = t % 2n === 0n ? t / 2n : (t + q) / 2n) cycle.push(t);
  const steps = BigInt((s - 1) * cycle.length);
  const divisor = (1n << steps) - 1n;
  cycle.forEach((t, i) => {
    const size = 1n << (steps - BigInt((s - 1) * i));
    addEta(form, s, t, q, times(weight, fraction(t % 2n === 0n ? -size : size, divisor)));
  });
}

/** Values B(residue, s) by period, each pair once. */
function sumsOf(forms: readonly LinearForm[], s: number, work: number, context: EvaluationContext): Map<string, Ball> {
  const residues = new Map<number, Set<number>>();
  for (const { period, residue } of forms.flatMap((f) => f.etas)) {
    residues.set(period, (residues.get(period) ?? new Set()).add(residue));
  }
  const values = new Map<string, Ball>();
  for (const [period, set] of residues) {
    const list = [...set];
    const [row = []] = alternatingSums(period, list, [s], work, context);
    list.forEach((residue, r) => {
      values.set(`${period}:${residue}`, { mid: row[r] as bigint, rad: ALTERNATING_ERROR, bits: work });
    });
  }
  return values;
}

function scale(x: Ball, { p, q }: Fraction, work: number): Ball {
  return divide(timesInteger(x, p), fromInteger(q), work);
}

/** All ζ(s, a) of one s in one pass. */
function hurwitzValues(list: readonly HurwitzArgs[], s: number, bits: number, context: EvaluationContext): Ball[] {
  const forms = list.map(({ p, q }) => {
    const form: LinearForm = { etas: [], zeta: ZERO, rational: ZERO };
    addHurwitz(form, s, p, q, { p: 1n, q: 1n });
    return form;
  });
  const largest = Math.max(...list.map(({ q }) => Number(q)));
  const guard = 16 + Math.ceil(s * (Math.log2(largest) + 1));
  return allToAccuracy(bits, guard, (work) => {
    const sums = sumsOf(forms, s, work, context);
    const usesZeta = forms.some((f) => f.zeta.p !== 0n);
    const zeta = usesZeta ? (context.argument(call('zeta', rational(BigInt(s))), work) as Ball) : fromInteger(0n);
    return forms.map((form) => {
      const start = add(scale(zeta, form.zeta, work), fromRational(form.rational.p, form.rational.q, work));
      return form.etas.reduce(
        (sum, { period, residue, weight }) => add(sum, scale(sums.get(`${period}:${residue}`) as Ball, weight, work)),
        start,
      );
    });
  });
}

/** By order, each order in one pass; results in the order of the arguments. */
function manyHurwitz(all: readonly HurwitzArgs[], bits: number, context: EvaluationContext): Ball[] {
  const values: Ball[] = [];
  for (const s of new Set(all.map((a) => a.s))) {
    const places = all.flatMap((a, j) => (a.s === s ? [j] : []));
    const list = places.map((j) => all[j] as HurwitzArgs);
    hurwitzValues(list, s, bits, context).forEach((value, k) => {
      values[places[k] as number] = value;
    });
  }
  return values;
}

/** The arguments of a call as an order and a positive rational. Throws InputError. */
function orderAndPoint(
  name: string,
  example: string,
  least: number,
  term: Parameters<Family['parse']>[0],
): HurwitzArgs {
  const list: readonly Term[] = term.kind === 'call' && term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  const [order, point] = list;
  if (list.length !== 2 || order?.kind !== 'rational' || point?.kind !== 'rational' || order.q !== 1n) {
    throw new InputError('wrong-arguments', `${name} takes an integer order and a rational number, as in ${example}.`);
  }
  if (order.p < BigInt(least) || order.p > BigInt(LARGEST_ORDER)) {
    throw new InputError('bad-argument', `The order of ${name} must lie between ${least} and ${LARGEST_ORDER}.`);
  }
  const { p, q } = point;
  if (p <= 0n)
    throw new InputError('bad-argument', `The second argument of ${name} must be positive, as in ${example}.`);
  if (q > LARGEST_DENOMINATOR || p > LARGEST_SHIFT * q) {
    throw new InputError(
      'too-large',
      `The second argument of ${name} may have a denominator of at most ${LARGEST_DENOMINATOR} and be at most ${LARGEST_SHIFT}.`,
    );
  }
  return { s: Number(order.p), p, q };
}

const pointText = ({ p, q }: HurwitzArgs): string => (q === 1n ? `${p}` : `${p}/${q}`);

const hurwitzFamily: Family<HurwitzArgs> = {
  key: 'hurwitz',
  title: 'Hurwitz zeta values',
  names: ['hurwitz'],
  parse: (term) => orderAndPoint('hurwitz', 'hurwitz(3,1/5)', 2, term),
  weight: ({ s }) => s,
  latex: ({ s, p, q }) => `\\zeta(${s},${rationalLatex(p, q)})`,
  text: (args) => `hurwitz(${args.s},${pointText(args)})`,
  isReal: () => true,
  evaluate: (args, bits, context) => manyHurwitz([args], bits, context)[0] as Ball,
  evaluateMany: manyHurwitz,
  definition: '\\mathrm{hurwitz}(s,a)=\\zeta(s,a)=\\sum_{k\\ge0}\\frac{1}{(k+a)^s}',
  source: 'DLMF 25.11; alternating sums by Cohen, Rodriguez Villegas and Zagier, Exper. Math. 9 (2000) 3.',
  examples: ['hurwitz(2,1/3)', 'hurwitz(3,1/5)', 'hurwitz(3,1/8)', 'hurwitz(4,3/4)'],
};

/**
 * ψ(p/q) for 0 < p < q by Gauss: −γ − log 2q − (π/2) cot(πp/q) + 2 Σ_{0<n<q/2} cos(2πnp/q) log sin(πn/q); for p = q it is −γ.
 */
function gauss(p: number, q: number, work: number, context: EvaluationContext): Ball {
  const gamma = context.argument(symbol('euler_gamma'), work) as Ball;
  if (q === 1) return negate(gamma);
  const logOf = (n: number): Ball => context.argument(call('log', rational(BigInt(n))), work) as Ball;
  const pi = piBall(work + 16);
  const angle = (u: number): Ball => divide(timesInteger(pi, BigInt(u)), fromInteger(BigInt(q)), work + 8);
  const { sin, cos } = sinCos(angle(p), work + 8);
  let sum = timesPowerOfTwo(multiply(pi, divide(cos, sin, work + 4), work + 4), -1);
  sum = negate(add(sum, add(gamma, logOf(2 * q))));
  for (let n = 1; 2 * n < q; n++) {
    const weight = sinCos(angle((2 * n * p) % (2 * q)), work + 4).cos;
    const size = log(sinCos(angle(n), work + 4).sin, work + 4);
    sum = add(sum, timesPowerOfTwo(multiply(weight, size, work + 4), 1));
  }
  return sum;
}

function digamma({ p, q }: HurwitzArgs, bits: number, context: EvaluationContext): Ball {
  const whole = (p - 1n) / q;
  const rest = p - whole * q;
  return toAccuracy(bits, 24 + Math.ceil(Math.log2(Number(q))), (work) => {
    let sum = gauss(Number(rest), Number(q), work, context);
    for (let k = 0n; k < whole; k++) sum = add(sum, fromRational(q, rest + k * q, work));
    return sum;
  });
}

/** ψ^{(n)} = (−1)^{n+1} n! ζ(n+1, a) for n ≥ 1. */
function manyPolygamma(all: readonly HurwitzArgs[], bits: number, context: EvaluationContext): Ball[] {
  const shifted = all.filter(({ s }) => s > 0).map(({ s, p, q }) => ({ s: s + 1, p, q }));
  const top = shifted.reduce((most, { s }) => Math.max(most, s), 2);
  const guard = factorial(top).toString(2).length;
  const values = manyHurwitz(shifted, bits + guard + 2, context);
  let next = 0;
  return all.map((args) => {
    if (args.s === 0) return digamma(args, bits, context);
    const value = values[next++] as Ball;
    return toAccuracy(bits, 0, () => timesInteger(value, args.s % 2 === 1 ? factorial(args.s) : -factorial(args.s)));
  });
}

const polygammaFamily: Family<HurwitzArgs> = {
  key: 'polygamma',
  title: 'Polygamma values',
  names: ['polygamma'],
  parse: (term) => orderAndPoint('polygamma', 'polygamma(1,1/3)', 0, term),
  weight: ({ s }) => (s === 0 ? null : s + 1),
  latex: ({ s, p, q }) => `\\psi^{(${s})}(${rationalLatex(p, q)})`,
  text: (args) => `polygamma(${args.s},${pointText(args)})`,
  isReal: () => true,
  evaluate: (args, bits, context) => manyPolygamma([args], bits, context)[0] as Ball,
  evaluateMany: manyPolygamma,
  definition: '\\mathrm{polygamma}(n,x)=\\psi^{(n)}(x)=\\frac{d^{n+1}}{dx^{n+1}}\\log\\Gamma(x)',
  source: 'DLMF 5.15; order 0 by Gauss’s theorem (DLMF 5.4.19), others through Hurwitz zeta values.',
  examples: ['polygamma(0,1/3)', 'polygamma(1,1/3)', 'polygamma(1,1/4)', 'polygamma(1,1/5)', 'polygamma(2,1/6)'],
};

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
export const hurwitzFamilies: readonly Family<any>[] = [hurwitzFamily, polygammaFamily];
