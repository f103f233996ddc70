/**
 * The state of one reduction: the exact rows in limbs, the transform collected since they were last brought up to date,
 * the leading window of the residuals, and the triangular factor in doubles. All in the one memory of the kernels.
 *
 * Rows are [b_i | 2^−e·y_i] with b_i the integer combination and y_i = b_i·Y its exact residuals (m columns).
 */
import { bitLength } from '../../number/integer.ts';
import type { Kernels } from './kernels/contract.ts';
import { LIMB_BITS, limbsFor, readLimbs, writeLimbs } from './limbs.ts';

export interface ExactRow {
  readonly y: bigint[];
  readonly b: bigint[];
}

/** Zero limbs below every run, so that a product with the k-th digit plane may read the run shifted by k ≤ 2 limbs. */
export const PADDING = 2;
/** Row stride of the small matrices of a window; the widest window fits. */
export const WINDOW_STRIDE = 34;
const DIGIT_PLANES = 3;

/** Runs of limbs: `rows` × `groups` integers of `length` limbs each; two buffers, one of them current. */
export interface LimbTable {
  groups: number;
  /** Capacity of a run in limbs. */
  length: number;
  /** Limbs of a run that can be non-zero. */
  used: number;
  groupStride: number;
  rowStride: number;
  current: number;
  other: number;
}

export interface LatticeState {
  readonly kernels: Kernels;
  readonly n: number;
  readonly m: number;
  /** Rows taking part at present. */
  active: number;
  /** The weight of the residuals is 2^−e. */
  e: number;
  /** True lengths are those in L times 2^scale. */
  scale: number;
  readonly stride: number;
  readonly l: number;
  readonly u: number;
  /** The transform since the last flush, and a spare of the same shape. */
  transform: number;
  spare: number;
  /** log2 of a bound for the entries of `transform`; 0 exactly when it is the identity. */
  transformBits: number;
  readonly planes: readonly number[];
  readonly feedVector: number;
  readonly windowU: number;
  readonly windowQ: number;
  residuals: LimbTable;
  basis: LimbTable;
  window: LimbTable;
  /** The window's limb 0 is limb `windowLow` of the residuals. */
  windowLow: number;
  /** The weight at which the exact rows were reduced. */
  rowsAt: number;
  /** What it takes to return to the rows before the last flush, which are in the other buffers; undefined when they are not. */
  earlier: { readonly rowsAt: number; readonly residualLimbs: number; readonly basisLimbs: number } | undefined;
}

export function newState(kernels: Kernels, n: number, m: number, residualBits: number): LatticeState {
  const stride = n + (n & 1) + 2;
  const square = (): number => kernels.allocate(n * stride + 4);
  const small = (): number => kernels.allocate(WINDOW_STRIDE * WINDOW_STRIDE);
  const residualLimbs = limbsFor(residualBits + bitLength(BigInt(n)) + 2);
  const windowLimbs = Math.min(residualLimbs, (n >> 1) + 14);
  return {
    kernels,
    n,
    m,
    active: 0,
    e: residualBits,
    scale: 0,
    stride,
    l: square(),
    u: square(),
    transform: square(),
    spare: square(),
    transformBits: 0,
    planes: Array.from({ length: DIGIT_PLANES }, square),
    feedVector: kernels.allocate(stride),
    windowU: small(),
    windowQ: small(),
    residuals: newTable(kernels, n, m, residualLimbs),
    basis: newTable(kernels, n, n, 4),
    window: newTable(kernels, n, m, windowLimbs),
    windowLow: 0,
    rowsAt: residualBits,
    earlier: undefined,
  };
}

export function newTable(kernels: Kernels, rows: number, groups: number, length: number): LimbTable {
  const groupStride = length + (length & 1) + PADDING;
  const rowStride = groups * groupStride + 2;
  const size = rows * rowStride + 4;
  const current = kernels.allocate(size) + PADDING;
  const other = kernels.allocate(size) + PADDING;
  return { groups, length, used: length, groupStride, rowStride, current, other };
}

/** Index of the lowest limb of entry (row, group). */
export function runAt(table: LimbTable, row: number, group: number): number {
  return table.current + row * table.rowStride + group * table.groupStride;
}

/** Makes `rows` the active rows: exact tables written, transform reset, window loaded. L is not touched. Yields every few rows. */
export function* loadRows(state: LatticeState, rows: readonly ExactRow[]): Generator<void, void, void> {
  const { kernels, n, m } = state;
  state.active = rows.length;
  let bits = 1;
  for (const row of rows) for (const b of row.b) bits = Math.max(bits, bitLength(b));
  if (limbsFor(bits) > state.basis.length) state.basis = newTable(kernels, n, n, limbsFor(bits) + 4);
  const f = kernels.view();
  let top = 1;
  for (const [i, row] of rows.entries()) {
    if (i % 16 === 15) yield;
    for (let j = 0; j < m; j++) {
      const y = row.y[j] as bigint;
      top = Math.max(top, bitLength(y));
      writeLimbs(y, f, runAt(state.residuals, i, j), state.residuals.length);
    }
    for (let j = 0; j < n; j++) writeLimbs(row.b[j] as bigint, f, runAt(state.basis, i, j), state.basis.length);
  }
  state.residuals.used = Math.min(state.residuals.length, limbsFor(top));
  state.basis.used = limbsFor(bits);
  state.earlier = undefined;
  state.rowsAt = state.e;
  resetTransform(state);
}

/** The exact rows; only right when the transform is the identity. */
export function exactRow(state: LatticeState, i: number): ExactRow {
  const f = state.kernels.view();
  const { residuals, basis } = state;
  const y = Array.from({ length: state.m }, (_, j) => readLimbs(f, runAt(residuals, i, j), residuals.used));
  const b = Array.from({ length: state.n }, (_, j) => readLimbs(f, runAt(basis, i, j), basis.used));
  return { y, b };
}

export function identity(f: Float64Array, at: number, stride: number, n: number): void {
  f.fill(0, at, at + n * stride);
  for (let i = 0; i < n; i++) f[at + i * stride + i] = 1;
}

/** Transform ← identity, window ← the leading limbs of the exact residuals. */
export function resetTransform(state: LatticeState): void {
  const { window, residuals, active, m } = state;
  const f = state.kernels.view();
  identity(f, state.transform, state.stride, active);
  state.transformBits = 0;
  state.windowLow = Math.max(0, residuals.used - window.length);
  window.used = Math.min(window.length, residuals.used);
  for (let i = 0; i < active; i++) {
    for (let j = 0; j < m; j++) {
      const from = runAt(residuals, i, j) + state.windowLow;
      f.copyWithin(runAt(window, i, j), from, from + window.used);
    }
  }
}

/** Bits of error in the residuals of the window: everything below its lowest limb was left out of the transform. */
export function windowErrorBits(state: LatticeState): number {
  if (state.windowLow === 0) return Number.NEGATIVE_INFINITY;
  return LIMB_BITS * state.windowLow + state.transformBits + Math.log2(state.n);
}
