import { describe, expect, it } from 'vitest';
import { primitive } from '../../src/relation/significance.ts';
import { randomFrom } from '../support/random.ts';
import { planted, randomNumbers, run } from './planted.ts';

describe('planted relations are recovered exactly', () => {
  for (const [n, digits, decimal] of [
    [2, 8, 40],
    [3, 5, 40],
    [5, 4, 40],
    [8, 6, 80],
    [11, 4, 60],
    [21, 5, 130],
    [33, 6, 250],
    [40, 6, 300],
  ] as const) {
    it(`${n} numbers, coefficients of ${digits} digits, ${decimal} digits`, () => {
      const random = randomFrom(`planted ${n}`);
      for (let k = 0; k < 3; k++) {
        const { numbers, relation } = planted(random, n, digits, Math.ceil(decimal / Math.log10(2)));
        const outcome = run({ rows: numbers.map((x) => [x]), method: 'pslq' });
        expect(outcome.kind).toBe('relation');
        if (outcome.kind === 'relation') expect(outcome.coefficients).toEqual(primitive(relation));
      }
    });
  }
});

describe('random numbers', () => {
  it('give no relation but a bound', () => {
    const random = randomFrom('no relation');
    for (let n = 2; n <= 20; n++) {
      const outcome = run({ rows: randomNumbers(random, n, 200).map((x) => [x]), method: 'pslq' });
      expect(outcome.kind).toBe('excluded');
    }
  });
});
