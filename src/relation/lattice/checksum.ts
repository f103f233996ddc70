/**
 * The determinant of the lattice, known exactly at every stage.
 *
 * The lattice of rows [c | 2^−e·c·Y] over all integer vectors c has Gram matrix I + 4^−e·Y·Yᵀ, whose determinant is
 * Σ_k 4^−ek·E_k with E_k the sum of the principal k × k minors of YᵀY. All E_k ≥ 0, so nothing cancels. A transform that is not
 * unimodular multiplies the determinant by an integer square, and drift of the doubles shows as well.
 */
import { bitLength, log10Of } from '../../number/integer.ts';

export interface Checksum {
  /** ½·log2 of the determinant of the Gram matrix at weight 2^−e: what Σ log2 l_ii must be. */
  expected(e: number): number;
}

export function checksumOf(rows: readonly (readonly bigint[])[]): Checksum {
  const columns = rows[0]?.length ?? 0;
  const terms = columns === 1 ? [log2Norm(rows)] : minorSums(gramOfColumns(rows)).map(log2Of);
  return {
    expected(e) {
      let top = 0;
      terms.forEach((term, k) => {
        top = Math.max(top, term - 2 * e * (k + 1));
      });
      let sum = 2 ** -top;
      terms.forEach((term, k) => {
        sum += 2 ** (term - 2 * e * (k + 1) - top);
      });
      return (top + Math.log2(sum)) / 2;
    },
  };
}

/** log2 of the squared norm of a single column, from the leading 64 bits. */
function log2Norm(rows: readonly (readonly bigint[])[]): number {
  const top = Math.max(...rows.map((row) => bitLength(row[0] as bigint)));
  const drop = Math.max(0, top - 64);
  let sum = 0n;
  for (const row of rows) sum += ((row[0] as bigint) >> BigInt(drop)) ** 2n;
  return log2Of(sum) + 2 * drop;
}

function log2Of(value: bigint): number {
  return log10Of(value) / Math.log10(2);
}

function gramOfColumns(rows: readonly (readonly bigint[])[]): bigint[][] {
  const m = rows[0]?.length ?? 0;
  const gram = Array.from({ length: m }, () => new Array<bigint>(m).fill(0n));
  for (let j = 0; j < m; j++) {
    for (let k = 0; k <= j; k++) {
      let sum = 0n;
      for (const row of rows) sum += (row[j] as bigint) * (row[k] as bigint);
      (gram[j] as bigint[])[k] = sum;
      (gram[k] as bigint[])[j] = sum;
    }
  }
  return gram;
}

/** E_1 … E_m of a symmetric integer matrix, by the method of Faddeev and LeVerrier; exact. */
function minorSums(gram: bigint[][]): bigint[] {
  const m = gram.length;
  const sums: bigint[] = [];
  let power: bigint[][] = gram.map((_, i) => gram.map((__, j) => (i === j ? 1n : 0n)));
  for (let k = 1; k <= m; k++) {
    const product = power.map((_, i) =>
      gram.map((__, j) => {
        let sum = 0n;
        for (let t = 0; t < m; t++) sum += (gram[i]?.[t] as bigint) * (power[t]?.[j] as bigint);
        return sum;
      }),
    );
    let trace = 0n;
    for (let i = 0; i < m; i++) trace += product[i]?.[i] as bigint;
    const c = -trace / BigInt(k);
    sums.push(k % 2 === 1 ? -c : c);
    power = product.map((row, i) => row.map((x, j) => (i === j ? x + c : x)));
  }
  return sums;
}
