/** H of a PSLQ state, recomputed in Float64 from its rows, and what can be read off it. */

/** H with the rounding level of the rows it came from. */
export interface Factor {
  readonly h: Float64Array;
  readonly noise: Float64Array;
}

/** Relative error of a row after the factorisation (Householder: a few n·u in practice). */
const ROW_NOISE = 2 ** -48;

/**
 * H of the rows [bᵢ | yᵢ/ρ] (n rows of `width` doubles, destroyed): Householder LQ with the rows taken from the last to the first
 * gives D·Dᵀ = R·Rᵀ with R upper triangular, and H = R⁻ᵀ. The rows must be scaled so that squares neither under- nor overflow.
 * Returns undefined if a diagonal entry is not a positive finite number.
 */
export function factorH(rows: Float64Array, n: number, width: number): Factor | undefined {
  const diagonal = new Float64Array(n);
  const noise = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let square = 0;
    for (let k = 0; k < width; k++) square += (rows[i * width + k] as number) ** 2;
    noise[i] = ROW_NOISE * Math.sqrt(square);
  }
  for (let i = n - 1; i >= 0; i--) {
    const first = n - 1 - i;
    const base = i * width;
    let norm = 0;
    for (let k = first; k < width; k++) norm += (rows[base + k] as number) ** 2;
    norm = Math.sqrt(norm);
    if (!(norm > 0) || !Number.isFinite(norm)) return undefined;
    const head = rows[base + first] as number;
    const alpha = head > 0 ? -norm : norm;
    // Householder vector, normalised so that its largest part is 1 and nothing under- or overflows.
    rows[base + first] = head - alpha;
    for (let k = first; k < width; k++) rows[base + k] = (rows[base + k] as number) / norm;
    let square = 0;
    for (let k = first; k < width; k++) square += (rows[base + k] as number) ** 2;
    for (let r = 0; r < i; r++) {
      const at = r * width;
      let dot = 0;
      for (let k = first; k < width; k++) dot += (rows[at + k] as number) * (rows[base + k] as number);
      const scale = (2 * dot) / square;
      for (let k = first; k < width; k++) rows[at + k] = (rows[at + k] as number) - scale * (rows[base + k] as number);
    }
    diagonal[i] = alpha;
  }
  return { h: invertTransposed(rows, n, width, diagonal), noise };
}

/** H = R⁻ᵀ, where R[i][j] (j > i) sits in rows[i·width + n−1−j] and R[i][i] in diagonal[i]. */
function invertTransposed(rows: Float64Array, n: number, width: number, diagonal: Float64Array): Float64Array {
  const h = new Float64Array(n * n);
  // Σ_k H[i][k]·R[j][k] = δᵢⱼ with k from j to i.
  for (let i = 0; i < n; i++) {
    h[i * n + i] = 1 / (diagonal[i] as number);
    for (let j = i - 1; j >= 0; j--) {
      let sum = 0;
      for (let k = j + 1; k <= i; k++) sum += (h[i * n + k] as number) * (rows[j * width + n - 1 - k] as number);
      h[i * n + j] = -sum / (diagonal[j] as number);
    }
  }
  return h;
}

/** log2 of the largest |H_jj|: every vector of the lattice spanned by the rows [bᵢ | yᵢ/ρ] is at least 2^−this long. */
export function log2MaxDiagonal(h: Float64Array, n: number): number {
  let top = 0;
  for (let i = 0; i < n; i++) top = Math.max(top, Math.abs(h[i * n + i] as number));
  return Math.log2(top);
}

/** log2 of the largest ratio |H_jj|/|H_ii|, j < i: what a recomputation of H loses in relative accuracy. */
export function log2Drop(h: Float64Array, n: number): number {
  let top = Math.abs(h[0] as number);
  let drop = 1;
  for (let i = 1; i < n; i++) {
    const here = Math.abs(h[i * n + i] as number);
    drop = Math.max(drop, top / here);
    top = Math.max(top, here);
  }
  return Math.log2(drop);
}
