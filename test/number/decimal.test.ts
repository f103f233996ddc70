import { Decimal as Reference } from 'decimal.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { contains } from '../../src/number/ball.ts';
import {
  canonicalText,
  digitsKnown,
  exactBall,
  formatBall,
  MOST_DIGITS,
  parseDecimal,
  toBall,
} from '../../src/number/decimal.ts';
import { InputError } from '../../src/number/errors.ts';

const seed = 20261201;

/** Digits with the ways people group them. */
const digitText = fc
  .array(
    fc.tuple(fc.constantFrom(...'0123456789'), fc.constantFrom('', '', '', ' ', '\u2009', '_', "'", '\n', ' \\\n')),
    {
      minLength: 1,
      maxLength: 60,
    },
  )
  .map((pairs) => ({
    plain: pairs.map(([d]) => d).join(''),
    typed: pairs.map(([d, gap], k) => (k === pairs.length - 1 ? d : d + gap)).join(''),
  }));

const numberText = fc
  .record({
    sign: fc.constantFrom('', '+', '-', '−'),
    whole: digitText,
    fraction: fc.option(digitText, { nil: undefined }),
    exponent: fc.option(fc.integer({ min: -300, max: 300 }), { nil: undefined }),
    mark: fc.constantFrom('e', 'E', 'd', 'D', '*10^', ' × 10^'),
    doubt: fc.option(fc.integer({ min: 1, max: 999 }), { nil: undefined }),
  })
  .map((n) => ({
    ...n,
    typed:
      n.sign +
      n.whole.typed +
      (n.fraction === undefined ? '' : `.${n.fraction.typed}`) +
      (n.doubt === undefined ? '' : `(${n.doubt})`) +
      (n.exponent === undefined ? '' : `${n.mark}${n.exponent}`),
  }));

function refusal(text: string): InputError {
  try {
    parseDecimal(text);
  } catch (caught) {
    if (caught instanceof InputError) return caught;
    throw caught;
  }
  throw new Error(`expected a refusal of ${text.slice(0, 40)}`);
}

describe('decimal text', () => {
  it('is read exactly, however it is grouped', () => {
    fc.assert(
      fc.property(numberText, (n) => {
        const read = parseDecimal(n.typed);
        const minus = n.sign === '-' || n.sign === '−';
        const digits = BigInt(n.whole.plain + (n.fraction?.plain ?? ''));
        expect(read.coefficient).toBe(minus ? -digits : digits);
        const places = n.fraction?.plain.length ?? 0;
        expect(read.exponent).toBe((n.exponent ?? 0) - places);
        if (n.doubt !== undefined) {
          expect(read.uncertainty).toEqual({ coefficient: BigInt(n.doubt), exponent: read.exponent });
        }
        const again = parseDecimal(canonicalText(read));
        expect([
          again.coefficient * 10n ** BigInt(Math.max(0, again.exponent - read.exponent)),
          again.significantDigits,
        ]).toEqual([read.coefficient * 10n ** BigInt(Math.max(0, read.exponent - again.exponent)), expect.any(Number)]);
      }),
      { numRuns: 5000, seed },
    );
  });

  it('refuses a mutated number or reads another exact number, and never answers with anything but an InputError', () => {
    const spoiled = fc.tuple(numberText, fc.nat(), fc.constantFrom(',', '.', 'x', '#', '--', 'é', '(', ')', '/', 'e'));
    fc.assert(
      fc.property(spoiled, ([n, where, what]) => {
        const at = where % (n.typed.length + 1);
        const text = n.typed.slice(0, at) + what + n.typed.slice(at);
        try {
          parseDecimal(text);
        } catch (caught) {
          expect(caught).toBeInstanceOf(InputError);
          expect((caught as InputError).at?.line).toBeGreaterThan(0);
        }
      }),
      { numRuns: 5000, seed },
    );
  });

  it.each([
    ['', 'empty'],
    ['   \n', 'empty'],
    ['abc', 'letter'],
    ['0.12x4', 'letter'],
    ['1.2.3', 'two-points'],
    ['NaN', 'not-a-number'],
    ['-nan(ind)', 'not-a-number'],
    ['inf', 'not-finite'],
    ['0,3284', 'comma'],
    ['1,234.5', 'comma'],
    ['-', 'no-digits'],
    ['1e99999999', 'exponent-too-large'],
    ['0.5(', 'bad-character'],
    ['12 / 5', 'bad-character'],
  ])('%j is refused with code %s and one sentence', (text, code) => {
    const error = refusal(text);
    expect(error.code).toBe(code);
    expect(error.message).toMatch(/^[“A-Z].*\.$/s);
  });

  it('points at line and column', () => {
    expect(refusal('0.123\n456x7').at).toMatchObject({ line: 2, column: 4, offset: 9 });
  });

  it('refuses ten million digits at once and accepts the most it promises', () => {
    const before = performance.now();
    expect(refusal('1'.repeat(10_000_000)).code).toBe('too-many-digits');
    expect(performance.now() - before).toBeLessThan(2000);
    expect(parseDecimal(`0.${'7'.repeat(MOST_DIGITS - 1)}`).significantDigits).toBe(MOST_DIGITS - 1);
  });

  it('keeps uncertainties in all notations', () => {
    expect(parseDecimal('0.12345(67)').uncertainty).toEqual({ coefficient: 67n, exponent: -5 });
    expect(parseDecimal('1.2345(6)e-3').uncertainty).toEqual({ coefficient: 6n, exponent: -7 });
    expect(parseDecimal('1.2345e-3(6)').uncertainty).toEqual({ coefficient: 6n, exponent: -7 });
    expect(parseDecimal('0.5 ± 0.01').uncertainty).toEqual({ coefficient: 1n, exponent: -2 });
    expect(parseDecimal('0.5 +/- 1e-3').uncertainty).toEqual({ coefficient: 1n, exponent: -3 });
    expect(parseDecimal('0.512(0.034)').uncertainty).toEqual({ coefficient: 34n, exponent: -3 });
  });
});

