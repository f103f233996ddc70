/** What a step of a plan will cost and whether the digits can carry it, before it runs. */
import { HOLDS_SURPLUS } from '../evidence/verdict.ts';

export interface StepEstimate {
  /** Rough, on a machine of the year 2020; a running plan scales it by what its first steps took. */
  readonly milliseconds: number;
  /** Numbers searched, the value included. */
  readonly numbers: number;
  /** Decimal digits that the coefficients may have for the relation to be recognised as real. */
  readonly coefficientDigits: number;
  readonly supported: boolean;
  /** Trusted digits from which coefficients of two digits are recognised. */
  readonly digitsNeeded: number;
}

/** Fewest coefficient digits for which a search is worth its time. */
const LEAST_COEFFICIENT_DIGITS = 1;
const USUAL_COEFFICIENT_DIGITS = 2;

/**
 * Digits that the coefficients of a relation among `constants` and the value may have when it is still to hold:
 * HOLDS_SURPLUS digits and the logarithm of the number of searches are kept back, the rest is shared by the numbers.
 */
export function carried(trusted: number, constants: number, columns = 1, searches = 1): number {
  return Math.max(0, (trusted * columns - HOLDS_SURPLUS - Math.log10(searches)) / (constants + 1));
}

/** Trusted digits with which coefficients of `coefficientDigits` digits are recognised. */
export function digitsToHold(constants: number, coefficientDigits: number, columns = 1, searches = 1): number {
  return Math.ceil(((constants + 1) * coefficientDigits + HOLDS_SURPLUS + Math.log10(searches)) / columns);
}

/** Most constants for which coefficients of `coefficientDigits` digits are recognised. */
export function largestBasis(trusted: number, coefficientDigits: number, columns = 1, searches = 1): number {
  const room = trusted * columns - HOLDS_SURPLUS - Math.log10(searches);
  return Math.max(0, Math.floor(room / coefficientDigits) - 1);
}

export function stepEstimate(trusted: number, constants: number, columns = 1, searches = 1): StepEstimate {
  const numbers = constants + 1;
  const coefficientDigits = carried(trusted, constants, columns, searches);
  return {
    // Fitted to searches of 5 to 41 numbers at 60 to 300 digits by the lattice method, evidence included.
    milliseconds: Math.round(15 + 1.2e-3 * numbers ** 2 * trusted * columns * (1 + trusted / 1000)),
    numbers,
    coefficientDigits,
    supported: coefficientDigits >= LEAST_COEFFICIENT_DIGITS,
    digitsNeeded: digitsToHold(constants, USUAL_COEFFICIENT_DIGITS, columns, searches),
  };
}
