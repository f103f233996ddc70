import { describe, expect, it } from 'vitest';
import type { Ball } from '../../src/number/ball.ts';
import { prepare } from '../../src/relation/prepare.ts';
import { digitsNeeded, log10BallVolume, primitive, surplusDigits } from '../../src/relation/significance.ts';
import { type Random, randomFrom } from '../support/random.ts';

/** How many integer vectors of norm up to N vanish within the errors, by trying all (c and −c both counted). Small integers only. */
function countByTrial(rows: readonly (readonly Ball[])[], limit: number): number {
  const prepared = prepare(rows);
  const integers = prepared.integers.map((row) => row.map(Number));
  const errors = prepared.errors.map((row) => row.map(Number));
  let count = 0;
  const visit = (at: number, square: number, sums: number[], allowed: number[]): void => {
    if (at === integers.length) {
      if (square > 0 && sums.every((s, j) => Math.abs(s) <= (allowed[j] as number))) count++;
      return;
    }
    const room = Math.floor(Math.sqrt(limit * limit - square));
    for (let v = -room; v <= room; v++) {
      const x = integers[at] as number[];
      const e = errors[at] as number[];
      visit(
        at + 1,
        square + v * v,
        sums.map((s, j) => s + v * (x[j] as number)),
        allowed.map((s, j) => s + Math.abs(v) * (e[j] as number)),
      );
    }
  };
  const zero = prepared.columns.map(() => 0);
  visit(0, 0, zero, zero);
  return count;
}

function expectedBySurplus(rows: readonly (readonly Ball[])[], limit: number): number {
  // Any vector of norm N with typical entries stands for all of them.
  const n = rows.length;
  const entry = BigInt(Math.round(limit / Math.sqrt(n)));
  return 10 ** -surplusDigits(prepare(rows), new Array<bigint>(n).fill(entry));
}

const uniform = (random: Random, bits: number): Ball => ({
  mid: random.bits(bits) + (1n << BigInt(bits - 1)),
  rad: 1n,
  bits,
});

describe('the expected number of chance vectors', () => {
  it.each([
    ['3 numbers', 3, 14, 30, (x: Ball) => [x]],
    ['4 numbers', 4, 13, 10, (x: Ball) => [x]],
    ['a column repeated', 3, 14, 30, (x: Ball) => [x, { ...x, mid: 2n * x.mid, rad: 2n }]],
  ] as const)('is right within a factor of 3: %s', (name, n, bits, limit, columns) => {
    const random = randomFrom(`chance ${name}`);
    let counted = 0;
    let expected = 0;
    for (let k = 0; k < 12; k++) {
      const rows = Array.from({ length: n }, () => columns(uniform(random, bits)));
      counted += countByTrial(rows, limit);
      expected += expectedBySurplus(rows, limit);
    }
    expect(counted).toBeGreaterThan(20);
    expect(expected / counted).toBeGreaterThan(1 / 3);
    expect(expected / counted).toBeLessThan(3);
  });

  it('and for two independent columns', () => {
    const random = randomFrom('chance in two columns');
    let counted = 0;
    let expected = 0;
    for (let k = 0; k < 30; k++) {
      const rows = Array.from({ length: 4 }, () => [uniform(random, 8), uniform(random, 8)]);
      counted += countByTrial(rows, 12);
      expected += expectedBySurplus(rows, 12);
    }
    expect(counted).toBeGreaterThan(20);
    expect(expected / counted).toBeGreaterThan(1 / 3);
    // With two columns the count is overestimated, which errs on the side of calling a relation chance.
    expect(expected / counted).toBeLessThan(10);
  });
});

describe('small helpers', () => {
  it('volumes of unit balls: 2, π, 4π/3, π²/2', () => {
    [2, Math.PI, (4 * Math.PI) / 3, Math.PI ** 2 / 2].forEach((v, k) => {
      expect(log10BallVolume(k + 1)).toBeCloseTo(Math.log10(v), 12);
    });
  });

  it('primitive vectors', () => {
    expect(primitive([0n, -6n, 4n])).toEqual([0n, 3n, -2n]);
    expect(() => primitive([0n, 0n])).toThrow(RangeError);
  });

  it('digits needed grow with the norm and shrink with the columns', () => {
    expect(digitsNeeded(10, 1, 5)).toBeGreaterThan(20);
    expect(digitsNeeded(10, 2, 5)).toBeLessThan(digitsNeeded(10, 1, 5));
  });
});
