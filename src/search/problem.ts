/** A request made ready: the value and its constants as numbers, in columns. */
import type { ConstantCache } from '../constants/cache.ts';
import { evaluateTerm } from '../constants/evaluate.ts';
import { type Ball, containsZero } from '../number/ball.ts';
import { divide as divideValues, isComplex, toComplex, type Value } from '../number/complex.ts';
import { InputError } from '../number/errors.ts';
import { log10Of } from '../number/integer.ts';
import type { Method } from '../relation/contract.ts';
import { type BasisElement, readTyped, resolveBasis } from './basis.ts';
import { believing, type ReadValue, readValue } from './intake.ts';
import { basisValues, inColumns } from './numbers.ts';
import type { SearchProgress, SearchRecord } from './record.ts';
import { relationRecord } from './report.ts';
import type { SearchRequest } from './request.ts';

export interface SearchOptions {
  readonly signal?: AbortSignal | undefined;
  readonly onProgress?: ((progress: SearchProgress) => void) | undefined;
  readonly cache?: ConstantCache | undefined;
}

/** Guard bits of the constants beyond the digits of the value: coefficients and comparisons cost this much at most. */
export const GUARD_BITS = 64;
export const LOG2_10 = Math.log2(10);

/** The numbers of a search, in columns. */
export interface Problem {
  readonly request: SearchRequest;
  readonly elements: readonly BasisElement[];
  readonly value: ReadValue;
  readonly columns: number;
  /** The value divided by its prefactor, believing so many digits. */
  believe(digits: number): Ball[];
  readonly constants: readonly (readonly Ball[])[];
  readonly scaleLog10: number;
  readonly method: Method;
  /** Coefficients and expression of an integer vector over (value, basis…). */
  present(integers: readonly bigint[]): Pick<SearchRecord, 'relation' | 'integers' | 'expression'>;
}

/** Reads and evaluates all that a linear request names. Throws InputError for a request that cannot be carried out. */
export function prepareProblem(
  request: SearchRequest,
  options: SearchOptions,
  onProgress: (f: number) => void,
): Problem {
  if (request.basis === undefined) throw new InputError('empty-basis', 'The request names no basis.');
  const value = readValue(request);
  const elements = resolveBasis(request.basis);
  const columns = value.parts.length;
  const context = { cache: options.cache, signal: options.signal, onProgress };
  const bits = constantBits(value);
  const divisor = request.divideBy === undefined ? null : divisorValue(request.divideBy, bits + 64, options);
  const believe = (digits: number): Ball[] => {
    const parts = believing(value, digits);
    if (divisor === null) return parts;
    const whole: Value = columns === 1 ? (parts[0] as Ball) : { re: parts[0] as Ball, im: parts[1] as Ball };
    const quotient = divideValues(whole, divisor, bits);
    if (columns === 1 && isComplex(quotient)) {
      throw new InputError(
        'complex-divisor',
        `The value divided by ${request.divideBy} is complex; give it as a complex value.`,
      );
    }
    return columns === 1 ? [quotient as Ball] : [toComplex(quotient).re, toComplex(quotient).im];
  };
  const constants = inColumns(basisValues(elements, bits, context), elements, columns);
  const sizes = believe(value.trusted).map((b) => log10Of(b.mid) - b.bits / LOG2_10);
  return {
    request,
    elements,
    value,
    columns,
    believe,
    constants,
    scaleLog10: Math.max(...sizes),
    method: request.method ?? 'pslq',
    present: (integers) => relationRecord(elements, integers, request.divideBy),
  };
}

/** Fraction bits to which the constants of a search are computed: the last written place of the value, and guard bits. */
export function constantBits(value: ReadValue): number {
  return Math.max(64, Math.ceil((value.written - value.leadExponent) * LOG2_10)) + GUARD_BITS;
}

function divisorValue(text: string, bits: number, options: SearchOptions): Value {
  const divisor = evaluateTerm(readTyped(text), bits, { cache: options.cache, signal: options.signal });
  const zero = isComplex(divisor) ? containsZero(divisor.re) && containsZero(divisor.im) : containsZero(divisor);
  if (zero) throw new InputError('zero-divisor', `${text} is zero, so nothing can be divided by it.`);
  return divisor;
}
