import { describe, expect, it } from 'vitest';
import { readEntry } from '../../app/bench/reading.ts';

const read = (text: string, trustedDigits: number | null = null) => readEntry({ text, trustedDigits });
/** Deterministic digits, first one non-zero. */
const digits = (n: number) => Array.from({ length: n }, (_, k) => (k === 0 ? 7 : (k * k + 3 * k) % 10)).join('');

describe('live reading of a pasted value', () => {
  it('counts significant digits and places the point', () => {
    expect(read('-0.0012 345 678')).toMatchObject({
      kind: 'value',
      sign: '-',
      digits: '12345678',
      exponent: -3,
      written: 8,
    });
    expect(read('123.4567')).toMatchObject({ digits: '1234567', exponent: 2, trusted: 7 });
    expect(read('0.123456789(67)')).toMatchObject({ fromUncertainty: true, written: 9 });
  });

  it('is empty for blanks', () => expect(read(' \n ')).toEqual({ kind: 'empty' }));

  for (const [text, said] of [
    ['abc', /line 1, column 1/],
    ['0.5\n.5', /line 2, column 1.*second decimal point/],
    ['NaN', /not a number/],
    ['0,12345678', /comma/],
    ['0.00000000', /zero/],
    ['1.23', /too little/],
  ] as const)
    it(`says what is wrong with ${JSON.stringify(text)}`, () => {
      const reading = read(text);
      expect(reading.kind).toBe('wrong');
      if (reading.kind === 'wrong') expect(reading.sentence).toMatch(said);
    });

  it('points at the trusted digits when they are wrong', () => {
    expect(read('1.2345678', 9)).toMatchObject({ kind: 'wrong', field: 'trusted' });
    expect(read('1.2345678', 0)).toMatchObject({ kind: 'wrong', field: 'trusted' });
  });

  it('reads long values as text exactly as it reads short ones', () => {
    const long = digits(40_000);
    expect(read(`-0.00${long}`)).toMatchObject({ sign: '-', digits: long, exponent: -3, written: 40_000 });
    expect(read(`${long.slice(0, 3)}.${long.slice(3)}`, 30_000)).toMatchObject({
      digits: long,
      exponent: 2,
      trusted: 30_000,
    });
    const grouped = long.replace(/(\d{50})/g, '$1\\\n').replace(/(\d{10})/g, '$1 ');
    expect(read(`0.${grouped}`)).toMatchObject({ digits: long, exponent: -1, written: 40_000 });
  });

  it('still complains about long values, and about too long ones', () => {
    expect(read(`0.${digits(20_000)}x`)).toMatchObject({ kind: 'wrong' });
    expect(read(`0.${digits(20_000)}`, 20_001)).toMatchObject({ kind: 'wrong', field: 'trusted' });
    expect(read(digits(200_001))).toMatchObject({ kind: 'wrong', sentence: expect.stringMatching(/200000 digits/) });
  });
});
