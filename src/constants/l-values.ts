/**
 * Catalan's constant, β(n) and L-values of real characters.
 *
 * Radii. Where the parity of s is that of the character: an exact rational times a power of π (ball arithmetic). Catalan: binary
 * splitting of a series whose terms fall by factors of at least 182, so that what is left out is less than 1.01 times the first
 * term left out, made less than one unit of 2^−work; the quotient is floored and the splitting rounds: 3 units. Everything else:
 * the alternating sums of alternating.ts (2 units each), with exact integer combinations.
 */
import { type Ball, divide, fromInteger, multiply, sqrt, subtract, timesInteger } from '../number/ball.ts';
import { log, sinCos } from '../number/elementary.ts';
import { InputError } from '../number/errors.ts';
import { piBall } from '../number/reduction.ts';
import { scaledQuotient, splitPositive } from '../number/splitting.ts';
import { toAccuracy } from './accurate.ts';
import { ALTERNATING_ERROR, alternatingSums } from './alternating.ts';
import {
  addFractions,
  bernoulliPolynomial,
  type Fraction,
  factorial,
  fraction,
  isFundamentalDiscriminant,
  kronecker,
  polynomialAt,
} from './exact.ts';
import type { EvaluationContext, Family } from './family.ts';
import { singleConstant } from './single.ts';
import { integerArguments, LARGEST_CLOSED, piPower, type ZetaArgs, zetaFamily } from './zeta.ts';

const LARGEST_CONDUCTOR = 2000;

/** G = (1/64) Σ_{k≥1} 256^k (580k² − 184k + 15)/(k³(2k−1) C(6k,3k) C(6k,4k) C(4k,2k)): Pilehrood and Pilehrood, Discrete Math. Theor. Comput. Sci. 12 (2010) 223. */
function catalan(work: number): Ball {
  const count = Math.ceil((work + 16 + 2 * Math.log2(work + 2)) / 7.509) + 2;
  const { Q, T } = splitPositive(
    {
      p: (k) => (k === 1 ? 32n : 32n * BigInt(k - 1) ** 3n * BigInt(2 * k - 3)),
      q: (k) => 9n * (BigInt(6 * k - 1) * BigInt(6 * k - 5)) ** 2n,
      a: (k) => BigInt(580 * k * k - 184 * k + 15),
    },
    1,
    count,
    work,
  );
  return { mid: scaledQuotient(T, Q, work) >> 6n, rad: 3n, bits: work };
}

const catalanFamily = singleConstant({
  key: 'catalan',
  title: 'Catalan’s constant',
  name: 'catalan',
  weight: 2,
  latex: 'G',
  definition: 'G=\\sum_{k\\ge0}\\frac{(-1)^k}{(2k+1)^2}',
  source: 'Pilehrood and Pilehrood, Discrete Math. Theor. Comput. Sci. 12 (2010) 223, binary splitting.',
  compute: catalan,
});

interface LArgs {
  /** Fundamental discriminant. */
  readonly d: number;
  readonly s: number;
}

/** L(d, s)/(π^s √|d|) for matching parity: (−1)^{1+(s−δ)/2} (1/2)(2/f)^s B_{s,χ}/s!, B_{s,χ} = f^{s−1} Σ χ(a) B_s(a/f) (Washington, "Cyclotomic fields", theorem 4.2 and the functional equation). */
function closedCoefficient({ d, s }: LArgs): Fraction {
  const f = Math.abs(d);
  const polynomial = bernoulliPolynomial(s);
  let sum: Fraction = { p: 0n, q: 1n };
  for (let a = 1; a < f; a++) {
    const chi = BigInt(kronecker(d, a));
    if (chi === 0n) continue;
    const value = polynomialAt(polynomial, BigInt(a), BigInt(f));
    sum = addFractions(sum, { p: chi * value.p, q: value.q });
  }
  const half = (s - (d < 0 ? 1 : 0)) / 2;
  const sign = half % 2 === 0 ? -1n : 1n;
  return fraction(sign * sum.p * (1n << BigInt(s)), 2n * sum.q * BigInt(f) * factorial(s));
}

/**
 * By blocks of constant sign pattern: for even conductor χ(n + f/2) = −χ(n), so L = Σ_j χ(j) B(j, s) with period f/2; for odd
 * conductor (−1)^{n−1} χ(n) has antiperiod f, and its sum is (1 − χ(2) 2^{1−s}) L.
 */
