/** What is known of a series, coefficient by coefficient, in decimal digits. */
import type { Ball } from '../number/ball.ts';
import { isComplex, type Value } from '../number/complex.ts';
import { exactBall, formatBall, parseDecimal } from '../number/decimal.ts';
import { absolute, log10Of } from '../number/integer.ts';
import { endOf, isExactZero, type Series } from './laurent.ts';

export interface CoefficientReport {
  readonly exponent: number;
  readonly value: Value;
  /**
   * The midpoint with as many digits as its radius leaves: wrong by at most one unit of the last digit. `0` for an exact
   * zero, null where no digit is known.
   */
  readonly text: string | { readonly re: string; readonly im: string } | null;
  /** Significant digits written in `text`, counted from the larger part; Infinity when exact. */
  readonly digits: number;
  /** Digits of `text` that are right to half a unit of the last one: `digits` or one fewer. */
  readonly trusted: number;
  /** −log10 of the radius: how many places behind the point are known; Infinity when exact. */
  readonly places: number;
  /** Digits lost by cancellation: those of the least known coefficient that went in, minus those known now. */
  readonly lost: number;
}

export interface SeriesReport {
  readonly variable: string;
  readonly low: number;
  /** Exponent of the first unknown power. */
  readonly end: number;
  readonly coefficients: readonly CoefficientReport[];
}

/**
 * log10 of the share of a radius that may be due to binary rounding (2^−10 of it): a coefficient that was only read and
 * written again keeps its digits.
 */
const ROUNDING_SHARE = 4.3e-4;
const LOG10_2 = Math.log10(2);

/** Report of a series; `from` is the series it was made of, for the digits lost. */
export function reportOf(s: Series, variable: string, from?: SeriesReport): SeriesReport {
  let least = Number.POSITIVE_INFINITY;
  const coefficients = s.coefficients.map((value, k): CoefficientReport => {
    const source = from?.coefficients[k];
    if (source !== undefined && !isExactZero(source.value)) least = Math.min(least, source.digits);
    const known = written(value);
    const comparable = from !== undefined && Number.isFinite(least) && Number.isFinite(known.digits);
    return {
      exponent: s.low + k,
      value,
      ...known,
      places: placesOf(value),
      lost: comparable ? Math.max(0, least - known.digits) : 0,
    };
  });
  return { variable, low: s.low, end: endOf(s), coefficients };
}

function placesOf(x: Value): number {
  const places = (b: Ball): number => (b.rad === 0n ? Number.POSITIVE_INFINITY : b.bits * LOG10_2 - log10Of(b.rad));
  return isComplex(x) ? Math.min(places(x.re), places(x.im)) : places(x);
}

/** Decimal exponent of the leading digit; −Infinity for zero. */
function leadOf(x: Ball): number {
  return x.mid === 0n ? Number.NEGATIVE_INFINITY : Math.floor(log10Of(absolute(x.mid)) - x.bits * LOG10_2 + 1e-12);
}

type Written = Pick<CoefficientReport, 'text' | 'digits' | 'trusted'>;

function written(x: Value): Written {
  if (!isComplex(x)) return writtenReal(x, leadOf(x));
  const lead = Math.max(leadOf(x.re), leadOf(x.im));
  const [re, im] = [writtenReal(x.re, lead), writtenReal(x.im, lead)];
  const digits = Math.min(re.digits, im.digits);
  if (digits < 1) return { text: null, digits: 0, trusted: 0 };
  const part = (w: Written): string => (typeof w.text === 'string' ? w.text : '0');
  return { text: { re: part(re), im: part(im) }, digits, trusted: Math.min(re.trusted, im.trusted) };
}

/** Digits are counted from 10^lead, which for a part of a complex number is the lead of the larger part. */
function writtenReal(x: Ball, lead: number): Written {
  if (x.rad === 0n) return { text: exactText(x), digits: Number.POSITIVE_INFINITY, trusted: Number.POSITIVE_INFINITY };
  const halfUnit = log10Of(2n * x.rad) - x.bits * LOG10_2 - ROUNDING_SHARE;
  const digits = Number.isFinite(lead) ? Math.floor(lead + 1 - halfUnit) : 0;
  if (digits < 1) return { text: null, digits: 0, trusted: 0 };
  const own = digits - (lead - leadOf(x));
  if (own < 1) return { text: null, digits, trusted: digits - 1 };
  const text = formatBall({ mid: x.mid, rad: 0n, bits: x.bits }, own);
  return { text, digits, trusted: roundsRight(x, text, lead + 1 - digits) ? digits : digits - 1 };
}

/** Whether the whole ball lies within half a unit 10^place (and the rounding share) of the text. */
function roundsRight(x: Ball, text: string, place: number): boolean {
  const t = exactBall(parseDecimal(text), x.bits);
  const farthest = absolute(x.mid - t.mid) + t.rad + x.rad;
  return log10Of(2n * farthest) - x.bits * LOG10_2 - ROUNDING_SHARE <= place;
}

/** A dyadic rational has a finite decimal expansion. */
function exactText(x: Ball): string {
  if (x.mid === 0n) return '0';
  const scaled = absolute(x.mid * 5n ** BigInt(x.bits))
    .toString()
    .replace(/0+$/, '');
  return formatBall(x, Math.max(1, scaled.length));
}
