/** How the pasted text of a value is read: its digits, or one sentence on what is wrong. */

import { InputError } from '../../src/number/errors.ts';
import { absolute } from '../../src/number/integer.ts';
import { readValue } from '../../src/search/intake.ts';
import type { ValueEntry } from '../state/project.ts';

export type Reading =
  | { readonly kind: 'empty' }
  | { readonly kind: 'wrong'; readonly sentence: string; readonly field: 'digits' | 'trusted' }
  | {
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
    };

export function readEntry(value: Pick<ValueEntry, 'text' | 'trustedDigits'>): Reading {
  if (value.text.trim() === '') return { kind: 'empty' };
  try {
    const all = readValue({ value: value.text });
    const read =
      value.trustedDigits === null ? all : readValue({ value: value.text, trustedDigits: value.trustedDigits });
    const [part] = read.parts;
    if (part === undefined) return { kind: 'empty' };
    return {
      kind: 'value',
      sign: part.coefficient < 0n ? '-' : '',
      digits: absolute(part.coefficient).toString(),
      exponent: read.leadExponent,
      written: read.written,
      trusted: read.trusted,
      fromUncertainty: part.uncertainty !== undefined,
    };
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return {
      kind: 'wrong',
      sentence: error.message,
      field: error.code === 'bad-trusted-digits' ? 'trusted' : 'digits',
    };
  }
}
