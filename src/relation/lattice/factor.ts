/**
 * Triangular factors of exact rows: given rows as vectors with an exponent each, the lower-triangular L with
 * L·Lᵀ their Gram matrix, by Householder reflections one row at a time (left-looking, so that a row may still be changed before it is
 * made final). Each row is scaled on its own, hence rows of any size may follow each other; row i of L has relative
 * error about n·2^−53 of the norm of row i (Higham, "Accuracy and Stability of Numerical Algorithms", 2002, §19.3).
 */
export class RowFactor {
  /** Number of rows made final. */
  count = 0;
  private readonly reflectors: Float64Array;
  private readonly width: number;
  /** diag[k] times 2^exponent[k] is the diagonal of L. */
  readonly diagonal: Float64Array;
  readonly exponent: Int32Array;
  /** Turns each column so that the diagonal comes out positive. */
  private readonly signs: number[] = [];

  constructor(rows: number, width: number) {
    this.width = width;
    this.reflectors = new Float64Array(rows * width);
    this.diagonal = new Float64Array(rows);
    this.exponent = new Int32Array(rows);
  }

  /** Replaces x (length `width`) by its coordinates: entries before `count` are final, the rest is the part outside the rows so far. */
  project(x: Float64Array): void {
    const { width, reflectors } = this;
    for (let k = 0; k < this.count; k++) {
      const at = k * width;
      let dot = 0;
      for (let j = k; j < width; j++) dot += (reflectors[at + j] as number) * (x[j] as number);
      if (dot !== 0) for (let j = k; j < width; j++) x[j] = (x[j] as number) - dot * (reflectors[at + j] as number);
      x[k] = (x[k] as number) * (this.signs[k] as number);
    }
  }

  /** Makes the projected row x·2^exponent final. Its diagonal entry becomes |rest| ≥ 0, stored into x[count]. */
  push(x: Float64Array, exponent: number): void {
    const { width, reflectors } = this;
    const k = this.count++;
    let top = 0;
    for (let j = k; j < width; j++) top = Math.max(top, Math.abs(x[j] as number));
    let square = 0;
    if (top > 0) for (let j = k; j < width; j++) square += ((x[j] as number) / top) ** 2;
    const norm = top * Math.sqrt(square);
    this.diagonal[k] = norm;
    this.exponent[k] = exponent;
    const at = k * width;
    if (norm > 0) {
      // The reflector H = I − v·vᵀ with |v|² = 2 maps the rest to ∓norm·e_k, away from cancellation.
      const head = (x[k] as number) / norm;
      const sign = head >= 0 ? 1 : -1;
      const scale = Math.sqrt(1 + sign * head);
      reflectors[at + k] = sign * scale;
      for (let j = k + 1; j < width; j++) reflectors[at + j] = (x[j] as number) / norm / scale;
      this.signs.push(-sign);
    } else this.signs.push(1);
    x[k] = norm;
    for (let j = k + 1; j < width; j++) x[j] = 0;
  }
}
