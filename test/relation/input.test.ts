import { describe, expect, it } from 'vitest';
import { type Ball, fromInteger, timesPowerOfTwo } from '../../src/number/ball.ts';
import { InputError } from '../../src/number/errors.ts';
import type { Method, RelationOutcome } from '../../src/relation/contract.ts';
import { mayVanish, prepare } from '../../src/relation/prepare.ts';
import { startRelation } from '../../src/relation/relation.ts';
import { primitive } from '../../src/relation/significance.ts';
import { randomFrom } from '../support/random.ts';
import { planted, randomNumbers, run } from './planted.ts';

type Search = (numbers: readonly Ball[], maxNormLog10?: number) => RelationOutcome;

function searchBy(method: Method): Search {
  return (numbers, maxNormLog10) =>
    run({ rows: numbers.map((x) => [x]), method, ...(maxNormLog10 === undefined ? {} : { maxNormLog10 }) });
}

const METHODS = ['pslq', 'lattice'] as const;

function refusal(rows: readonly (readonly Ball[])[]): string {
  try {
    startRelation({ rows, method: 'pslq' });
  } catch (error) {
    if (error instanceof InputError) return error.code;
    throw error;
  }
  return 'accepted';
}

const exact = fromInteger;

describe('input that cannot be searched is refused with a reason', () => {
  const good: Ball = { mid: 12345678901234567890n, rad: 1n, bits: 60 };
  it.each([
    ['no number', [], 'too-few-numbers'],
    ['one number', [[good]], 'too-few-numbers'],
    [
      'as many columns as numbers',
      [
        [good, exact(3n)],
        [exact(7n), good],
      ],
      'too-few-numbers',
    ],
    ['rows of different length', [[good], [good, good]], 'ragged-rows'],
    ['rows without columns', [[], []], 'ragged-rows'],
    ['a radius below zero', [[good], [{ mid: 1n, rad: -1n, bits: 0 }]], 'not-a-number'],
    [
      'a midpoint that is not an integer',
      [[good], [{ mid: Number.NaN as unknown as bigint, rad: 1n, bits: 9 }]],
      'not-a-number',
    ],
    ['bits that are not a number', [[good], [{ mid: 1n, rad: 1n, bits: Number.NaN }]], 'not-a-number'],
    ['all zero', [[exact(0n)], [exact(0n)], [exact(0n)]], 'all-zero'],
    ['no digit anywhere', [[{ mid: 3n, rad: 8n, bits: 5 }], [{ mid: 0n, rad: 1n, bits: 5 }]], 'no-digits'],
    ['one number without a digit', [[good], [{ mid: 3n, rad: 8n, bits: 2 }], [exact(1n)]], 'no-digits'],
    [
      'a number below the uncertainty of another',
      [[good], [{ mid: 3n << 40n, rad: 1n, bits: 200 }], [exact(5n)]],
      'too-small',
    ],
  ] as [string, Ball[][], string][])('%s', (_, rows, code) => {
    expect(refusal(rows)).toBe(code);
  });

  it('a largest norm below 1 or not a number', () => {
    for (const maxNormLog10 of [-1, Number.NaN]) {
      expect(() => startRelation({ rows: [[good], [exact(1n)]], method: 'pslq', maxNormLog10 })).toThrow(InputError);
    }
  });
});

describe.each(METHODS)('relations that need no search (%s)', (method) => {
  const search = searchBy(method);
  it('an exact zero, and a zero within its uncertainty', () => {
    expect(search([exact(3n), exact(0n), exact(5n)])).toMatchObject({ kind: 'relation', coefficients: [0n, 1n, 0n] });
    const numbers = randomNumbers(randomFrom('zero'), 3, 100);
    expect(search([...numbers, { mid: 1n, rad: 2n, bits: 100 }])).toMatchObject({
      kind: 'relation',
      coefficients: [0n, 0n, 0n, 1n],
    });
  });

  it('equal numbers, and equal up to sign, named by position', () => {
    const [x, y, z] = randomNumbers(randomFrom('equal'), 3, 100) as [Ball, Ball, Ball];
    const nudged = { ...y, mid: -y.mid + 2n };
    expect(search([x, y, z, x])).toMatchObject({ kind: 'relation', coefficients: [1n, 0n, 0n, -1n] });
    expect(prepare([x, y, z, nudged].map((b) => [b])).immediate).toMatchObject({ kind: 'equal', indices: [1, 3] });
    expect(search([x, y, z, nudged])).toMatchObject({ coefficients: [0n, 1n, 0n, 1n] });
  });

  it('not on the strength of a few digits', () => {
    const few: Ball[] = [
      { mid: 5n << 8n, rad: 2n, bits: 8 },
      { mid: (5n << 8n) + 1n, rad: 2n, bits: 8 },
    ];
    expect(prepare(few.map((b) => [b])).immediate).toBeUndefined();
    expect(search(few).kind).not.toBe('relation');
  });
});

