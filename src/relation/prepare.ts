/**
 * From balls to exact integers at one scale per column, and the cases that need no search.
 *
 * In column j every number is written as integers[i][j] ± errors[i][j] units of 2^−scales[j]. The unit is set by the least
 * accurate number of the column (a few bits below its radius), because only absolute errors count in Σ cᵢ·xᵢⱼ. The absolute
 * size of a column therefore does not matter, and numbers of very different size may share one.
 */
import { accuracy, add, type Ball, containsZero, magnitude, negate, sign, withBits } from '../number/ball.ts';
import { InputError } from '../number/errors.ts';
import { absolute, bitLength } from '../number/integer.ts';

/** A relation that can be read off: one number is zero, or two are equal up to sign. */
export interface ImmediateRelation {
  readonly kind: 'zero' | 'equal';
  /** Zero-based positions of the numbers concerned: one for 'zero', two for 'equal'. */
  readonly indices: readonly number[];
  readonly coefficients: readonly bigint[];
  /** log10 of the size of the number over what its digits leave open; Infinity when exact. */
  readonly confidenceLog10: number;
}

export interface Prepared {
  /** The balls as given, for the final exact test of a relation. */
  readonly rows: readonly (readonly Ball[])[];
  /** n rows of m integers (columns that carry no digits are left out; m ≥ 1). */
  readonly integers: readonly (readonly bigint[])[];
  /** The true number lies within errors[i][j] units of integers[i][j]. */
  readonly errors: readonly (readonly bigint[])[];
  /** The unit of column j is 2^−scales[j]; may be negative. */
  readonly scales: readonly number[];
  /** Right bits of column j: log2(largest |integer| / largest error), rounded down. For exact columns: bits of the largest integer. */
  readonly precisionBits: readonly number[];
  /** Bits of the largest error of column j; 0 when exact. */
  readonly columnErrorBits: readonly number[];
  /** Which column of `rows` each column here is. */
  readonly columns: readonly number[];
  /** The first relation that shows without a search. */
  readonly immediate: ImmediateRelation | undefined;
}

/** The unit lies this many bits below the radius of the least accurate number, so that rounding adds little to the errors. */
const GUARD_BITS = 4;
/** A number counts as zero, or two as equal, only on the strength of at least this many bits. */
const IMMEDIATE_BITS = 24;

/**
 * Throws InputError with code `too-few-numbers` (n < 2, or not more numbers than informative columns), `ragged-rows`,
 * `not-a-number` (a malformed ball), `no-digits` (a ball that contains zero and is too wide to be called zero),
 * `all-zero`, `too-small` (a number that vanishes in the uncertainty of another).
 */
export function prepare(rows: readonly (readonly Ball[])[]): Prepared {
  checkShape(rows);
  const columns = informativeColumns(rows);
  const scales = columns.map((j) => columnScale(rows, j));
  const integers: bigint[][] = rows.map(() => []);
  const errors: bigint[][] = rows.map(() => []);
  columns.forEach((j, at) => {
    rows.forEach((row, i) => {
      const scaled = withBits(row[j] as Ball, scales[at] as number);
      (integers[i] as bigint[]).push(scaled.mid);
      (errors[i] as bigint[]).push(scaled.rad);
    });
  });
  const columnErrorBits = columns.map((_, at) => bitLength(largest(errors.map((e) => e[at] as bigint))));
  const precisionBits = columns.map(
    (_, at) => bitLength(largest(integers.map((x) => x[at] as bigint))) - (columnErrorBits[at] as number),
  );
  const immediate = zeroNumber(rows, columns) ?? equalNumbers(rows, columns);
  if (immediate === undefined) {
    refuseVanishing(integers, errors);
    if (rows.length <= columns.length) {
      throw new InputError(
        'too-few-numbers',
        `A relation over ${columns.length} columns at once needs more than ${columns.length} numbers, got ${rows.length}.`,
      );
    }
  }
  return { rows, integers, errors, scales, precisionBits, columnErrorBits, columns, immediate };
}

/** Whether Σ cᵢ·xᵢⱼ may be zero in every column, decided on the balls as given, exactly. */
export function mayVanish(rows: readonly (readonly Ball[])[], coefficients: readonly bigint[]): boolean {
  const columns = rows[0]?.length ?? 0;
  for (let j = 0; j < columns; j++) if (!containsZero(combination(rows, coefficients, j))) return false;
  return true;
}

/** Σ cᵢ·xᵢⱼ as a ball; exact on midpoints and radii. */
export function combination(rows: readonly (readonly Ball[])[], coefficients: readonly bigint[], column: number): Ball {
  const bits = Math.max(...rows.map((row) => (row[column] as Ball).bits));
  let mid = 0n;
  let rad = 0n;
  rows.forEach((row, i) => {
    const c = coefficients[i] as bigint;
    if (c === 0n) return;
    const x = row[column] as Ball;
    const shift = BigInt(bits - x.bits);
    mid += (c * x.mid) << shift;
    rad += (absolute(c) * x.rad) << shift;
  });
  return { mid, rad, bits };
}

/** Σ rowₖ·xₖⱼ per column, in units; exact. */
export function residualsOf(prepared: Prepared, row: readonly bigint[]): bigint[] {
  return prepared.columns.map((_, j) =>
    row.reduce((sum, c, k) => (c === 0n ? sum : sum + c * (prepared.integers[k]?.[j] as bigint)), 0n),
  );
}

