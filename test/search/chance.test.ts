/** Random values must never be recognised, planted relations always. Seeded stream of cryptographic quality. */
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { evaluateTerm } from '../../src/constants/evaluate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { add, type Ball, fromInteger, overInteger, timesInteger } from '../../src/number/ball.ts';
import { formatMidpoint } from '../../src/number/decimal.ts';
import { runSearch } from '../../src/search/run.ts';
import { randomFrom } from '../support/random.ts';

const basis = ['1', 'pi^2', 'zeta(3)', 'pi^2*log(2)', 'Li(4,1/2)', 'log(2)^4', 'catalan', 'zeta(5)'];
const digits = 60;
const cache = new ConstantCache();
const constants = basis.map((text) => evaluateTerm(parseTerm(text), 400, { cache }) as Ball);

describe('chance', () => {
  it('500 values of random digits against 8 constants at 60 digits: none holds, none is tentative', async () => {
    const random = randomFrom('digits without meaning');
    for (let k = 0; k < 500; k++) {
      const value = `0.${random
        .below(10n ** BigInt(digits))
        .toString()
        .padStart(digits, '0')
        .replace(/^0/, '1')}`;
      const record = await runSearch({ value, basis }, { cache });
      expect(['holds', 'tentative'], value).not.toContain(record.verdict);
      expect(record.outcome === 'excluded' || record.outcome === 'inconclusive' || record.verdict === 'spurious').toBe(
        true,
      );
    }
  }, 240_000);

  it('200 planted relations, numerators and common denominator up to 10^3, at 60 digits: all found and hold', async () => {
    const random = randomFrom('planted relations');
    for (let k = 0; k < 200; k++) {
      const denominator = BigInt(random.integer(1, 1000));
      const numerators = basis.map(() => BigInt(random.integer(-1000, 1000)));
      let sum: Ball = fromInteger(0n);
      numerators.forEach((n, i) => {
        sum = add(sum, timesInteger(constants[i] as Ball, n));
      });
      const value = formatMidpoint(overInteger(sum, denominator), digits);
      const record = await runSearch({ value, basis }, { cache });
      const found = record.relation.map((r) => r.coefficient.split('/').map(BigInt)) as [bigint, bigint?][];
      for (const [i, [p, q = 1n]] of found.entries()) {
        expect(p * denominator, value).toBe((numerators[i] as bigint) * q);
      }
      expect(record.verdict, value).toBe('holds');
    }
  }, 240_000);
});
