/**
 * The inner loops of the lattice method, as they are asked for. Every kernel exists twice, in TypeScript (typescript.ts) and in
 * WebAssembly SIMD (assembly/), and both do the same floating-point operations in the same order on each element, so that
 * their answers are identical bit for bit.
 *
 * All matrices are row-major Float64 in one memory; a matrix is named by the index of its first element (not bytes) and
 * its row stride.
 */

/** x + ROUND − ROUND is the integer nearest to x (ties to even) for |x| < 2^51. */
export const ROUND = 6755399441055744; // 1.5·2^52

export interface Kernels {
  readonly kind: 'webassembly' | 'typescript';
  /** Allocates `length` doubles, zeroed, at an even index. */
  allocate(length: number): number;
  /** The memory as doubles. Fetch it after every `allocate`: growing the memory detaches earlier views. */
  view(): Float64Array;

  /**
   * C = A·B, or C + A·B when `accumulate` is 1, for C of `rows` × `cols`, the inner index running over 0 … min(inner, i + band) − 1 in row i rounded up to the end of its group of four rows
   * (A is zero beyond). Reads and writes columns up to `cols` rounded up to even: strides must leave room. C may not overlap A or B.
   */
  multiply(
    c: number,
    cStride: number,
    a: number,
    aStride: number,
    b: number,
    bStride: number,
    rows: number,
    inner: number,
    cols: number,
    band: number,
    accumulate: number,
  ): void;

  /** M ← U·M for M of w × cols, U of w × w with row stride `uStride`. */
  multiplyLeft(m: number, mStride: number, u: number, uStride: number, w: number, cols: number): void;

  /** M ← M·Q for M of rows × w, Q of w × w. */
  multiplyRight(m: number, mStride: number, q: number, qStride: number, rows: number, w: number): void;

  /** Rank-one update: L becomes the lower-triangular factor of L·Lᵀ + v·vᵀ, with positive diagonal. Destroys v. */
  update(l: number, lStride: number, v: number, n: number): void;

  /**
   * LLL (Lovász factor `delta`) on the w × w diagonal block of L that begins at row `start`. The block is replaced by the
   * reduced one; U receives the transform of the rows, Q the rotation of the columns: block' = U·block·Q, both w × w with row
   * stride `stride`. Returns the number of row operations and swaps, 0 when nothing changed; negative when it gave up.
   */
  reduce(
    l: number,
    lStride: number,
    start: number,
    w: number,
    u: number,
    q: number,
    stride: number,
    delta: number,
  ): number;

  /**
   * Size-reduces rows from … to − 1 of L in turn, each against all rows above it; the same operations are done on the
   * rows of T (columns below i + band and `cols` in row i).
   */
  sizeReduce(
    l: number,
    lStride: number,
    t: number,
    tStride: number,
    from: number,
    to: number,
    cols: number,
    band: number,
  ): void;

  /**
   * Makes limbs canonical: in each of `rows` rows, `groups` runs of `length` limbs (least first; runs `groupStride` apart),
   * carries multiples of 2^22 upwards until every limb is in [−2^21, 2^21]. What leaves the last limb is dropped: the value is
   * kept modulo 2^(22·length). Entries < 2^52.
   */
  carry(x: number, rowStride: number, rows: number, groups: number, groupStride: number, length: number): void;
}
