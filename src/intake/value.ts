/** One value as codes print it: real, complex or a series in a variable. */
import { canonicalText, type Decimal, parseDecimal } from '../number/decimal.ts';
import { InputError, spotIn } from '../number/errors.ts';
import type { CoefficientText, SeriesText } from '../series/steps.ts';
import { guessTrust } from './trust.ts';

export type ReadValue =
  | { readonly kind: 'real'; readonly value: string; readonly trustedDigits: number; readonly notes: readonly string[] }
  | {
      readonly kind: 'complex';
      readonly value: { readonly re: string; readonly im: string };
      readonly trustedDigits: number;
      readonly notes: readonly string[];
    }
  | {
      readonly kind: 'series';
      readonly value: SeriesText;
      readonly trustedDigits: number;
      readonly notes: readonly string[];
    };

const NUMBER_WITH_POINT = /^[-+−]?\d*\.\d+(?:[eEdD][-+]?\d+)?(?:\(\d+\))?$/;
/** A name that is neither the imaginary unit nor an exponent mark. */
const VARIABLE =
  /(?<![\p{L}\d._])(?!(?:[iI]|O|nan|NaN|NAN|inf|Inf|INF|Infinity|infinity)(?![\p{L}\d_]))(\p{L}[\p{L}\d_]*)/u;
const MOST_POWER = 500;

/** Reads a value. Throws InputError with the spot in `text`. */
export function readValue(text: string): ReadValue {
  const pair = /^\s*\(([^(),]+(?:\(\d+\))?[^(),]*),([^(),]+(?:\(\d+\))?[^(),]*)\)\s*$/.exec(text);
  if (pair !== null) return complex(text, pair[1] as string, pair[2] as string);
  const fields = text.trim().split(/\s+/, 4);
  if (fields.length === 2 && fields.every((f) => NUMBER_WITH_POINT.test(f))) {
    return complex(text, fields[0] as string, fields[1] as string);
  }
  // Long runs of digits need no search for names.
  const letters = text.length < 20_000 || /[\p{L}]/u.test(text);
  if (letters) {
    const variable = VARIABLE.exec(text)?.[1];
    if (variable !== undefined && /\d/.test(text)) return series(text, variable);
    if (/[iI]\s*$|[iI]\s*\*/.test(text)) return complexSum(text);
  }
  return real(decimalIn(text, text, 0));
}

/** A decimal that stands at `offset` of a longer text; errors point into that text. */
function decimalIn(whole: string, part: string, offset: number): Decimal {
  try {
    return parseDecimal(part);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    const at = spotIn(whole, offset + (error.at?.offset ?? 0), error.at?.length ?? part.length);
    throw new InputError(
      error.code,
      error.message.replace(/line \d+, column \d+/, `line ${at.line}, column ${at.column}`),
      at,
    );
  }
}

function real(d: Decimal): ReadValue {
  const guess = guessTrust(d);

  return { kind: 'real', value: written(d), trustedDigits: guess.digits, notes: [guess.note] };
}

/** The digits without grouping; an uncertainty is carried by the trusted digits. */
function written(d: Decimal): string {
  return canonicalText(d);
}

function complex(whole: string, re: string, im: string): ReadValue {
  const at = whole.indexOf(re);
  const x = decimalIn(whole, re, at);
  const y = decimalIn(whole, im, whole.indexOf(im, at + re.length));
  const parts = [x, y].filter((d) => d.coefficient !== 0n);
  const lead = Math.max(...parts.map((d) => leadOf(d)));
  const guesses = parts.map((d) => ({ guess: guessTrust(d), digits: guessTrust(d).digits + lead - leadOf(d) }));
  const worst = guesses.reduce((a, b) => (b.digits < a.digits ? b : a), guesses[0] as (typeof guesses)[0]);
  return {
    kind: 'complex',
    value: { re: written(x), im: written(y) },
    trustedDigits: worst?.digits ?? 0,
    notes: [worst?.guess.note ?? 'The value is zero.'],
  };
}

function leadOf(d: Decimal): number {
  return d.significantDigits - 1 + d.exponent;
}

/** `a + b*I`, `a - I*b`, `b*I`. */
function complexSum(text: string): ReadValue {
  let re: string | undefined;
  let im: string | undefined;
  for (const { part, offset } of terms(text)) {
    const bare = part.replace(/\*?\s*[iI]\s*$/, '').replace(/^(\s*[-+−]?\s*)[iI]\s*\*/, '$1');
    const imaginary = bare !== part;
    if (imaginary ? im !== undefined : re !== undefined) {
      throw new InputError(
        'twice',
        `A second ${imaginary ? 'imaginary' : 'real'} part stands at column ${spotIn(text, offset).column}.`,
        spotIn(text, offset),
      );
    }
    const digits = /\d/.test(bare) ? bare : `${bare}1`;
    decimalIn(text, digits, offset);
    if (imaginary) im = canonical(digits);
    else re = canonical(digits);
  }
  const [a, b] = [re ?? '0', im ?? '0'];
  return complex(`${a} ${b}`, a, b);
}

function canonical(text: string): string {
  return text.replace(/\s+/g, '');
}