describe.each(METHODS)('absolute size and gaps of size do not matter (%s)', (method) => {
  const search = searchBy(method);
  it('tiny and huge numbers', () => {
    const { numbers, relation } = planted(randomFrom('size'), 6, 5, 300);
    for (const shift of [-3000, -1, 200, 4000]) {
      expect(search(numbers.map((x) => timesPowerOfTwo(x, shift)))).toMatchObject({
        kind: 'relation',
        coefficients: primitive(relation),
      });
    }
  });

  it('ratios of 10^60 within one relation', () => {
    const random = randomFrom('gap');
    const relation = [3n, 10n ** 60n + 7n, -5n, 10n ** 45n + 13n, 11n, 7n];
    const bits = 1900;
    const numbers = randomNumbers(random, 5, bits);
    numbers[1] = { mid: (numbers[1] as Ball).mid >> 200n, rad: 1n, bits };
    numbers[3] = { mid: (numbers[3] as Ball).mid >> 150n, rad: 1n, bits };
    const sum = numbers.reduce((s, x, i) => s + x.mid * (relation[i] as bigint), 0n);
    numbers.push({ mid: -sum / 7n, rad: 1n, bits });
    const cut = numbers.map((x) => ({ mid: x.mid >> 400n, rad: 1n, bits: bits - 400 }));
    expect(search(cut)).toMatchObject({ kind: 'relation', coefficients: relation });
  });

  it('ratios of 10^60 without a relation end with a bound', () => {
    const numbers = randomNumbers(randomFrom('gap random'), 8, 600).map((x, i) => ({
      mid: x.mid >> BigInt((i % 2) * 200),
      rad: 1n,
      bits: 600,
    }));
    const outcome = search(numbers);
    expect(outcome.kind).toBe('excluded');
    expect(outcome.normBoundLog10).toBeGreaterThan(20);
  });
});

describe.each(METHODS)('chance among small numbers (%s)', (method) => {
  it('is not taken for a relation when larger numbers with more right digits are offered too', () => {
    const random = randomFrom('chance among the small');
    for (let k = 0; k < 40; k++) {
      const bits = random.integer(100, 500);
      // One or two numbers of full size, the others so small that few of their digits are right.
      const rows = randomNumbers(random, random.integer(4, 9), bits).map((x, i) => [
        i < 1 + (k % 2) ? x : { ...x, mid: x.mid >> BigInt(Math.floor(bits * 0.6)) },
      ]);
      expect(run({ rows, method }).kind).not.toBe('relation');
    }
  });
});

describe.each(METHODS)('digits that do not suffice (%s)', (method) => {
  const search = searchBy(method);
  it('a limit that the digits cannot reach is inconclusive and says how many are needed', () => {
    const outcome = search(randomNumbers(randomFrom('limit'), 6, 300), 30);
    expect(outcome.kind).toBe('inconclusive');
    if (outcome.kind === 'inconclusive')
      expect(outcome.reason).toMatch(/90 right digits .* about 18\d would be needed/);
    expect(outcome.normBoundLog10).toBeGreaterThan(14);
  });

  it('a limit within reach ends early, with at least that bound', () => {
    const outcome = search(randomNumbers(randomFrom('limit'), 6, 300), 5);
    expect(outcome.kind).toBe('excluded');
    expect(outcome.normBoundLog10).toBeGreaterThanOrEqual(5);
  });

  it('one inaccurate number among accurate ones sets the precision', () => {
    const numbers = randomNumbers(randomFrom('one poor'), 5, 1000);
    numbers[2] = { mid: (numbers[2] as Ball).mid >> 900n, rad: 1n, bits: 100 };
    const outcome = search(numbers);
    expect(outcome.kind).toBe('excluded');
    expect(outcome.normBoundLog10).toBeLessThan(7);
  });

  it('numbers equal to many digits but not to all are not called equal', () => {
    const [x, z] = randomNumbers(randomFrom('near'), 2, 400) as [Ball, Ball];
    const outcome = search([x, { ...x, mid: x.mid + (1n << 200n) }, { mid: z.mid >> 300n, rad: 1n, bits: 100 }]);
    expect(outcome.kind).toBe('inconclusive');
  });
});

describe.each(METHODS)('exact and dependent numbers (%s)', (method) => {
  it('exact integers always have a relation, and it is exact', () => {
    const random = randomFrom('integers');
    for (const size of [5, 60, 2000]) {
      for (const n of [2, 3, 7]) {
        const rows = Array.from({ length: n }, () => [exact(random.bits(size) + 2n)]);
        const outcome = run({ rows, method });
        expect(outcome.kind).toBe('relation');
        if (outcome.kind === 'relation') expect(mayVanish(rows, outcome.coefficients)).toBe(true);
      }
    }
  });

  it('of several relations one is returned', () => {
    const [x, y, z] = randomNumbers(randomFrom('several'), 3, 400) as [Ball, Ball, Ball];
    const of = (mid: bigint): Ball => ({ mid, rad: 12n, bits: 400 });
    const rows = [x, y, of(3n * x.mid + 5n * y.mid), z, of(7n * z.mid - 2n * x.mid)].map((b) => [b]);
    const outcome = run({ rows, method });
    expect(outcome.kind).toBe('relation');
    if (outcome.kind === 'relation') {
      expect(mayVanish(rows, outcome.coefficients)).toBe(true);
      expect(outcome.confidenceLog10).toBeGreaterThan(30);
    }
  });
});

describe.each(METHODS)('the run (%s)', (method) => {
  it('is made of short steps, reports progress that only rises, and keeps its outcome', () => {
    const { numbers } = planted(randomFrom('steps'), 30, 6, 800);
    const started = startRelation({ rows: numbers.map((x) => [x]), method });
    let outcome = started.step();
    let fraction = 0;
    while (outcome === undefined) {
      expect(started.progress.fraction).toBeGreaterThanOrEqual(fraction);
      fraction = started.progress.fraction;
      outcome = started.step();
    }
    expect(started.step()).toBe(outcome);
    expect(outcome.kind).toBe('relation');
  });

  it('gives the same outcome twice', () => {
    const rows = randomNumbers(randomFrom('twice'), 12, 500).map((x) => [x]);
    expect(run({ rows, method })).toEqual(run({ rows, method }));
  });
});
