/**
 * What goes into and comes out of the relation engine. Everything here is about given numbers only: nothing knows what they mean.
 *
 * A relation of n numbers x₁ … xₙ (each a row of m columns) is an integer vector c ≠ 0 with Σ cᵢ·xᵢⱼ = 0 for every column j.
 */
import type { Ball } from '../number/ball.ts';

export type Method = 'pslq' | 'lattice';

export interface RelationRequest {
  /** n rows of m balls. m = 1 for a real value; 2 for real and imaginary part together; k for k values sharing one coefficient vector. */
  readonly rows: readonly (readonly Ball[])[];
  readonly method: Method;
  /** Stop with `excluded` as soon as every relation with Euclidean norm up to 10^this is ruled out. */
  readonly maxNormLog10?: number;
}

export interface RelationProgress {
  /** Share of the offered digits that have been used up, 0 … 1. */
  readonly fraction: number;
  readonly iterations: number;
  /** log10 of the present lower bound on the norm of any relation. Evidence while running; proven only in an outcome. */
  readonly normBoundLog10: number;
}

export type RelationOutcome =
  | {
      readonly kind: 'relation';
      /** Primitive (content 1), first non-zero entry positive. */
      readonly coefficients: readonly bigint[];
      /** log10 of the gap between the residual of this relation and that of the next best vector: large for a real relation. */
      readonly confidenceLog10: number;
      /** log10 of a proven lower bound on the norm of every relation. */
      readonly normBoundLog10: number;
      readonly iterations: number;
    }
  | { readonly kind: 'excluded'; readonly normBoundLog10: number; readonly iterations: number }
  | {
      readonly kind: 'inconclusive';
      /** One plain sentence. */
      readonly reason: string;
      readonly normBoundLog10: number;
      readonly iterations: number;
    };

/** A search in steps of a few milliseconds, so that its owner can report progress and hear a cancel between them. Deterministic: the outcome does not depend on timing. */
export interface RelationRun {
  /** Works for a few milliseconds; returns the outcome once there is one (and the same one from then on). */
  step(): RelationOutcome | undefined;
  readonly progress: RelationProgress;
}
