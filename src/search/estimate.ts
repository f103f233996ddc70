/** What a number of digits can carry, before any search. */
import { vectorsLog10 } from '../evidence/counting.ts';
import type { Budget } from '../evidence/evidence.ts';
import { log10Of } from '../number/integer.ts';

/** Share of the trusted digits that the search may use; the rest must be predicted. */
const USED_SHARE = 0.85;
const FEWEST_HELD_OUT = 4;

/** How many of the trusted digits the search sees. */
export function digitsUsed(trusted: number): number {
  return Math.max(4, Math.min(trusted - FEWEST_HELD_OUT, Math.floor(trusted * USED_SHARE)));
}

/** Digits with which a search finds this relation: what chance could reach with such coefficients, and a few more. */
export function digitsFixing(coefficients: readonly bigint[], columns = 1): number {
  const normLog10 = log10Of(coefficients.reduce((sum, c) => sum + c * c, 0n)) / 2;
  return Math.ceil(vectorsLog10(coefficients.length, normLog10) / columns) + 6;
}

/** Digits to search with when `least` are needed: half of the others are held out, and at least four. */
export function digitsLeaving(trusted: number, least: number): number {
  return trusted - Math.max(FEWEST_HELD_OUT, Math.floor((trusted - least) / 2));
}

/** The information budget of a search: `constants` numbers beside the value, in `columns` columns. */
export function budgetFor(trusted: number, constants: number, columns = 1): Budget {
  const numbers = constants + 1;
  const digits = digitsUsed(trusted);
  return { numbers, digits, coefficientDigits: (digits * columns) / numbers };
}

/** Digits that a value needs for coefficients of up to `coefficientDigits` digits in this basis. */
export function digitsNeeded(constants: number, coefficientDigits: number, columns = 1): number {
  const search = ((constants + 1) * coefficientDigits) / columns + 6;
  return Math.ceil(Math.max(search / USED_SHARE, search + FEWEST_HELD_OUT));
}
