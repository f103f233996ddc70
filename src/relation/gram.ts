/** Gram matrices of the columns, exact. */
import { log10Of } from '../number/integer.ts';
import type { Prepared } from './prepare.ts';

/** x̂ᵀx̂ over the given rows (all by default): entry (j, k) is the product of columns j and k of the integers. */
export function columnGram(prepared: Prepared, rows: Iterable<number> = prepared.integers.keys()): bigint[][] {
  const gram = prepared.columns.map(() => prepared.columns.map(() => 0n));
  for (const i of rows) addRow(gram, prepared.integers[i] as readonly bigint[]);
  return gram;
}

/** Adds what one more row contributes. */
export function addRow(gram: bigint[][], x: readonly bigint[]): void {
  gram.forEach((row, j) => {
    for (let k = 0; k < row.length; k++) row[k] = (row[k] as bigint) + (x[j] as bigint) * (x[k] as bigint);
  });
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
