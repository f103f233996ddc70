/** The exact state of a PSLQ run: a unimodular basis and its residuals, and their view in doubles. */
import { bitLength } from '../../number/integer.ts';
import type { Prepared } from '../prepare.ts';

export interface ExactState {
  readonly n: number;
  readonly m: number;
  /** Rows bᵢ of a unimodular matrix. */
  basis: bigint[][];
  /** residuals[i][j] = Σ_k basis[i][k]·integers[k][j]. */
  residuals: bigint[][];
}

/** The identity, its rows ordered so that the largest numbers come last: the LQ starts from them. */
export function initialState(prepared: Prepared): ExactState {
  const n = prepared.integers.length;
  const m = prepared.columns.length;
  const tops = prepared.columns.map((_, j) => Math.max(...prepared.integers.map((x) => bitLength(x[j] as bigint))));
  const size = (i: number): number =>
    Math.max(...prepared.columns.map((_, j) => approximate(prepared.integers[i]?.[j] as bigint, tops[j] as number)));
  const order = prepared.integers.map((_, i) => i).sort((a, b) => size(a) - size(b) || a - b);
  return {
    n,
    m,
    basis: order.map((i) => prepared.integers.map((_, k) => (k === i ? 1n : 0n))),
    residuals: order.map((i) => [...(prepared.integers[i] as readonly bigint[])]),
  };
}

/** |value|/2^exponent in a double. */
function approximate(value: bigint, exponent: number): number {
  return Math.abs(scaled(value, exponent));
}

/** value/2^exponent in a double, relative error at most 2^−52; 0 below 2^−1000. */
export function scaled(value: bigint, exponent: number): number {
  const length = bitLength(value);
  if (length <= 1000 && Math.abs(exponent) < 1000) return Number(value) * 2 ** -exponent;
  const drop = Math.max(0, length - 64);
  const shift = drop - exponent;
  if (shift < -1060) return 0;
  return Number(value >> BigInt(drop)) * 2 ** shift;
}

/**
 * The rows [bᵢ | yᵢⱼ·2^−weights[j]] in doubles, all scaled by one power of two; `exponent` is its log2:
 * the true row is the returned one times 2^exponent.
 */
export function doubleRows(state: ExactState, weights: readonly number[]): { rows: Float64Array; exponent: number } {
  const { n, m } = state;
  let exponent = 0;
  for (const row of state.basis) for (const value of row) exponent = Math.max(exponent, bitLength(value));
  for (const row of state.residuals) {
    row.forEach((value, j) => {
      exponent = Math.max(exponent, bitLength(value) - Math.ceil(weights[j] as number));
    });
  }
  const width = n + m;
  const rows = new Float64Array(n * width);
  for (let i = 0; i < n; i++) {
    const basis = state.basis[i] as bigint[];
    for (let k = 0; k < n; k++) rows[i * width + k] = scaled(basis[k] as bigint, exponent);
    for (let j = 0; j < m; j++) {
      const weight = weights[j] as number;
      const whole = Math.floor(weight);
      rows[i * width + n + j] = scaled(state.residuals[i]?.[j] as bigint, exponent + whole) * 2 ** (whole - weight);
    }
  }
  return { rows, exponent };
}

/** One row of u·matrix for a row of exact integers held in doubles. */
export function transformedRow(
  u: Float64Array,
  n: number,
  i: number,
  matrix: readonly (readonly bigint[])[],
): bigint[] {
  const width = (matrix[0] as readonly bigint[]).length;
  const row = new Array<bigint>(width).fill(0n);
  for (let k = 0; k < n; k++) {
    const factor = u[i * n + k] as number;
    if (factor === 0) continue;
    const source = matrix[k] as readonly bigint[];
    if (factor === 1) for (let c = 0; c < width; c++) row[c] = (row[c] as bigint) + (source[c] as bigint);
    else {
      const exact = BigInt(factor);
      for (let c = 0; c < width; c++) row[c] = (row[c] as bigint) + exact * (source[c] as bigint);
    }
  }
  return row;
}
