/** Clausen values Cl(s, θ) and inverse tangent integrals Ti(s, x). Radii: clausen.ts and polylog-kernels.ts. */
import { type Ball, divide, fromInteger, multiply as multiplyReal, negate } from '../number/ball.ts';
import { toComplex, type Value } from '../number/complex.ts';
import { sinCos } from '../number/elementary.ts';
import { InputError } from '../number/errors.ts';
import { toAccuracy } from './accurate.ts';
import { approximate, elementaryValue, isAlgebraic, isRealElementary } from './arguments.ts';
import { type Angle, clausenAt, clausenOne, multipleOfPi, reduceAngle } from './clausen.ts';
import type { EvaluationContext, Family } from './family.ts';
import { orderAndArgument, pointOf } from './polylog.ts';
import { acceleratedSums, bitsPerTerm, type Point } from './polylog-kernels.ts';
import { directOdd } from './power-series.ts';
import { call, rational, type Term } from './term.ts';
import { termLatex } from './term-latex.ts';
import { termText } from './term-text.ts';

const LEAST_RATE = 0.02;

interface ClausenArgs {
  readonly s: number;
  readonly x: Term;
  /** Null for an angle that is no simple multiple of π. */
  readonly angle: Angle | null;
}

function parseClausen(term: Parameters<Family['parse']>[0]): ClausenArgs {
  const { s, x } = orderAndArgument('Cl', 'Cl(2,pi/3)', term);
  if (!isRealElementary(x)) throw new InputError('bad-argument', 'Cl takes a real angle, as in Cl(2,pi/3).');
  const turn = multipleOfPi(x);
  const angle = turn === null ? null : reduceAngle(turn.p, turn.q);
  if (angle?.p === 0 && s === 1) throw new InputError('divergent', 'Cl(1,0) diverges.');
  if (angle === null) {
    const point = circlePoint(x);
    if (bitsPerTerm(point.re, point.im) < LEAST_RATE) {
      throw new InputError('too-close', `${termText(x)} is too close to a multiple of 2*pi for Cl to be summed.`);
    }
  }
  return { s, x, angle };
}

/** e^{iθ}. */
function circlePoint(x: Term): Point {
  const value = (bits: number): Value => {
    const { sin, cos } = sinCos(toComplex(elementaryValue(x, bits + 4)).re, bits + 2);
    return { re: cos, im: sin };
  };
  const theta = approximate(x).re;
  return { re: Math.cos(theta), im: Math.sin(theta), value, exact: null };
}

function evaluateClausen({ s, x, angle }: ClausenArgs, bits: number, context: EvaluationContext): Ball {
  if (angle === null) {
    const point = circlePoint(x);
    const value = toAccuracy(bits, 12, (work) => {
      const d = { stride: 1, offset: 1, exponents: [s] };
      return acceleratedSums(point, d, work, context)[0] as Value;
    });
    const { re, im } = toComplex(value);
    return s % 2 === 0 ? im : re;
  }
  if (angle.p === 0) {
    return s % 2 === 0 ? fromInteger(0n) : (context.argument(call('zeta', rational(BigInt(s))), bits) as Ball);
  }
  return toAccuracy(bits, 16, (work) => (s === 1 ? clausenOne(angle, work) : clausenAt(s, angle, work, context)));
}

const clausenFamily: Family<ClausenArgs> = {
  key: 'clausen',
  title: 'Clausen values',
  names: ['Cl'],
  parse: parseClausen,
  weight: ({ s, angle }) => (angle === null ? null : s),
  latex: ({ s, x }) => `\\mathrm{Cl}_{${s}}\\bigl(${termLatex(x)}\\bigr)`,
  text: ({ s, x }) => `Cl(${s},${termText(x)})`,
  isReal: () => true,
  evaluate: evaluateClausen,
  definition:
    '\\mathrm{Cl}_s(\\theta)=\\sum_{n\\ge1}\\frac{\\sin n\\theta}{n^s}\\ (s\\text{ even}),\\quad\\sum_{n\\ge1}\\frac{\\cos n\\theta}{n^s}\\ (s\\text{ odd})',
  source:
    'Lewin, "Polylogarithms and Associated Functions" (1981), chapter 7; sums by Cohen, Rodriguez Villegas and Zagier, Exper. Math. 9 (2000) 3.',
  examples: ['Cl(2,pi/3)', 'Cl(2,2*pi/3)', 'Cl(2,pi/4)', 'Cl(3,pi/3)', 'Cl(4,pi/3)', 'Cl(6,pi/3)', 'Cl(2,acos(1/3))'],
};

