/**
 * A proven lower bound for the Euclidean norm of every integer relation.
 *
 * Statement. Let x̂ᵢⱼ be the prepared integers with errors eᵢⱼ (units of the column). For every choice of real numbers
 * xᵢⱼ with |xᵢⱼ − x̂ᵢⱼ| ≤ eᵢⱼ, every integer vector c ≠ 0 with Σᵢ cᵢ·xᵢⱼ = 0 for all j has ‖c‖ ≥ 10^normBoundLog10.
 * The only assumption is that the true numbers lie in the balls that were given: nothing is claimed for digits that are wrong.
 *
 * Proof. For such a c, |Σᵢ cᵢ·x̂ᵢⱼ| ≤ Σᵢ |cᵢ|·eᵢⱼ ≤ ‖c‖·‖eⱼ‖, so the vector v(c) = [c | (c·x̂ⱼ)/ρⱼ] has
 * ‖v(c)‖² ≤ ‖c‖²·(1 + Σⱼ ‖eⱼ‖²/ρⱼ²). If B is unimodular, v(c) = z·D with z integer and D = [B | B·x̂/ρ]. For a triangular
 * V (any, in doubles) let Q = V·D and ε ≥ ‖Q·Qᵀ − I‖₂. If ε < 1 then ‖z·D‖ = ‖z·V⁻¹·Q‖ ≥ √(1 − ε)·‖z·V⁻¹‖, and as V⁻¹
 * is triangular too, ‖z·V⁻¹‖ ≥ minⱼ 1/|Vⱼⱼ|. Together: ‖c‖ ≥ √(1 − ε)·minⱼ 1/|Vⱼⱼ| / √(1 + Σⱼ ‖eⱼ‖²/ρⱼ²).
 *
 * ε is bounded from one product in doubles with its a-priori rounding bound (Higham, Accuracy and Stability of Numerical Algorithms,
 * 2nd ed., §3.5: |fl(a·b) − a·b| ≤ γₖ·|a|·|b|, γₖ = k·u/(1 − k·u), u = 2^−53); V comes from a Householder factorisation whose
 * own errors do not matter. The idea of proving a factorisation after the fact follows Villard, "Certification of the QR
 * factor R and of lattice basis reducedness", ISSAC 2007, and Rump's verification methods (Acta Numerica 19 (2010) 287).
 *
 * That B is unimodular is proved as well: det(D·Dᵀ) = det(B)²·det(I + ρ⁻¹x̂ᵀx̂ρ⁻¹) is known exactly on the right but for the
 * integer det(B)², and det(Q·Qᵀ) pins the left to less than a factor 4.
 */
import { bitLength, log10Of } from '../number/integer.ts';
import { columnGram, log10Determinant } from './gram.ts';
import { type Prepared, residualsOf } from './prepare.ts';

export interface NormBound {
  /** log10 of the proven bound; never below 0, which holds for any integer vector. */
  readonly normBoundLog10: number;
  /** False when the basis was too ill-conditioned for the proof in doubles; the bound is then the trivial 0. */
  readonly proved: boolean;
  /** The ε of the proof. */
  readonly defect: number;
}

const UNIT = 2 ** -53;
/** Factor that covers the rounding of a few thousand additions and multiplications of non-negative doubles. */
const ROUND_UP = 1 + 1e-9;
const UNPROVED: NormBound = { normBoundLog10: 0, proved: false, defect: Number.POSITIVE_INFINITY };

/**
 * The bound that `basis` proves for the numbers `prepared`. `basis` is a unimodular matrix, rows in the order of
 * orthogonalisation (shortest first is best); `weightsLog2` are the integers log2 ρⱼ at which it is reduced.
 * Any basis and weights give a true bound; good ones give a good bound. `residuals`, where the caller has them, must be the exact
 * products of the rows with the integers. Throws RangeError for a basis of the wrong shape.
 */
