// Binary splitting against plain sums of exact rationals.
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { absolute } from '../../src/number/integer.ts';
import { type SeriesTerms, scaledQuotient, splitPositive, splitSeries } from '../../src/number/splitting.ts';

/** Σ a(n) Π p/q term by term over one common denominator. */
function plain(terms: SeriesTerms, from: number, to: number): { top: bigint; bottom: bigint } {
  let top = 0n;
  let bottom = 1n;
  let product = 1n;
  for (let n = from; n < to; n++) {
    product *= terms.p(n);
    top = top * terms.q(n) + terms.a(n) * product;
    bottom *= terms.q(n);
  }
  return { top, bottom };
}

const series = fc
  .record({
    p: fc.tuple(fc.integer({ min: 1, max: 50 }), fc.integer({ min: 0, max: 9 })),
    q: fc.tuple(fc.integer({ min: 1, max: 90 }), fc.integer({ min: 1, max: 40 })),
    a: fc.integer({ min: 1, max: 1000 }),
    from: fc.integer({ min: 1, max: 5 }),
    count: fc.integer({ min: 1, max: 300 }),
  })
  .map(({ p, q, a, from, count }) => ({
    terms: {
      p: (n: number) => BigInt(p[0] + p[1] * n),
      q: (n: number) => BigInt(q[0] + q[1] * n * n),
      a: (n: number) => BigInt(a + n),
    },
    from,
    to: from + count,
  }));

describe('binary splitting', () => {
  it('is the exact sum', () => {
    fc.assert(
      fc.property(series, ({ terms, from, to }) => {
        const { top, bottom } = plain(terms, from, to);
        const { Q, T } = splitSeries(terms, from, to);
        expect(T * bottom).toBe(top * Q);
      }),
      { seed: 20_260_102, numRuns: 100 },
    );
  });

  it('is exact for terms of changing sign', () => {
    const terms = {
      p: (n: number) => BigInt(-n),
      q: (n: number) => BigInt(3 * n + 1),
      a: (n: number) => BigInt(n % 5),
    };
    for (const to of [2, 9, 40, 200]) {
      const { top, bottom } = plain(terms, 1, to);
      const { Q, T } = splitSeries(terms, 1, to);
      expect(T * bottom).toBe(top * Q);
    }
  });

  it('with rounding keeps the relative error it promises', () => {
    fc.assert(
      fc.property(series, fc.integer({ min: 1, max: 400 }), ({ terms, from, to }, bits) => {
        const { top, bottom } = plain(terms, from, to);
        const { Q, T } = splitPositive(terms, from, to, bits);
        const shift = bits + 60;
        const quotient = scaledQuotient(T, Q, shift);
        // |quotient/2^shift − top/bottom| ≤ 2^−(bits + 2) top/bottom + 2^−shift
        const distance = absolute(quotient * bottom - (top << BigInt(shift)));
        expect(distance <= ((top << BigInt(shift)) >> BigInt(bits + 2)) + bottom).toBe(true);
      }),
      { seed: 20_260_103, numRuns: 200 },
    );
  });
});
