import type { Value } from '../number/complex.ts';
import type { CallTerm, SymbolTerm, Term } from './term.ts';

/** Evaluates an argument term to an absolute error of 2^−bits; handed to families so that they need not know the registry. */
export type ArgumentEvaluator = (term: Term, bits: number) => Value;

export interface EvaluationContext {
  readonly argument: ArgumentEvaluator;
  readonly signal?: AbortSignal | undefined;
  /** Fraction of the pass that is done, 0 … 1. */
  readonly onProgress?: ((fraction: number) => void) | undefined;
}

/**
 * Constants computed by one method. `Args` is the family's own checked form of a call or symbol.
 *
 * The evaluation contract: the returned ball (or each part of a complex ball) contains the constant, and its radius is at
 * most 2^−bits absolute. The radius is proven; the family's header comment says how.
 */
export interface Family<Args = unknown> {
  /** Stable kebab-case key, for example `zeta`. */
  readonly key: string;
  readonly title: string;
  /** The function names and symbols this family claims in the grammar, for example `zeta`. A name may be shared by several families (`zeta` by single, multiple and alternating values): the first whose `parse` does not return null takes it. */
  readonly names: readonly string[];
  /** Checks a call or symbol. Null when it belongs to another family with the same name; InputError when it is ours but wrong (a diverging sum, a wrong number of arguments). */
  parse(term: CallTerm | SymbolTerm): Args | null;
  /** Transcendental weight, or null where none is agreed. */
  weight(args: Args): number | null;
  latex(args: Args): string;
  /** Canonical typed text; parses back to the same constant and is its cache key. */
  text(args: Args): string;
  isReal(args: Args): boolean;
  evaluate(args: Args, bits: number, context: EvaluationContext): Value;
  /** Evaluates many members in one pass where that is cheaper; same contract as `evaluate`, results in order. */
  evaluateMany?(args: readonly Args[], bits: number, context: EvaluationContext): Value[];
  /** The defining sum or integral in LaTeX, with its convention. */
  readonly definition: string;
  /** Literature source of the definition and of the method. */
  readonly source: string;
  /** Typed members listed in the catalogue. */
  readonly examples: readonly string[];
}
