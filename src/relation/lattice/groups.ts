/**
 * Numbers of very different size. The factor in doubles only ever holds rows whose lengths resolve each other; two kinds of rows wait outside it:
 *
 * - pending: rows whose residual is still small against their length at the bits fed so far: at first the numbers that are much
 *   smaller than others (their rows are unit vectors), later short rows that vanish on the leading digits only.
 *   They join as a cluster when the feed comes near their leading bits.
 * - parked: rows longer than all others by 2^PARK_GAP or more. In a reduced basis they stand last, and nothing can move across the gap
 *   until the shorter rows have grown; then they are size-reduced exactly, in as many passes of double precision as
 *   their quotients need, and join again.
 */
import { bitLength } from '../../number/integer.ts';
import { RowFactor } from './factor.ts';
import { timesPowerOfTwo } from './limbs.ts';
import type { ExactRow } from './state.ts';

/** Clusters of pending numbers are split where neighbours in size differ by more than this many bits. */
const CLUSTER_GAP = 16;
/** Lengths that spread over fewer bits than this are left together. */
export const SPREAD = 28;
const PARK_GAP = 8;
/** Parked rows join again when the longest other row is within this many bits of them. */
export const JOIN_GAP = 3;
/** Each pass takes some 40 bits off the quotients. Passes that do not shorten the row settle the last few; more would be noise. */
const MAX_STALLED = 3;

export const ROWS_PER_STEP = 16;

export interface Cluster {
  readonly rows: ExactRow[];
  /** Weight 2^−bits is where its residuals reach its lengths. */
  readonly bits: number;
  /** log2 of the shortest length in it. */
  readonly least: number;
}

export interface Parked {
  readonly rows: ExactRow[];
  /** log2 of the smallest diagonal entry when it was parked. */
  readonly least: number;
}

/** The numbers in clusters of similar size, largest first. */
export function clusters(integers: readonly (readonly bigint[])[]): Cluster[] {
  const n = integers.length;
  const sized = integers.map((y, i) => ({
    bits: Math.max(...y.map(bitLength)),
    row: { y: [...y], b: Array.from({ length: n }, (_, k) => (k === i ? 1n : 0n)) },
  }));
  sized.sort((p, q) => q.bits - p.bits);
  const found: { rows: ExactRow[]; bits: number; least: number }[] = [];
  let last = Number.POSITIVE_INFINITY;
  for (const { bits, row } of sized) {
    if (found.length === 0 || last - bits > CLUSTER_GAP) found.push({ rows: [row], bits, least: 0 });
    else found[found.length - 1]?.rows.push(row);
    last = bits;
  }
  return found;
}

/** A factored list of rows: coordinates[i]·2^exponents[i] is row i of L. */
export interface Arranged {
  readonly rows: ExactRow[];
  readonly coordinates: Float64Array[];
  readonly exponents: number[];
  /** log2 of the diagonal. */
  readonly diagonal: number[];
}

/** Size-reduces the rows exactly, each against those before it, at weight 2^−e, and factors them. Yields every few rows. */
export function* arrange(rows: readonly ExactRow[], e: number): Generator<void, Arranged, void> {
  const n = rows[0]?.b.length ?? 0;
  const m = rows[0]?.y.length ?? 0;
  const factor = new RowFactor(rows.length, n + m);
  const done: Arranged = { rows: [], coordinates: [], exponents: [], diagonal: [] };
  for (const given of rows) {
    let row = given;
    if (done.rows.length % ROWS_PER_STEP === ROWS_PER_STEP - 1) yield;
    let shortest = Number.POSITIVE_INFINITY;
    for (let stalled = 0; ; ) {
      const x = new Float64Array(n + m);
      const exponent = scaledRow(row, e, x);
      factor.project(x);
      if (exponent < shortest) shortest = exponent;
      else stalled++;
      const quotients = stalled < MAX_STALLED ? nearestQuotients(done, x, exponent) : [];
      if (quotients.every((q) => q === 0n)) {
        factor.push(x, exponent);
        done.rows.push(row);
        done.coordinates.push(x);
        done.exponents.push(exponent);
        done.diagonal.push(Math.log2(x[done.rows.length - 1] as number) + exponent);
        break;
      }
      row = subtract(row, done.rows, quotients);
    }
  }
  return done;
}

