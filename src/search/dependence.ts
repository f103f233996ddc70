/** Relations among the constants of a basis, which make every answer ambiguous. */
import { add, type Ball, containsZero, fromInteger, timesInteger } from '../number/ball.ts';
import { gcd } from '../number/integer.ts';
import { basisValues, inColumns } from './numbers.ts';
import { GUARD_BITS, LOG2_10, type Problem, type SearchOptions } from './problem.ts';
import type { SearchRecord } from './record.ts';
import { relateRows } from './relate.ts';

/** A relation of the constants without the value, as a vector with 0 in front; null when none shows at the digits of the value. */
export async function relationAmongConstants(problem: Problem, options: SearchOptions): Promise<bigint[] | null> {
  if (problem.constants.length < 2) return null;
  const outcome = await relateRows(problem.constants, 'lattice', undefined, options, null);
  return outcome.kind === 'relation' ? [0n, ...outcome.coefficients] : null;
}

/** The record of a dependent basis, once the relation is confirmed with constants at twice the digits; null when it is not. */
export async function dependentRecord(
  problem: Problem,
  integers: readonly bigint[],
  base: SearchRecord,
  options: SearchOptions,
): Promise<SearchRecord | null> {
  const { elements, columns } = problem;
  const bits = 2 * Math.ceil(problem.value.written * LOG2_10) + GUARD_BITS;
  const values = inColumns(
    basisValues(elements, bits, { cache: options.cache, signal: options.signal }),
    elements,
    columns,
  );
  const vanishes = Array.from({ length: columns }, (_, j) =>
    values.reduce((sum, row, k) => add(sum, timesInteger(row[j] as Ball, integers[k + 1] as bigint)), fromInteger(0n)),
  ).every(containsZero);
  if (!vanishes) return null;
  const rest = integers.slice(1).reduce((g, c) => gcd(g, c), 0n);
  const involved = elements.filter((_, k) => integers[k + 1] !== 0n).map((e) => e.text);
  return {
    ...base,
    ...problem.present(integers.map((c) => c / (rest === 0n ? 1n : rest))),
    outcome: 'basis-dependent',
    diagnosis: [
      `The constants ${involved.join(', ')} are linearly dependent: the relation holds to ${Math.floor(bits / LOG2_10)} digits without the value. Leave one of them out and search again.`,
    ],
  };
}
