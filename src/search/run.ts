/** One search from request to record: constants, relation, evidence. */
import { InputError } from '../number/errors.ts';
import type { RelationOutcome } from '../relation/contract.ts';
import { algebraicSearch } from './algebraic.ts';
import { digitsUsed } from './estimate.ts';
import { judge } from './judge.ts';
import { multiplicativeProblem } from './multiplicative.ts';
import { type Problem, prepareProblem, type SearchOptions } from './problem.ts';
import type { SearchRecord } from './record.ts';
import { type Report, relate } from './relate.ts';
import type { SearchRequest } from './request.ts';

/** Shares of the trusted digits with which a search that found nothing is repeated, in case the last digits are wrong. */
const RESCUE_SHARES = [0.6, 0.4, 0.25];
const FEWEST_RESCUE_DIGITS = 20;

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
    (outcome.kind === 'excluded' ? await rescue(problem, options) : undefined) ??
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
  const problem = prepareProblem(request, options, onProgress);
  return form === 'linear' ? problem : multiplicativeProblem(problem);
}

/** First with part of the trusted digits; without a relation again with all of them, so that the negative is as strong as they allow. */
async function search(
  problem: Problem,
  options: SearchOptions,
  report: Report,
): Promise<{ outcome: RelationOutcome; digits: number }> {
  const { trusted } = problem.value;
  const used = digitsUsed(trusted);
  const outcome = await relate(problem, used, problem.method, options, report);
  if (outcome.kind === 'relation' || used >= trusted) return { outcome, digits: used };
  return { outcome: await relate(problem, trusted, problem.method, options, report), digits: trusted };
}

/** A relation that holds on fewer digits and is contradicted by the last ones: the record of a wrong tail, or undefined. */
async function rescue(problem: Problem, options: SearchOptions): Promise<SearchRecord | undefined> {
  for (const share of RESCUE_SHARES) {
    const digits = Math.floor(problem.value.trusted * share);
    if (digits < FEWEST_RESCUE_DIGITS) return undefined;
    const outcome = await relate(problem, digits, problem.method, options, null);
    if (outcome.kind !== 'relation' || outcome.coefficients[0] === 0n) continue;
    const record = await judge(problem, outcome, digits, options);
    if (record.verdict === 'holds') return record;
  }
  return undefined;
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
