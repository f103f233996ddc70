import { describe, expect, it } from 'vitest';
import type { Ball } from '../../src/number/ball.ts';
import { log10Norm, primitive } from '../../src/relation/significance.ts';
import { type Random, randomFrom } from '../support/random.ts';
import { planted, randomNumbers, run } from './planted.ts';

const METHODS = ['pslq', 'lattice'] as const;

/** n rows of m columns with one relation common to all columns; the last row is solved for. */
function plantedColumns(
  random: Random,
  n: number,
  m: number,
  coefficientDigits: number,
  bits: number,
): { rows: Ball[][]; relation: bigint[] } {
  const limit = 10n ** BigInt(coefficientDigits);
  const relation = Array.from({ length: n }, () => random.below(2n * limit + 1n) - limit);
  relation[n - 1] = 7n;
  const guard = 100;
  const fine = Array.from({ length: n - 1 }, () => Array.from({ length: m }, () => random.bits(bits + guard)));
  fine.push(
    Array.from(
      { length: m },
      (_, j) => -fine.reduce((s, row, i) => s + (relation[i] as bigint) * (row[j] as bigint), 0n) / 7n,
    ),
  );
  const rows = fine.map((row) => row.map((mid) => ({ mid: mid >> BigInt(guard), rad: 1n, bits })));
  return { rows, relation };
}

const bitsOf = (digits: number): number => Math.ceil(digits / Math.log10(2));

describe.each(METHODS)('planted relations are recovered exactly (%s)', (method) => {
  it.each([
    [2, 8, 40],
    [3, 5, 40],
    [5, 4, 40],
    [8, 6, 80],
    [11, 4, 60],
    [21, 5, 130],
    [33, 6, 250],
    [40, 6, 300],
    [3, 300, 1500],
  ])('%i numbers, coefficients of %i digits, %i digits', (n, digits, decimal) => {
    const random = randomFrom(`planted ${n}`);
    for (let k = 0; k < 3; k++) {
      const { numbers, relation } = planted(random, n, digits, bitsOf(decimal));
      const outcome = run({ rows: numbers.map((x) => [x]), method });
      expect(outcome).toMatchObject({ kind: 'relation', coefficients: primitive(relation) });
      expect(outcome.normBoundLog10).toBeLessThanOrEqual(log10Norm(relation) + 1e-12);
      expect(outcome.normBoundLog10).toBeGreaterThan(log10Norm(relation) - 1.5);
    }
  });

  it.each([
    [3, 2, 4, 20],
    [6, 2, 4, 30],
    [10, 2, 6, 60],
    [12, 3, 6, 50],
    [20, 5, 6, 50],
    [20, 10, 3, 30],
    [12, 8, 6, 30],
  ])('%i numbers in %i columns, coefficients of %i digits, %i digits', (n, m, digits, decimal) => {
    const { rows, relation } = plantedColumns(randomFrom(`columns ${n} ${m}`), n, m, digits, bitsOf(decimal));
    expect(run({ rows, method })).toMatchObject({ kind: 'relation', coefficients: primitive(relation) });
  });

  it('columns of different accuracy', () => {
    const { rows, relation } = plantedColumns(randomFrom('uneven columns'), 8, 2, 6, 300);
    const uneven = rows.map(([x, y]) => [x as Ball, { mid: (y as Ball).mid >> 220n, rad: 1n, bits: 80 }]);
    expect(run({ rows: uneven, method })).toMatchObject({ kind: 'relation', coefficients: primitive(relation) });
  });

  it('a column of zeros says nothing and costs nothing', () => {
    const { numbers, relation } = planted(randomFrom('real as complex'), 6, 5, 200);
    const rows = numbers.map((x) => [x, { mid: 0n, rad: 1n, bits: 200 }]);
    expect(run({ rows, method })).toMatchObject({ kind: 'relation', coefficients: primitive(relation) });
  });
});

describe.each(METHODS)('random numbers give a bound near what their digits are worth (%s)', (method) => {
  it.each([
    [2, 1, 60],
    [5, 1, 60],
    [12, 1, 120],
    [20, 1, 300],
    [9, 2, 60],
    [16, 4, 50],
  ])('%i numbers in %i columns', (n, m, decimal) => {
    const random = randomFrom(`random ${n} ${m}`);
    const rows = Array.from({ length: n }, () => randomNumbers(random, m, bitsOf(decimal)));
    const outcome = run({ rows, method });
    expect(outcome.kind).toBe('excluded');
    const worth = (decimal * m) / n;
    expect(outcome.normBoundLog10).toBeLessThan(worth + 0.5);
    expect(outcome.normBoundLog10).toBeGreaterThan(worth - n * 0.02 - 0.8);
  });

  it('columns that repeat each other are not twice the evidence', () => {
    const random = randomFrom('one phase');
    for (let k = 0; k < 20; k++) {
      // Real numbers times 3 + 4i, to 40 digits: 40 digits of information, not 80.
      const rows = randomNumbers(random, 6, 133).map(({ mid }) =>
        [3n, 4n].map((f) => ({ mid: f * mid, rad: f, bits: 133 })),
      );
      const outcome = run({ rows, method });
      expect(outcome.kind).toBe('excluded');
    }
  });

  it('and a limit within reach ends the search early', () => {
    const rows = randomNumbers(randomFrom('early'), 10, 600).map((x) => [x]);
    const outcome = run({ rows, method, maxNormLog10: 6 });
    expect(outcome.kind).toBe('excluded');
    expect(outcome.normBoundLog10).toBeGreaterThanOrEqual(6);
    expect(outcome.normBoundLog10).toBeLessThan(12);
  });
});