function checkShape(rows: readonly (readonly Ball[])[]): void {
  if (rows.length < 2) {
    throw new InputError('too-few-numbers', `A relation needs at least two numbers, got ${rows.length}.`);
  }
  const width = rows[0]?.length ?? 0;
  rows.forEach((row, i) => {
    if (row.length !== width || width === 0) {
      throw new InputError('ragged-rows', `Number ${i + 1} has ${row.length} columns where number 1 has ${width}.`);
    }
    for (const x of row) {
      const sound =
        typeof x.mid === 'bigint' &&
        typeof x.rad === 'bigint' &&
        x.rad >= 0n &&
        Number.isInteger(x.bits) &&
        x.bits >= 0;
      if (!sound) throw new InputError('not-a-number', `Number ${i + 1} is not a number with an error bound.`);
    }
  });
}

/** Columns in which at least one number is told from zero. */
function informativeColumns(rows: readonly (readonly Ball[])[]): number[] {
  const columns: number[] = [];
  const width = rows[0]?.length ?? 0;
  for (let j = 0; j < width; j++)
    if (rows.some((row) => sign(row[j] as Ball) !== 0 && !containsZero(row[j] as Ball))) columns.push(j);
  if (columns.length > 0) return columns;
  if (rows.every((row) => row.every((x) => x.mid === 0n && x.rad === 0n))) {
    throw new InputError('all-zero', 'All the numbers are zero.');
  }
  throw new InputError(
    'no-digits',
    'None of the numbers has a right digit: every one may be zero within its uncertainty.',
  );
}

function columnScale(rows: readonly (readonly Ball[])[], j: number): number {
  let scale = Number.POSITIVE_INFINITY;
  let widest = 0;
  for (const row of rows) {
    const x = row[j] as Ball;
    scale = Math.min(scale, accuracy(x));
    if (x.mid !== 0n) widest = Math.max(widest, x.bits);
  }
  return Number.isFinite(scale) ? scale + GUARD_BITS : widest;
}

function largest(values: readonly bigint[]): bigint {
  let top = 0n;
  for (const value of values) if (absolute(value) > top) top = absolute(value);
  return top;
}

/** Bits by which the largest number of the column exceeds the radius of x. */
function bitsBelow(rows: readonly (readonly Ball[])[], j: number, x: Ball): number {
  const top = Math.max(...rows.map((row) => magnitude(row[j] as Ball)));
  return top + accuracy(x);
}

function zeroNumber(rows: readonly (readonly Ball[])[], columns: readonly number[]): ImmediateRelation | undefined {
  for (let i = 0; i < rows.length; i++) {
    const row = rows[i] as readonly Ball[];
    if (!row.every(containsZero)) continue;
    const bits = Math.min(...columns.map((j) => bitsBelow(rows, j, row[j] as Ball)));
    if (bits < IMMEDIATE_BITS) {
      throw new InputError('no-digits', `Number ${i + 1} has no right digit: it may be zero within its uncertainty.`);
    }
    const coefficients = rows.map((_, k) => (k === i ? 1n : 0n));
    return { kind: 'zero', indices: [i], coefficients, confidenceLog10: bits * Math.log10(2) };
  }
  return undefined;
}

function equalNumbers(rows: readonly (readonly Ball[])[], columns: readonly number[]): ImmediateRelation | undefined {
  const ends = rows.map((row) => row.map((x) => magnitude(x)));
  for (let i = 0; i < rows.length; i++) {
    for (let k = i + 1; k < rows.length; k++) {
      if (
        columns.some(
          (j) => Math.abs((ends[i]?.[j] as number) - (ends[k]?.[j] as number)) > 2 && !bothNearZero(rows, i, k, j),
        )
      )
        continue;
      for (const factor of [-1n, 1n]) {
        const differences = (rows[i] as readonly Ball[]).map((x, j) => {
          const y = rows[k]?.[j] as Ball;
          return add(x, factor < 0n ? negate(y) : y);
        });
        if (!differences.every(containsZero)) continue;
        const bits = sharedBits(rows[i] as readonly Ball[], differences, columns);
        if (bits < IMMEDIATE_BITS) continue;
        const coefficients = rows.map((_, at) => (at === i ? 1n : at === k ? factor : 0n));
        return { kind: 'equal', indices: [i, k], coefficients, confidenceLog10: bits * Math.log10(2) };
      }
    }
  }
  return undefined;
}

function bothNearZero(rows: readonly (readonly Ball[])[], i: number, k: number, j: number): boolean {
  return containsZero(rows[i]?.[j] as Ball) && containsZero(rows[k]?.[j] as Ball);
}

/** Bits on which a number agrees with its partner, in the column where that is most. */
function sharedBits(row: readonly Ball[], differences: readonly Ball[], columns: readonly number[]): number {
  return Math.max(
    ...columns.map((j) => {
      const x = row[j] as Ball;
      return containsZero(x) ? 0 : magnitude(x) + accuracy(differences[j] as Ball);
    }),
  );
}

function refuseVanishing(integers: readonly (readonly bigint[])[], errors: readonly (readonly bigint[])[]): void {
  integers.forEach((row, i) => {
    if (row.every((x, j) => absolute(x) <= (errors[i]?.[j] as bigint))) {
      throw new InputError(
        'too-small',
        `Number ${i + 1} is smaller than the uncertainty of the others: more digits of them are needed, or another scale.`,
      );
    }
  });
}
