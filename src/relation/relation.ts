/** The entry point of the relation engine: one request, one run in steps, one outcome. */
import { InputError } from '../number/errors.ts';
import { log10Of } from '../number/integer.ts';
import { certifyNormBound, type NormBound } from './bound.ts';
import type { RelationOutcome, RelationProgress, RelationRequest, RelationRun } from './contract.ts';
import { mayVanish, type Prepared, prepare } from './prepare.ts';
import { pslq } from './pslq/search.ts';
import { type ExactState, initialState } from './pslq/state.ts';
import { primitive, SURPLUS_DIGITS, surplusDigits, withinErrors } from './significance.ts';

/** Work between two looks at the clock is a few milliseconds; a step ends at the first look past this many. */
const STEP_MILLISECONDS = 5;

/**
 * Begins the search for an integer relation of `request.rows`. Throws InputError for rows that cannot be searched
 * (see `prepare`) and for a maxNormLog10 that is not a number ≥ 0.
 *
 * Guarantees: a 'relation' vanishes within the given balls, exactly, and is more than chance (see `surplusDigits`);
 * normBoundLog10 bounds the norm of every relation of any numbers inside the balls. The outcome depends on the request only.
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

function inSteps(work: Generator<void, RelationOutcome, void>, progress: RelationProgress): RelationRun {
  let outcome: RelationOutcome | undefined;
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

type Progress = { fraction: number; iterations: number; normBoundLog10: number };

function* search(
  request: RelationRequest,
  prepared: Prepared,
  progress: Progress,
): Generator<void, RelationOutcome, void> {
  const { immediate } = prepared;
  if (immediate !== undefined) {
    const { coefficients, confidenceLog10 } = immediate;
    return { kind: 'relation', coefficients, confidenceLog10, normBoundLog10: 0, iterations: 0 };
  }
  const state = initialState(prepared);
  const maxNormLog10 = request.maxNormLog10 ?? Number.POSITIVE_INFINITY;
  // The last rows of a PSLQ state are orthogonalised first.
  const certify = (weights: readonly number[]): NormBound =>
    certifyNormBound(prepared, [...state.basis].reverse(), weights);
  const end = yield* pslq(
    prepared,
    state,
    {
      accept: (c) => surplusDigits(prepared, c) >= SURPLUS_DIGITS && mayVanish(prepared.rows, c),
      maxNormLog10,
      bounded: (weights) => certify(weights).normBoundLog10 >= maxNormLog10,
    },
    progress,
  );
  const { normBoundLog10 } = certify(end.weights);
  const { iterations } = progress;
  progress.normBoundLog10 = normBoundLog10;
  if (end.kind === 'candidate') {
    const coefficients = primitive(state.basis[end.index] as bigint[]);
    return {
      kind: 'relation',
      coefficients,
      confidenceLog10: confidence(prepared, state, end.index),
      normBoundLog10,
      iterations,
    };
  }
  const asked = request.maxNormLog10 ?? Math.log10(state.n) / 2;
  if (normBoundLog10 >= asked) return { kind: 'excluded', normBoundLog10, iterations };
  return { kind: 'inconclusive', reason: shortage(prepared, request.maxNormLog10 ?? 1), normBoundLog10, iterations };
}

/**
 * log10 of the smallest residual that does not vanish within the errors over the one of the relation (at least one unit);
 * all columns together. 0 when every row vanishes.
 */
function confidence(prepared: Prepared, state: ExactState, index: number): number {
  const size = (i: number): number => log10Of((state.residuals[i] as bigint[]).reduce((s, y) => s + y * y, 0n)) / 2;
  const others = state.basis
    .map((_, i) => i)
    .filter((i) => !withinErrors(prepared, state.basis[i] as bigint[], state.residuals[i] as bigint[]));
  if (others.length === 0) return 0;
  return Math.max(0, Math.min(...others.map(size)) - Math.max(0, size(index)));
}

/** About how many digits a search of n numbers in m columns needs to rule out every norm up to 10^maxNormLog10. */
export function digitsNeeded(n: number, m: number, maxNormLog10: number): number {
  // Lattice reduction leaves its shortest vector within about 1.02^n of the root of the determinant (Gama and Nguyen 2008).
  return Math.ceil((n * (maxNormLog10 + n * Math.log10(1.02) + 0.3)) / m) + 1;
}

function shortage(prepared: Prepared, maxNormLog10: number): string {
  const n = prepared.integers.length;
  const m = prepared.columns.length;
  const have = Math.floor(Math.min(...prepared.precisionBits) * Math.log10(2));
  const need = Math.max(digitsNeeded(n, m, maxNormLog10), have + 1);
  return `The digits ran out: ${have} right digits cannot decide about relations of ${n} numbers with norm up to 10^${maxNormLog10.toPrecision(3)}; about ${need} would be needed.`;
}
