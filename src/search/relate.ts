/** The relation engine on a problem at some number of digits, in turns of the event loop. */
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
export async function relate(
  problem: Problem,
  digits: number,
  method: Method,
  options: SearchOptions,
  report: Report | null,
): Promise<RelationOutcome> {
  const { maxNorm } = problem.request;
  const run = startRelation({
    rows: [problem.believe(digits), ...problem.constants],
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
