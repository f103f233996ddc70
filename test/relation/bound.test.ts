import { describe, expect, it } from 'vitest';
import type { Ball } from '../../src/number/ball.ts';
import { absolute } from '../../src/number/integer.ts';
import { certifyNormBound } from '../../src/relation/bound.ts';
import { type Prepared, prepare } from '../../src/relation/prepare.ts';
import { pslq, weightRange } from '../../src/relation/pslq/search.ts';
import { type ExactState, initialState } from '../../src/relation/pslq/state.ts';
import { log10Norm } from '../../src/relation/significance.ts';
import { type Random, randomFrom } from '../support/random.ts';
import { planted, randomNumbers, run } from './planted.ts';

/** The state of a PSLQ run that has used all digits, accepting nothing. */
function reduced(prepared: Prepared): ExactState {
  const state = initialState(prepared);
  const options = { accept: () => false, maxNormLog10: Number.POSITIVE_INFINITY, bounded: () => false };
  const search = pslq(prepared, state, options, { fraction: 0, iterations: 0, normBoundLog10: 0 });
  while (!search.next().done);
  return state;
}

function orthogonalisationOrder(state: ExactState): bigint[][] {
  return [...state.basis].reverse();
}

/** Smallest ‖c‖² over all c ≠ 0 with |cᵢ| ≤ limit that may be a relation of numbers inside the balls; undefined if none. */
function shortestByTrial(prepared: Prepared, limit: number): number | undefined {
  const n = prepared.integers.length;
  let best: number | undefined;
  const c = new Array<number>(n).fill(0);
  const visit = (at: number, square: number, sums: bigint[], allowed: bigint[]): void => {
    if (best !== undefined && square >= best) return;
    if (at === n) {
      if (square > 0 && sums.every((s, j) => absolute(s) <= (allowed[j] as bigint))) best = square;
      return;
    }
    for (let value = -limit; value <= limit; value++) {
      c[at] = value;
      const factor = BigInt(value);
      visit(
        at + 1,
        square + value * value,
        sums.map((s, j) => s + factor * (prepared.integers[at]?.[j] as bigint)),
        allowed.map((s, j) => s + absolute(factor) * (prepared.errors[at]?.[j] as bigint)),
      );
    }
  };
  const zero = prepared.columns.map(() => 0n);
  visit(0, 0, zero, zero);
  return best;
}

function randomRows(random: Random, n: number, m: number, bits: number): Ball[][] {
  return Array.from({ length: n }, () =>
    Array.from({ length: m }, () => ({
      mid: random.bits(bits) - (1n << BigInt(bits - 1)),
      rad: random.below(4n) + 1n,
      bits,
    })),
  );
}

describe('the norm bound', () => {
  it('is never above the shortest possible relation, found by trying all small vectors', () => {
    const random = randomFrom('exhaustive bound');
    let ratio = 0;
    let cases = 0;
    for (const [n, m, bits, limit] of [
      [2, 1, 13, 150],
      [3, 1, 17, 40],
      [3, 2, 12, 60],
      [4, 1, 18, 16],
      [4, 2, 11, 16],
    ] as const) {
      for (let k = 0; k < 12; k++) {
        const prepared = prepare(randomRows(random, n, m, bits));
        if (prepared.immediate !== undefined) continue;
        const basis = orthogonalisationOrder(reduced(prepared));
        const { end } = weightRange(prepared);
        const shortest = shortestByTrial(prepared, limit);
        for (const shift of [-2, 0, 3]) {
          const bound = certifyNormBound(
            prepared,
            basis,
            end.map((w) => w + shift),
          );
          expect(bound.proved).toBe(true);
          if (shortest === undefined) continue;
          cases++;
          expect(bound.normBoundLog10).toBeLessThanOrEqual(Math.log10(shortest) / 2);
          if (shift === 0) ratio = Math.max(ratio, 10 ** bound.normBoundLog10 / Math.sqrt(shortest));
        }
      }
    }
    expect(cases).toBeGreaterThan(100);
    // The bound must also be of use: at best close to the truth.
    expect(ratio).toBeGreaterThan(0.6);
  });

  it('is never above a planted relation, at any stage of the digits', () => {
    const random = randomFrom('planted bound');
    for (let k = 0; k < 60; k++) {
      const n = random.integer(2, 16);
      const digits = random.integer(1, 8);
      const { numbers, relation } = planted(random, n, digits, random.integer(20, 4 * n * digits + 40));
      const outcome = run({ rows: numbers.map((x) => [x]), method: 'pslq' });
      expect(outcome.normBoundLog10).toBeLessThanOrEqual(log10Norm(relation) + 1e-12);
    }
  });

  it('refuses a basis that is not unimodular, and one that is too ill-conditioned, with the trivial bound', () => {
    const random = randomFrom('not unimodular');
    const prepared = prepare(randomNumbers(random, 6, 200).map((x) => [x]));
    const basis = orthogonalisationOrder(reduced(prepared));
    const { end } = weightRange(prepared);
    expect(certifyNormBound(prepared, basis, end).proved).toBe(true);
    for (const factor of [2n, 3n, 0n]) {
      const spoiled = basis.map((row, i) => (i === 2 ? row.map((c) => factor * c) : row));
      const bound = certifyNormBound(prepared, spoiled, end);
      expect(bound.proved).toBe(false);
      expect(bound.normBoundLog10).toBe(0);
    }
    const identity = basis.map((_, i) => basis.map((_, k) => (i === k ? 1n : 0n)));
    const crude = certifyNormBound(prepared, identity, end);
    expect(crude.normBoundLog10).toBeLessThan(1);
  });

  it('is worth nearly the digits that were given', () => {
    const random = randomFrom('quality');
    for (const n of [3, 10, 25]) {
      const digits = 20 * n;
      const rows = randomNumbers(random, n, Math.ceil(digits / Math.log10(2))).map((x) => [x]);
      const outcome = run({ rows, method: 'pslq' });
      expect(outcome.kind).toBe('excluded');
      expect(outcome.normBoundLog10).toBeGreaterThan(19);
      expect(outcome.normBoundLog10).toBeLessThan(21);
    }
  });

  it('throws for a wrong shape', () => {
    const prepared = prepare(randomNumbers(randomFrom('shape'), 3, 60).map((x) => [x]));
    expect(() => certifyNormBound(prepared, [[1n]], [4])).toThrow(RangeError);
    expect(() =>
      certifyNormBound(
        prepared,
        [
          [1n, 0n, 0n],
          [0n, 1n, 0n],
          [0n, 0n, 1n],
        ],
        [4.5],
      ),
    ).toThrow(RangeError);
  });
});
