/** Complex values, products and minimal polynomials through the whole search. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { evaluateTerm } from '../../src/constants/evaluate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import type { Ball } from '../../src/number/ball.ts';
import { formatMidpoint } from '../../src/number/decimal.ts';
import { checkRecord } from '../../src/search/check.ts';
import { runSearch } from '../../src/search/run.ts';

const { problems } = JSON.parse(readFileSync('test/reference/problems-open.json', 'utf8')) as {
  problems: { id: string; value: string; basis: string[]; relation: Record<string, string> }[];
};
const problem = (id: string) => problems.find((p) => p.id === id) as (typeof problems)[number];
const cache = new ConstantCache();
const digitsOf = (text: string, digits: number): string =>
  formatMidpoint(evaluateTerm(parseTerm(text), 4 * digits + 40, { cache }) as Ball, digits);

describe('multiplicative', () => {
  it('Watson’s lattice integral as a product of gamma values (Glasser and Zucker 1977)', async () => {
    const { value, basis, relation } = problem('watson-simple-cubic');
    const record = await runSearch({ value, basis, form: 'multiplicative' }, { cache });
    expect(record.verdict).toBe('holds');
    expect(Object.fromEntries(record.relation.map((r) => [r.constant, r.coefficient]))).toEqual(relation);
    const back = evaluateTerm(parseTerm(record.expression?.text ?? ''), 1000, { cache }) as Ball;
    expect(formatMidpoint(back, 250)).toBe(formatMidpoint(evaluateTerm(parseTerm(value), 1000) as Ball, 250));
    expect((await checkRecord(JSON.parse(JSON.stringify(record)), { cache })).ok).toBe(true);
  });

  it('a negative value keeps its sign; a random one is excluded; dependent bases are named', async () => {
    const value = digitsOf('-2*sqrt(3)*pi^(2/3)', 80);
    const record = await runSearch({ value, basis: ['2', '3', 'pi'], form: 'multiplicative' }, { cache });
    expect([record.verdict, record.relation.map((r) => r.coefficient)]).toEqual(['holds', ['1', '1/2', '2/3']]);
    expect(record.expression?.text).toMatch(/^-2\*/);
    const zeta = digitsOf('zeta(3)', 80);
    expect((await runSearch({ value: zeta, basis: ['2', '3', 'pi'], form: 'multiplicative' }, { cache })).outcome).toBe(
      'excluded',
    );
    const twice = await runSearch({ value, basis: ['2', '4', 'pi', '3'], form: 'multiplicative' }, { cache });
    expect(twice.outcome).toBe('basis-dependent');
  });

  it('refuses bases that are not positive or are 1', async () => {
    for (const [base, code] of [
      ['-2', 'not-positive'],
      ['1', 'one-as-base'],
      ['log(1/2)', 'not-positive'],
    ] as const) {
      const request = { value: '1.2345678901', basis: ['pi', base], form: 'multiplicative' as const };
      await expect(runSearch(request, { cache })).rejects.toMatchObject({ code });
    }
  });
});

describe('algebraic', () => {
  it('2^(1/6) + 3^(1/5) has degree 30, from 200 and from 250 digits', async () => {
    const { value } = problem('degree-30-algebraic');
    for (const trustedDigits of [200, 250]) {
      const record = await runSearch({ value, trustedDigits, form: 'algebraic', degree: 30 });
      expect(record.verdict).toBe('holds');
      // Monic of degree 30 (PARI/GP manual), and the number itself, computed apart to 1,200 digits, is a root.
      expect(record.integers.at(-1)).toBe('1');
      const p = record.integers.map(BigInt);
      const x = evaluateTerm(parseTerm('2^(1/6)+3^(1/5)'), 4000) as Ball;
      let sum = 0n;
      for (const c of [...p].reverse()) sum = (sum * x.mid) / (1n << BigInt(x.bits)) + (c << BigInt(x.bits));
      expect(sum < 1n << BigInt(x.bits - 3500) && sum > -(1n << BigInt(x.bits - 3500))).toBe(true);
    }
  });

  it('the golden ratio, a rational, and a transcendental number', async () => {
    const phi = await runSearch({ value: digitsOf('(1+sqrt(5))/2', 60), form: 'algebraic', degree: 4 });
    expect(phi.integers.slice(0, 3)).toEqual(['-1', '-1', '1']);
    expect(phi.expression?.text).toBe('root of x^2 - x - 1 near 1.6180340');
    expect(phi.diagnosis.join(' ')).toContain('real root 2 of 2');
    expect((await runSearch({ value: digitsOf('22/7', 40), form: 'algebraic', degree: 3 })).expression?.text).toBe(
      '22/7',
    );
    const pi = await runSearch({ value: digitsOf('pi', 60), form: 'algebraic', degree: 4 });
    expect(pi.outcome).toBe('excluded');
  });

  it('a complex root', async () => {
    const re = digitsOf('re((1+i*sqrt(2))^(1/2))', 70);
    const im = digitsOf('im((1+i*sqrt(2))^(1/2))', 70);
    const record = await runSearch({ value: { re, im }, form: 'algebraic', degree: 4 });
    // x² = 1 + i√2, so (x² − 1)² = −2: x⁴ − 2x² + 3.
    expect([record.verdict, record.integers]).toEqual(['holds', ['3', '0', '-2', '0', '1']]);
  });

  it('needs a degree', async () => {
    await expect(runSearch({ value: '1.41421356', form: 'algebraic' })).rejects.toMatchObject({ code: 'bad-degree' });
  });
});

describe('complex values', () => {
  it('one vector of rationals for real and imaginary part together', async () => {
    const re = digitsOf('3*zeta(3)/4 - pi^2*log(2)/5', 70);
    const im = digitsOf('7*catalan/3 - pi^3/8', 70);
    const basis = ['zeta(3)', 'pi^2*log(2)', 'i*catalan', 'i*pi^3'];
    const record = await runSearch({ value: { re, im }, basis }, { cache });
    expect([record.verdict, record.relation.map((r) => r.coefficient)]).toEqual([
      'holds',
      ['3/4', '-1/5', '7/3', '-1/8'],
    ]);
  });

  it('a complex constant against a real value is refused with advice', async () => {
    await expect(runSearch({ value: '1.2345678', basis: ['Li(2,i)'] }, { cache })).rejects.toMatchObject({
      code: 'complex-constant',
    });
  });
});
