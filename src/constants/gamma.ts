/**
 * Γ at rationals.
 *
 * **1/4 and 1/3** (and 3/4, 2/3, 1/6, 5/6 by reflection and duplication) through the arithmetic-geometric mean.
 * **Others** for 0 < s < 1 by the incomplete gamma function: Γ(s) = N^s e^{−N} Σ_{k<M} N^k/(s(s+1)…(s+k)) + error with an
 * integer N ≥ work·ln 2 + 1. The upper incomplete part is below N^{s−1} e^{−N} ≤ 2^−work/e. The terms left out: the k-th is at
 * most N^k/(s k!), and for M ≥ 3N their sum is at most 1.5 N^M/(s M!) ≤ (1.5/s)(eN/M)^M ≤ (1.5/s)·0.92^{3N}; times N^s e^{−N}
 * that is below 2^−work·N/s·0.77^N, made less than 2^−work by N ≥ 64 and a denominator of at most 1000. The exact sum by binary
 * splitting is rounded once; the rest is ball arithmetic.
 */
import {
  add,
  type Ball,
  divide,
  fromInteger,
  multiply,
  subtract,
  timesInteger,
  timesPowerOfTwo,
  widen,
} from '../number/ball.ts';
import { exp, log, sinCos } from '../number/elementary.ts';
import { InputError } from '../number/errors.ts';
import { bitLength } from '../number/integer.ts';
import { piBall } from '../number/reduction.ts';
import { agm, root } from '../number/roots.ts';
import { scaledQuotient, splitPositive } from '../number/splitting.ts';
import { toAccuracy } from './accurate.ts';
import { type Fraction, factorial, fraction } from './exact.ts';
import type { Family } from './family.ts';
import { rationalLatex } from './term-latex.ts';

interface GammaArgs {
  readonly p: bigint;
  readonly q: bigint;
}

const LARGEST_DENOMINATOR = 1000n;
const LARGEST_SIZE = 2000n;

const sqrtOf = (x: Ball, bits: number): Ball => root(x, 2, bits);

/** Γ(1/4)² = (2π)^{3/2}/agm(1, √2): Gauss; Borwein and Borwein, "Pi and the AGM" (1987). */
function gammaQuarter(work: number): Ball {
  const twoPi = timesPowerOfTwo(piBall(work + 8), 1);
  const top = sqrtOf(multiply(multiply(twoPi, twoPi, work + 8), twoPi, work + 8), work + 8);
  const mean = agm(fromInteger(1n), sqrtOf(fromInteger(2n), work + 8), work + 8);
  return sqrtOf(divide(top, mean, work + 4), work);
}

/** Γ(1/3)³ = 2^{7/3} 3^{−1/4} π K(sin π/12), K = π/(2 agm(1, cos π/12)), cos π/12 = √(2 + √3)/2 (Borwein and Borwein 1987). */
function gammaThird(work: number): Ball {
  const w = work + 16;
  const pi = piBall(w);
  const cos = timesPowerOfTwo(sqrtOf(add(fromInteger(2n), sqrtOf(fromInteger(3n), w)), w), -1);
  const mean = agm(fromInteger(1n), cos, w);
  const square = timesPowerOfTwo(divide(multiply(pi, pi, w), mean, w), -1);
  const factor = divide(root(fromInteger(128n), 3, w), root(fromInteger(3n), 4, w), w);
  return root(multiply(square, factor, w), 3, work);
}

/** Γ(1/6) = 2^{−1/3} √(3/π) Γ(1/3)², from duplication and reflection. */
function gammaSixth(work: number): Ball {
  const w = work + 16;
  const third = gammaThird(w);
  const factor = divide(sqrtOf(divide(fromInteger(3n), piBall(w), w), w), root(fromInteger(2n), 3, w), w);
  return multiply(multiply(third, third, w), factor, work);
}

/** Γ(1 − s) = π/(sin(πs) Γ(s)). */
function reflected(value: Ball, s: Fraction, work: number): Ball {
  const pi = piBall(work + 16);
  const angle = divide(timesInteger(pi, s.p), fromInteger(s.q), work + 16);
  return divide(pi, multiply(sinCos(angle, work + 16).sin, value, work + 16), work);
}