/** The summands at the top level, signs included. */
function terms(text: string): { part: string; offset: number }[] {
  const found: { part: string; offset: number }[] = [];
  let start = 0;
  let depth = 0;
  for (let k = 0; k < text.length; k++) {
    const char = text[k] as string;
    if (char === '(') depth += 1;
    else if (char === ')') depth -= 1;
    else if ((char === '+' || char === '-' || char === '−') && depth === 0) {
      const before = text.slice(Math.max(0, k - 12), k).trimEnd();
      const joined = /(?:\d\.?[eEdD]|[\^*/(])$/.test(before) || text.slice(start, k).trim() === '';
      if (!joined && !text.startsWith('+/-', k) && !/\+\/$/.test(before)) {
        found.push({ part: text.slice(start, k), offset: start });
        start = k;
      }
    }
  }
  found.push({ part: text.slice(start), offset: start });
  return found;
}

const POWER = String.raw`(?:\s*(?:\^|\*\*)\s*\(?\s*([-+−]?\d+)\s*\)?)?`;

function series(text: string, variable: string): ReadValue {
  const name = variable.replace(/[^\p{L}\d_]/gu, '');
  const order = new RegExp(`^\\s*\\+?\\s*O\\(\\s*${name}${POWER}\\s*\\)${POWER}\\s*$`, 'u');
  const tail = new RegExp(`^(.*?)(\\*|/)?\\s*(?<![\\p{L}\\d_])${name}${POWER}\\s*$`, 'su');
  const coefficients = new Map<number, CoefficientText>();
  const trusted = new Map<number, number>();
  let end: number | undefined;
  for (const { part, offset } of terms(text)) {
    const big = order.exec(part);
    if (big !== null) {
      end = toInteger(big[1] ?? '1') * toInteger(big[2] ?? '1');
      continue;
    }
    const match = tail.exec(part);
    const sign = match?.[2] === '/' ? -1 : 1;
    const exponent = match === null ? 0 : sign * toInteger(match[3] ?? '1');
    const spot = spotIn(text, offset, part.length);
    if (Math.abs(exponent) > MOST_POWER) {
      throw new InputError(
        'bad-exponent',
        `The power at line ${spot.line}, column ${spot.column} is beyond ±${MOST_POWER}.`,
        spot,
      );
    }
    if (coefficients.has(exponent)) {
      throw new InputError(
        'twice',
        `A second coefficient of ${name}^${exponent} stands at line ${spot.line}, column ${spot.column}.`,
        spot,
      );
    }
    const read = coefficient(text, match === null ? part : (match[1] as string), offset);
    coefficients.set(exponent, read.text);
    if (read.trusted !== undefined) trusted.set(exponent, read.trusted);
  }
  return assemble(text, name === 'ε' || name === 'epsilon' ? 'ep' : name, coefficients, trusted, end);
}

function assemble(
  text: string,
  variable: string,
  coefficients: ReadonlyMap<number, CoefficientText>,
  trusted: ReadonlyMap<number, number>,
  end: number | undefined,
): ReadValue {
  const exponents = [...coefficients.keys()];
  if (exponents.length === 0)
    throw new InputError('no-terms', 'This series has no terms before its O( ).', spotIn(text, 0));
  const low = Math.min(...exponents);
  const top = end ?? Math.max(...exponents) + 1;
  if (Math.max(...exponents) >= top || top - low > MOST_POWER) {
    throw new InputError(
      'bad-order',
      `The series is cut off at order ${top}, but has other terms beyond.`,
      spotIn(text, 0),
    );
  }
  const list = Array.from({ length: top - low }, (_, k) => coefficients.get(low + k) ?? '0');
  const missing = list.length - exponents.length;
  const digits = [...trusted.values()];
  return {
    kind: 'series',
    value: { variable, low, coefficients: list, trustedDigits: list.map((_, k) => trusted.get(low + k) ?? null) },
    trustedDigits: digits.length === 0 ? 0 : Math.min(...digits),
    notes: [
      `A series in ${variable} from order ${low} to ${top - 1}.`,
      ...(missing > 0 ? [`${missing} orders that are not written are taken as zero.`] : []),
    ],
  };
}

function toInteger(text: string): number {
  return Number(text.replace('−', '-').replace('+', ''));
}

/** A coefficient: empty (1), exact p/q, digits, or a bracketed complex number. */
function coefficient(
  whole: string,
  part: string,
  offset: number,
): { text: CoefficientText; trusted: number | undefined } {
  const bare = canonical(part).replace(/\*$/, '').replace('−', '-').replace(/^\+/, '');
  if (bare === '' || bare === '-') return { text: `${bare}1`, trusted: undefined };
  if (/^-?\d{1,15}(?:\/\d{1,15})?$/.test(bare)) return { text: bare, trusted: undefined };
  const inner = /^(-?)\((.*)\)$/s.exec(bare);
  if (inner !== null && /[iI]/.test(inner[2] as string)) {
    const value = complexSum(inner[2] as string);
    if (value.kind !== 'complex')
      throw new InputError('bad-coefficient', 'This coefficient is not a number.', spotIn(whole, offset));
    const flip = (t: string): string => (inner[1] === '' ? t : t.startsWith('-') ? t.slice(1) : `-${t}`);
    return { text: { re: flip(value.value.re), im: flip(value.value.im) }, trusted: undefined };
  }
  const start = part.length - part.trimStart().length;
  const d = decimalIn(
    whole,
    inner === null ? part.trim().replace(/\*\s*$/, '') : `${inner[1]}${inner[2]}`.replace('--', ''),
    offset + start,
  );
  return { text: written(d), trusted: guessTrust(d).digits };
}
