/** Polynomials over ℤ as coefficient lists, lowest degree first, no leading zero; the zero polynomial is the empty list. Exact. */
import { absolute, gcdOf } from '../../number/integer.ts';

export type Polynomial = readonly bigint[];

export function trimmed(p: Polynomial): bigint[] {
  const copy = [...p];
  while (copy.length > 0 && copy.at(-1) === 0n) copy.pop();
  return copy;
}

export function degree(p: Polynomial): number {
  return p.length - 1;
}

export function derivative(p: Polynomial): bigint[] {
  return trimmed(p.slice(1).map((c, k) => c * BigInt(k + 1)));
}

export function product(p: Polynomial, q: Polynomial): bigint[] {
  if (p.length === 0 || q.length === 0) return [];
  const result = new Array<bigint>(p.length + q.length - 1).fill(0n);
  p.forEach((a, i) => {
    q.forEach((b, j) => {
      result[i + j] = (result[i + j] as bigint) + a * b;
    });
  });
  return result;
}

/** Content 1, leading coefficient positive. */
export function primitivePart(p: Polynomial): bigint[] {
  if (p.length === 0) return [];
  const content = gcdOf(p);
  const divisor = (p.at(-1) as bigint) < 0n ? -content : content;
  return p.map((c) => c / divisor);
}

/** p/q when q divides p over ℤ; undefined otherwise. */
export function exactQuotient(p: Polynomial, q: Polynomial): bigint[] | undefined {
  const rest = [...p];
  const lead = q.at(-1) as bigint;
  const quotient = new Array<bigint>(Math.max(0, p.length - q.length + 1)).fill(0n);
  for (let k = p.length - q.length; k >= 0; k--) {
    const top = rest[k + q.length - 1] as bigint;
    const factor = top / lead;
    if (factor * lead !== top) return undefined;
    quotient[k] = factor;
    q.forEach((c, i) => {
      rest[k + i] = (rest[k + i] as bigint) - factor * c;
    });
  }
  return rest.some((c) => c !== 0n) ? undefined : quotient;
}

/** A positive multiple of the remainder of p by q, with the sign of the true remainder (needed for Sturm chains). */
export function signedRemainder(p: Polynomial, q: Polynomial): bigint[] {
  let rest = trimmed(p);
  const lead = q.at(-1) as bigint;
  const size = absolute(lead);
  while (rest.length >= q.length) {
    const factor = lead < 0n ? -(rest.at(-1) as bigint) : (rest.at(-1) as bigint);
    const shift = rest.length - q.length;
    rest = trimmed(rest.map((c, k) => size * c - (k >= shift ? factor * (q[k - shift] as bigint) : 0n)));
  }
  const content = gcdOf(rest);
  return content === 0n ? [] : rest.map((c) => c / content);
}

/** Greatest common divisor, primitive (Euclid with primitive remainders). */
export function commonDivisor(p: Polynomial, q: Polynomial): bigint[] {
  let [a, b] = [primitivePart(p), primitivePart(q)];
  while (b.length > 0) [a, b] = [b, primitivePart(signedRemainder(a, b))];
  return a;
}

/** Number of distinct real roots in (low, high], ends given as p/2^bits; −Infinity and Infinity for the whole line. Sturm's theorem. */
export function countRealRoots(p: Polynomial, low: bigint | '-inf', high: bigint | 'inf', bits: number): number {
  const chain: Polynomial[] = [primitivePart(p), primitivePart(derivative(p))];
  for (;;) {
    const rest = signedRemainder(chain.at(-2) as Polynomial, chain.at(-1) as Polynomial);
    if (rest.length === 0) break;
    chain.push(rest.map((c) => -c));
  }
  return variations(chain, low, bits) - variations(chain, high, bits);
}

function variations(chain: readonly Polynomial[], at: bigint | '-inf' | 'inf', bits: number): number {
  let count = 0;
  let last = 0;
  for (const p of chain) {
    const sign = at === '-inf' || at === 'inf' ? signAtInfinity(p, at) : signAt(p, at, bits);
    if (sign !== 0 && last !== 0 && sign !== last) count++;
    if (sign !== 0) last = sign;
  }
  return count;
}

function signAtInfinity(p: Polynomial, at: '-inf' | 'inf'): number {
  const lead = (p.at(-1) as bigint) > 0n ? 1 : -1;
  return at === '-inf' && degree(p) % 2 === 1 ? -lead : lead;
}

/** Sign of p(a/2^bits), exact: Horner on 2^(bits·degree)·p. */
export function signAt(p: Polynomial, a: bigint, bits: number): -1 | 0 | 1 {
  let value = 0n;
  const step = BigInt(bits);
  let scale = 0n;
  for (let k = p.length - 1; k >= 0; k--) {
    value = value * a + ((p[k] as bigint) << scale);
    scale += step;
  }
  return value > 0n ? 1 : value < 0n ? -1 : 0;
}
