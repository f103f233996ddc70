/** Recognising a value whose last digits are wrong: a search that found nothing is repeated with fewer and fewer of them. */
import { judge } from './judge.ts';
import type { Problem, SearchOptions } from './problem.ts';
import type { SearchRecord } from './record.ts';
import { relate } from './relate.ts';

/** A relation needs this many digits to be believed against the others (TAIL_SURPLUS, and a few for the smallest coefficients). */
const FEWEST_DIGITS = 20;
/** Up to this many numbers² × digits the repetitions follow each other closely; beyond, each costs too much. */
const CLOSE_LIMIT = 100_000;

/**
 * The numbers of digits tried after a search of `digits` digits among `numbers` numbers, descending. Neighbours are
 * 8 digits or 8 % apart (40 % for large problems): a relation is met when its right digits outnumber those that it
 * needs by that much.
 */
export function rescueDigits(digits: number, numbers: number): number[] {
  const share = numbers * numbers * digits <= CLOSE_LIMIT ? 0.08 : 0.4;
  const tried: number[] = [];
  for (let d = digits; ; ) {
    d -= Math.max(8, Math.ceil(share * d));
    if (d < FEWEST_DIGITS) return tried;
    tried.push(d);
  }
}

/** The record of a relation that holds on fewer digits and that the last ones contradict, or undefined. */
export async function rescue(problem: Problem, options: SearchOptions): Promise<SearchRecord | undefined> {
  const { trusted } = problem.value;
  const rungs = rescueDigits(trusted, problem.elements.length + 1);
  for (const [k, digits] of rungs.entries()) {
    const outcome = await relate(problem, digits, 'lattice', options, null);
    if (outcome.kind !== 'relation' || outcome.coefficients[0] === 0n) continue;
    const record = await judge(problem, outcome, digits, options, k + 3);
    if (record.verdict === 'holds') return record;
  }
  return undefined;
}
