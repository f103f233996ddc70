/**
 * π, e, Euler's constant, logarithms and the other elementary functions at elementary arguments.
 *
 * Radii: π see number/reduction.ts; γ see euler-gamma.ts; e: after N terms of Σ 1/n! less than 2/N! is left out, made less than
 * one unit, and the quotient is floored. Logarithms of rationals: exact combinations of log 2, 3, 5, 7 and of acoth values (2
 * units each, number/reduction.ts). Other functions: ball arithmetic over number/elementary.ts, repeated with more bits until
 * the radius suffices.
 */
import { add as addBalls, type Ball, fromInteger, timesInteger, timesPowerOfTwo } from '../number/ball.ts';
import type { Value } from '../number/complex.ts';
import { InputError } from '../number/errors.ts';
import { acothFixed, piBall, SMOOTH_PRIMES, smoothLog } from '../number/reduction.ts';
import { splitSeries } from '../number/splitting.ts';
import { toAccuracy } from './accurate.ts';
import {
  ELEMENTARY,
  elementaryArgument,
  elementaryValue,
  isAlgebraic,
  isRealElementary,
  undecided,
} from './arguments.ts';
import { eulerGamma } from './euler-gamma.ts';
import { factorUpTo } from './exact.ts';
import type { EvaluationContext, Family } from './family.ts';
import { singleConstant } from './single.ts';
import { type CallTerm, call, rational, type Term } from './term.ts';
import { termLatex } from './term-latex.ts';
import { termText } from './term-text.ts';

const pi = singleConstant({
  key: 'pi',
  title: 'π',
  name: 'pi',
  weight: 1,
  latex: '\\pi',
  definition: '\\pi=4\\sum_{k\\ge0}\\frac{(-1)^k}{2k+1}',
  source: 'Series of Chudnovsky and Chudnovsky (1988), binary splitting.',
  compute: piBall,
});

function computeE(work: number): Ball {
  let count = 2;
  for (let log = 0; log < work + 2; count++) log += Math.log2(count);
  const { Q, T } = splitSeries({ p: () => 1n, q: (n) => BigInt(n), a: () => 1n }, 1, count + 1);
  return { mid: ((Q + T) << BigInt(work)) / Q, rad: 2n, bits: work };
}

const e = singleConstant({
  key: 'e',
  title: 'e',
  name: 'e',
  weight: null,
  latex: 'e',
  definition: 'e=\\sum_{n\\ge0}\\frac{1}{n!}',
  source: 'Exponential series, binary splitting.',
  compute: computeE,
});

const gamma = singleConstant({
  key: 'euler-gamma',
  title: 'Euler’s constant',
  name: 'euler_gamma',
  weight: null,
  latex: '\\gamma',
  definition: '\\gamma=\\lim_{n\\to\\infty}\\Bigl(\\sum_{k=1}^{n}\\frac1k-\\log n\\Bigr)',
  source: 'Brent and McMillan, Math. Comp. 34 (1980) 305; bound of Brent and Johansson, Math. Comp. 84 (2015) 2351.',
  compute: eulerGamma,
});

/** Above this prime a general logarithm is as fast as the chain of smaller primes. */
const LARGEST_PRIME = 1000;

/** log p by 2 log p = log(p − 1) + log(p + 1) + 2 acoth(2p² − 1), down to primes that come together. */
function primeLog(p: bigint, work: number, context: EvaluationContext): Ball {
  if (SMOOTH_PRIMES.some((q) => q === p)) return smoothLog(p, work);
  const neighbours = factorUpTo((p - 1n) * (p + 1n), LARGEST_PRIME).factors;
  const sum = neighbours.reduce<Ball>((total, { prime, exponent }) => {
    const log = context.argument(call('log', rational(prime)), work) as Ball;
    return addBalls(total, timesInteger(log, BigInt(exponent)));
  }, fromInteger(0n));
  const rest: Ball = { mid: acothFixed(2n * p * p - 1n, work), rad: 2n, bits: work };
  return addBalls(timesPowerOfTwo(sum, -1), rest);
}

/** The factors of a positive rational over small primes, or null when something larger is left over. */
function smallFactors(p: bigint, q: bigint): { prime: bigint; exponent: number }[] | null {
  const above = factorUpTo(p, LARGEST_PRIME);
  const below = factorUpTo(q, LARGEST_PRIME);
  if (above.rest !== 1n || below.rest !== 1n) return null;
  return [...above.factors, ...below.factors.map((f) => ({ prime: f.prime, exponent: -f.exponent }))];
}

