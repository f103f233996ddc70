/** Finite linear combinations over ℚ of things named by strings, without zero coefficients. */
import { type Fraction, plus, times } from './fraction.ts';

export type Combination = ReadonlyMap<string, Fraction>;

/** Adds coefficient·term to a combination under construction. */
export function accumulate(sum: Map<string, Fraction>, key: string, coefficient: Fraction): void {
  if (coefficient.p === 0n) return;
  const old = sum.get(key);
  const now = old === undefined ? coefficient : plus(old, coefficient);
  if (now.p === 0n) sum.delete(key);
  else sum.set(key, now);
}

export function accumulateAll(sum: Map<string, Fraction>, terms: Combination, factor: Fraction): void {
  for (const [key, coefficient] of terms) accumulate(sum, key, times(coefficient, factor));
}

/** The bilinear extension of a product of keys. */
export function product(a: Combination, b: Combination, ofKeys: (x: string, y: string) => Combination): Combination {
  const sum = new Map<string, Fraction>();
  for (const [x, p] of a) {
    for (const [y, q] of b) accumulateAll(sum, ofKeys(x, y), times(p, q));
  }
  return sum;
}

/** All shuffles of two words, with multiplicity. */
export function shuffleWords(x: string, y: string): Combination {
  const sum = new Map<string, Fraction>();
  const go = (i: number, j: number, done: string): void => {
    if (i === x.length) accumulate(sum, done + y.slice(j), { p: 1n, q: 1n });
    else if (j === y.length) accumulate(sum, done + x.slice(i), { p: 1n, q: 1n });
    else {
      go(i + 1, j, done + x[i]);
      go(i, j + 1, done + y[j]);
    }
  };
  go(0, 0, '');
  return sum;
}
