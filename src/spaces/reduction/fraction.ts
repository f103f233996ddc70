/** Exact rational numbers in lowest terms with a positive denominator. */
import { gcd } from '../../number/integer.ts';

export interface Fraction {
  readonly p: bigint;
  readonly q: bigint;
}

export const ZERO: Fraction = { p: 0n, q: 1n };
export const ONE: Fraction = { p: 1n, q: 1n };

/** p/q in lowest terms. Throws RangeError for q = 0. */
export function fraction(p: bigint, q = 1n): Fraction {
  if (q === 0n) throw new RangeError('fraction: expected a non-zero denominator, got 0');
  const common = q < 0n ? -gcd(p, q) : gcd(p, q);
  return { p: p / common, q: q / common };
}

export function plus(a: Fraction, b: Fraction): Fraction {
  if (a.q === 1n && b.q === 1n) return { p: a.p + b.p, q: 1n };
  return fraction(a.p * b.q + b.p * a.q, a.q * b.q);
}

export function times(a: Fraction, b: Fraction): Fraction {
  if (a.q === 1n && b.q === 1n) return { p: a.p * b.p, q: 1n };
  return fraction(a.p * b.p, a.q * b.q);
}

export function opposite(a: Fraction): Fraction {
  return { p: -a.p, q: a.q };
}

export function inverse(a: Fraction): Fraction {
  return fraction(a.q, a.p);
}

export function fractionText({ p, q }: Fraction): string {
  return q === 1n ? `${p}` : `${p}/${q}`;
}

/** Reads what `fractionText` writes. */
export function readFraction(text: string): Fraction {
  const [p, q] = text.split('/');
  return { p: BigInt(p as string), q: q === undefined ? 1n : BigInt(q) };
}
