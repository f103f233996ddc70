// Every constant of test/reference/constants.json, which two independent programs computed and agree on (sources beside each
// entry there), must come out correctly rounded to all of its 1,000 digits.
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { evaluateMany, evaluateTerm, isRealTerm, weightOf } from '../../src/constants/evaluate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { isComplex, type Value } from '../../src/number/complex.ts';
import { absolute } from '../../src/number/integer.ts';

interface Entry {
  readonly id: string;
  readonly weight: number | null;
  readonly digits: string;
}

const file = JSON.parse(readFileSync(new URL('../reference/constants.json', import.meta.url), 'utf8')) as {
  constants: Entry[];
};

/** The reference writes the central binomial sums out; they are typed as binsum(s). */
function typed(id: string): string {
  return id.replace(/^sum 1\/\(n\^(\d+) binomial\(2n,n\)\)$/, 'binsum($1)');
}

const BITS = 3360;

/** Whether every point of the ball rounds to the reference's digits (half a unit of its last place either way). */
function roundsTo(value: Value, digits: string): boolean {
  if (isComplex(value)) return false;
  const [whole = '', fraction = ''] = digits.replace('-', '').split('.');
  const size = BigInt(whole + fraction) * (digits.startsWith('-') ? -1n : 1n);
  const scale = 10n ** BigInt(fraction.length);
  const distance = absolute(2n * (value.mid * scale - (size << BigInt(value.bits)))) + 2n * value.rad * scale;
  return distance <= 1n << BigInt(value.bits);
}

describe('reference digits', () => {
  const terms = file.constants.map((entry) => parseTerm(typed(entry.id)));

  it('holds 167 constants with 1,000 digits each', () => {
    expect(file.constants.length).toBe(167);
    for (const { digits } of file.constants)
      expect(digits.replace(/^-?0?\.?0*/, '').replace('.', '').length).toBe(1000);
  });

  it('are met by the constants computed together', { timeout: 60_000 }, () => {
    const values = evaluateMany(terms, BITS, { cache: new ConstantCache() });
    const wrong = file.constants.filter((entry, j) => !roundsTo(values[j] as Value, entry.digits)).map((e) => e.id);
    expect(wrong).toEqual([]);
  });

  it('are met one by one, with a cache that knows nothing', { timeout: 60_000 }, () => {
    // The sums have their own tests; here every third of the others.
    const some = file.constants.filter((e, j) => j % 3 === 0 && !/^(zeta\(.*,|re|im|sum)/.test(e.id));
    const wrong = some.filter((e) => !roundsTo(evaluateTerm(parseTerm(typed(e.id)), BITS), e.digits)).map((e) => e.id);
    expect(wrong).toEqual([]);
  });

  it('have the weight of the reference and are known to be real', () => {
    file.constants.forEach((entry, j) => {
      const term = terms[j] as (typeof terms)[number];
      expect(isRealTerm(term), entry.id).toBe(true);
      if (entry.weight !== null && weightOf(term) !== null) expect(weightOf(term), entry.id).toBe(entry.weight);
    });
  });
});
