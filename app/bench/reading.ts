/** How the pasted text of a value is read: its digits, or one sentence on what is wrong. */

import { MOST_DIGITS } from '../../src/number/decimal.ts';
import { InputError } from '../../src/number/errors.ts';
import { absolute } from '../../src/number/integer.ts';
import { readValue } from '../../src/search/intake.ts';
import type { ValueEntry } from '../state/project.ts';

export interface ReadDigits {
  readonly kind: 'value';
  readonly sign: '' | '-';
  /** Significant digits, first one non-zero. */
  readonly digits: string;
  /** Decimal exponent of the first digit. */
  readonly exponent: number;
  readonly written: number;
  readonly trusted: number;
  /** Whether the trusted digits follow from a stated uncertainty. */
  readonly fromUncertainty: boolean;
}

export type Reading =
  | { readonly kind: 'empty' }
  | { readonly kind: 'wrong'; readonly sentence: string; readonly field: 'digits' | 'trusted' }
  | ReadDigits;

/** From this length on plain digits are read as text, without the big integer that would hold the page up. */
const LONG_TEXT = 15_000;
const FEWEST_DIGITS = 6;

export function readEntry(value: Pick<ValueEntry, 'text' | 'trustedDigits'>): Reading {
  if (value.text.trim() === '') return { kind: 'empty' };
  try {
    return (value.text.length > LONG_TEXT ? readLong(value) : undefined) ?? readExactly(value);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return {
      kind: 'wrong',
      sentence: error.message,
      field: error.code === 'bad-trusted-digits' ? 'trusted' : 'digits',
    };
  }
}

function readExactly({ text, trustedDigits }: Pick<ValueEntry, 'text' | 'trustedDigits'>): ReadDigits {
  const read = readValue({ value: text, ...(trustedDigits === null ? {} : { trustedDigits }) });
  const part = read.parts[0];
  if (part === undefined) throw new RangeError('readExactly: expected one part, got none');
  return {
    kind: 'value',
    sign: part.coefficient < 0n ? '-' : '',
    digits: absolute(part.coefficient).toString(),
    exponent: read.leadExponent,
    written: read.written,
    trusted: read.trusted,
    fromUncertainty: part.uncertainty !== undefined && trustedDigits === null,
  };
}

/** Plain digits with at most a sign, a point and grouping; undefined for anything else, and for what has to be complained about. */
function readLong({ text, trustedDigits }: Pick<ValueEntry, 'text' | 'trustedDigits'>): ReadDigits | undefined {
  const match = /^([-+−]?)(\d*)(?:\.(\d*))?$/.exec(text.replace(/\\\s*\n|[\s_'’]+/g, ''));
  if (match === null) return undefined;
  const [, sign, whole = '', fraction = ''] = match;
  const all = `${whole}${fraction}`;
  const zeros = /^0*/.exec(all)?.[0].length ?? 0;
  const digits = all.slice(zeros);
  const trusted = trustedDigits ?? digits.length;
  const usable = all.length <= MOST_DIGITS && digits.length >= FEWEST_DIGITS;
  if (!usable || !Number.isInteger(trusted) || trusted < FEWEST_DIGITS || trusted > digits.length) return undefined;
  return {
    kind: 'value',
    sign: sign === '' || sign === '+' ? '' : '-',
    digits,
    exponent: whole.length - zeros - 1,
    written: digits.length,
    trusted,
    fromUncertainty: false,
  };
}
