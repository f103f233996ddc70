/** Binary splitting of hypergeometric series: Haible and Papanikolaou, "Fast multiprecision evaluation of series of rational numbers", ANTS-III (1998). */
import { bitLength } from './integer.ts';

/** Σ a(n) Π_{k=from…n} p(k)/q(k) over from ≤ n < to equals T/Q; P and Q are the products of all p and q. */
interface Split {
  readonly P: bigint;
  readonly Q: bigint;
  readonly T: bigint;
}

export interface SeriesTerms {
  p(n: number): bigint;
  q(n: number): bigint;
  a(n: number): bigint;
}

/** Below this many terms a plain loop beats the recursion in V8. */
const BLOCK = 6;

/** The exact sum of the terms from ≤ n < to, as T/Q. `to` > `from`. */
export function splitSeries(terms: SeriesTerms, from: number, to: number): { readonly Q: bigint; readonly T: bigint } {
  return split(terms, from, to, false);
}

/** P is needed of ranges that others follow; where `withP` is false it is left at 0. */
function split(terms: SeriesTerms, from: number, to: number, withP: boolean): Split {
  if (to - from <= BLOCK) return block(terms, from, to);
  const middle = (from + to) >> 1;
  const left = split(terms, from, middle, true);
  const right = split(terms, middle, to, withP);
  return { P: withP ? left.P * right.P : 0n, Q: left.Q * right.Q, T: left.T * right.Q + left.P * right.T };
}

function block(terms: SeriesTerms, from: number, to: number): Split {
  let P = terms.p(from);
  let Q = terms.q(from);
  let T = terms.a(from) * P;
  for (let n = from + 1; n < to; n++) {
    const q = terms.q(n);
    P *= terms.p(n);
    Q *= q;
    T = T * q + terms.a(n) * P;
  }
  return { P, Q, T };
}

/** mantissa·2^exponent. */
export interface Scaled {
  readonly mantissa: bigint;
  readonly exponent: number;
}

interface ScaledSplit {
  readonly P: Scaled;
  readonly Q: Scaled;
  readonly T: Scaled;
}

/** Ranges of at most this many terms are kept exactly. */
const EXACT = 32;
/** Bits kept beyond those asked for; see `splitPositive`. */
const GUARD = 28;

/**
 * As `splitSeries` for positive p, q, a, with numbers longer than `bits` + 28 bits rounded down: where p and q have much in common
 * the exact ones grow to many times the precision wanted.
 *
 * Each of P, Q, T and the quotient T/Q has a relative error below 2^−(bits + 2): a rounding loses less than 2^−(bits + 27)
 * relative, sums of positive numbers do not increase a relative error and products add them, so that the error of a range is
 * at most that of its halves and one rounding each: less than 2^20 of them for fewer than 2^24 terms, twice that for a quotient.
 */
export function splitPositive(
  terms: SeriesTerms,
  from: number,
  to: number,
  bits: number,
): { readonly Q: Scaled; readonly T: Scaled } {
  return splitRounded(terms, from, to, bits + GUARD, false);
}

const NOTHING: Scaled = { mantissa: 0n, exponent: 0 };

function splitRounded(terms: SeriesTerms, from: number, to: number, bits: number, withP: boolean): ScaledSplit {
  if (to - from <= EXACT) {
    const { P, Q, T } = split(terms, from, to, withP);
    return { P: { mantissa: P, exponent: 0 }, Q: { mantissa: Q, exponent: 0 }, T: { mantissa: T, exponent: 0 } };
  }
  const middle = (from + to) >> 1;
  const left = splitRounded(terms, from, middle, bits, true);
  const right = splitRounded(terms, middle, to, bits, withP);
  return {
    P: withP ? trim(times(left.P, right.P), bits) : NOTHING,
    Q: trim(times(left.Q, right.Q), bits),
    T: trim(plus(times(left.T, right.Q), times(left.P, right.T)), bits),
  };
}

function times(x: Scaled, y: Scaled): Scaled {
  return { mantissa: x.mantissa * y.mantissa, exponent: x.exponent + y.exponent };
}

/** Exact sum. */
function plus(x: Scaled, y: Scaled): Scaled {
  const exponent = Math.min(x.exponent, y.exponent);
  const up = (z: Scaled): bigint => z.mantissa << BigInt(z.exponent - exponent);
  return { mantissa: up(x) + up(y), exponent };
}

/** Rounded down to about `bits` bits, at least that many. */
function trim(x: Scaled, bits: number): Scaled {
  // The shift is all that short numbers cost.
  const over = x.mantissa >> BigInt(bits);
  if (over === 0n) return x;
  const drop = bitLength(over);
  return { mantissa: x.mantissa >> BigInt(drop), exponent: x.exponent + drop };
}

/** x/y with `bits` fraction bits, rounded down; positive x and y. */
export function scaledQuotient(x: Scaled, y: Scaled, bits: number): bigint {
  const shift = bits + x.exponent - y.exponent;
  return shift >= 0 ? (x.mantissa << BigInt(shift)) / y.mantissa : x.mantissa / (y.mantissa << BigInt(-shift));
}