export function certifyNormBound(
  prepared: Prepared,
  basis: readonly (readonly bigint[])[],
  weightsLog2: readonly number[],
  residuals: readonly (readonly bigint[])[] = basis.map((row) => residualsOf(prepared, row)),
): NormBound {
  const n = prepared.integers.length;
  const m = prepared.columns.length;
  if (basis.length !== n || basis.some((row) => row.length !== n)) {
    throw new RangeError(`certifyNormBound: expected ${n} rows of ${n} integers`);
  }
  if (weightsLog2.length !== m || weightsLog2.some((w) => !Number.isInteger(w))) {
    throw new RangeError(`certifyNormBound: expected ${m} integer weights`);
  }
  const width = n + m;
  const { rows, exponents } = exactRows(basis, residuals, weightsLog2);
  const v = inverseFactor(rows.slice(), n, width);
  if (v === undefined) return UNPROVED;
  const defect = orthogonalityDefect(v, rows, n, width);
  if (!(defect < 0.5)) return { ...UNPROVED, defect };
  let shortest = Number.POSITIVE_INFINITY;
  let volume = 0;
  for (let i = 0; i < n; i++) {
    const length = (exponents[i] as number) - Math.log2(Math.abs(v[i * n + i] as number));
    shortest = Math.min(shortest, length);
    volume += length;
  }
  // log2 |det B|, up to n·ε/(1 − ε) nats from det(Q·Qᵀ) and rounding: it must leave no room for |det B| ≥ 2 (or 0).
  const determinant = volume - log2GramDeterminant(prepared, weightsLog2) / 2;
  if (!(Math.abs(determinant) + (n * defect * Math.LOG2E) / (1 - defect) / 2 < 0.9)) return { ...UNPROVED, defect };
  const inflation = 1 + errorShare(prepared, weightsLog2);
  const log2 = shortest + Math.log2(1 - defect) / 2 - Math.log2(inflation) / 2;
  return { normBoundLog10: Math.max(0, log2 * Math.log10(2) - 1e-9), proved: true, defect };
}

/**
 * Rows [bᵢ | yᵢⱼ/ρⱼ] from exact products, row i divided by 2^exponents[i] so that its largest entry is near 1.
 * Each double is within 2u relative of the exact entry, or within 2^−1000.
 */
function exactRows(
  basis: readonly (readonly bigint[])[],
  residuals: readonly (readonly bigint[])[],
  weightsLog2: readonly number[],
): { rows: Float64Array; exponents: number[] } {
  const n = basis.length;
  const m = weightsLog2.length;
  const width = n + m;
  const rows = new Float64Array(n * width);
  const exponents = basis.map((row, i) => {
    let exponent = Number.NEGATIVE_INFINITY;
    for (const c of row) if (c !== 0n) exponent = Math.max(exponent, bitLength(c));
    (residuals[i] as readonly bigint[]).forEach((y, j) => {
      if (y !== 0n) exponent = Math.max(exponent, bitLength(y) - (weightsLog2[j] as number));
    });
    if (!Number.isFinite(exponent)) return 0;
    row.forEach((c, k) => {
      rows[i * width + k] = roundedQuotient(c, exponent);
    });
    (residuals[i] as readonly bigint[]).forEach((y, j) => {
      rows[i * width + n + j] = roundedQuotient(y, exponent + (weightsLog2[j] as number));
    });
    return exponent;
  });
  return { rows, exponents };
}

/** value/2^exponent in a double for |value| < 2^(exponent + 1): within 2^−52 relative, or 2^−1000 absolute. */
function roundedQuotient(value: bigint, exponent: number): number {
  const drop = Math.max(0, bitLength(value) - 64);
  const shift = drop - exponent;
  if (shift < -1064) return 0;
  const top = Number(value >> BigInt(drop));
  // Two factors, because 2^shift alone could be subnormal while the product is not.
  const half = Math.trunc(shift / 2);
  return top * 2 ** half * 2 ** (shift - half);
}

