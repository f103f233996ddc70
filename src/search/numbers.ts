/** The constants of a basis as balls, one a column. */
import type { ConstantCache } from '../constants/cache.ts';
import { evaluateMany } from '../constants/evaluate.ts';
import type { Ball } from '../number/ball.ts';
import { fromInteger } from '../number/ball.ts';
import { isComplex, toComplex, type Value } from '../number/complex.ts';
import { parseDecimal, toBall } from '../number/decimal.ts';
import { InputError } from '../number/errors.ts';
import type { BasisElement } from './basis.ts';

export interface EvaluationOptions {
  readonly cache?: ConstantCache | undefined;
  readonly signal?: AbortSignal | undefined;
  readonly onProgress?: ((fraction: number) => void) | undefined;
}

/** Every element to an absolute error of 2^−bits (pasted ones to what their digits give). */
export function basisValues(elements: readonly BasisElement[], bits: number, options: EvaluationOptions): Value[] {
  const terms = elements.flatMap(({ source }) => ('term' in source ? [source.term] : []));
  const values = evaluateMany(terms, bits, options);
  let next = 0;
  return elements.map(({ source }) => {
    if ('term' in source) return values[next++] as Value;
    const decimal = parseDecimal(source.pasted.digits);
    return toBall(decimal, source.pasted.trustedDigits ?? decimal.significantDigits);
  });
}

/** Values spread over `columns` columns: a real one has the imaginary part 0. Throws InputError for a complex constant in a real search. */
export function inColumns(values: readonly Value[], elements: readonly BasisElement[], columns: number): Ball[][] {
  return values.map((value, k) => {
    if (columns === 1) {
      if (isComplex(value)) {
        const name = elements[k]?.text ?? 'A constant';
        throw new InputError(
          'complex-constant',
          `${name} is complex, but the value is real; use re( ) or im( ) of it.`,
        );
      }
      return [value];
    }
    const { re, im } = toComplex(value);
    return [re, isComplex(value) ? im : fromInteger(0n)];
  });
}
