/**
 * Clausen values Cl_s(θ): Σ sin(nθ)/n^s for even s and Σ cos(nθ)/n^s for odd s, and polylogarithms at e^{iθ}.
 *
 * θ = πp/q. For odd p, e^{iqθ} = −1 and the sum over n = qk + j is Σ_j trig(jθ) B(j, s) with period q (alternating.ts). For even p
 * (q odd) duplication Li_s(z) = 2^{1−s} Li_s(z²) − Li_s(−z) leads through odd multiples −z, −z², −z⁴, … back to z, so that
 * with f = 2^{1−s} and L steps Li_s(z) = −Σ_{i<L} f^i Li_s(−z^{2^i})/(1 − f^L). The B(j, s) (2 units each) enter with exact integer
 * weights; sines and the final division are balls. Other angles: the unit circle in polylog-kernels.ts.
 */
import {
  add,
  type Ball,
  divide,
  fromInteger,
  multiply,
  negate,
  power,
  sqrt,
  timesInteger,
  timesPowerOfTwo,
} from '../number/ball.ts';
import { log, sinCos } from '../number/elementary.ts';
import { absolute, gcd } from '../number/integer.ts';
import { piBall } from '../number/reduction.ts';
import { ALTERNATING_ERROR, alternatingSums } from './alternating.ts';
import { bernoulliPolynomial, factorial, fraction, polynomialAt } from './exact.ts';
import type { EvaluationContext } from './family.ts';
import { rational, type Term } from './term.ts';

/** The angle πp/q, 0 ≤ p < 2q, lowest terms. */
export interface Angle {
  readonly p: number;
  readonly q: number;
}

/** Largest q for which sums over residues are used; a general angle is faster beyond. */
export const LARGEST_DENOMINATOR = 240;

export function reduceAngle(p: bigint, q: bigint): Angle | null {
  const common = gcd(p, q);
  const below = q / common;
  if (below > BigInt(LARGEST_DENOMINATOR)) return null;
  const turn = 2n * below;
  return { p: Number((((p / common) % turn) + turn) % turn), q: Number(below) };
}

/** The rational r with term = r·π, or null. */
export function multipleOfPi(term: Term): { p: bigint; q: bigint } | null {
  if (term.kind === 'rational') return term.p === 0n ? { p: 0n, q: 1n } : null;
  if (term.kind === 'symbol') return term.name === 'pi' ? { p: 1n, q: 1n } : null;
  if (term.kind !== 'product') return null;
  let found = false;
  let factor = rational(1n);
  for (const t of term.factors) {
    if (t.kind === 'symbol' && t.name === 'pi' && !found) found = true;
    else if (t.kind === 'rational' && factor.kind === 'rational') factor = rational(t.p * factor.p, t.q * factor.q);
    else return null;
  }
  return found && factor.kind === 'rational' ? { p: factor.p, q: factor.q } : null;
}

/** sin(πu/v) for 0 ≤ u/v ≤ 1/2. */
function sinOf(u: number, v: number, work: number): Ball {
  if (u === 0) return fromInteger(0n);
  if (2 * u === v) return fromInteger(1n);
  if (6 * u === v) return timesPowerOfTwo(fromInteger(1n), -1);
  if (4 * u === v) return timesPowerOfTwo(sqrt(fromInteger(2n), work), -1);
  if (3 * u === v) return timesPowerOfTwo(sqrt(fromInteger(3n), work), -1);
  const angle = divide(timesInteger(piBall(work + 8), BigInt(u)), fromInteger(BigInt(v)), work + 4);
  return sinCos(angle, work).sin;
}

/** trig(πa/q) = sign · sin(π·u/(2q)) with u in [0, q]; `even` chooses the sine, otherwise the cosine. */
function reduceTrig(a: number, q: number, even: boolean): { sign: 1 | -1; u: number } {
  let rest = a;
  let sign: 1 | -1 = 1;
  if (rest >= q) {
    rest -= q;
    sign = -1;
  }
  if (even) return { sign, u: 2 * rest > q ? 2 * (q - rest) : 2 * rest };
  return 2 * rest > q ? { sign: sign === 1 ? -1 : 1, u: 2 * rest - q } : { sign, u: q - 2 * rest };
}

