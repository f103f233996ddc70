/** Which root of a polynomial a given approximation stands for, decided by Rouché's theorem and, on the real line, Sturm's. */

import { type Ball, withBits } from '../../number/ball.ts';
import { isComplex, toComplex, type Value } from '../../number/complex.ts';
import { integerSqrt } from '../../number/integer.ts';
import { countRealRoots, degree, type Polynomial } from './integer.ts';

export interface RootOf {
  /** The disc |z − (re + i·im)/2^bits| ≤ 2^radiusLog2 contains exactly one root of the polynomial, and the given number. */
  readonly re: bigint;
  readonly im: bigint;
  readonly bits: number;
  readonly radiusLog2: number;
  /** For a real number and degree up to REAL_INDEX_DEGREE: its place among the real roots in rising order, from 1, and their number. */
  readonly realIndex: number | undefined;
  readonly realRoots: number | undefined;
}

/** Sturm chains of higher degree take too long to be worth an index. */
export const REAL_INDEX_DEGREE = 40;

/**
 * The largest disc 2^−t around (a rounding of) `x` that provably isolates one root of the square-free polynomial p; undefined if the
 * digits of x do not suffice. Rouché: with p(z₀ + w) = Σ aₖ·wᵏ, |a₁|·r > |a₀| + Σ_{k≥2} |aₖ|·r^k means that p has as many zeros in
 * |w| ≤ r as a₁·w, that is one.
 */
export function isolate(p: Polynomial, x: Value): RootOf | undefined {
  const { re, im } = toComplex(x);
  const finest = Math.max(re.bits, im.bits);
  for (let bits = 32; ; bits *= 2) {
    const last = bits >= finest;
    const found = isolateAt(p, re, im, last ? finest : bits);
    if (found !== undefined) return { ...found, ...realPlace(p, x, found) };
    if (last) return undefined;
  }
}

function isolateAt(
  p: Polynomial,
  re: Ball,
  im: Ball,
  bits: number,
): Omit<RootOf, 'realIndex' | 'realRoots'> | undefined {
  const [a, b] = [withBits(re, bits), withBits(im, bits)];
  const off = integerSqrt(a.rad * a.rad + b.rad * b.rad) + 1n;
  const sizes = taylorSizes(p, a.mid, b.mid, bits);
  for (let t = 1; t < bits; t++) {
    // All sizes times r^k in units of 2^(−bits·degree − t·degree) would be exact; scaling by 2^(t·(degree − k)) keeps integers.
    const term = (k: number): bigint => (sizes[k] as bigint) << BigInt(t * (degree(p) - k));
    let others = term(0);
    for (let k = 2; k < sizes.length; k++) others += term(k);
    // integerSqrt rounds down: one unit per size on the side where it matters.
    if (term(1) - (1n << BigInt(t * degree(p))) * BigInt(sizes.length) <= others) continue;
    if (off << BigInt(t) > 1n << BigInt(bits)) return undefined;
    return { re: a.mid, im: b.mid, bits, radiusLog2: -t };
  }
  return undefined;
}

/** |aₖ|·2^(bits·degree) of the Taylor coefficients at (u + iv)/2^bits, rounded down; exact complex Horner shifts in integers. */
function taylorSizes(p: Polynomial, u: bigint, v: bigint, bits: number): bigint[] {
  const d = degree(p);
  // q(w) = 2^(bits·d)·p(w/2^bits) has integer coefficients; its Taylor coefficients at u + iv are 2^(bits·(d−k))·aₖ.
  const re = p.map((c, k) => c << BigInt(bits * (d - k)));
  const im = p.map(() => 0n);
  for (let k = 0; k < d; k++) {
    for (let i = d - 1; i >= k; i--) {
      const [x, y] = [re[i + 1] as bigint, im[i + 1] as bigint];
      re[i] = (re[i] as bigint) + x * u - y * v;
      im[i] = (im[i] as bigint) + x * v + y * u;
    }
  }
  return re.map((x, k) => integerSqrt(x * x + (im[k] as bigint) ** 2n) << BigInt(bits * k));
}

function realPlace(
  p: Polynomial,
  x: Value,
  disc: Omit<RootOf, 'realIndex' | 'realRoots'>,
): { realIndex: number | undefined; realRoots: number | undefined } {
  if (isComplex(x) || degree(p) > REAL_INDEX_DEGREE) return { realIndex: undefined, realRoots: undefined };
  // Nothing else lies between the disc's edge and the root: count up to the edge.
  const bits = Math.max(disc.bits, -disc.radiusLog2);
  const edge = (disc.re << BigInt(bits - disc.bits)) + (1n << BigInt(bits + disc.radiusLog2));
  return { realIndex: countRealRoots(p, '-inf', edge, bits), realRoots: countRealRoots(p, '-inf', 'inf', bits) };
}
