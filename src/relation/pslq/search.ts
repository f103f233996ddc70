/**
 * The PSLQ method as a generator: it yields between pieces of work of at most a few milliseconds and returns the candidate
 * that ended it. Deterministic.
 *
 * Three levels: iterations in Float64 (iterate.ts), their transforms collected and applied to the exact integers
 * (state.ts), and H recomputed from the exact integers, so that rounding never accumulates.
 */
import { bitLength } from '../../number/integer.ts';
import type { Prepared } from '../prepare.ts';
import { withinErrors } from '../significance.ts';
import { factorH, log2Drop, log2MaxDiagonal } from './factor.ts';
import { iterate, newStage, reduceWide } from './iterate.ts';
import { doubleRows, type ExactState, transformedRow } from './state.ts';

export interface PslqProgress {
  fraction: number;
  iterations: number;
  normBoundLog10: number;
}

/** How the search ended, with the weights (log2 ρ per column) at which the state is then reduced. */
export type PslqEnd = { readonly weights: readonly number[] } & (
  | { readonly kind: 'candidate'; readonly index: number }
  /** The norm bound asked for is proved. */
  | { readonly kind: 'bounded' }
  /** All digits are used. */
  | { readonly kind: 'exhausted' }
);

export interface PslqOptions {
  /** Whether a vector that vanishes within the errors is to end the search. */
  readonly accept: (coefficients: readonly bigint[]) => boolean;
  readonly maxNormLog10: number;
  /** Asked when the bound in doubles has passed maxNormLog10: whether it can be proved at these weights. */
  readonly bounded: (weightsLog2: readonly number[]) => boolean;
}

/** Multipliers of one stage stay near 2^this: what a double carries minus room for rounding. */
const STAGE_BITS = 30;

/** Stages at one weight before the next digits are fed all the same: rounding can make exchanges that undo each other. */
const PASS_LIMIT = 1000;

/** log2 ρ, integers, per column, at the beginning and at the end of a search. */
export interface Weights {
  readonly start: readonly number[];
  readonly end: readonly number[];
}

/**
 * ρ begins at the largest |x| and ends at twice ‖errors‖ (so that the errors cost the norm bound a factor √(1 + m/4) at most),
 * or, where the numbers are exact, so low that a vector which does not vanish is longer than the shortest relation.
 */
export function weightRange(prepared: Prepared): Weights {
  const start = prepared.columns.map((_, j) => Math.max(...prepared.integers.map((x) => bitLength(x[j] as bigint))));
  const end = prepared.columns.map((_, j) => {
    let square = 0n;
    for (const e of prepared.errors) square += (e[j] as bigint) ** 2n;
    return square === 0n ? -(start[j] as number) - prepared.integers.length : Math.ceil(bitLength(square) / 2) + 1;
  });
  return { start, end };
}

export function* pslq(
  prepared: Prepared,
  state: ExactState,
  options: PslqOptions,
  progress: PslqProgress,
): Generator<void, PslqEnd, void> {
  const { start, end } = weightRange(prepared);
  const total = Math.max(...start.map((s, j) => s - (end[j] as number)));
  const weightsAt = (fed: number): number[] =>
    start.map((s, j) => s - Math.round(((s - (end[j] as number)) * fed) / total));
  const count = { rounds: 0 };
  let fed = 0;
  let passes = 0;
  for (;;) {
    const weights = weightsAt(fed);
    const { rows, exponent } = doubleRows(state, weights);
    const factor = factorH(rows, state.n, state.n + state.m);
    if (factor === undefined) return { kind: 'exhausted', weights };
    const { h } = factor;
    const stage = newStage(factor, state.n);
    let status = iterate(stage, 8, count);
    while (status === 'more') {
      yield;
      status = iterate(stage, 8, count);
    }
    yield* apply(state, stage.u);
    if (status === 'wide') widen(state, weights);
    progress.iterations = count.rounds;
    progress.fraction = Math.min(1, fed / total);
    if (status !== 'done' && ++passes < PASS_LIMIT) continue;
    passes = 0;
    const bound = exponent - log2MaxDiagonal(h, state.n) - Math.log2(1 + (state.m / 4) * 4 ** (fed - total)) / 2;
    progress.normBoundLog10 = Math.max(0, bound * Math.log10(2));
    const index = vanishing(prepared, state, options);
    if (index >= 0) return { kind: 'candidate', index, weights };
    if (progress.normBoundLog10 > options.maxNormLog10 && options.bounded(weights)) return { kind: 'bounded', weights };
    if (fed >= total) return { kind: 'exhausted', weights };
    fed = Math.min(total, fed + Math.max(2, Math.floor(STAGE_BITS - log2Drop(h, state.n))));
  }
}

/** Size-reduces rows of very different length, on the exact integers. */
function widen(state: ExactState, weights: readonly number[]): void {
  const { rows } = doubleRows(state, weights);
  const factor = factorH(rows, state.n, state.n + state.m);
  if (factor === undefined) return;
  reduceWide(factor, state.n, (i, j, t) => {
    const multiple = BigInt(t);
    const add = (target: bigint[], source: readonly bigint[]): void =>
      source.forEach((value, k) => {
        target[k] = (target[k] as bigint) + multiple * value;
      });
    add(state.basis[j] as bigint[], state.basis[i] as bigint[]);
    add(state.residuals[j] as bigint[], state.residuals[i] as bigint[]);
  });
}

function* apply(state: ExactState, u: Float64Array): Generator<void, void, void> {
  const basis: bigint[][] = [];
  const residuals: bigint[][] = [];
  for (let i = 0; i < state.n; i++) {
    basis.push(transformedRow(u, state.n, i, state.basis));
    residuals.push(transformedRow(u, state.n, i, state.residuals));
    if (i % 8 === 7) yield;
  }
  state.basis = basis;
  state.residuals = residuals;
}

/** The first acceptable row whose residuals are all within what the errors allow; −1 if there is none. */
function vanishing(prepared: Prepared, state: ExactState, options: PslqOptions): number {
  for (let i = 0; i < state.n; i++) {
    const row = state.basis[i] as bigint[];
    if (withinErrors(prepared, row, state.residuals[i] as bigint[]) && options.accept(row)) return i;
  }
  return -1;
}
