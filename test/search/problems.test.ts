/** The published problems of test/reference/problems-open.json, from digits to verdict; sources stand in that file. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { checkRecord } from '../../src/search/check.ts';
import { runSearch } from '../../src/search/run.ts';

interface Problem {
  readonly id: string;
  readonly value?: string;
  readonly form: string;
  readonly basis?: readonly string[];
  readonly relation: Readonly<Record<string, string>>;
  readonly source: string;
}

const { problems } = JSON.parse(readFileSync('test/reference/problems-open.json', 'utf8')) as { problems: Problem[] };
const linear = problems.filter((p) => p.form === 'linear');
const cache = new ConstantCache();

describe('published relations are found from their digits', () => {
  it.each(linear.map((p) => [p.id, p] as const))('%s', async (_, problem) => {
    const basis = problem.basis as readonly string[];
    const record = await runSearch({ value: problem.value as string, basis }, { cache });
    expect(record.outcome).toBe('relation');
    const found = Object.fromEntries(
      record.relation.map((r, k) => [basis[k] as string, r.coefficient]).filter(([, c]) => c !== '0'),
    );
    expect(found).toEqual(problem.relation);
    expect(record.verdict).toBe('holds');
    expect(record.heldOut?.predicted).toBe((record.evidence?.digits.trusted ?? 0) - (record.heldOut?.used ?? 0));
  });

  it('the three-loop one also by the lattice method', async () => {
    const problem = linear.find((p) => p.id === 'qed-three-loop') as Problem;
    const record = await runSearch(
      { value: problem.value as string, basis: problem.basis as string[], method: 'lattice' },
      { cache },
    );
    expect([record.verdict, record.engine.method]).toEqual(['holds', 'lattice']);
  });
});

describe('honest negatives', () => {
  const basis = ['1', 'pi^2', 'zeta(3)', 'pi^2*log(2)'];

  it('a value outside the basis is excluded with a bound that the digits support', async () => {
    const zeta5 =
      '1.036927755143369926331365486457034168057080919501912811974192677903803589786281484560043106557133336379620341466556609042801';
    const record = await runSearch({ value: zeta5, basis }, { cache });
    expect([record.outcome, record.verdict]).toEqual(['excluded', 'excluded']);
    // Five numbers and 118 digits: a shortest vector has about 10^(118/5) = 10^23.6.
    expect(Number(record.normBound)).toBeGreaterThan(1e20);
    expect(Number(record.normBound)).toBeLessThan(1e25);
  });

  it('maxNorm ends the search early with a bound at least that large', async () => {
    const record = await runSearch(
      { value: '1.0369277551433699263313654864570341680570809195019', basis, maxNorm: '1e5' },
      { cache },
    );
    expect(record.outcome).toBe('excluded');
    expect(Number(record.normBound)).toBeGreaterThanOrEqual(1e5);
  });

  it('too few digits for the basis end inconclusive or excluded at a small bound, never with a relation that holds', async () => {
    const many = [
      '1',
      'pi',
      'pi^2',
      'pi^3',
      'log(2)',
      'log(3)',
      'zeta(3)',
      'catalan',
      'sqrt(2)',
      'sqrt(3)',
      'Li(4,1/2)',
    ];
    const record = await runSearch({ value: '0.7391823', basis: many }, { cache });
    expect(record.outcome).not.toBe('relation');
    expect(record.diagnosis.join(' ')).toMatch(/digits/);
  });

  it('a dependent basis is named and does not involve the value', async () => {
    const value = '0.82736451928374650912837465091283746509128374650981723645098172364509817236450918';
    const record = await runSearch({ value, basis: ['zeta(2)', 'pi^2', 'zeta(3)'] }, { cache });
    expect(record.outcome).toBe('basis-dependent');
    expect(record.relation.map((r) => r.coefficient)).toEqual(['6', '-1', '0']);
    expect(record.diagnosis[0]).toContain('zeta(2), pi^2');
  });

  it('a dependent basis is named even when the value takes part in what is found', async () => {
    const { value } = linear.find((p) => p.id === 'euler-sum-quadratic') as Problem;
    const record = await runSearch({ value: value as string, basis: ['pi^4', 'zeta(4)', 'zeta(3)'] }, { cache });
    expect(record.outcome).toBe('basis-dependent');
    expect(record.relation.map((r) => r.coefficient)).toEqual(['1', '-90', '0']);
  });

  it('a wrong tail is named and the relation still found', async () => {
    const good = (linear.find((p) => p.id === 'qed-two-loop') as Problem).value as string;
    const spoiled = `${good.slice(0, 92)}${good
      .slice(92, 122)
      .split('')
      .map((d) => (9 - Number(d)).toString())
      .join('')}`;
    const record = await runSearch({ value: spoiled, basis }, { cache });
    expect([record.outcome, record.verdict]).toEqual(['relation', 'holds']);
    // The sign, "0." and 89 digits are right; the 90th significant digit is the first changed one.
    expect(record.diagnosis[0]).toMatch(/from (89|90|91) on look wrong/);
  });
});

describe('bad input is one plain sentence', () => {
  const basis = ['1', 'pi'];
  it.each<[string, object, string]>([
    ['nothing', { value: '', basis }, 'empty'],
    ['letters', { value: 'abc', basis }, 'letter'],
    ['two points', { value: '1.2.3', basis }, 'two-points'],
    ['NaN', { value: 'NaN', basis }, 'not-a-number'],
    ['ten million digits', { value: '7'.repeat(10_000_000), basis }, 'too-many-digits'],
    ['zero', { value: '0.0000', basis }, 'zero-value'],
    ['an unknown constant', { value: '1.2345678901', basis: ['1', 'zetta(3)'] }, 'unknown-constant'],
    ['no basis', { value: '1.2345678901', basis: [] }, 'empty-basis'],
    ['a constant twice', { value: '1.2345678901', basis: ['pi', ' pi'] }, 'named-twice'],
    ['more trusted digits than there are', { value: '1.2345678901', basis, trustedDigits: 50 }, 'bad-trusted-digits'],
    ['two digits', { value: '1.2', basis }, 'too-few-digits'],
    ['an unknown space', { value: '1.2345678901', basis: { space: 'nowhere', weight: 3 } }, 'unknown-space'],
    ['a zero divisor', { value: '1.2345678901', basis, divideBy: 'pi-pi' }, 'zero-divisor'],
  ])('%s', async (_, request, code) => {
    const error = await runSearch(request as never, { cache }).catch((e: unknown) => e);
    expect(error).toMatchObject({ name: 'InputError', code });
    expect((error as Error).message).toMatch(/^.{5,300}[.?]$/s);
  });
});

describe('records', () => {
  const request = {
    value: '-0.3284789655791937845821728169648923924111192986796278218945',
    basis: ['1', 'pi^2', 'zeta(3)', 'pi^2*log(2)'],
  };

  it('check passes, and fails for a record altered by one digit anywhere', async () => {
    const record = JSON.parse(JSON.stringify(await runSearch(request, { cache })));
    expect((await checkRecord(record, { cache })).ok).toBe(true);
    const alter = (change: (copy: typeof record) => void): unknown => {
      const copy = structuredClone(record);
      change(copy);
      return copy;
    };
    const altered = [
      alter((r) => (r.relation[0].coefficient = '198/144')),
      alter((r) => (r.integers[1] = `${BigInt(r.integers[1]) + 1n}`)),
      alter((r) => (r.agreementDigits += 1)),
      alter((r) => (r.verdict = 'tentative')),
      alter((r) => (r.expression.text = r.expression.text.replace('197', '196'))),
      alter((r) => (r.request.value = r.request.value.replace('96489', '96488'))),
      alter((r) => (r.evidence.surplusDigits += 0.5)),
    ];
    for (const bad of altered) expect((await checkRecord(bad, { cache })).ok).toBe(false);
  });

  it('what is not a record is refused', async () => {
    for (const bad of [null, [], {}, { format: 'digit-assay/record', version: 2 }]) {
      await expect(checkRecord(bad)).rejects.toMatchObject({ code: 'not-a-record' });
    }
  });

  it('a cancelled search rejects with the reason of the signal', async () => {
    const controller = new AbortController();
    controller.abort(new Error('stop'));
    await expect(runSearch(request, { signal: controller.signal })).rejects.toThrow('stop');
  });
});