function evaluateLog(argument: Term, bits: number, context: EvaluationContext): Value {
  const factors = argument.kind === 'rational' && argument.p > 0n ? smallFactors(argument.p, argument.q) : null;
  if (factors === null) return elementaryValue(call('log', argument), bits);
  const [only] = factors;
  if (factors.length === 1 && only?.exponent === 1) {
    return toAccuracy(bits, 8, (work) => primeLog(only.prime, work, context));
  }
  return toAccuracy(bits, 12, (work) =>
    factors.reduce<Ball>((sum, { prime, exponent }) => {
      const log = context.argument(call('log', rational(prime)), work) as Ball;
      return addBalls(sum, timesInteger(log, BigInt(exponent)));
    }, fromInteger(0n)),
  );
}

/** The argument of a function that is a family here, checked. */
interface FunctionArgs {
  readonly name: string;
  readonly argument: Term;
}

function parseFunction(term: Parameters<Family['parse']>[0]): FunctionArgs {
  const first = term.kind === 'call' ? term.groups[0]?.[0] : undefined;
  if (term.kind !== 'call' || term.groups.length !== 1 || term.groups[0]?.length !== 1 || first === undefined) {
    throw new InputError('wrong-arguments', `${term.name} takes one argument, as in ${term.name}(1/2).`);
  }
  const argument = elementaryArgument(term.name, first);
  checkDomain(term, argument);
  return { name: term.name, argument };
}

/** Refuses poles: the value must exist to some precision. */
function checkDomain(term: CallTerm, argument: Term): void {
  try {
    elementaryValue({ ...term, groups: [[argument]] }, 64);
  } catch (error) {
    const known = undecided(error);
    if (!(known instanceof InputError) || known.code !== 'undecided') throw known;
    throw new InputError('pole', `${term.name}(${termText(argument)}) is infinite or cannot be told from infinite.`);
  }
}

const functionCommon = {
  parse: parseFunction,
  latex: ({ name, argument }: FunctionArgs) => termLatex(call(name, argument)),
  text: ({ name, argument }: FunctionArgs) => `${name}(${termText(argument)})`,
  isReal: ({ name, argument }: FunctionArgs) => isRealElementary(call(name, argument)),
} as const;

/** Logarithms and inverse functions of algebraic numbers have weight 1. */
function inverseWeight({ argument }: FunctionArgs): number | null {
  return isAlgebraic(argument) ? 1 : null;
}

const logarithm: Family<FunctionArgs> = {
  ...functionCommon,
  key: 'logarithm',
  title: 'Logarithms',
  names: ['log'],
  weight: inverseWeight,
  evaluate: ({ argument }, bits, context) => evaluateLog(argument, bits, context),
  definition: '\\log x=\\int_1^x\\frac{dt}{t},\\quad\\text{principal value},\\ -\\pi<\\operatorname{Im}\\log x\\le\\pi',
  source:
    'Principal value as in DLMF 4.2. Integers through acoth series of small primes; other arguments by Newton’s iteration on exp.',
  examples: [
    'log(2)',
    'log(3)',
    'log(5)',
    'log(7)',
    'log(11)',
    'log((1+sqrt(5))/2)',
    'log(1+sqrt(2))',
    'log(2+sqrt(3))',
  ],
};

const inverseFunctions: Family<FunctionArgs> = {
  ...functionCommon,
  key: 'inverse-functions',
  title: 'Inverse trigonometric and hyperbolic functions',
  names: ['atan', 'asin', 'acos', 'asinh', 'acosh', 'atanh'],
  weight: inverseWeight,
  evaluate: ({ name, argument }, bits) => elementaryValue(call(name, argument), bits),
  definition:
    '\\arctan x=\\int_0^x\\frac{dt}{1+t^2},\\quad\\operatorname{artanh}x=\\int_0^x\\frac{dt}{1-t^2},\\dots\\ \\text{principal values}',
  source: 'Principal values as in DLMF 4.23 and 4.37; arc tangent by Newton’s iteration on sine and cosine.',
  examples: ['atan(1/2)', 'atan(1/5)', 'atan(sqrt(2))', 'asin(1/3)', 'acos(1/3)', 'asinh(1)', 'atanh(1/2)'],
};

const directFunctions: Family<FunctionArgs> = {
  ...functionCommon,
  key: 'exponential-functions',
  title: 'Exponential, trigonometric and hyperbolic functions',
  names: Object.keys(ELEMENTARY).filter((name) => !/^(log|a.*)$/.test(name)),
  weight: () => null,
  evaluate: ({ name, argument }, bits) => elementaryValue(call(name, argument), bits),
  definition: '\\exp x=\\sum_{n\\ge0}\\frac{x^n}{n!},\\quad\\sin x=\\frac{e^{ix}-e^{-ix}}{2i},\\dots',
  source: 'Argument reduction and Taylor series; Smith, Math. Comp. 52 (1989) 131.',
  examples: ['exp(1)', 'exp(pi)', 'cos(pi/7)', 'sin(1)', 'tan(pi/8)', 'sinh(1)'],
};

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
export const elementaryFamilies: readonly Family<any>[] = [pi, e, gamma, logarithm, inverseFunctions, directFunctions];