/** V ≈ L⁻¹ (lower triangular, row-major n×n), where rows = L·Q by Householder reflections, row 0 first. Destroys `rows`. */
function inverseFactor(rows: Float64Array, n: number, width: number): Float64Array | undefined {
  const diagonal = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const base = i * width;
    let square = 0;
    for (let k = i; k < width; k++) square += (rows[base + k] as number) ** 2;
    const norm = Math.sqrt(square);
    if (!(norm > 1e-140)) return undefined;
    const head = rows[base + i] as number;
    const alpha = head > 0 ? -norm : norm;
    rows[base + i] = head - alpha;
    const size = square - head * head + (head - alpha) ** 2;
    for (let r = i + 1; r < n; r++) {
      const at = r * width;
      let dot = 0;
      for (let k = i; k < width; k++) dot += (rows[at + k] as number) * (rows[base + k] as number);
      const scale = (2 * dot) / size;
      for (let k = i; k < width; k++) rows[at + k] = (rows[at + k] as number) - scale * (rows[base + k] as number);
    }
    diagonal[i] = alpha;
  }
  const v = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    // Row i of L⁻¹ from L·V = I: V[i][·] = (e_i − Σ_{k<i} L[i][k]·V[k][·]) / L[i][i].
    for (let k = 0; k < i; k++) {
      const factor = rows[i * width + k] as number;
      for (let j = 0; j <= k; j++) v[i * n + j] = (v[i * n + j] as number) - factor * (v[k * n + j] as number);
    }
    const inverse = 1 / (diagonal[i] as number);
    for (let j = 0; j < i; j++) v[i * n + j] = (v[i * n + j] as number) * inverse;
    v[i * n + i] = inverse;
  }
  return v;
}

/** An upper bound of ‖Q·Qᵀ − I‖₂ for Q = V·D, with D known through `rows` as `exactRows` says. */
function orthogonalityDefect(v: Float64Array, rows: Float64Array, n: number, width: number): number {
  const gamma = ((n + 4) * UNIT) / (1 - (n + 4) * UNIT);
  const q = new Float64Array(n * width);
  const size = new Float64Array(width);
  let errorSquare = 0;
  let qSquare = 0;
  for (let i = 0; i < n; i++) {
    size.fill(0);
    let total = 0;
    for (let k = 0; k <= i; k++) {
      const factor = v[i * n + k] as number;
      const positive = Math.abs(factor);
      total += positive;
      for (let c = 0; c < width; c++) {
        const term = rows[k * width + c] as number;
        q[i * width + c] = (q[i * width + c] as number) + factor * term;
        size[c] = (size[c] as number) + positive * Math.abs(term);
      }
    }
    // Rounding of the product and of the entries of D (γ with k + 3 covers both), and entries flushed below 2^−1000.
    for (let c = 0; c < width; c++) {
      errorSquare += (gamma * (size[c] as number) + total * 2 ** -999) ** 2;
      qSquare += (q[i * width + c] as number) ** 2;
    }
  }
  let defectSquare = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let dot = i === j ? -1 : 0;
      for (let c = 0; c < width; c++) dot += (q[i * width + c] as number) * (q[j * width + c] as number);
      defectSquare += (i === j ? 1 : 2) * dot * dot;
    }
  }
  const dotGamma = ((width + 2) * UNIT) / (1 - (width + 2) * UNIT);
  const error = Math.sqrt(errorSquare) * ROUND_UP;
  const norm = Math.sqrt(qSquare) * ROUND_UP;
  const rounding = dotGamma * (norm * norm + Math.sqrt(n));
  return (Math.sqrt(defectSquare) * ROUND_UP + rounding + 2 * norm * error + error * error) * ROUND_UP;
}

/** Σⱼ ‖eⱼ‖²/ρⱼ², rounded up. */
function errorShare(prepared: Prepared, weightsLog2: readonly number[]): number {
  let share = 0;
  weightsLog2.forEach((w, j) => {
    let square = 0n;
    for (const e of prepared.errors) square += (e[j] as bigint) ** 2n;
    if (square > 0n) share += 2 ** (log10Of(square) / Math.log10(2) - 2 * w);
  });
  return share * ROUND_UP;
}

/** log2 det(I + ρ⁻¹·x̂ᵀ·x̂·ρ⁻¹) = log2 det(ρ² + x̂ᵀx̂) − 2·Σ log2 ρⱼ, on exact integers (lifted where some ρ is below one unit). */
function log2GramDeterminant(prepared: Prepared, weightsLog2: readonly number[]): number {
  const lift = BigInt(2 * Math.max(0, ...weightsLog2.map((w) => -w)));
  const matrix = columnGram(prepared).map((row, j) =>
    row.map((dot, k) => (dot << lift) + (j === k ? 1n << (lift + BigInt(2 * (weightsLog2[j] as number))) : 0n)),
  );
  const log2 = log10Determinant(matrix) / Math.log10(2);
  return log2 - Number(lift) * matrix.length - 2 * weightsLog2.reduce((sum, w) => sum + w, 0);
}
