/**
 * Multiplicative relations Π xₖ^{cₖ} = root of unity, from logarithms: Σ cₖ·log|xₖ| = 0 is a linear relation, and the argument of the
 * product then says which root of unity it is.
 */
import { add, type Ball, fromInteger, timesInteger } from '../number/ball.ts';
import { absolute, gcd } from '../number/integer.ts';
import type { Method, RelationOutcome, RelationProgress } from './contract.ts';
import { startRelation } from './relation.ts';

/** A non-zero number by its logarithm. */
export interface Logarithm {
  /** log |x|. */
  readonly modulus: Ball;
  /** arg(x)/2π, any branch. Exactly 0 for a positive and 1/2 for a negative number (`POSITIVE`, `NEGATIVE`). */
  readonly turn: Ball;
}

export const POSITIVE: Ball = fromInteger(0n);
export const NEGATIVE: Ball = { mid: 1n, rad: 0n, bits: 1 };

/** e^{2πi·p/q}, 0 ≤ p < q, in lowest terms. */
export interface RootOfUnity {
  readonly p: number;
  readonly q: number;
}

export type MultiplicativeOutcome =
  | (Extract<RelationOutcome, { kind: 'relation' }> & {
      /** What Π xₖ^{cₖ} is; undefined when the arguments fit no root of unity of order up to MAX_ORDER: then only its absolute value is 1. */
      readonly root: RootOfUnity | undefined;
    })
  | Exclude<RelationOutcome, { kind: 'relation' }>;

export interface MultiplicativeRun {
  step(): MultiplicativeOutcome | undefined;
  readonly progress: RelationProgress;
}

/** Roots of unity of higher order are not looked for. */
export const MAX_ORDER = 1000;
/** An argument names a root of unity only if its uncertainty would admit one by chance with odds below 2^−this. */
const CHANCE_BITS = 20;

/** Begins a search for exponents; steps, errors and guarantees of `startRelation` on the logarithms of absolute values. */
export function startMultiplicative(request: {
  readonly numbers: readonly Logarithm[];
  readonly method: Method;
  readonly maxNormLog10?: number;
}): MultiplicativeRun {
  const { numbers, method, maxNormLog10 } = request;
  const rows = numbers.map((x) => [x.modulus]);
  const run = startRelation({ rows, method, ...(maxNormLog10 === undefined ? {} : { maxNormLog10 }) });
  let outcome: MultiplicativeOutcome | undefined;
  return {
    get progress() {
      return run.progress;
    },
    step() {
      const found = outcome === undefined ? run.step() : undefined;
      if (found !== undefined) {
        outcome = found.kind === 'relation' ? { ...found, root: rootOf(numbers, found.coefficients) } : found;
      }
      return outcome;
    },
  };
}

function rootOf(numbers: readonly Logarithm[], exponents: readonly bigint[]): RootOfUnity | undefined {
  const turn = numbers.reduce((sum, x, k) => add(sum, timesInteger(x.turn, exponents[k] as bigint)), fromInteger(0n));
  return rootOfUnity(turn);
}

/** The root of unity e^{2πi·turn}, of least order up to MAX_ORDER; undefined if there is none or the ball is too wide to tell. */
export function rootOfUnity(turn: Ball): RootOfUnity | undefined {
  const one = 1n << BigInt(turn.bits);
  // Roots of order up to N lie at about N²/3 places: their shadows must cover a negligible part of the circle.
  if (turn.rad * BigInt(MAX_ORDER) ** 2n > one >> BigInt(CHANCE_BITS)) return undefined;
  for (let q = 1n; q <= BigInt(MAX_ORDER); q++) {
    const scaled = turn.mid * q;
    const p = (scaled + (one >> 1n)) >> BigInt(turn.bits);
    if (absolute(scaled - p * one) > turn.rad * q) continue;
    const reduced = ((p % q) + q) % q;
    const divisor = gcd(reduced, q);
    return { p: Number(reduced / divisor), q: Number(q / divisor) };
  }
  return undefined;
}
