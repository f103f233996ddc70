/** What comes after a search: advice computed from its numbers, and comparison with earlier values. */
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { whatNext } from '../../src/search/advice.ts';
import { consult } from '../../src/search/ledger.ts';
import { largestBasis } from '../../src/search/plan-cost.ts';
import { rescueDigits } from '../../src/search/rescue.ts';
import { runSearch } from '../../src/search/run.ts';
import { evaluateToDigits } from '../../src/worker/tasks.ts';
import { randomFrom } from '../support/random.ts';

const cache = new ConstantCache();
const digitsOf = (text: string, digits: number): string => evaluateToDigits(text, digits, { cache }).digits;

describe('advice', () => {
  it('following it finds the relation: the number of digits that it names suffices', async () => {
    const text = '3*zeta(3)/2-7*pi^2*log(2)/4+log(2)^3/8';
    const basis = { space: 'alternating', weight: 5, lower: true };
    const short = await runSearch({ value: digitsOf(text, 30), basis }, { cache });
    expect(short.verdict).not.toBe('holds');
    const advice = whatNext(short);
    const more = advice.find((a) => a.kind === 'more-digits');
    expect(advice[0]).toBe(more);
    const digits = more?.kind === 'more-digits' ? more.digits : 0;
    const long = await runSearch({ value: digitsOf(text, digits), basis }, { cache });
    expect([digits > 30, long.verdict]).toEqual([true, 'holds']);
    expect(whatNext(long)).toEqual([]);
    expect(advice.find((a) => a.kind === 'smaller-basis')).toMatchObject({ constants: largestBasis(30, 2) });
  });

  it('names spaces that were not tried, fit the digits, and hold the value', async () => {
    const value = digitsOf('5*pi^2*log(2)-zeta(3)/3+2', 80);
    const basis = ['1', 'pi^2', 'zeta(3)'];
    const record = await runSearch({ value, basis }, { cache });
    expect(record.outcome).toBe('excluded');
    const offers = whatNext(record, [{ space: 'mzv', weight: 3, lower: true }]).flatMap((a) =>
      a.kind === 'space' ? [a.basis] : [],
    );
    expect(offers.length).toBeGreaterThan(0);
    expect(offers.some((b) => b.space === 'mzv' && b.weight === 3)).toBe(false);
    const found = await Promise.all(offers.map((offer) => runSearch({ value, basis: offer }, { cache })));
    expect(found.map((r) => r.verdict)).toContain('holds');
  });

  it('of a dependent basis: every constant that can go', async () => {
    const record = await runSearch({ value: digitsOf('e', 50), basis: ['zeta(2)', 'e', 'pi^2'] }, { cache });
    expect(whatNext(record).flatMap((a) => (a.kind === 'drop-constant' ? [a.constant] : []))).toEqual([
      'zeta(2)',
      'pi^2',
    ]);
  });
});

describe('the ledger', () => {
  const known = digitsOf('zeta(5)-2*catalan*log(2)', 60);
  const entries = [
    { name: 'a master integral', value: { value: known } },
    { name: 'an earlier finding', value: { expression: 'Cl(2,pi/3)*sqrt(3)' } },
    { name: 'a complex one', value: { value: { re: known, im: known } } },
    { name: 'unreadable', value: { value: 'abc' } },
  ];

  it('recognises a rational multiple, of a value and of an expression', async () => {
    const value = digitsOf('-7/12*(zeta(5)-2*catalan*log(2))', 55);
    const [hit, ...others] = await consult({ value }, entries, { cache });
    expect(hit).toMatchObject({ name: 'a master integral', factor: '-7/12', extra: null });
    expect(others).toEqual([]);
    const multiple = digitsOf('3/4*Cl(2,pi/3)*sqrt(3)', 50);
    expect(await consult({ value: multiple }, entries, { cache })).toMatchObject([
      { name: 'an earlier finding', factor: '3/4' },
    ]);
  });

  it('recognises a multiple and one constant more', async () => {
    const value = digitsOf('5*(zeta(5)-2*catalan*log(2))+11*pi^2/6', 60);
    expect(await consult({ value }, entries, { cache })).toMatchObject([
      { name: 'a master integral', factor: '5', extra: { constant: 'pi^2', share: '11/6' } },
    ]);
  });

  it('random digits match nothing', async () => {
    const random = randomFrom('ledger');
    for (let k = 0; k < 50; k++) {
      const value = `0.${10n ** 29n + random.below(9n * 10n ** 29n)}`;
      expect(await consult({ value }, entries, { cache })).toEqual([]);
    }
  });
});

describe('wrong tails', () => {
  it('repetitions come close to each other, and end at 20 digits', () => {
    const tried = rescueDigits(100, 5);
    expect(tried[0]).toBe(92);
    expect(tried.at(-1)).toBeGreaterThanOrEqual(20);
    expect(rescueDigits(5000, 40).length).toBeLessThan(12);
  });

  it.each([45, 62, 77, 95, 110])('wrong from digit %i of 120: recognised and named', async (position) => {
    const good = digitsOf('17/3-5*pi^2/7+11*zeta(3)', 120);
    const at = good.length - 121 + position;
    const bad = `${good.slice(0, at)}${[...good.slice(at)].map((d) => (Number(d) + 5) % 10).join('')}`;
    const record = await runSearch({ value: bad, basis: ['1', 'pi^2', 'zeta(3)', 'catalan'] }, { cache });
    expect(record.relation.map((r) => r.coefficient)).toEqual(['17/3', '-5/7', '11', '0']);
    expect(record.verdict).toBe('holds');
    const named = Number(/from (\d+) on look wrong/.exec(record.diagnosis.join(' '))?.[1]);
    expect(Math.abs(named - position)).toBeLessThanOrEqual(2);
  });

  it('a relation of few surplus digits keeps its verdict among few searches and loses it among many', async () => {
    const value = digitsOf('3*zeta(3)/2+pi^2/7', 24);
    const basis = ['pi^2', 'zeta(3)'];
    const alone = await runSearch({ value, basis }, { cache });
    const among = await runSearch({ value, basis, amongSearches: 1_000_000_000 }, { cache });
    expect([alone.verdict, among.verdict]).toEqual(['holds', 'tentative']);
    const error = await runSearch({ value, basis, amongSearches: 0 }, { cache }).catch((e: unknown) => e);
    expect(error).toMatchObject({ code: 'bad-count' });
  });
});
