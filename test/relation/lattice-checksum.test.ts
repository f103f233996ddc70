import { describe, expect, it } from 'vitest';
import { checksumOf } from '../../src/relation/lattice/checksum.ts';
import { RowFactor } from '../../src/relation/lattice/factor.ts';
import { newKernels } from '../../src/relation/lattice/kernels/load.ts';
import { LatticeSearch, type SearchEnd } from '../../src/relation/lattice/search.ts';
import { randomFrom } from '../support/random.ts';

function search(integers: bigint[][]): LatticeSearch {
  const errors = integers.map((row) => row.map(() => 1n));
  return new LatticeSearch(
    { integers, errors, endBits: 4, maxNormLog2: Number.POSITIVE_INFINITY, accept: () => true },
    newKernels('auto'),
  );
}

/** Runs to the end, calling `disturb` at every yield until it says that it has done its damage. */
function runWith(work: LatticeSearch, disturb: (steps: number) => boolean): { end: SearchEnd; disturbed: boolean } {
  const run = work.run();
  let disturbed = false;
  for (let steps = 0; ; steps++) {
    const next = run.next();
    if (next.done) return { end: next.value, disturbed };
    disturbed ||= disturb(steps);
  }
}

function plantedNumbers(
  seed: string,
  n: number,
  digits: number,
  bits: number,
): { integers: bigint[][]; relation: bigint[] } {
  const random = randomFrom(seed);
  const limit = 10n ** BigInt(digits);
  const relation = Array.from({ length: n }, () => random.below(limit) + 1n);
  const x = Array.from({ length: n }, () => random.bits(bits));
  let sum = 0n;
  for (let i = 0; i < n - 1; i++) sum += (relation[i] as bigint) * (x[i] as bigint);
  x[n - 1] = -sum / (relation[n - 1] as bigint);
  return { integers: x.map((value) => [value]), relation };
}

function proportional(a: readonly bigint[] | undefined, b: readonly bigint[]): boolean {
  return a !== undefined && b.every((c, i) => c * (a[0] as bigint) === (a[i] as bigint) * (b[0] as bigint));
}

describe('the checksum', () => {
  it('is the determinant, for several columns', () => {
    const random = randomFrom('checksum');
    for (const [n, m] of [
      [3, 1],
      [5, 2],
      [6, 3],
      [4, 4],
      [3, 5],
    ] as const) {
      const integers = Array.from({ length: n }, () => Array.from({ length: m }, () => random.bits(50) - (1n << 49n)));
      // A dependent column makes the largest minors vanish.
      if (m === 3) for (const row of integers) row[2] = (row[0] as bigint) - 2n * (row[1] as bigint);
      for (const e of [60, 50, 40]) {
        const factor = new RowFactor(n, n + m);
        integers.forEach((row, i) => {
          const x = Float64Array.from([
            ...row.map((y) => Number(y) * 2 ** -e),
            ...integers.map((_, k) => (k === i ? 1 : 0)),
          ]);
          factor.project(x);
          factor.push(x, 0);
        });
        const sum = factor.diagonal.reduce((total, d) => total + Math.log2(d), 0);
        expect(Math.abs(checksumOf(integers).expected(e) - sum), `${n} × ${m} at ${e}`).toBeLessThan(1e-4);
      }
    }
  });
});

describe('recovery', () => {
  const { integers, relation } = plantedNumbers('recovery', 40, 8, 1400);

  it('nothing to recover from: no rollback', () => {
    const work = search(integers);
    const { end } = runWith(work, () => false);
    expect(proportional(end.candidate, relation)).toBe(true);
    expect(work.stages.counts.rollbacks).toBe(0);
  });

  it('a spoilt factor is noticed and recomputed from the exact rows', () => {
    const work = search(integers);
    const { state } = work.stages;
    let before = 0;
    const { end, disturbed } = runWith(work, (steps) => {
      if (steps < 25) return false;
      before = work.stages.counts.refreshes;
      const f = state.kernels.view();
      for (let i = 5; i < 20; i++)
        f[state.l + i * (state.stride + 1)] = (f[state.l + i * (state.stride + 1)] as number) * 1.1;
      return true;
    });
    expect(disturbed).toBe(true);
    expect(work.stages.counts.refreshes).toBeGreaterThan(before);
    expect(work.stages.counts.rollbacks).toBe(0);
    expect(proportional(end.candidate, relation)).toBe(true);
  });

  it('a spoilt transform is noticed, and the search goes back to the last exact rows', () => {
    const work = search(integers);
    const { state } = work.stages;
    const { end, disturbed } = runWith(work, (steps) => {
      if (steps < 20 || state.transformBits === 0) return false;
      // Row 7 twice over: the transform is no longer unimodular.
      const f = state.kernels.view();
      for (let j = 0; j < state.active; j++) {
        f[state.transform + 7 * state.stride + j] = 2 * (f[state.transform + 7 * state.stride + j] as number);
      }
      return true;
    });
    expect(disturbed).toBe(true);
    expect(work.stages.counts.rollbacks).toBeGreaterThan(0);
    expect(proportional(end.candidate, relation)).toBe(true);
    // The basis is exact and a basis: every row's residual is right, and the relation is in it.
    for (const { y, b } of work.exactBasis()) {
      expect(b.reduce((sum, c, i) => sum + c * (integers[i]?.[0] as bigint), 0n)).toBe(y[0]);
    }
  });

  it('spoilt residuals in the window never yield a wrong relation', () => {
    const work = search(integers);
    const { state } = work.stages;
    const { end } = runWith(work, (steps) => {
      if (steps < 20) return false;
      const f = state.kernels.view();
      for (let k = 0; k < state.window.used; k++) f[state.window.current + 3 * state.window.rowStride + k] = 0;
      return true;
    });
    expect(end.candidate === undefined || proportional(end.candidate, relation)).toBe(true);
    expect(end.kind).toBe('candidate');
  });
});
