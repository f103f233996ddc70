/** The relation engine on a problem at some number of digits, in turns of the event loop. */
import type { Ball } from '../number/ball.ts';
import type { Method, RelationOutcome } from '../relation/contract.ts';
import { startRelation } from '../relation/relation.ts';
import { readMaxNorm } from './intake.ts';
import { pacer } from './pause.ts';
import type { Problem, SearchOptions } from './problem.ts';
import type { SearchProgress } from './record.ts';

export type Report = (
  stage: SearchProgress['stage'],
  fraction: number,
  iterations?: number,
  normBoundLog10?: number,
) => void;

/** Searches with the value believed to `digits` digits. Rejects with the signal's reason when aborted. */
export function relate(
  problem: Problem,
  digits: number,
  method: Method,
  options: SearchOptions,
  report: Report | null,
): Promise<RelationOutcome> {
  const rows = [problem.believe(digits), ...problem.constants];
  return relateRows(rows, method, problem.request.maxNorm, options, report);
}

/** Searches among any numbers, a row each. Rejects with the signal's reason when aborted. */
export async function relateRows(
  rows: readonly (readonly Ball[])[],
  method: Method,
  maxNorm: string | undefined,
  options: SearchOptions,
  report: Report | null,
): Promise<RelationOutcome> {
  const run = startRelation({
    rows,
    method,
    ...(maxNorm === undefined ? {} : { maxNormLog10: readMaxNorm(maxNorm) }),
  });
  const pause = pacer(options.signal);
  for (;;) {
    options.signal?.throwIfAborted();
    const outcome = run.step();
    report?.('relation', run.progress.fraction, run.progress.iterations, run.progress.normBoundLog10);
    if (outcome !== undefined) return outcome;
    await pause();
  }
}
