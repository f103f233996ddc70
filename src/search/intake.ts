/** From the text of a request to the numbers that a search works with. */
import type { Ball } from '../number/ball.ts';
import { type Decimal, parseDecimal, toBall } from '../number/decimal.ts';
import { InputError } from '../number/errors.ts';
import { log10Of } from '../number/integer.ts';
import type { SearchRequest } from './request.ts';

/** Fewest trusted digits with which a search is worth anything. */
const FEWEST_DIGITS = 6;

export interface ReadValue {
  /** One decimal for a real value, two for a complex one (real part first). */
  readonly parts: readonly Decimal[];
  /** Significant digits of the whole value, counted from its larger part. */
  readonly written: number;
  readonly trusted: number;
  /** log10 of the size of the larger part. */
  readonly scaleLog10: number;
  /** Decimal exponent of the first significant digit of the larger part. */
  readonly leadExponent: number;
}

/** Reads the value of a request. Throws InputError: unreadable text, a zero value, too few digits, trusted digits out of range. */
export function readValue(request: Pick<SearchRequest, 'value' | 'trustedDigits'>): ReadValue {
  const { value, trustedDigits } = request;
  const texts = typeof value === 'string' ? [value] : [value?.re, value?.im];
  if (texts.some((t) => typeof t !== 'string')) {
    throw new InputError('bad-value', 'The value must be given as text: its digits, or its real and imaginary part.');
  }
  const parts = (texts as string[]).map(parseDecimal);
  if (parts.every((d) => d.coefficient === 0n)) {
    throw new InputError('zero-value', 'The value is zero, so there is nothing to recognise.');
  }
  const lead = (d: Decimal): number =>
    d.coefficient === 0n ? Number.NEGATIVE_INFINITY : Math.floor(log10Of(d.coefficient) + 1e-12) + d.exponent;
  const leadExponent = Math.max(...parts.map(lead));
  // A part that is exactly zero has as many places as the other one.
  const places = parts.filter((d) => d.coefficient !== 0n).map((d) => -d.exponent);
  const written = Math.min(...places) + leadExponent + 1;
  const stated = parts.flatMap((d) =>
    d.uncertainty === undefined || d.uncertainty.coefficient === 0n
      ? []
      : [log10Of(2n * d.uncertainty.coefficient) + d.uncertainty.exponent],
  );
  const believed =
    stated.length === 0 ? written : Math.min(written, Math.floor(leadExponent + 1 - Math.max(...stated)));
  const trusted = trustedDigits ?? believed;
  if (!Number.isInteger(trusted) || trusted < 1) {
    throw new InputError('bad-trusted-digits', 'The number of trusted digits must be a positive whole number.');
  }
  if (trusted > written) {
    throw new InputError(
      'bad-trusted-digits',
      `The value has ${written} significant digits, so ${trusted} cannot be trusted.`,
    );
  }
  if (trusted < FEWEST_DIGITS) {
    throw new InputError(
      'too-few-digits',
      `${trusted} trusted digits carry too little to recognise anything; give at least ${FEWEST_DIGITS}.`,
    );
  }
  return { parts, written, trusted, scaleLog10: leadExponent, leadExponent };
}

/** The parts as balls that believe `digits` significant digits of the whole value. */
export function believing(value: ReadValue, digits: number): Ball[] {
  const place = value.leadExponent + 1 - digits;
  return value.parts.map((d) => {
    const drop = Math.max(0, place - d.exponent);
    return toBall(
      { ...d, uncertainty: undefined, significantDigits: Math.max(d.significantDigits, drop) },
      Math.max(d.significantDigits, drop) - drop,
    );
  });
}

/** maxNorm text such as "1e12" to log10. Throws InputError. */
export function readMaxNorm(text: string): number {
  const d = parseDecimal(text);
  const size = log10Of(d.coefficient) + d.exponent;
  if (d.coefficient <= 0n || size < 0)
    throw new InputError('bad-max-norm', 'The largest norm must be at least 1, for example 1e12.');
  return size;
}
