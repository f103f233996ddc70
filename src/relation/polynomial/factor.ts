/**
 * Factorisation over ℤ: Zassenhaus, "On Hensel factorization, I", J. Number Theory 1 (1969) 291. Irreducibility is first tried from the
 * degrees of factors modulo several primes, which settles most cases.
 */
import { absolute, integerSqrt } from '../../number/integer.ts';
import { liftFactors } from './hensel.ts';
import {
  commonDivisor,
  degree,
  derivative,
  exactQuotient,
  type Polynomial,
  primitivePart,
  product,
} from './integer.ts';
import * as modular from './modular.ts';

export interface Factorisation {
  /** Primitive factors, each once; their product is the square-free part of the polynomial. */
  readonly factors: readonly bigint[][];
  /** Whether every factor is proved irreducible. False when the number of combinations to be tried passed the limit. */
  readonly proved: boolean;
}

const PRIMES_TRIED = 60;
const FIRST_PRIME = 1009;
/** Combinations of modular factors that may be tried. */
const COMBINATION_LIMIT = 200_000;

/** The irreducible factors of a polynomial of positive degree. Yields between primes and between batches of trials. */
export function* factorise(p: Polynomial): Generator<void, Factorisation, void> {
  const free = squareFree(primitivePart(p));
  if (degree(free) <= 1) return { factors: [free], proved: true };
  const best = yield* bestPrime(free);
  if (best === 'irreducible') return { factors: [free], proved: true };
  return yield* recombine(free, best.prime, best.parts);
}

/** The product of the different irreducible factors. A square-free image modulo one prime proves that nothing is to be done. */
function squareFree(p: bigint[]): bigint[] {
  let prime = FIRST_PRIME;
  for (let tried = 0; tried < 5; prime = nextPrime(prime)) {
    if ((p.at(-1) as bigint) % BigInt(prime) === 0n) continue;
    if (squareFreeImage(p, prime) !== undefined) return p;
    tried++;
  }
  return primitivePart(exactQuotient(p, commonDivisor(p, derivative(p))) as bigint[]);
}

/** p modulo the prime, made monic, if it is square-free there. */
function squareFreeImage(p: Polynomial, prime: number): number[] | undefined {
  const image = modular.monic(modular.reduceModulo(p, prime), prime);
  return modular.commonDivisor(image, modular.derivative(image, prime), prime).length > 1 ? undefined : image;
}

type Parts = { degree: number; product: number[] }[];

/** A prime with few factors, or the proof that no factorisation has degrees compatible with all the primes tried. */
function* bestPrime(f: Polynomial): Generator<void, 'irreducible' | { prime: number; parts: Parts }, void> {
  let possible = (1n << BigInt(degree(f) + 1)) - 1n;
  const trivial = 1n | (1n << BigInt(degree(f)));
  let best: { prime: number; parts: Parts; count: number } | undefined;
  let prime = FIRST_PRIME;
  for (let tried = 0; tried < PRIMES_TRIED; prime = nextPrime(prime)) {
    if ((f.at(-1) as bigint) % BigInt(prime) === 0n) continue;
    const image = squareFreeImage(f, prime);
    if (image === undefined) continue;
    tried++;
    const parts = modular.distinctDegrees(image, prime);
    // Bit d of `sums` tells whether some of the factors have degrees that add up to d.
    let sums = 1n;
    let count = 0;
    for (const part of parts) {
      for (let k = (part.product.length - 1) / part.degree; k > 0; k--) {
        sums |= sums << BigInt(part.degree);
        count++;
      }
    }
    possible &= sums;
    if (possible === trivial) return 'irreducible';
    if (best === undefined || count < best.count) best = { prime, parts, count };
    yield;
  }
  return best as { prime: number; parts: Parts };
}

function nextPrime(after: number): number {
  for (let candidate = after + 2; ; candidate += 2) {
    let prime = true;
    for (let d = 3; d * d <= candidate && prime; d += 2) prime = candidate % d !== 0;
    if (prime) return candidate;
  }
}

/** Every coefficient of a factor of f is at most 2^deg·‖f‖₂ (Mignotte). */
function coefficientBound(f: Polynomial): bigint {
  const square = f.reduce((sum, c) => sum + c * c, 0n);
  return (integerSqrt(square) + 1n) << BigInt(degree(f));
}

function* recombine(f: Polynomial, prime: number, parts: Parts): Generator<void, Factorisation, void> {
  const locals = parts.flatMap((part) => modular.equalDegree(part.product, part.degree, prime));
  yield;
  const lifted = liftFactors(f, locals, prime, 2n * coefficientBound(f) * absolute(f.at(-1) as bigint) + 1n);
  const modulus = lifted.modulus;
  let pool = lifted.factors;
  let rest: bigint[] = [...f];
  const factors: bigint[][] = [];
  let tried = 0;
  for (let size = 1; 2 * size <= pool.length; ) {
    let found: number[] | undefined;
    for (const subset of subsets(pool.length, size)) {
      if (++tried % 64 === 0) yield;
      if (tried > COMBINATION_LIMIT) return { factors: [...factors, rest], proved: false };
      const candidate = primitivePart(
        symmetric(
          subset.reduce<bigint[]>(
            (g, k) => symmetric(product(g, pool[k] as bigint[]), modulus),
            [rest.at(-1) as bigint],
          ),
          modulus,
        ),
      );
      const quotient = plausible(candidate, rest) ? exactQuotient(rest, candidate) : undefined;
      if (quotient === undefined) continue;
      factors.push(candidate);
      rest = primitivePart(quotient);
      found = subset;
      break;
    }
    if (found === undefined) size++;
    else {
      const gone = new Set(found);
      pool = pool.filter((_, k) => !gone.has(k));
    }
  }
  if (degree(rest) > 0) factors.push(rest);
  return { factors, proved: true };
}

/** Cheap necessary condition for a divisor: its ends divide the ends. */
function plausible(candidate: Polynomial, f: Polynomial): boolean {
  if (candidate[0] === 0n) return f[0] === 0n;
  return (
    (f[0] as bigint) % (candidate[0] as bigint) === 0n && (f.at(-1) as bigint) % (candidate.at(-1) as bigint) === 0n
  );
}

function symmetric(p: Polynomial, modulus: bigint): bigint[] {
  return p.map((c) => {
    const r = ((c % modulus) + modulus) % modulus;
    return 2n * r > modulus ? r - modulus : r;
  });
}

/** All index sets of the given size out of 0 … n−1, in lexicographic order. */
function* subsets(n: number, size: number): Generator<number[], void, void> {
  const chosen = Array.from({ length: size }, (_, k) => k);
  for (;;) {
    yield [...chosen];
    let at = size - 1;
    while (at >= 0 && chosen[at] === n - size + at) at--;
    if (at < 0) return;
    chosen[at] = (chosen[at] as number) + 1;
    for (let k = at + 1; k < size; k++) chosen[k] = (chosen[k - 1] as number) + 1;
  }
}
