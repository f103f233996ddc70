/** Gram matrices of the columns, exact. */
import { log10Of } from '../number/integer.ts';
import type { Prepared } from './prepare.ts';

/** x̂ᵀx̂: entry (j, k) is the product of columns j and k of the integers. */
export function columnGram(prepared: Prepared): bigint[][] {
  return prepared.integers.reduce<bigint[][] | undefined>(plusRow, undefined) as bigint[][];
}

/** A Gram matrix of columns with one more row; from nothing when undefined. */
export function plusRow(gram: readonly (readonly bigint[])[] | undefined, x: readonly bigint[]): bigint[][] {
  return x.map((a, j) => x.map((b, k) => (gram?.[j]?.[k] ?? 0n) + a * b));
}

/** log10 of the determinant of a positive definite integer matrix, by fraction-free elimination (Bareiss, Math. Comp. 22 (1968) 565). */
export function log10Determinant(matrix: readonly (readonly bigint[])[]): number {
  const rows = matrix.map((row) => [...row]);
  const m = rows.length;
  let previous = 1n;
  for (let k = 0; k + 1 < m; k++) {
    const pivot = rows[k]?.[k] as bigint;
    for (let i = k + 1; i < m; i++) {
      const row = rows[i] as bigint[];
      const head = row[k] as bigint;
      for (let j = k + 1; j < m; j++)
        row[j] = ((row[j] as bigint) * pivot - head * (rows[k]?.[j] as bigint)) / previous;
    }
    previous = pivot;
  }
  return log10Of(rows[m - 1]?.[m - 1] as bigint);
}
