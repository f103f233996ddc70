/** What a step of a plan will cost and whether the digits can carry it, before it runs. */
import { vectorsLog10 } from '../evidence/counting.ts';
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

/** Below this not even coefficients of ±1 and ±2 throughout are recognised. */
const LEAST_COEFFICIENT_DIGITS = 0.3;
const USUAL_COEFFICIENT_DIGITS = 2;

/** Digits kept back for the surplus that a relation needs to hold. */
function keptBack(searches: number): number {
  return HOLDS_SURPLUS + Math.log10(searches);
}

/**
 * Digits that all coefficients of a relation among `constants` and the value may have when it is still to hold: the
 * integer vectors with entries up to 10^h, counted by the ball around them, leave HOLDS_SURPLUS digits and the logarithm
 * of the number of searches.
 */
export function carried(trusted: number, constants: number, columns = 1, searches = 1): number {
  const m = constants + 1;
  const far = 20;
  const room = trusted * columns - keptBack(searches);
  return Math.max(0, (room - vectorsLog10(m, far)) / m + far - Math.log10(m) / 2);
}

/** Trusted digits with which coefficients of `coefficientDigits` digits are recognised. */
export function digitsToHold(constants: number, coefficientDigits: number, columns = 1, searches = 1): number {
  const m = constants + 1;
  return Math.ceil((vectorsLog10(m, coefficientDigits + Math.log10(m) / 2) + keptBack(searches)) / columns);
}

/** Most constants for which coefficients of `coefficientDigits` digits are recognised. */
export function largestBasis(trusted: number, coefficientDigits: number, columns = 1, searches = 1): number {
  let constants = 0;
  while (digitsToHold(constants + 1, coefficientDigits, columns, searches) <= trusted) constants += 1;
  return constants;
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
