import { describe, expect, it } from 'vitest';
import { importInChunks, importText } from '../../src/intake/import.ts';
import { compareEvaluations, guessTrust } from '../../src/intake/trust.ts';
import { parseDecimal } from '../../src/number/decimal.ts';
import { spoiltTexts, validTexts } from './properties.ts';

describe('importText', () => {
  it('reads generated texts to the exact digits', () => validTexts(2000, 11));
  it('refuses spoilt texts with line and column', () => spoiltTexts(1000, 12));

  it('reads CSV with a header, TSV, and a running number', () => {
    const lines = importText('name,value\nF1,1.25e-3\nF2\t-0.333333\n7 0.125001\n');
    expect(lines.map((l) => [l.line, l.label, l.kind === 'real' ? l.value : l.kind])).toEqual([
      [2, 'F1', '0.00125'],
      [3, 'F2', '-0.333333'],
      [4, '7', '0.125001'],
    ]);
  });

  it('reads JSON without losing digits', () => {
    const text = '[{"label":"a","value":0.1234567890123456789012345},\n{"label":"b","value":{"re":"1.5","im":-2.25}}]';
    const lines = importText(text);
    expect(lines).toMatchObject([
      { label: 'a', kind: 'real', value: '0.1234567890123456789012345', line: 1 },
      { label: 'b', kind: 'complex', value: { re: '1.5', im: '-2.25' }, line: 2 },
    ]);
    expect(() => importText('[1.5, ')).toThrow(/line 1, column/);
  });

  it('joins wrapped digits and keeps later lines apart', () => {
    const lines = importText('3.14159265358979323846264338327\n95028841971693993751058209749\n2.5\n');
    expect(lines).toMatchObject([
      { line: 1, value: '3.1415926535897932384626433832795028841971693993751058209749' },
      { line: 3, value: '2.5' },
    ]);
  });

  it.each([
    ['0,12345', 1, 'comma'],
    ['1.5\nNaN', 2, 'NaN'],
    ['1.5\n2.5\nfoo', 3, 'letter'],
    ['1.2.3', 1, 'second decimal point'],
    ['a = 1.5\nb = 1.5 1.5 1.5', 2, 'second decimal point'],
  ])('refuses %j', (text, line, message) => {
    const bad = importText(text).find((l) => l.kind === 'refused');
    expect(bad?.kind === 'refused' && bad.reason).toContain(message);
    expect(bad?.line).toBe(line);
  });

  it('10,000 lines and a number of 100,000 digits take under a second', () => {
    const many = Array.from({ length: 10_000 }, (_, k) => `F${k} = 0.${`${k}`.padStart(6, '1').repeat(10)}3`).join(
      '\n',
    );
    const long = `3.${'1415926535'.repeat(10_000)}`;
    for (const [text, count] of [
      [many, 10_000],
      [long, 1],
    ] as const) {
      const start = performance.now();
      const lines = [...importInChunks(text)].flat();
      expect(lines.filter((l) => l.kind === 'real')).toHaveLength(count);
      expect(performance.now() - start).toBeLessThan(1000);
    }
  });
});

describe('guessTrust', () => {
  it.each([
    // 0.1 as a double and as a float, written out in full (exact binary values, from memory)
    ['0.1000000000000000055511151231257827021181583404541015625', 15, 'float'],
    ['0.100000001490116119384765625', 6, 'float'],
    ['0.333333333333333333333333330000000000', 26, 'zeros'],
    ['0.123456789(12)', 7, 'uncertainty'],
    ['0.12345678901234567890', 19, 'written'],
    ['3.14159265358979323846264338327950288', 36, 'written'],
  ])('%s', (text, digits, reason) => {
    const guess = guessTrust(parseDecimal(text));
    expect(guess.reason).toBe(reason);
    if (reason !== 'written') expect(guess.digits).toBe(digits);
  });
});

describe('compareEvaluations', () => {
  it('says where two evaluations part', () => {
    const of = (a: string, b: string) => compareEvaluations(parseDecimal(a), parseDecimal(b));
    expect(of('1.23456789', '1.23456712')).toMatchObject({ same: false, digits: 7, partsAt: 8 });
    expect(of('1.2345', '1.23451234')).toMatchObject({ same: true, digits: 5 });
    expect(of('0.99999999', '1.00000000')).toMatchObject({ same: true });
    expect(of('5.1', '-5.1')).toMatchObject({ digits: 0, same: false });
  });
});