describe('balls of decimals and back', () => {
  it('contain the decimal and every number that rounds to its trusted digits', () => {
    fc.assert(
      fc.property(
        fc.bigInt(1n, 10n ** 60n),
        fc.integer({ min: -80, max: 20 }),
        fc.integer({ min: 1, max: 60 }),
        (c, e, trusted) => {
          const decimal = parseDecimal(`${c}e${e}`);
          const x = toBall(decimal, trusted);
          expect(contains(x, exactBall(decimal, x.bits + 40))).toBe(true);
          const drop = Math.max(0, decimal.significantDigits - trusted);
          const half = { coefficient: 2n * c * 10n + 10n ** BigInt(drop + 1), exponent: e - 1 };
          const edge = exactBall({ ...decimal, coefficient: half.coefficient, exponent: half.exponent }, x.bits + 200);
          expect(contains({ mid: x.mid * 2n, rad: x.rad * 2n, bits: x.bits }, edge)).toBe(true);
          expect(x.bits).toBeLessThan(Math.max(0, -(e + drop)) * 3.33 + 25);
        },
      ),
      { numRuns: 2000, seed },
    );
  });

  it('formatBall rounds correctly (property against exact rationals) or throws', () => {
    fc.assert(
      fc.property(
        fc.bigInt(1n, 1n << 300n),
        fc.integer({ min: 0, max: 400 }),
        fc.integer({ min: 1, max: 50 }),
        (mid, bits, digits) => {
          const text = formatBall({ mid, rad: 0n, bits }, digits);
          const read = parseDecimal(text);
          expect(read.significantDigits).toBeLessThanOrEqual(Math.max(digits, text.length));
          // |x − text| ≤ half a unit of the last digit kept, in exact integers.
          const lead = read.coefficient.toString().length + read.exponent;
          const place = lead - digits;
          const scale = 400n;
          const up = 10n ** scale;
          const x = mid * up;
          const t = ((read.coefficient * up * 10n ** BigInt(read.exponent + 400)) / 10n ** 400n) << BigInt(bits);
          const half = ((up * 10n ** BigInt(place + 400)) / 10n ** 400n) << BigInt(bits);
          const gap = x > t ? x - t : t - x;
          expect(2n * gap <= half + 2n).toBe(true);
        },
      ),
      { numRuns: 3000, seed },
    );
    expect(() => formatBall({ mid: 12345n, rad: 1n, bits: 0 }, 5)).toThrow('does not determine');
    expect(() => formatBall({ mid: 1n, rad: 1n, bits: 0 }, 1)).toThrow('zero');
    expect(formatBall({ mid: 12345n, rad: 1n, bits: 0 }, 3)).toBe('12300');
    expect(formatBall({ mid: 99999n, rad: 0n, bits: 0 }, 2)).toBe('100000');
    expect(formatBall({ mid: -1n, rad: 0n, bits: 40 }, 5)).toBe('-9.0949e-13');
    expect(digitsKnown({ mid: 10n ** 30n, rad: 1n, bits: 0 })).toBe(30);
  });

  it('agrees with decimal.js 10.6 on reading and on rounding half up to significant digits', () => {
    const Wide = Reference.clone({ precision: 400, rounding: Reference.ROUND_HALF_UP, toExpNeg: -1e6, toExpPos: 1e6 });
    fc.assert(
      fc.property(
        fc.bigInt(1n, 10n ** 80n),
        fc.integer({ min: -90, max: 10 }),
        fc.integer({ min: 1, max: 60 }),
        (c, e, digits) => {
          const decimal = parseDecimal(`${c}e${e}`);
          expect(new Wide(canonicalText(decimal)).eq(new Wide(`${c}e${e}`))).toBe(true);
          // 2^k scaling keeps the binary ball exact, so that the two programs round the same number.
          const ball = { mid: c, rad: 0n, bits: 64 };
          const exact = new Wide(c.toString()).div(new Wide(2).pow(64));
          expect(new Wide(formatBall(ball, digits)).eq(exact.toSignificantDigits(digits))).toBe(true);
        },
      ),
      { numRuns: 2000, seed },
    );
  });
});
