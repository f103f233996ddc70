/** The entry point of the relation engine: one request, one run in steps, one outcome. */
import { InputError } from '../number/errors.ts';
import { absolute } from '../number/integer.ts';
import { certifyNormBound, type NormBound } from './bound.ts';
import type { RelationOutcome, RelationProgress, RelationRequest, RelationRun } from './contract.ts';
import { latticeMethod } from './lattice-method.ts';
import { confidence, type MethodEnd, type MethodOptions, type MethodProgress, pslqMethod } from './methods.ts';
import { mayVanish, type Prepared, prepare, residualsOf } from './prepare.ts';
import {
  digitsNeeded,
  errorsOf,
  log10Norm,
  primitive,
  SURPLUS_DIGITS,
  surplusOf,
  withinErrors,
} from './significance.ts';

/** Work between two looks at the clock is a few milliseconds; a step ends at the first look past this many. */
const STEP_MILLISECONDS = 5;

/**
 * Begins the search for an integer relation of `request.rows`. Throws InputError for rows that cannot be searched
 * (see `prepare`) and for a maxNormLog10 that is not a number ≥ 0.
 *
 * Guarantees: a 'relation' vanishes within the given balls, exactly, and is more than chance (see `surplusOf`);
 * normBoundLog10 is proved (see `certifyNormBound`) for any numbers inside the balls. The outcome depends on the request only.
 */
export function startRelation(request: RelationRequest): RelationRun {
  const { maxNormLog10 } = request;
  if (maxNormLog10 !== undefined && !(maxNormLog10 >= 0)) {
    throw new InputError('max-norm', 'The largest norm to be searched must be at least 1.');
  }
  const prepared = prepare(request.rows);
  const progress = { fraction: 0, iterations: 0, normBoundLog10: 0 };
  return inSteps(search(request, prepared, progress), progress);
}

/** A generator that yields every few milliseconds, as a run in steps. */
export function inSteps<Outcome>(
  work: Generator<void, Outcome, void>,
  progress: RelationProgress,
): { step(): Outcome | undefined; readonly progress: RelationProgress } {
  let outcome: Outcome | undefined;
  return {
    progress,
    step() {
      const until = performance.now() + STEP_MILLISECONDS;
      while (outcome === undefined) {
        const next = work.next();
        if (next.done) outcome = next.value;
        else if (performance.now() >= until) break;
      }
      return outcome;
    },
  };
}

function* search(
  request: RelationRequest,
  prepared: Prepared,
  progress: MethodProgress,
): Generator<void, RelationOutcome, void> {
  const { immediate } = prepared;
  if (immediate !== undefined) {
    const { coefficients, confidenceLog10 } = immediate;
    return { kind: 'relation', coefficients, confidenceLog10, normBoundLog10: 0, iterations: 0 };
  }
  const maxNormLog10 = request.maxNormLog10 ?? Number.POSITIVE_INFINITY;
  const surplus = surplusOf(prepared);
  const options: MethodOptions = {
    accept: (c) => surplus(c) >= SURPLUS_DIGITS && mayVanish(prepared.rows, c),
    maxNormLog10,
    bounded: (basis, weights) => certifyNormBound(prepared, basis, weights).normBoundLog10 >= maxNormLog10,
  };
  const method = request.method === 'lattice' ? latticeMethod : pslqMethod;
  const end = yield* method(prepared, options, progress);
  yield;
  const residuals: bigint[][] = [];
  for (const row of end.basis) {
    residuals.push(residualsOf(prepared, row));
    if (residuals.length % 16 === 0) yield;
  }
  const bound = certifyNormBound(prepared, end.basis, end.weights, residuals);
  yield;
  progress.normBoundLog10 = bound.normBoundLog10;
  const { iterations } = progress;
  if (end.coefficients === undefined) return negative(request, prepared, end, bound, iterations);
  const coefficients = primitive(end.coefficients);
  const loose = undetermined(prepared, coefficients, end, residuals, surplus);
  if (loose !== undefined) {
    const reason = `A relation shows, but its coefficients are not fixed: number ${loose + 1} is too small for what the uncertainties of the others leave open.`;
    return { kind: 'inconclusive', reason, normBoundLog10: bound.normBoundLog10, iterations };
  }
  const confidenceLog10 = confidence(prepared, end.basis, residuals, coefficients);
  return { kind: 'relation', coefficients, confidenceLog10, normBoundLog10: bound.normBoundLog10, iterations };
}

function negative(
  request: RelationRequest,
  prepared: Prepared,
  end: MethodEnd,
  { normBoundLog10, proved }: NormBound,
  iterations: number,
): RelationOutcome {
  const unstable = end.kind === 'unstable' || !proved;
  const asked =
    request.maxNormLog10 ?? (unstable ? Number.POSITIVE_INFINITY : Math.log10(prepared.integers.length) / 2);
  if (normBoundLog10 >= asked) return { kind: 'excluded', normBoundLog10, iterations };
  const reason = unstable
    ? 'Double precision did not suffice to reduce these numbers; the other method or other digits may decide.'
    : shortage(prepared, request.maxNormLog10 ?? 1);
  return { kind: 'inconclusive', reason, normBoundLog10, iterations };
}

/**
 * A number whose coefficient the digits do not fix, if there is one: it is itself below what the errors leave open in the relation, or
 * it takes part in a vector no longer than the relation that can be added to it, and is no relation itself.
 */
function undetermined(
  prepared: Prepared,
  coefficients: readonly bigint[],
  end: MethodEnd,
  residuals: readonly (readonly bigint[])[],
  surplus: (coefficients: readonly bigint[]) => number,
): number | undefined {
  const allowed = errorsOf(prepared, coefficients);
  const small = prepared.integers.findIndex((x) => x.every((value, j) => absolute(value) <= (allowed[j] as bigint)));
  if (small >= 0) return small;
  const norm = log10Norm(coefficients);
  const own = residualsOf(prepared, coefficients);
  const fits = (sign: bigint, row: readonly bigint[], y: readonly bigint[]): boolean => {
    const sum = coefficients.map((c, k) => c + sign * (row[k] as bigint));
    const residual = own.map((r, j) => r + sign * (y[j] as bigint));
    return sum.some((c) => c !== 0n) && withinErrors(prepared, sum, residual);
  };
  const loose = end.basis.find((row, i) => {
    const y = residuals[i] as readonly bigint[];
    if (log10Norm(row) > norm || !(fits(1n, row, y) || fits(-1n, row, y))) return false;
    return !withinErrors(prepared, row, y) || surplus(row) < SURPLUS_DIGITS;
  });
  return loose?.findIndex((c) => c !== 0n);
}

function shortage(prepared: Prepared, maxNormLog10: number): string {
  const n = prepared.integers.length;
  const m = prepared.columns.length;
  const have = Math.max(0, Math.floor(Math.min(...prepared.precisionBits) * Math.log10(2)));
  const need = Math.max(digitsNeeded(n, m, maxNormLog10), have + 1);
  return `The digits ran out: ${have} right digits cannot decide about relations of ${n} numbers with norm up to 10^${maxNormLog10.toPrecision(3)}; about ${need} would be needed.`;
}
