/** One search from request to record: constants, relation, evidence. */
import { InputError } from '../number/errors.ts';
import type { RelationOutcome } from '../relation/contract.ts';
import { algebraicSearch } from './algebraic.ts';
import { digitsFixing, digitsLeaving, digitsUsed } from './estimate.ts';
import { judge } from './judge.ts';
import { multiplicativeProblem } from './multiplicative.ts';
import { type Problem, prepareProblem, type SearchOptions } from './problem.ts';
import type { SearchRecord } from './record.ts';
import { type Report, relate } from './relate.ts';
import type { SearchRequest } from './request.ts';
import { rescue } from './rescue.ts';

/**
 * Runs one search. Rejects with InputError for a request that cannot be carried out (one plain sentence), and with the
 * signal's reason when it is aborted. Everything else, a negative answer included, is a record.
 */
export async function runSearch(request: SearchRequest, options: SearchOptions = {}): Promise<SearchRecord> {
  const timings = { constantsMs: 0, relationMs: 0, evidenceMs: 0 };
  const start = performance.now();
  const report = reporter(options, start);
  report('constants', 0);
  if (request.form === 'algebraic') return algebraicSearch(request, options, report);
  const problem = problemOf(request, options, (fraction) => report('constants', fraction));
  const searching = performance.now();
  timings.constantsMs = searching - start;
  const { outcome, digits } = await search(problem, options, report);
  const judging = performance.now();
  timings.relationMs = judging - searching;
  report('evidence', 0);
  const record =
    (outcome.kind === 'relation' ? undefined : await rescue(problem, options)) ??
    (await judge(problem, outcome, digits, options));
  timings.evidenceMs = performance.now() - judging;
  report('evidence', 1);
  return { ...record, timings };
}

function problemOf(request: SearchRequest, options: SearchOptions, onProgress: (fraction: number) => void): Problem {
  const { form = 'linear' } = request;
  if (form !== 'linear' && form !== 'multiplicative') {
    throw new InputError(
      'unknown-form',
      `The form “${form}” is not known; forms are linear, multiplicative and algebraic.`,
    );
  }
  const { amongSearches = 1 } = request;
  if (!Number.isInteger(amongSearches) || amongSearches < 1) {
    throw new InputError('bad-count', 'The number of searches that this one is of must be a positive whole number.');
  }
  const problem = prepareProblem(request, options, onProgress);
  return form === 'linear' ? problem : multiplicativeProblem(problem);
}

/**
 * First with part of the trusted digits; without a relation again with all of them, so that the negative is as strong as
 * they allow. A relation that only then shows is searched for once more with as many digits as leave some to predict.
 */
async function search(
  problem: Problem,
  options: SearchOptions,
  report: Report,
): Promise<{ outcome: RelationOutcome; digits: number }> {
  const { trusted } = problem.value;
  const used = digitsUsed(trusted);
  const outcome = await relate(problem, used, problem.method, options, report);
  if (outcome.kind === 'relation' || used >= trusted) return { outcome, digits: used };
  const whole = await relate(problem, trusted, problem.method, options, report);
  if (whole.kind === 'relation') {
    const fewer = digitsLeaving(trusted, digitsFixing(whole.coefficients, problem.columns));
    const again = fewer > used ? await relate(problem, fewer, problem.method, options, report) : outcome;
    if (again.kind === 'relation') return { outcome: again, digits: fewer };
  }
  return { outcome: whole, digits: trusted };
}

function reporter(options: SearchOptions, start: number): Report {
  let last = Number.NEGATIVE_INFINITY;
  let stageStart = start;
  let stageNow = '';
  return (stage, fraction, iterations = 0, normBoundLog10 = 0) => {
    const now = performance.now();
    if (stage !== stageNow) {
      stageNow = stage;
      stageStart = now;
    } else if (now - last < 60) return;
    last = now;
    const spent = now - stageStart;
    const remainingMs = fraction > 0.05 && spent > 200 ? (spent * (1 - fraction)) / fraction : null;
    options.onProgress?.({ stage, fraction, iterations, normBoundLog10, elapsedMs: now - start, remainingMs });
  };
}
