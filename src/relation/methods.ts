/** What a search method is to the engine, and PSLQ as one. */
import { type Prepared, residualsOf } from './prepare.ts';
import { pslq } from './pslq/search.ts';
import { initialState } from './pslq/state.ts';
import { log10Norm, withinErrors } from './significance.ts';

export interface MethodProgress {
  fraction: number;
  iterations: number;
  normBoundLog10: number;
}

/** Rows of a unimodular matrix. */
export type Basis = readonly (readonly bigint[])[];

export interface MethodOptions {
  /** Whether a vector that vanishes within the errors is to end the search. */
  readonly accept: (coefficients: readonly bigint[]) => boolean;
  /** Infinity for none. */
  readonly maxNormLog10: number;
  /** Whether this basis at these weights proves that every relation is longer than maxNormLog10. */
  readonly bounded: (basis: Basis, weightsLog2: readonly number[]) => boolean;
}

export interface MethodEnd {
  readonly kind: 'candidate' | 'bounded' | 'exhausted' | 'unstable';
  /** The accepted vector, for 'candidate'. */
  readonly coefficients: readonly bigint[] | undefined;
  /** A unimodular basis in order of orthogonalisation, and the weights log2 ρⱼ at which it is reduced. */
  readonly basis: Basis;
  readonly weights: readonly number[];
}

/** Yields every few milliseconds. */
export type SearchMethod = (
  prepared: Prepared,
  options: MethodOptions,
  progress: MethodProgress,
) => Generator<void, MethodEnd, void>;

export const pslqMethod: SearchMethod = function* (prepared, options, progress) {
  const state = initialState(prepared);
  // The last rows of a PSLQ state are orthogonalised first.
  const ordered = (): Basis => [...state.basis].reverse();
  const { accept, maxNormLog10 } = options;
  const bounded = (weights: readonly number[]): boolean => options.bounded(ordered(), weights);
  const end = yield* pslq(prepared, state, { accept, maxNormLog10, bounded }, progress);
  const found = end.kind === 'candidate';
  return {
    kind: end.kind,
    coefficients: found ? state.basis[end.index] : undefined,
    basis: ordered(),
    weights: end.weights,
  };
};

/**
 * log10 of the smallest residual among the rows of `basis` that do not vanish within the errors over that of the relation
 * (at least one unit); all columns together. 0 when every row vanishes. `residuals` are those of the basis.
 */
export function confidence(
  prepared: Prepared,
  basis: Basis,
  residuals: readonly (readonly bigint[])[],
  coefficients: readonly bigint[],
): number {
  let least = Number.POSITIVE_INFINITY;
  basis.forEach((row, i) => {
    const y = residuals[i] as readonly bigint[];
    if (!withinErrors(prepared, row, y)) least = Math.min(least, log10Norm(y));
  });
  if (!Number.isFinite(least)) return 0;
  return Math.max(0, least - Math.max(0, log10Norm(residualsOf(prepared, coefficients))));
}
