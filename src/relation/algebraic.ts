/**
 * Minimal polynomials: a relation among 1, x, x², …, x^d, found from a part of the digits, factored exactly, held against the rest
 * of the digits, and its root told apart from the others.
 */
import { accuracy, type Ball, magnitude, timesInteger, widen, withBits } from '../number/ball.ts';
import { isComplex, multiply, toComplex, type Value } from '../number/complex.ts';
import { InputError } from '../number/errors.ts';
import type { Method, RelationOutcome, RelationProgress, RelationRun } from './contract.ts';
import { factorise } from './polynomial/factor.ts';
import { degree, type Polynomial, primitivePart, trimmed } from './polynomial/integer.ts';
import { isolate, type RootOf } from './polynomial/isolate.ts';
import { combination, mayVanish } from './prepare.ts';
import { inSteps, startRelation } from './relation.ts';

export interface AlgebraicRequest {
  readonly value: Value;
  /** Largest degree to be tried; at least 1. */
  readonly degree: number;
  readonly method: Method;
  /** For the Euclidean norm of the coefficients. */
  readonly maxNormLog10?: number;
  /**
   * Shares of the right digits that the search may use, tried in turn until a polynomial is found; the rest of the digits must then
   * agree. [0.85, 0.95] by default.
   */
  readonly searchShares?: readonly number[];
}

export type AlgebraicOutcome =
  | {
      readonly kind: 'algebraic';
      /** Minimal polynomial, constant term first; content 1, leading coefficient positive. */
      readonly polynomial: readonly bigint[];
      /** False when the factorisation gave up before it proved that nothing smaller divides it. */
      readonly irreducible: boolean;
      /** Which of the roots; undefined when the digits do not tell it from the others. */
      readonly root: RootOf | undefined;
      readonly confidenceLog10: number;
      /** Right bits that the search used, and right bits of the value: the polynomial vanishes to the latter. */
      readonly searchBits: number;
      readonly valueBits: number;
      readonly normBoundLog10: number;
      readonly iterations: number;
    }
  | {
      /** A polynomial fits the digits that were searched, but not the rest. */
      readonly kind: 'contradicted';
      readonly polynomial: readonly bigint[];
      /** Bits to which the value agrees with a root, about. */
      readonly agreementBits: number;
      readonly normBoundLog10: number;
      readonly iterations: number;
    }
  | Exclude<RelationOutcome, { kind: 'relation' }>;

export interface AlgebraicRun {
  step(): AlgebraicOutcome | undefined;
  readonly progress: RelationProgress;
}

const SEARCH_SHARES = [0.85, 0.95] as const;

/** Begins a search. Throws InputError for a degree below 1 (`degree`), a share outside (0, 1] (`share`), and as `startRelation`. */
export function startAlgebraic(request: AlgebraicRequest): AlgebraicRun {
  const { degree: d, searchShares = SEARCH_SHARES } = request;
  if (!Number.isInteger(d) || d < 1) throw new InputError('degree', 'The degree must be a whole number of at least 1.');
  if (searchShares.length === 0 || searchShares.some((share) => !(share > 0 && share <= 1))) {
    throw new InputError('share', 'The share of digits must lie between 0 and 1.');
  }
  const progress = { fraction: 0, iterations: 0, normBoundLog10: 0 };
  const rows = powerRows(request.value, d);
  // The first search begins here, so that refusals are for the caller and not for the first step.
  const first = startPart(request, rows, searchShares[0] as number);
  return inSteps(search(request, rows, first, searchShares.slice(1), progress), progress);
}

interface Part {
  readonly run: RelationRun;
  readonly bits: number;
}

/** A search on rows that keep `share` of their right bits. */
function startPart(request: AlgebraicRequest, rows: readonly (readonly Ball[])[], share: number): Part {
  const { maxNormLog10, method } = request;
  const bits = rightBits(request.value);
  const drop = Number.isFinite(bits) ? Math.floor(bits * (1 - share)) : 0;
  const limit = maxNormLog10 === undefined ? {} : { maxNormLog10 };
  return { run: startRelation({ rows: coarser(rows, drop), method, ...limit }), bits: bits - drop };
}

function* search(
  request: AlgebraicRequest,
  rows: readonly (readonly Ball[])[],
  first: Part,
  shares: readonly number[],
  progress: { fraction: number; iterations: number; normBoundLog10: number },
): Generator<void, AlgebraicOutcome, void> {
  let part = first;
  for (let next = 0; ; next++) {
    let found = part.run.step();
    while (found === undefined) {
      Object.assign(progress, part.run.progress);
      yield;
      found = part.run.step();
    }
    Object.assign(progress, part.run.progress);
    if (found.kind === 'relation') return yield* polynomialOf(request, rows, found, part.bits);
    const decided = request.maxNormLog10 !== undefined && found.kind === 'excluded';
    if (decided || next >= shares.length) return found;
    part = startPart(request, rows, shares[next] as number);
  }
}

