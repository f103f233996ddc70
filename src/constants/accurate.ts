/** Working precision: guess, look at the radius that came out, go up until it suffices. */
import { accuracy, withBits } from '../number/ball.ts';
import { isComplex, type Value } from '../number/complex.ts';
import { PrecisionError } from '../number/errors.ts';

/** Right fraction bits of the worse part. */
export function accuracyOf(x: Value): number {
  return isComplex(x) ? Math.min(accuracy(x.re), accuracy(x.im)) : accuracy(x);
}

export function roundTo(x: Value, bits: number): Value {
  return isComplex(x) ? { re: withBits(x.re, bits), im: withBits(x.im, bits) } : withBits(x, bits);
}

/**
 * Calls `compute` with growing working precision, from bits + guard on, until the radius of its result is at most
 * 2^−(bits+1); gives that back with bits + 2 fraction bits, where its radius is at most 2^−bits. A PrecisionError of `compute`
 * (a divisor or a sign that cannot be told yet) counts as too little precision. Throws the last PrecisionError once the working
 * precision has passed 4·bits + 4000.
 */
export function toAccuracy<T extends Value>(bits: number, guard: number, compute: (work: number) => T): T {
  return allToAccuracy(bits, guard, (work) => [compute(work)])[0] as T;
}

/** As `toAccuracy` for several values that are computed together. */
export function allToAccuracy<T extends Value>(bits: number, guard: number, compute: (work: number) => T[]): T[] {
  const limit = 4 * bits + 4000;
  let work = bits + guard;
  for (;;) {
    let missing: number;
    try {
      const values = compute(work);
      missing = bits + 1 - values.reduce((least, x) => Math.min(least, accuracyOf(x)), Number.POSITIVE_INFINITY);
      if (missing <= 0) return values.map((x) => roundTo(x, bits + 2) as T);
      if (work > limit) throw new PrecisionError('toAccuracy: the result cannot be told at this precision');
    } catch (error) {
      if (!(error instanceof PrecisionError) || work > limit) throw error;
      missing = Math.max(32, work >> 1);
    }
    work += missing + 8;
  }
}
