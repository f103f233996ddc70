/**
 * Relations over the Gaussian integers ℤ[i] and the Eisenstein integers ℤ[ω], ω = e^{2πi/3}: Σ γₖ·zₖ = 0 with γₖ = aₖ + bₖ·i or
 * aₖ + bₖ·ω. Embedded as 2n integer unknowns in two real columns, because Σ γₖ·zₖ = Σ aₖ·zₖ + Σ bₖ·(i or ω)·zₖ.
 */
import { accuracy, add, type Ball, fromInteger, multiply, negate, sqrt, timesPowerOfTwo } from '../number/ball.ts';
import { type ComplexBall, toComplex, type Value } from '../number/complex.ts';
import { absolute } from '../number/integer.ts';
import type { Method, RelationProgress } from './contract.ts';
import { startRelation } from './relation.ts';

export type Ring = 'gaussian' | 'eisenstein';

/** a + b·i in ℤ[i], a + b·ω in ℤ[ω]. */
export interface RingInteger {
  readonly a: bigint;
  readonly b: bigint;
}

export interface RingRequest {
  readonly numbers: readonly Value[];
  readonly ring: Ring;
  readonly method: Method;
  /** As for a relation over ℤ, for the norm √(Σ |γₖ|²). */
  readonly maxNormLog10?: number;
}

export type RingOutcome =
  | {
      readonly kind: 'relation';
      /** Without a common divisor in the ring but units; the first non-zero one has argument in [0, π/2) or [0, π/3). */
      readonly coefficients: readonly RingInteger[];
      readonly confidenceLog10: number;
      readonly normBoundLog10: number;
      readonly iterations: number;
    }
  | { readonly kind: 'excluded'; readonly normBoundLog10: number; readonly iterations: number }
  | {
      readonly kind: 'inconclusive';
      readonly reason: string;
      readonly normBoundLog10: number;
      readonly iterations: number;
    };

export interface RingRun {
  step(): RingOutcome | undefined;
  readonly progress: RelationProgress;
}

/** |a + bω|² = a² − ab + b² lies between half and three halves of a² + b². */
const EISENSTEIN_LOSS = Math.log10(2) / 2;

/** Begins a search; steps, errors and guarantees are those of `startRelation`. Norm bounds are for √(Σ |γₖ|²). */
export function startRingRelation(request: RingRequest): RingRun {
  const { ring, method, maxNormLog10 } = request;
  const loss = ring === 'gaussian' ? 0 : EISENSTEIN_LOSS;
  const rows = request.numbers
    .map(toComplex)
    .flatMap((z) => [z, timesGenerator(z, ring)].map(({ re, im }) => [re, im]));
  const run = startRelation({
    rows,
    method,
    ...(maxNormLog10 === undefined ? {} : { maxNormLog10: maxNormLog10 + loss }),
  });
  let outcome: RingOutcome | undefined;
  return {
    get progress() {
      return { ...run.progress, normBoundLog10: Math.max(0, run.progress.normBoundLog10 - loss) };
    },
    step() {
      const found = outcome === undefined ? run.step() : undefined;
      if (found !== undefined) {
        const bounded = { ...found, normBoundLog10: Math.max(0, found.normBoundLog10 - loss) };
        outcome =
          bounded.kind === 'relation' ? { ...bounded, coefficients: inRing(bounded.coefficients, ring) } : bounded;
      }
      return outcome;
    },
  };
}

function timesGenerator(z: ComplexBall, ring: Ring): ComplexBall {
  if (ring === 'gaussian') return { re: negate(z.im), im: z.re };
  const bits = 16 + Math.max(...[z.re, z.im].map((x) => (x.rad === 0n ? x.bits + 64 : Math.max(0, accuracy(x)))));
  const magnitudeBits = Math.max(0, ...[z.re, z.im].map((x) => x.mid.toString(2).length - x.bits));
  const rootOfThree = sqrt(fromInteger(3n), bits + magnitudeBits);
  const half = (x: Ball): Ball => timesPowerOfTwo(x, -1);
  return {
    re: negate(half(add(z.re, multiply(rootOfThree, z.im, bits)))),
    im: half(add(multiply(rootOfThree, z.re, bits), negate(z.im))),
  };
}

function inRing(flat: readonly bigint[], ring: Ring): RingInteger[] {
  const pairs: RingInteger[] = [];
  for (let k = 0; k < flat.length; k += 2) pairs.push({ a: flat[k] as bigint, b: flat[k + 1] as bigint });
  const divisor = pairs.reduce((g, x) => ringGcd(g, x, ring), { a: 0n, b: 0n });
  const reduced = pairs.map((x) => ringQuotient(x, divisor, ring));
  const first = reduced.find((x) => x.a !== 0n || x.b !== 0n) as RingInteger;
  const unit = units(ring).find((u) => inFirstSector(ringProduct(u, first, ring), ring)) as RingInteger;
  return reduced.map((x) => ringProduct(unit, x, ring));
}

/** Argument in [0, 2π/4) or [0, 2π/6): exactly one associate of each non-zero element. */
function inFirstSector({ a, b }: RingInteger, ring: Ring): boolean {
  // a + bω = (a − b/2) + i·b·√3/2: argument below π/3 is b < a.
  return ring === 'gaussian' ? a > 0n && b >= 0n : b >= 0n && a > b;
}

function units(ring: Ring): RingInteger[] {
  const generator = ring === 'gaussian' ? { a: 0n, b: 1n } : { a: 1n, b: 1n };
  const all: RingInteger[] = [{ a: 1n, b: 0n }];
  while (all.length < (ring === 'gaussian' ? 4 : 6)) all.push(ringProduct(all.at(-1) as RingInteger, generator, ring));
  return all;
}

/** Product; i² = −1, ω² = −1 − ω. */
export function ringProduct(x: RingInteger, y: RingInteger, ring: Ring): RingInteger {
  const square = x.b * y.b;
  const cross = x.a * y.b + x.b * y.a;
  return { a: x.a * y.a - square, b: ring === 'gaussian' ? cross : cross - square };
}

function conjugate(x: RingInteger, ring: Ring): RingInteger {
  return ring === 'gaussian' ? { a: x.a, b: -x.b } : { a: x.a - x.b, b: -x.b };
}

function ringNorm(x: RingInteger, ring: Ring): bigint {
  return ring === 'gaussian' ? x.a * x.a + x.b * x.b : x.a * x.a - x.a * x.b + x.b * x.b;
}

/** Nearest ring integer to x/y, coordinate by coordinate: the remainder has smaller norm than y in both rings. */
function ringQuotient(x: RingInteger, y: RingInteger, ring: Ring): RingInteger {
  const top = ringProduct(x, conjugate(y, ring), ring);
  const bottom = ringNorm(y, ring);
  return { a: nearest(top.a, bottom), b: nearest(top.b, bottom) };
}

function nearest(p: bigint, q: bigint): bigint {
  const quotient = (2n * absolute(p) + q) / (2n * q);
  return p < 0n ? -quotient : quotient;
}

function ringGcd(x: RingInteger, y: RingInteger, ring: Ring): RingInteger {
  let [u, v] = [x, y];
  while (v.a !== 0n || v.b !== 0n) {
    const product = ringProduct(ringQuotient(u, v, ring), v, ring);
    [u, v] = [v, { a: u.a - product.a, b: u.b - product.b }];
  }
  return u;
}