function* polynomialOf(
  request: AlgebraicRequest,
  rows: readonly (readonly Ball[])[],
  found: Extract<RelationOutcome, { kind: 'relation' }>,
  searchBits: number,
): Generator<void, AlgebraicOutcome, void> {
  const { normBoundLog10, iterations, confidenceLog10 } = found;
  const d = request.degree;
  const whole = primitivePart(trimmed(found.coefficients));
  const { factors, proved } = yield* factorise(whole);
  const fitting = factors.filter((f) => mayVanish(rows, padded(f, d)));
  const polynomial = fitting.reduce<Polynomial | undefined>(
    (best, f) => (best && degree(best) <= degree(f) ? best : f),
    undefined,
  );
  if (polynomial === undefined) {
    return {
      kind: 'contradicted',
      polynomial: whole,
      agreementBits: agreement(rows, padded(whole, d)),
      normBoundLog10,
      iterations,
    };
  }
  yield;
  return {
    kind: 'algebraic',
    polynomial,
    irreducible: proved || degree(polynomial) === 1,
    root: fitting.length === 1 ? isolate(polynomial, request.value) : undefined,
    confidenceLog10,
    searchBits,
    valueBits: rightBits(request.value),
    normBoundLog10,
    iterations,
  };
}

/** 1, x, …, x^d as rows of one column (real x) or two. Each power is right to about the relative accuracy of x over its exponent. */
export function powerRows(x: Value, d: number): Ball[][] {
  const parts = isComplex(x) ? [x.re, x.im] : [x];
  const small = Math.max(0, -Math.max(...parts.map(magnitude)));
  const bits = Math.max(...parts.map((part) => part.bits)) + 16 + (Number.isFinite(small) ? d * small : 0);
  const one: Value = isComplex(x)
    ? { re: { mid: 1n, rad: 0n, bits: 0 }, im: { mid: 0n, rad: 0n, bits: 0 } }
    : { mid: 1n, rad: 0n, bits: 0 };
  const powers: Value[] = [one];
  // Products of halves keep the growth of the error at the exponent, not its square.
  for (let k = 1; k <= d; k++)
    powers.push(k === 1 ? x : multiply(powers[k >> 1] as Value, powers[k - (k >> 1)] as Value, bits));
  return powers.map((power) => (isComplex(power) ? [power.re, power.im] : [power]));
}

/** Right bits of x relative to its size; Infinity when exact. */
function rightBits(x: Value): number {
  const { re, im } = toComplex(x);
  const size = Math.max(magnitude(re), magnitude(im));
  return Math.min(accuracy(re), accuracy(im)) + (Number.isFinite(size) ? size : 0);
}

/** The same rows, each column known to `drop` bits less than its least accurate entry. */
function coarser(rows: readonly (readonly Ball[])[], drop: number): Ball[][] {
  if (drop <= 0) return rows.map((row) => [...row]);
  const ends = (rows[0] as readonly Ball[]).map(
    (_, j) => Math.min(...rows.map((row) => accuracy(row[j] as Ball))) - drop,
  );
  return rows.map((row) =>
    row.map((x, j) => {
      const end = ends[j] as number;
      if (!Number.isFinite(end) || x.rad === 0n) return x;
      if (end <= 0) return widen(x, 1n << BigInt(x.bits - Math.floor(end)));
      return widen(withBits(x, Math.floor(end)), 1n);
    }),
  );
}

function padded(p: Polynomial, d: number): bigint[] {
  return Array.from({ length: d + 1 }, (_, k) => p[k] ?? 0n);
}

/** Bits by which Σ cₖ·xᵏ is smaller than its largest term. */
function agreement(rows: readonly (readonly Ball[])[], coefficients: readonly bigint[]): number {
  const columns = (rows[0] as readonly Ball[]).map((_, j) => j);
  const residual = Math.max(...columns.map((j) => magnitude(combination(rows, coefficients, j))));
  let largest = Number.NEGATIVE_INFINITY;
  coefficients.forEach((c, k) => {
    for (const x of rows[k] ?? []) largest = Math.max(largest, magnitude(timesInteger(x, c)));
  });
  return Math.max(0, largest - residual);
}
