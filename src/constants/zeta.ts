/**
 * ζ(n) for integers n ≥ 2.
 *
 * Radii. Even n: an exact rational times a power of π (ball arithmetic). ζ(3): binary splitting of a series whose terms fall by
 * factors of at least 1000 and alternate, so that what is left out is less than the first term left out, made less than one unit of
 * 2^−work; the quotient is floored: 2 units. Other odd n: the alternating sums of alternating.ts (2 units each) over an exact
 * divisor. Large n: the defining sum, a unit for each term.
 */
import { type Ball, divide, fromInteger, multiply, power, sqrt, timesInteger } from '../number/ball.ts';
import { InputError } from '../number/errors.ts';
import { piBall } from '../number/reduction.ts';
import { splitSeries } from '../number/splitting.ts';
import { toAccuracy } from './accurate.ts';
import { ALTERNATING_ERROR, alternatingSums } from './alternating.ts';
import { bernoulliNumbers, type Fraction, factorial, fraction } from './exact.ts';
import type { EvaluationContext, Family } from './family.ts';
import type { Term } from './term.ts';

/** Arguments above this are closer to 1 than any precision used here can tell apart in reasonable time. */
const LARGEST_ARGUMENT = 100_000;
/** Up to here values of matching parity come from Bernoulli numbers. */
export const LARGEST_CLOSED = 120;

/** Integer argument of a call with `count` arguments in one group, by position. Throws InputError. */
export function integerArguments(
  name: string,
  example: string,
  term: Parameters<Family['parse']>[0],
  count: number,
): number[] {
  const list: readonly Term[] = term.kind === 'call' && term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  if (list.length !== count) {
    throw new InputError(
      'wrong-arguments',
      `${name} takes ${count === 1 ? 'one integer' : `${count} integers`}, as in ${example}.`,
    );
  }
  return list.map((t) => {
    if (t.kind !== 'rational' || t.q !== 1n) {
      throw new InputError('bad-argument', `${name} is known here at integers only, as in ${example}.`);
    }
    if (t.p > BigInt(LARGEST_ARGUMENT) || t.p < -BigInt(LARGEST_ARGUMENT)) {
      throw new InputError('too-large', `The arguments of ${name} may be at most ${LARGEST_ARGUMENT}.`);
    }
    return Number(t.p);
  });
}

/** coefficient · π^s · √d/√1 with `work` bits about. */
export function piPower(coefficient: Fraction, s: number, radicand: number, work: number): Ball {
  const size = Math.ceil(s * 1.66) + 8;
  const pi = power(piBall(work + size + 8), s, work + 8);
  const scaled = divide(timesInteger(pi, coefficient.p), fromInteger(coefficient.q), work + 8);
  return radicand === 1 ? scaled : multiply(scaled, sqrt(fromInteger(BigInt(radicand)), work + size), work);
}

/** ζ(2m)/π^{2m} = (−1)^{m+1} 2^{2m−1} B_{2m}/(2m)!. */
function evenZetaCoefficient(s: number): Fraction {
  const b = bernoulliNumbers(s)[s] as Fraction;
  const sign = (s / 2) % 2 === 1 ? 1n : -1n;
  return fraction(sign * b.p * (1n << BigInt(s - 1)), b.q * factorial(s));
}

/** ζ(3) = (1/64) Σ (−1)^k k!¹⁰ (205k² + 250k + 77)/(2k+1)!⁵: Amdeberhan and Zeilberger, Electron. J. Combin. 4(2) (1997) R3. */
function apery(work: number): Ball {
  const count = Math.ceil((work + 16) / 10) + 2;
  const { Q, T } = splitSeries(
    {
      p: (k) => -(BigInt(k) ** 5n),
      q: (k) => 32n * BigInt(2 * k + 1) ** 5n,
      a: (k) => BigInt(205 * k * k + 250 * k + 77),
    },
    1,
    count,
  );
  return { mid: ((77n * Q + T) << BigInt(work)) / (64n * Q), rad: 2n, bits: work };
}