interface TangentArgs {
  readonly s: number;
  readonly x: Term;
}

/** Up to this |x| the defining sum is used for rationals: x² ≤ 0.69. */
const DIRECT = 0.83;

function parseTangent(term: Parameters<Family['parse']>[0]): TangentArgs {
  const { s, x } = orderAndArgument('Ti', 'Ti(2,1/2)', term);
  if (!isRealElementary(x)) throw new InputError('bad-argument', 'Ti takes a real argument, as in Ti(2,1/2).');
  const { re } = approximate(x);
  if (re === 0 || bitsPerTerm(-re * re, 0) < LEAST_RATE) {
    throw new InputError(
      'bad-argument',
      'Ti takes a real argument that is neither zero nor very large, as in Ti(2,1/2).',
    );
  }
  return { s, x };
}

/** Ti_s(x) = −(1/x)·z Σ z^k/(2k+1)^s with z = −x². */
function evaluateTangent({ s, x }: TangentArgs, bits: number, context: EvaluationContext): Ball {
  if (s === 1) return elementaryValue(call('atan', x), bits) as Ball;
  if (x.kind === 'rational' && x.p * x.p === x.q * x.q) {
    const beta = context.argument(call('beta', rational(BigInt(s))), bits) as Ball;
    return x.p < 0n ? negate(beta) : beta;
  }
  if (x.kind === 'rational' && Math.abs(approximate(x).re) <= DIRECT) {
    const { p, q } = x;
    const guard = 16 + Math.ceil(Math.log2(bits + 64));
    return toAccuracy(bits, guard, (work) => directOdd(p, q, -p * p, q * q, 2, 1, [s], work, context)[0] as Ball);
  }
  const z = pointOf({ kind: 'product', factors: [rational(-1n), x, x] });
  const d = { stride: 2, offset: 1, exponents: [s] };
  return toAccuracy(bits, 16, (work) => {
    const sum = acceleratedSums(z, d, work, context)[0] as Ball;
    const argument = elementaryValue(x, work + 8) as Ball;
    return negate(divide(multiplyReal(sum, fromInteger(1n), work + 8), argument, work));
  });
}

const tangentFamily: Family<TangentArgs> = {
  key: 'inverse-tangent-integral',
  title: 'Inverse tangent integrals',
  names: ['Ti'],
  parse: parseTangent,
  weight: ({ s, x }) => (isAlgebraic(x) ? s : null),
  latex: ({ s, x }) => `\\mathrm{Ti}_{${s}}\\bigl(${termLatex(x)}\\bigr)`,
  text: ({ s, x }) => `Ti(${s},${termText(x)})`,
  isReal: () => true,
  evaluate: evaluateTangent,
  definition: '\\mathrm{Ti}_s(x)=\\operatorname{Im}\\mathrm{Li}_s(ix)=\\sum_{k\\ge0}\\frac{(-1)^kx^{2k+1}}{(2k+1)^s}',
  source:
    'Lewin, "Polylogarithms and Associated Functions" (1981), chapter 2; acceleration of Cohen, Rodriguez Villegas and Zagier, Exper. Math. 9 (2000) 3.',
  examples: ['Ti(2,1/2)', 'Ti(2,1/3)', 'Ti(3,1/2)', 'Ti(2,2)', 'Ti(2,sqrt(3))', 'Ti(2,2-sqrt(3))'],
};

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
export const circularFamilies: readonly Family<any>[] = [clausenFamily, tangentFamily];