/** Γ(p/q) for 0 < p/q < 1 by the incomplete gamma function, see the header. */
function gammaSplit(p: bigint, q: bigint, work: number): Ball {
  const n = Math.max(64, Math.ceil(work * Math.LN2) + 1);
  const N = BigInt(n);
  // Σ = (q/p)(1 + T/Q), as large as e^N, which N^s e^−N takes back: as many bits beyond the point as before it.
  const size = Math.ceil(n * Math.LOG2E) + bitLength(N) + bitLength(q);
  const factors = { p: () => N * q, q: (k: number) => p + q * BigInt(k), a: () => 1n };
  const { Q, T } = splitPositive(factors, 1, 3 * n, work + 16);
  // T/Q has a relative error below 2^−(work + 18), in units of 2^−(work + 16) less than a quarter of itself, and the floor.
  const ratio: Ball = { mid: scaledQuotient(T, Q, work + 16), rad: 0n, bits: work + 16 };
  const loose = widen(ratio, (ratio.mid >> BigInt(work + 17)) + 2n);
  const sum = divide(timesInteger(add(loose, fromInteger(1n)), q), fromInteger(p), work + 16);
  const inner = work + 16 + 2 * size;
  const power = divide(timesInteger(log(fromInteger(N), inner), p), fromInteger(q), inner);
  const factor = exp(subtract(power, fromInteger(N)), work + 16 + size);
  return widen(multiply(sum, factor, work), 2n);
}

/** Γ at 0 < p/q ≤ 1. */
function reducedGamma(p: bigint, q: bigint, work: number): Ball {
  if (q === 1n) return fromInteger(1n);
  const lower = 2n * p > q ? { p: q - p, q } : { p, q };
  const table: Readonly<Record<string, (work: number) => Ball>> = {
    '1/2': (w) => sqrtOf(piBall(w + 8), w),
    '1/4': gammaQuarter,
    '1/3': gammaThird,
    '1/6': gammaSixth,
  };
  const special = table[`${lower.p}/${q}`];
  if (special === undefined) return gammaSplit(p, q, work);
  return lower.p === p ? special(work) : reflected(special(work + 16), lower, work);
}

/** Γ(p/q) = Γ(s) · rising or falling product, s in (0, 1]. */
function evaluateGamma({ p, q }: GammaArgs, bits: number): Ball {
  if (q === 1n) return fromInteger(factorial(Number(p) - 1));
  let whole = p / q;
  if (p < 0n) whole -= 1n;
  const rest = p - whole * q;
  let factor: Fraction = { p: 1n, q: 1n };
  for (let k = 0n; k < whole; k++) factor = { p: factor.p * (rest + k * q), q: factor.q * q };
  for (let k = -1n; k >= whole; k--) factor = { p: factor.p * q, q: factor.q * (rest + k * q) };
  const { p: above, q: below } = fraction(factor.p, factor.q);
  const growth = Math.max(0, bitLength(above) - bitLength(below));
  return toAccuracy(bits, 16 + growth, (work) =>
    divide(timesInteger(reducedGamma(rest, q, work), above), fromInteger(below), work),
  );
}

function parse(term: Parameters<Family['parse']>[0]): GammaArgs {
  const list = term.kind === 'call' && term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  const [argument] = list;
  if (list.length !== 1 || argument?.kind !== 'rational') {
    throw new InputError('wrong-arguments', 'Gamma takes one rational number, as in Gamma(1/4).');
  }
  const { p, q } = argument;
  if (q === 1n && p <= 0n) throw new InputError('pole', `Gamma(${p}) is infinite.`);
  const size = p < 0n ? -p : p;
  if (q > LARGEST_DENOMINATOR || size > LARGEST_SIZE * q) {
    throw new InputError(
      'too-large',
      `The argument of Gamma may have a denominator of at most ${LARGEST_DENOMINATOR} and a size of at most ${LARGEST_SIZE}.`,
    );
  }
  return { p, q };
}

export const gammaFamily: Family<GammaArgs> = {
  key: 'gamma',
  title: 'Gamma function at rationals',
  names: ['Gamma'],
  parse,
  weight: () => null,
  latex: ({ p, q }) => `\\Gamma(${rationalLatex(p, q)})`,
  text: ({ p, q }) => (q === 1n ? `Gamma(${p})` : `Gamma(${p}/${q})`),
  isReal: () => true,
  evaluate: evaluateGamma,
  definition: '\\Gamma(s)=\\int_0^\\infty t^{s-1}e^{-t}\\,dt',
  source:
    'DLMF 5.2. Thirds, quarters and sixths: Borwein and Borwein, "Pi and the AGM" (1987); others: Brent, J. ACM 23 (1976) 242, in binary splitting.',
  examples: ['Gamma(1/2)', 'Gamma(1/3)', 'Gamma(1/4)', 'Gamma(1/5)', 'Gamma(1/8)', 'Gamma(1/24)', 'Gamma(2/7)'],
};
