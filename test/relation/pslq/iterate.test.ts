import { describe, expect, it } from 'vitest';
import { factorH, log2Drop, log2MaxDiagonal } from '../../../src/relation/pslq/factor.ts';
import { iterate, newStage, reduceWide } from '../../../src/relation/pslq/iterate.ts';
import { type Random, randomFrom } from '../../support/random.ts';

function randomRows(random: Random, n: number, width: number): Float64Array {
  return Float64Array.from({ length: n * width }, () => random.unit() - 0.5);
}

/** a·bᵀ for row-major matrices of equal width. */
function timesTransposed(a: Float64Array, b: Float64Array, width: number): number[][] {
  const rows = (x: Float64Array): Float64Array[] =>
    Array.from({ length: x.length / width }, (_, i) => x.subarray(i * width, (i + 1) * width));
  return rows(a).map((r) => rows(b).map((s) => r.reduce((sum, v, k) => sum + v * (s[k] as number), 0)));
}

function product(a: number[][], b: number[][]): number[][] {
  return a.map((row) => (b[0] as number[]).map((_, j) => row.reduce((s, v, k) => s + v * (b[k]?.[j] as number), 0)));
}

describe('H from the rows of a state', () => {
  it('is lower triangular, and H·Hᵀ is the inverse of D·Dᵀ', () => {
    const random = randomFrom('factor');
    for (const [n, width] of [
      [1, 2],
      [4, 5],
      [9, 11],
      [20, 21],
    ] as const) {
      const rows = randomRows(random, n, width);
      const gram = timesTransposed(rows, rows, width);
      const factor = factorH(rows.slice(), n, width);
      if (factor === undefined) throw new Error('no factor');
      for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) expect(factor.h[i * n + j]).toBe(0);
      const identity = product(timesTransposed(factor.h, factor.h, n), gram);
      identity.forEach((row, i) => {
        row.forEach((v, j) => {
          expect(Math.abs(v - (i === j ? 1 : 0))).toBeLessThan(1e-7);
        });
      });
    }
  });

  it('is undefined for a row of zeros', () => {
    expect(factorH(Float64Array.from([1, 0, 0, 0]), 2, 2)).toBeUndefined();
  });
});

describe('iterations', () => {
  it('keep H·Q equal to what the transform makes of it, with a unimodular integer transform, and reduce', () => {
    const random = randomFrom('iterate');
    for (const n of [2, 3, 7, 15]) {
      const width = n + 1;
      const rows = randomRows(random, n, width);
      for (let i = 0; i < n; i++) rows[i * width + n] = (rows[i * width + n] as number) * 1e6;
      const factor = factorH(rows.slice(), n, width);
      if (factor === undefined) throw new Error('no factor');
      const before = log2MaxDiagonal(factor.h, n);
      const stage = newStage(factor, n);
      const count = { rounds: 0 };
      expect(iterate(stage, 10_000, count)).toBe('done');
      expect(count.rounds).toBeGreaterThan(0);
      // The same H belongs to the transformed rows, up to signs of columns: compare D·Dᵀ through its inverse.
      const moved = new Float64Array(n * width);
      for (let i = 0; i < n; i++)
        for (let k = 0; k < n; k++) {
          const u = stage.u[i * n + k] as number;
          expect(Number.isInteger(u)).toBe(true);
          for (let c = 0; c < width; c++)
            moved[i * width + c] = (moved[i * width + c] as number) + u * (rows[k * width + c] as number);
        }
      const again = factorH(moved, n, width);
      if (again === undefined) throw new Error('no factor');
      for (let i = 0; i < n; i++) {
        const [x, y] = [Math.abs(again.h[i * n + i] as number), Math.abs(stage.h[i * n + i] as number)];
        expect(Math.abs(x / y - 1)).toBeLessThan(1e-6);
        for (let j = 0; j < i; j++) {
          const ratio = Math.abs((again.h[i * n + j] as number) / (again.h[j * n + j] as number));
          expect(ratio).toBeLessThan(0.51);
        }
      }
      expect(log2MaxDiagonal(stage.h, n)).toBeLessThanOrEqual(before + 1e-9);
      expect(log2Drop(stage.h, n)).toBeLessThan(n);
    }
  });

  it('leave multipliers too large for doubles to the exact reduction', () => {
    // b₁ = (1, 0), b₀ = (2^70 + 1, 1): one step of 2^70 is needed.
    const rows = Float64Array.from([2 ** 70, 2 ** 10, 1, 0]);
    const factor = factorH(rows, 2, 2);
    if (factor === undefined) throw new Error('no factor');
    expect(iterate(newStage({ h: factor.h.slice(), noise: factor.noise.slice() }, 2), 10, { rounds: 0 })).toBe('wide');
    const steps: number[][] = [];
    reduceWide(factor, 2, (i, j, t) => steps.push([i, j, t]));
    expect(steps).toEqual([[1, 0, -(2 ** 70)]]);
  });
});
