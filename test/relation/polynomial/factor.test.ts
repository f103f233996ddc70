import { describe, expect, it } from 'vitest';
import { factorise } from '../../../src/relation/polynomial/factor.ts';
import { countRealRoots, degree, primitivePart, product, signAt } from '../../../src/relation/polynomial/integer.ts';
import { type Random, randomFrom } from '../../support/random.ts';

function factors(p: readonly bigint[]): { factors: string[]; proved: boolean } {
  const work = factorise(p);
  for (;;) {
    const next = work.next();
    if (next.done) return { factors: next.value.factors.map(String).sort(), proved: next.value.proved };
  }
}

const of = (...lists: number[][]): bigint[][] => lists.map((c) => c.map(BigInt));

function randomPolynomial(random: Random, d: number, size: bigint): bigint[] {
  const p = Array.from({ length: d + 1 }, () => random.below(2n * size + 1n) - size);
  p[d] = random.below(size) + 1n;
  if (p[0] === 0n) p[0] = 1n;
  return primitivePart(p);
}

describe('factorisation over the integers', () => {
  it('textbook cases', () => {
    expect(factors([-1n, 0n, 0n, 0n, 1n])).toEqual({ factors: ['-1,1', '1,0,1', '1,1'], proved: true });
    // x⁴ + 1 splits modulo every prime and is irreducible.
    expect(factors([1n, 0n, 0n, 0n, 1n])).toEqual({ factors: ['1,0,0,0,1'], proved: true });
    // Swinnerton-Dyer polynomial of √2, √3, √5: irreducible, splits into quadratics at best.
    expect(factors([576n, 0n, -960n, 0n, 352n, 0n, -40n, 0n, 1n])).toEqual({
      factors: ['576,0,-960,0,352,0,-40,0,1'],
      proved: true,
    });
    // Sophie Germain: x⁴ + 4.
    expect(factors([4n, 0n, 0n, 0n, 1n])).toEqual({ factors: ['2,-2,1', '2,2,1'], proved: true });
    // Square factors count once.
    expect(factors(product(product([1n, 2n], [1n, 2n]), [-3n, 0n, 5n]))).toEqual({
      factors: ['-3,0,5', '1,2'],
      proved: true,
    });
    // x^15 − 1: cyclotomic factors of order 1, 3, 5, 15.
    expect(factors([-1n, ...new Array<bigint>(14).fill(0n), 1n]).factors).toEqual(
      of([-1, 1], [1, 1, 1], [1, 1, 1, 1, 1], [1, -1, 0, 1, -1, 1, 0, -1, 1]).map(String).sort(),
    );
  });

  it('products of random polynomials come apart again', () => {
    const random = randomFrom('factorise');
    for (let k = 0; k < 40; k++) {
      const parts = Array.from({ length: random.integer(2, 4) }, () =>
        randomPolynomial(random, random.integer(1, 7), 10n ** BigInt(random.integer(1, 12))),
      );
      const whole = parts.reduce((p, q) => product(p, q), [1n]);
      // Random polynomials are almost always irreducible; a finer split than the planted one must still multiply up.
      const result = factors(whole);
      expect(result.proved).toBe(true);
      const lists = result.factors.map((text) => text.split(',').map(BigInt));
      expect(lists.reduce((p, q) => product(p, q), [1n])).toEqual(primitivePart(whole));
      expect(result.factors.length).toBeGreaterThanOrEqual(parts.length);
      for (const part of parts) expect(lists.some((f) => degree(f) <= degree(part))).toBe(true);
    }
  });
});

describe('real roots by Sturm chains', () => {
  it('counts roots in intervals', () => {
    // (x − 1)(x − 2)(x − 3)(x² + 1)
    const p = [of([-1, 1])[0], of([-2, 1])[0], of([-3, 1])[0], of([1, 0, 1])[0]].reduce<bigint[]>(
      (a, b) => product(a, b as bigint[]),
      [1n],
    );
    expect(countRealRoots(p, '-inf', 'inf', 0)).toBe(3);
    expect(countRealRoots(p, '-inf', 3n, 1)).toBe(1);
    expect(countRealRoots(p, 3n, 5n, 1)).toBe(1);
    expect(countRealRoots(p, 1n, 3n, 0)).toBe(2);
    expect(signAt(p, 3n, 1)).toBe(1);
  });
});