/** Odd multiples P with integer weights, and the divisor: the sum over residues of Σ weight·trig(πjP/q) B(j, s) is divisor times the value. */
function multiples({ p, q }: Angle, s: number): { list: { P: number; weight: bigint }[]; divisor: bigint } {
  if (p % 2 === 1) return { list: [{ P: p, weight: 1n }], divisor: 1n };
  const cycle: number[] = [];
  for (let t = p; cycle.length === 0 || t !== p; t = (2 * t) % (2 * q)) cycle.push((t + q) % (2 * q));
  const steps = BigInt((s - 1) * cycle.length);
  const list = cycle.map((P, i) => ({ P, weight: -(1n << (steps - BigInt((s - 1) * i))) }));
  return { list, divisor: (1n << steps) - 1n };
}

/** Cl_s(πp/q) for s ≥ 2 and an angle that is no multiple of 2π when s is odd. */
export function clausenAt(s: number, angle: Angle, work: number, context: EvaluationContext): Ball {
  const { q } = angle;
  const even = s % 2 === 0;
  const { list, divisor } = multiples(angle, s);
  const trig = (j: number, P: number): { sign: 1 | -1; u: number } => reduceTrig((j * P) % (2 * q), q, even);
  const residues = Array.from({ length: q }, (_, j) => j + 1).filter((j) => list.some(({ P }) => trig(j, P).u !== 0));
  if (residues.length === 0) return fromInteger(0n);
  const [row = []] = alternatingSums(q, residues, [s], work, context);
  const groups = new Map<number, Ball>();
  residues.forEach((j, r) => {
    const base = { mid: row[r] as bigint, rad: ALTERNATING_ERROR, bits: work };
    for (const { P, weight } of list) {
      const { sign, u } = trig(j, P);
      if (u === 0) continue;
      const share = timesInteger(base, sign === 1 ? weight : -weight);
      groups.set(u, add(groups.get(u) ?? fromInteger(0n), share));
    }
  });
  let total = fromInteger(0n);
  for (const [u, sum] of groups) total = add(total, multiply(sum, sinOf(u, 2 * q, work + 8), work + 4));
  return divisor === 1n ? total : divide(total, fromInteger(divisor), work);
}

/** Cl_1(θ) = −log(2 sin(θ/2)). */
export function clausenOne({ p, q }: Angle, work: number): Ball {
  const half = p <= q ? sinOf(p, 2 * q, work + 8) : sinOf(2 * q - p, 2 * q, work + 8);
  return negate(log(timesInteger(half, 2n), work));
}

/**
 * The part of Li_s(e^{iπp/q}) that is not the Clausen value: its real part for even s, its imaginary part for odd s, from
 * Li_s(e^{2πix}) + (−1)^s Li_s(e^{−2πix}) = −(2πi)^s B_s(x)/s! for 0 ≤ x < 1 (0 < x for s = 1).
 */
export function bernoulliPart(s: number, { p, q }: Angle, work: number): Ball {
  const b = polynomialAt(bernoulliPolynomial(s), BigInt(p), BigInt(2 * q));
  const sign = Math.floor(s / 2) % 2 === 0 ? -1n : 1n;
  const c = fraction(sign * b.p * (1n << BigInt(s)), 2n * b.q * factorial(s));
  const size = Math.ceil(1.66 * s) + 8;
  const pi = power(piBall(work + size + 8), s, work + 8);
  const guard = Math.max(0, absolute(c.p).toString(2).length - c.q.toString(2).length);
  return divide(timesInteger(pi, c.p), fromInteger(c.q), work + guard);
}

/** Largest s for which `bernoulliPart` is used. */
export const LARGEST_BERNOULLI = 200;