function blockSum({ d, s }: LArgs, work: number, context: EvaluationContext): Ball {
  const f = Math.abs(d);
  const even = f % 2 === 0;
  const period = even ? f / 2 : f;
  const residues = Array.from({ length: period }, (_, j) => j + 1).filter((j) => kronecker(d, j) !== 0);
  const [row = []] = alternatingSums(period, residues, [s], work, context);
  const mid = residues.reduce((sum, j, r) => {
    const sign = kronecker(d, j) * (even || j % 2 === 1 ? 1 : -1);
    return sum + BigInt(sign) * (row[r] as bigint);
  }, 0n);
  const sum = { mid, rad: ALTERNATING_ERROR * BigInt(residues.length), bits: work };
  if (even) return sum;
  const top = 1n << BigInt(s - 1);
  return divide(timesInteger(sum, top), fromInteger(top - BigInt(kronecker(d, 2))), work);
}

/** L(1, χ) = −(2/√d) Σ_{a<d/2} χ(a) log sin(πa/d) for even χ (Dirichlet). */
function logarithmicValue(d: number, work: number): Ball {
  const inner = work + 16;
  const pi = piBall(inner + 8);
  let above: Ball = fromInteger(1n);
  let below: Ball = fromInteger(1n);
  for (let a = 1; 2 * a < d; a++) {
    const chi = kronecker(d, a);
    if (chi === 0) continue;
    const { sin } = sinCos(divide(timesInteger(pi, BigInt(a)), fromInteger(BigInt(d)), inner + 8), inner);
    // 2 sin keeps the products of moderate size: together they are units of the field.
    const factor = timesInteger(sin, 2n);
    if (chi > 0) above = multiply(above, factor, inner);
    else below = multiply(below, factor, inner);
  }
  const difference = subtract(log(below, inner), log(above, inner));
  return divide(timesInteger(difference, 2n), sqrt(fromInteger(BigInt(d)), inner), work);
}

function evaluateL(args: LArgs, bits: number, context: EvaluationContext): Ball {
  const { d, s } = args;
  const matching = (s % 2 === 0) === d > 0;
  const guard = 12 + Math.ceil(Math.log2(Math.abs(d)));
  return toAccuracy(bits, guard, (work) => {
    if (matching && s <= LARGEST_CLOSED) return piPower(closedCoefficient(args), s, Math.abs(d), work);
    if (s === 1 && kronecker(d, 2) === 1) return logarithmicValue(d, work);
    return blockSum(args, work, context);
  });
}

const lFamily: Family<LArgs> = {
  key: 'l-values',
  title: 'L-values of quadratic characters',
  names: ['L'],
  parse: (term) => {
    const [d = 0, s = 0] = integerArguments('L', 'L(-3,2)', term, 2);
    if (!isFundamentalDiscriminant(d) || Math.abs(d) > LARGEST_CONDUCTOR) {
      throw new InputError(
        'bad-discriminant',
        `The first argument of L must be a fundamental discriminant such as -3, -4, 5, 8, 12, of size at most ${LARGEST_CONDUCTOR}; ${d} is not.`,
      );
    }
    if (s < 1)
      throw new InputError('bad-argument', 'The second argument of L must be a positive integer, as in L(-3,2).');
    return { d, s };
  },
  weight: ({ s }) => s,
  latex: ({ d, s }) => `L(\\chi_{${d}},${s})`,
  text: ({ d, s }) => `L(${d},${s})`,
  isReal: () => true,
  evaluate: evaluateL,
  definition:
    'L(d,s)=\\sum_{n\\ge1}\\Bigl(\\frac dn\\Bigr)\\frac1{n^s},\\quad\\text{Kronecker symbol of a fundamental discriminant }d',
  source:
    'Washington, "Introduction to Cyclotomic Fields", chapter 4; blocks of the alternating sum by Cohen, Rodriguez Villegas and Zagier (2000).',
  examples: ['L(-3,2)', 'L(-3,4)', 'L(-7,2)', 'L(-8,2)', 'L(5,3)', 'L(8,3)', 'L(12,3)'],
};

const betaFamily: Family<ZetaArgs> = {
  key: 'beta',
  title: 'Dirichlet beta values',
  names: ['beta'],
  parse: (term) => {
    const [s = 0] = integerArguments('beta', 'beta(4)', term, 1);
    if (s < 1) throw new InputError('bad-argument', 'beta takes a positive integer, as in beta(4).');
    return { s };
  },
  weight: ({ s }) => s,
  latex: ({ s }) => `\\beta(${s})`,
  text: ({ s }) => `beta(${s})`,
  isReal: () => true,
  evaluate: ({ s }, bits, context) =>
    s === 2 ? toAccuracy(bits, 12, catalan) : evaluateL({ d: -4, s }, bits, context),
  definition: '\\beta(s)=\\sum_{k\\ge0}\\frac{(-1)^k}{(2k+1)^s}',
  source: 'DLMF 25.11(x); method as for L-values.',
  examples: ['beta(2)', 'beta(3)', 'beta(4)', 'beta(6)'],
};

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
export const characterFamilies: readonly Family<any>[] = [zetaFamily, betaFamily, lFamily, catalanFamily];