/** ζ(s) from η(s) = (1 − 2^{1−s}) ζ(s) = Σ (−1)^k/(k+1)^s; several s share one pass. */
function oddZetas(list: readonly number[], work: number, context: EvaluationContext): Ball[] {
  const sums = alternatingSums(1, [1], list, work, context);
  return list.map((s, j) => {
    const top = 1n << BigInt(s - 1);
    const scale = { mid: (sums[j]?.[0] as bigint) * top, rad: ALTERNATING_ERROR * top, bits: work };
    return divide(scale, fromInteger(top - 1n), work);
  });
}

/** ζ(s) = Σ_{k≤K} k^−s + less than K^{1−s}/(s−1), when K is small. Each division loses less than one unit. */
function directZeta(s: number, terms: number, work: number): Ball {
  const one = 1n << BigInt(work);
  let mid = one;
  for (let k = 2; k <= terms; k++) mid += one / BigInt(k) ** BigInt(s);
  return { mid, rad: BigInt(terms + 1), bits: work };
}

function zetaTerms(s: number, work: number): number {
  return Math.ceil(2 ** ((work + 1) / (s - 1)));
}

/** Whether fewer terms of the defining sum are needed than of the accelerated one. */
function isDirect(s: number, work: number): boolean {
  return (work + 1) / (s - 1) < 12 && zetaTerms(s, work) < work / 4;
}

function evaluateZeta(s: number, bits: number, context: EvaluationContext): Ball {
  return toAccuracy(bits, 12, (work) => {
    if (isDirect(s, work)) return directZeta(s, zetaTerms(s, work), work);
    if (s % 2 === 0 && s <= LARGEST_CLOSED) return piPower(evenZetaCoefficient(s), s, 1, work);
    if (s === 3) return apery(work);
    return oddZetas([s], work, context)[0] as Ball;
  });
}

export interface ZetaArgs {
  readonly s: number;
}

export const zetaFamily: Family<ZetaArgs> = {
  key: 'zeta',
  title: 'Zeta values',
  names: ['zeta'],
  parse: (term) => {
    if (term.kind === 'call' && (term.groups[0]?.length ?? 0) > 1) return null;
    const [s = 0] = integerArguments('zeta', 'zeta(3)', term, 1);
    if (s < 0) return null;
    if (s < 2) {
      throw new InputError(
        s === 1 ? 'divergent' : 'bad-argument',
        s === 1 ? 'zeta(1) diverges.' : 'zeta takes indices from 2 on, as in zeta(3).',
      );
    }
    return { s };
  },
  weight: ({ s }) => s,
  latex: ({ s }) => `\\zeta(${s})`,
  text: ({ s }) => `zeta(${s})`,
  isReal: () => true,
  evaluate: ({ s }, bits, context) => evaluateZeta(s, bits, context),
  evaluateMany: (all, bits, context) => {
    const shared = [...new Set(all.map(({ s }) => s))].filter((s) => s % 2 === 1 && s > 3 && !isDirect(s, bits + 16));
    const values = shared.length > 1 ? oddZetas(shared, bits + 16, context) : [];
    const known = new Map(shared.map((s, j) => [s, values[j]]));
    return all.map(({ s }) => {
      const value = known.get(s);
      return value === undefined ? evaluateZeta(s, bits, context) : toAccuracy(bits, 16, () => value);
    });
  },
  definition: '\\zeta(s)=\\sum_{n\\ge1}\\frac1{n^s}',
  source:
    'Even s: Euler. ζ(3): Amdeberhan and Zeilberger (1997). Odd s: Cohen, Rodriguez Villegas and Zagier, Exper. Math. 9 (2000) 3.',
  examples: ['zeta(2)', 'zeta(3)', 'zeta(4)', 'zeta(5)', 'zeta(7)', 'zeta(9)', 'zeta(11)'],
};