/**
 * Where to part rows whose lengths spread too far for doubles: the index of the largest gap, every diagonal entry from there on
 * exceeding every earlier one. The number of rows when there is no need, or no gap.
 */
export function parkFrom(diagonal: readonly number[]): number {
  const n = diagonal.length;
  if (Math.max(...diagonal) - Math.min(...diagonal) < SPREAD) return n;
  const least: number[] = [];
  let low = Number.POSITIVE_INFINITY;
  for (let i = n - 1; i >= 0; i--) {
    low = Math.min(low, diagonal[i] as number);
    least[i] = low;
  }
  let top = diagonal[0] as number;
  let widest = PARK_GAP;
  let at = n;
  for (let i = 1; i < n; i++) {
    const gap = (least[i] as number) - top;
    if (gap > widest) [widest, at] = [gap, i];
    top = Math.max(top, diagonal[i] as number);
  }
  return at;
}

/** x ← the row [y·2^−e | b] as mantissas; returns their common exponent. */
function scaledRow(row: ExactRow, e: number, x: Float64Array): number {
  let top = Number.NEGATIVE_INFINITY;
  for (const y of row.y) if (y !== 0n) top = Math.max(top, bitLength(y) - e);
  for (const b of row.b) if (b !== 0n) top = Math.max(top, bitLength(b));
  row.y.forEach((y, j) => {
    x[j] = mantissa(y, -e - top);
  });
  row.b.forEach((b, j) => {
    x[row.y.length + j] = mantissa(b, -top);
  });
  return top;
}

/** value·2^exponent as a double. */
function mantissa(value: bigint, exponent: number): number {
  const drop = bitLength(value) - 64;
  return drop > 0
    ? timesPowerOfTwo(Number(value >> BigInt(drop)), exponent + drop)
    : timesPowerOfTwo(Number(value), exponent);
}

/** Size reduction of x·2^exponent against the rows so far, on doubles: the quotients as integers (right to 53 bits each). */
function nearestQuotients(done: Arranged, x: Float64Array, exponent: number): bigint[] {
  const rest = Float64Array.from(x);
  const quotients = new Array<bigint>(done.rows.length).fill(0n);
  for (let j = done.rows.length - 1; j >= 0; j--) {
    const against = done.coordinates[j] as Float64Array;
    const shift = exponent - (done.exponents[j] as number);
    const ratio = (rest[j] as number) / (against[j] as number);
    if (ratio === 0 || Math.log2(Math.abs(ratio)) + shift < -0.93) continue; // |quotient| < 0.525
    const q = roundScaled(ratio, shift);
    if (q === 0n) continue;
    quotients[j] = q;
    const factor = shift > 52 ? ratio : Math.round(timesPowerOfTwo(ratio, shift)) * 2 ** -Math.max(shift, -1000);
    for (let k = 0; k <= j; k++) rest[k] = (rest[k] as number) - factor * (against[k] as number);
  }
  return quotients;
}

/** The integer next to ratio·2^shift. */
function roundScaled(ratio: number, shift: number): bigint {
  const size = Math.log2(Math.abs(ratio)) + shift;
  if (size < 52) return BigInt(Math.round(timesPowerOfTwo(ratio, shift)));
  const up = Math.ceil(size) - 52;
  return BigInt(Math.round(timesPowerOfTwo(ratio, shift - up))) << BigInt(up);
}

function subtract(row: ExactRow, rows: readonly ExactRow[], quotients: readonly bigint[]): ExactRow {
  const y = [...row.y];
  const b = [...row.b];
  quotients.forEach((q, j) => {
    if (q === 0n) return;
    const other = rows[j] as ExactRow;
    other.y.forEach((v, k) => {
      y[k] = (y[k] as bigint) - q * v;
    });
    other.b.forEach((v, k) => {
      if (v !== 0n) b[k] = (b[k] as bigint) - q * v;
    });
  });
  return { y, b };
}
