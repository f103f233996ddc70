import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Term } from '../../src/constants/term.ts';
import { termText } from '../../src/constants/term-text.ts';
import { makePower, makeProduct, makeSum, parseTerm } from '../../src/expression/parse.ts';
import { InputError } from '../../src/number/errors.ts';

const leaf: fc.Arbitrary<Term> = fc.oneof(
  fc
    .tuple(fc.bigInt(-50n, 50n), fc.bigInt(1n, 9n))
    .map(([p, q]) =>
      makeProduct([
        { kind: 'rational', p, q: 1n },
        makePower({ kind: 'rational', p: q, q: 1n }, { kind: 'rational', p: -1n, q: 1n }),
      ]),
    ),
  fc.constantFrom('pi', 'catalan', 'ep').map((name): Term => ({ kind: 'symbol', name })),
);
const { term: anyTerm } = fc.letrec<{ term: Term }>((tie) => ({
  term: fc.oneof(
    { depthSize: 'small' },
    leaf,
    fc.array(tie('term'), { minLength: 2, maxLength: 3 }).map(makeSum),
    fc.array(tie('term'), { minLength: 2, maxLength: 3 }).map(makeProduct),
    fc
      .tuple(tie('term'), fc.constantFrom(-2n, -1n, 2n, 3n))
      .filter(([base]) => base.kind !== 'rational' || base.p !== 0n)
      .map(([base, p]) => makePower(base, { kind: 'rational', p, q: 1n })),
    fc
      .tuple(
        fc.constantFrom('zeta', 'H', 'MPL'),
        fc.array(fc.array(tie('term'), { minLength: 1, maxLength: 3 }), { minLength: 1, maxLength: 2 }),
      )
      .map(([name, groups]): Term => ({ kind: 'call', name, groups })),
  ),
}));

function refusal(typed: string): InputError {
  try {
    parseTerm(typed);
  } catch (caught) {
    if (caught instanceof InputError) return caught;
    throw caught;
  }
  throw new Error('expected a refusal');
}

describe('typed expressions', () => {
  it('print and parse back to the same term', () => {
    fc.assert(
      fc.property(anyTerm, (term) => {
        expect(parseTerm(termText(term))).toEqual(term);
      }),
      { numRuns: 3000, seed: 20261201 },
    );
  });

  it('reads every typed name of the reference tables', () => {
    const { constants } = JSON.parse(readFileSync('test/reference/constants.json', 'utf8')) as {
      constants: { id: string }[];
    };
    for (const { id } of constants.filter((c) => !c.id.startsWith('sum '))) {
      expect(parseTerm(termText(parseTerm(id))), id).toEqual(parseTerm(id));
    }
  });

  it.each([
    ['2^3^2', '512'],
    ['-2^2', '-4'],
    ['2/3/4', '1/6'],
    ['0.125', '1/8'],
    ['1.5e-3', '3/2000'],
    ['π²'.replace('²', '^2'), 'pi^2'],
    ['2·ζ(3) − 1', '2*zeta(3) - 1'],
    ['zeta(-5, -1)', 'zeta(-5,-1)'],
    ['MPL(2,1;r6,1)', 'MPL(2,1;r6,1)'],
    ['pi^2*log(2)/2', 'pi^2*log(2)/2'],
  ])('%s means %s', (typed, canonical) => {
    expect(termText(parseTerm(typed))).toBe(canonical);
  });

  it.each([
    ['', 'empty', 1],
    ['2*', 'unexpected', 3],
    ['(1+2', 'open-bracket', 1],
    ['1+2)', 'unmatched-bracket', 4],
    ['2 pi', 'unexpected', 3],
    ['zeta(3', 'open-bracket', 5],
    ['1/0', 'division-by-zero', 3],
    ['zeta(3) & 1', 'bad-character', 9],
    ['0^(-1)', 'division-by-zero', 1],
    ['2^9999999', 'too-large', 1],
  ])('refuses “%s” with code %s at column %s', (typed, code, column) => {
    const error = refusal(typed);
    expect(error.code).toBe(code);
    expect(error.at?.column).toBe(column);
  });

  it('refuses what is too deep or too long at once', () => {
    expect(refusal('('.repeat(90_000)).code).toBe('too-deep');
    expect(refusal('-'.repeat(90_000)).code).toBe('unexpected');
    expect(refusal('1'.repeat(1_000_000)).code).toBe('too-long');
  });
});
