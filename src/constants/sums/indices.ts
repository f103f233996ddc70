/** Index lists of nested sums, as they are typed. */
import { InputError } from '../../number/errors.ts';
import type { Term } from '../term.ts';

/** Sums above this weight are refused: their cost grows with its square. */
export const MAX_WEIGHT = 64;

/** The arguments as non-zero integers, or null when one of them is not an integer at all. Throws InputError for 0 and for a weight above MAX_WEIGHT. */
export function integerIndices(name: string, terms: readonly Term[]): number[] | null {
  const indices: number[] = [];
  for (const term of terms) {
    if (term.kind !== 'rational' || term.q !== 1n) return null;
    if (term.p === 0n) throw new InputError('zero-index', `An index of ${name} must not be 0.`);
    const size = term.p < 0n ? -term.p : term.p;
    if (size > BigInt(MAX_WEIGHT)) throw tooHeavy(name);
    indices.push(Number(term.p));
  }
  if (weightOf(indices) > MAX_WEIGHT) throw tooHeavy(name);
  return indices;
}

function tooHeavy(name: string): InputError {
  return new InputError('too-heavy', `The weight of ${name} may be at most ${MAX_WEIGHT}.`);
}

export function weightOf(indices: readonly number[]): number {
  return indices.reduce((sum, s) => sum + Math.abs(s), 0);
}
