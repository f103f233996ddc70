/** Decimal text as people and programs print it, read exactly; and numbers back to text, rounded correctly. */
import type { Ball } from './ball.ts';
import { InputError, PrecisionError, spotIn } from './errors.ts';
import { absolute, bitLength, log10Of } from './integer.ts';

/** An exact decimal coefficient·10^exponent, as it was written. */
export interface Decimal {
  readonly coefficient: bigint;
  readonly exponent: number;
  /** Significant digits as given: from the first non-zero digit to the last digit written. */
  readonly significantDigits: number;
  /** Stated uncertainty, coefficient·10^exponent; undefined where none was given. */
  readonly uncertainty: { readonly coefficient: bigint; readonly exponent: number } | undefined;
}

/** More digits than this are refused at once: far beyond any calculation, and a page must not freeze over a wrong file. */
export const MOST_DIGITS = 200_000;
const LARGEST_EXPONENT = 1_000_000;

/** Spaces (plain, no-break, thin, figure, line breaks), underscores and apostrophes only group digits. */
const GROUPING = /[\s\u00a0\u2000-\u200b\u202f\u2060\ufeff_'’]/;
const MINUS = /[-−–‐‑]/;

/**
 * Reads one real number. Accepts signs, a decimal point, exponents (`e`, `E`, `d`, `D`, `*10^`), digit grouping (see
 * GROUPING; a backslash at a line end too) and uncertainties `0.12345(67)` and `0.12345 ± 0.00067` (`+/-`, `+-`).
 *
 * Throws InputError with line and column for anything else.
 */
export function parseDecimal(text: string): Decimal {
  return new Reader(text).read();
}

type Part = { coefficient: bigint; exponent: number; significantDigits: number };

class Reader {
  private readonly text: string;
  private at = 0;

  constructor(text: string) {
    this.text = text;
    if (text.length > 4 * MOST_DIGITS) this.tooMany();
  }

  read(): Decimal {
    this.skip();
    if (this.at === this.text.length)
      throw new InputError('empty', 'There is no number here yet: paste or type its digits.', spotIn(this.text, 0, 0));
    const part = this.signed();
    const brief = this.bracketed(part.exponent);
    const scale = this.exponent();
    const late = brief ?? this.bracketed(part.exponent);
    const uncertainty = late ?? this.plusMinus();
    this.skip();
    if (this.at < this.text.length) this.complain();
    const shifted = (u: { coefficient: bigint; exponent: number }, by: number) => ({
      coefficient: u.coefficient,
      exponent: u.exponent + by,
    });
    return {
      coefficient: part.coefficient,
      exponent: part.exponent + scale,
      significantDigits: part.significantDigits,
      uncertainty: uncertainty === undefined ? undefined : shifted(uncertainty, late === undefined ? 0 : scale),
    };
  }

  /** Passes over grouping characters, and over a backslash that ends a line. */
  private skip(): void {
    for (;;) {
      const char = this.text[this.at];
      if (char === undefined) return;
      if (
        !GROUPING.test(char) &&
        !(char === '\\' && /^[ \t]*(?:\r|\n)/.test(this.text.slice(this.at + 1, this.at + 20)))
      )
        return;
      this.at += 1;
    }
  }

  private tooMany(): never {
    throw new InputError(
      'too-many-digits',
      `This is longer than ${MOST_DIGITS} digits, the most that one number may have here.`,
    );
  }

  /** A sign and digits with at most one point. */
  private signed(): Part {
    let minus = false;
    const first = this.text[this.at] ?? '';
    if (MINUS.test(first)) minus = true;
    if (minus || first === '+') this.at += 1;
    const part = this.digits();
    return minus ? { ...part, coefficient: -part.coefficient } : part;
  }

  private digits(): Part {
    const kept: string[] = [];
    let point = -1;
    for (;;) {
      this.skip();
      const run = /^[0-9]+/.exec(this.text.slice(this.at, this.at + 4096))?.[0];
      if (run !== undefined) {
        kept.push(run);
        this.at += run.length;
        continue;
      }
      if (this.text[this.at] !== '.') break;
      if (point >= 0) this.refuse('two-points', 'is a second decimal point in the same number');
      point = kept.reduce((n, r) => n + r.length, 0);
      this.at += 1;
    }
    const digits = kept.join('');
    if (digits === '') this.complain();
    if (digits.length > MOST_DIGITS) this.tooMany();
    const coefficient = BigInt(digits);
    const significantDigits = coefficient === 0n ? 0 : digits.replace(/^0+/, '').length;
    return { coefficient, exponent: point < 0 ? 0 : point - digits.length, significantDigits };
  }

  private exponent(): number {
    this.skip();
    const match = /^(?:[eEdD]|(?:\*|×|·)\s*10\s*(?:\^|\*\*))\s*([-+−]?)\s*\(?([0-9]+)\)?/.exec(
      this.text.slice(this.at, this.at + 40),
    );
    if (match === null) return 0;
    this.at += match[0].length;
    const size = Number(match[2]);
    if (size > LARGEST_EXPONENT)
      throw new InputError(
        'exponent-too-large',
        `The exponent ${match[2]} is beyond ±${LARGEST_EXPONENT}.`,
        spotIn(this.text, this.at - match[0].length, match[0].length),
      );
    return match[1] === '' || match[1] === '+' ? size : -size;
  }

  /** `(67)`: the uncertainty in units of the last digit; `(0.0067)` in the units of the number. */
  private bracketed(lastPlace: number): { coefficient: bigint; exponent: number } | undefined {
    this.skip();
    const match = /^\(\s*([0-9]+)(\.[0-9]+)?\s*\)/.exec(this.text.slice(this.at, this.at + 60));
    if (match === null) return undefined;
    this.at += match[0].length;
    const fraction = match[2]?.slice(1);
    if (fraction === undefined) return { coefficient: BigInt(match[1] as string), exponent: lastPlace };
    return { coefficient: BigInt(`${match[1]}${fraction}`), exponent: -fraction.length };
  }

  private plusMinus(): { coefficient: bigint; exponent: number } | undefined {
    this.skip();
    const mark = /^(?:±|\+\/?[-−]|\\pm)/.exec(this.text.slice(this.at, this.at + 4))?.[0];
    if (mark === undefined) return undefined;
    this.at += mark.length;
    this.skip();
    const part = this.digits();
    return { coefficient: part.coefficient, exponent: part.exponent + this.exponent() };
  }

  private refuse(code: string, complaint: string): never {
    const spot = spotIn(this.text, this.at);
    const char = this.text[this.at] as string;
    throw new InputError(code, `“${char}” at line ${spot.line}, column ${spot.column} ${complaint}.`, spot);
  }

  /** Says what is wrong at the present place. */
  private complain(): never {
    const rest = this.text.slice(this.at, this.at + 12);
    const spot = spotIn(this.text, this.at);
    const where = `line ${spot.line}, column ${spot.column}`;
    if (rest === '') throw new InputError('no-digits', `The number ends at ${where} before any digit.`, spot);
    if (/^[+-]?nan/i.test(rest))
      throw new InputError(
        'not-a-number',
        `“NaN” at ${where} is not a number: the calculation that printed it had failed.`,
        spot,
      );
    if (/^(inf|∞)/i.test(rest))
      throw new InputError('not-finite', `“${rest.trim()}” at ${where} is not a finite number.`, spot);
    if (rest.startsWith(','))
      this.refuse('comma', 'is a comma; write the decimal point as “.” and group digits with spaces or not at all');
    if (rest.startsWith('.')) this.refuse('two-points', 'is a second decimal point in the same number');
    if (/^\p{L}/u.test(rest)) this.refuse('letter', 'is a letter where digits are expected');
    return this.refuse('bad-character', 'does not belong in a number');
  }
}

const LOG2_10 = Math.log2(10);

/**
 * The ball that a decimal stands for when `trustedDigits` of its significant digits are right: the radius is half a unit
 * of the last trusted digit (or the stated uncertainty where that is larger). Without `trustedDigits` all written digits count.
 * The fraction bits are chosen so that rounding adds less than 2^−16 of the radius. An all-zero decimal keeps its written places.
 */
export function toBall(decimal: Decimal, trustedDigits = decimal.significantDigits): Ball {
  const drop = Math.max(0, decimal.significantDigits - trustedDigits);
  const place = decimal.exponent + drop;
  const bits = Math.max(0, Math.ceil(-place * LOG2_10)) + 20;
  const half = scaledUp(1n, place, 2n, bits);
  const stated = decimal.uncertainty;
  const wide = stated === undefined ? 0n : scaledUp(stated.coefficient, stated.exponent, 1n, bits);
  const mid = scaled(decimal.coefficient, decimal.exponent, bits);
  return { mid, rad: (wide > half ? wide : half) + 1n, bits };
}

/** coefficient·10^exponent·2^bits rounded to nearest, error below one unit. */
function scaled(coefficient: bigint, exponent: number, bits: number): bigint {
  if (exponent >= 0) return (coefficient * 10n ** BigInt(exponent)) << BigInt(bits);
  const divisor = 10n ** BigInt(-exponent);
  const doubled = (coefficient << BigInt(bits + 1)) / divisor;
  return (doubled + (doubled < 0n ? -1n : 1n)) / 2n;
}

function scaledUp(coefficient: bigint, exponent: number, over: bigint, bits: number): bigint {
  if (exponent >= 0) return ((coefficient * 10n ** BigInt(exponent)) << BigInt(bits)) / over + 1n;
  return (coefficient << BigInt(bits)) / (over * 10n ** BigInt(-exponent)) + 1n;
}

/** An exact decimal as a ball of radius at most one unit at `bits` fraction bits. */
export function exactBall(decimal: Decimal, bits: number): Ball {
  const mid = scaled(decimal.coefficient, decimal.exponent, bits);
  return { mid, rad: decimal.exponent >= 0 ? 0n : 1n, bits };
}

/** Exponent e of the leading digit: 10^e ≤ |x| < 10^(e+1), for |x| = size·2^−bits > 0; right or one too low. */
function leadingExponent(size: bigint, bits: number): number {
  return Math.floor((bitLength(size) - 1 - bits) / LOG2_10 - 1e-9);
}

/** ⌊size·2^−bits·10^places⌉ (halves up) as an integer. */
function toPlaces(size: bigint, bits: number, places: number): bigint {
  const numerator = places >= 0 ? size * 10n ** BigInt(places) : size;
  const denominator = (places >= 0 ? 1n : 10n ** BigInt(-places)) << BigInt(bits);
  return (2n * numerator + denominator) / (2n * denominator);
}

/** Rounds |x| to `digits` significant digits: the digit string and the exponent of its first digit. */
function roundTo(size: bigint, bits: number, digits: number): { text: string; exponent: number } {
  for (let exponent = leadingExponent(size, bits); ; exponent++) {
    const text = toPlaces(size, bits, digits - 1 - exponent).toString();
    if (text.length <= digits) return { text, exponent };
    if (/^10*$/.test(text)) return { text: text.slice(0, digits), exponent: exponent + 1 };
  }
}

/**
 * The digits of a ball, correctly rounded to `digits` significant digits: every point of the ball rounds to this text.
 * Throws PrecisionError when points of the ball round differently.
 */
export function formatBall(x: Ball, digits: number): string {
  if (!Number.isInteger(digits) || digits < 1)
    throw new RangeError(`formatBall: expected a positive number of digits, got ${digits}`);
  if (x.mid === 0n && x.rad === 0n) return '0';
  const size = absolute(x.mid);
  if (size <= x.rad) throw new PrecisionError('formatBall: the number cannot be told from zero at this precision');
  const low = roundTo(size - x.rad, x.bits, digits);
  const high = roundTo(size + x.rad, x.bits, digits);
  if (low.text !== high.text || low.exponent !== high.exponent) {
    throw new PrecisionError(`formatBall: the ball does not determine ${digits} digits`);
  }
  return `${x.mid < 0n ? '-' : ''}${layOut(low.text, low.exponent)}`;
}

/** The midpoint rounded to `digits` significant digits, whatever the radius; for display beside a stated radius only. */
export function formatMidpoint(x: Ball, digits: number): string {
  if (x.mid === 0n) return '0';
  const { text, exponent } = roundTo(absolute(x.mid), x.bits, digits);
  return `${x.mid < 0n ? '-' : ''}${layOut(text, exponent)}`;
}

/** Plain positional notation for ordinary sizes, scientific beyond. */
function layOut(digits: string, exponent: number): string {
  if (exponent < -7 || exponent >= Math.max(21, digits.length)) {
    const tail = digits.length > 1 ? `.${digits.slice(1)}` : '';
    return `${digits[0]}${tail}e${exponent}`;
  }
  if (exponent < 0) return `0.${'0'.repeat(-exponent - 1)}${digits}`;
  const whole = digits.slice(0, exponent + 1).padEnd(exponent + 1, '0');
  const fraction = digits.slice(exponent + 1);
  return fraction === '' ? whole : `${whole}.${fraction}`;
}

/** How many significant digits the ball determines: ⌊−log10 of its relative radius⌋, 0 when it may be zero, Infinity when exact. */
export function digitsKnown(x: Ball): number {
  if (x.rad === 0n) return Number.POSITIVE_INFINITY;
  const size = absolute(x.mid);
  if (size <= x.rad) return 0;
  const estimate = Math.max(0, Math.floor(log10Of(size) - log10Of(x.rad) + 1e-9));
  return x.rad * 10n ** BigInt(estimate) <= size ? estimate : Math.max(0, estimate - 1);
}

/** Canonical text of a decimal as given: the same digits without grouping. */
export function canonicalText(decimal: Decimal): string {
  const { coefficient, exponent } = decimal;
  const digits = absolute(coefficient).toString();
  const sign = coefficient < 0n ? '-' : '';
  if (exponent > 0) return exponent > 20 ? `${sign}${digits}e${exponent}` : `${sign}${digits}${'0'.repeat(exponent)}`;
  if (exponent === 0) return `${sign}${digits}`;
  const lead = digits.length + exponent;
  if (lead > 0) return `${sign}${digits.slice(0, lead)}.${digits.slice(lead)}`;
  if (lead > -20) return `${sign}0.${'0'.repeat(-lead)}${digits}`;
  return `${sign}${digits}e${exponent}`;
}
