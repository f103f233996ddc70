import type { Evidence, Verdict } from '../evidence/evidence.ts';
import type { SearchRequest } from './request.ts';

export type OutcomeKind = 'relation' | 'excluded' | 'basis-dependent' | 'inconclusive' | 'cancelled';

export interface RelationEntry {
  /** Typed text of the basis constant (for the algebraic form `x^k`; for the multiplicative form the base). */
  readonly constant: string;
  readonly latex: string;
  readonly weight: number | null;
  /** Exact rational "p/q" or "p"; "0" for constants offered and not used. For a dependent basis: the integer coefficient. */
  readonly coefficient: string;
}

/** Progress of a whole search, in the order of its stages. */
export interface SearchProgress {
  readonly stage: 'constants' | 'relation' | 'evidence';
  /** Of the present stage, 0 … 1. */
  readonly fraction: number;
  readonly iterations: number;
  readonly normBoundLog10: number;
  readonly elapsedMs: number;
  /** Estimate for the rest of the search; null while there is no ground for one. */
  readonly remainingMs: number | null;
}

/** The portable account of one search: everything needed to re-check it. Plain JSON; large numbers are text. */
export interface SearchRecord {
  readonly format: 'digit-assay/record';
  readonly version: 1;
  readonly request: SearchRequest;
  readonly outcome: OutcomeKind;
  /** Constants in the order offered, with the coefficient each received. Empty unless a relation was found. */
  readonly relation: readonly RelationEntry[];
  /** Integer vector over (value, basis…) as found. */
  readonly integers: readonly string[];
  readonly expression: { readonly text: string; readonly latex: string } | null;
  readonly agreementDigits: number | null;
  readonly surplusDigits: number | null;
  readonly heldOut: { readonly used: number; readonly predicted: number } | null;
  /** Proven lower bound on the norm of any relation, as decimal text such as "1.8e9". Null where nothing was proven. */
  readonly normBound: string | null;
  readonly verdict: Verdict | null;
  readonly diagnosis: readonly string[];
  readonly evidence: Evidence | null;
  readonly timings: { readonly constantsMs: number; readonly relationMs: number; readonly evidenceMs: number };
  readonly engine: { readonly version: string; readonly method: 'pslq' | 'lattice' };
}
