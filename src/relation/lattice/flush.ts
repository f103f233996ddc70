/** Exact products of integer matrices with tables of limbs: the window at every stage, the exact rows at a flush. */
import { LIMB, LIMB_BITS, limbsFor } from './limbs.ts';
import { type LatticeState, type LimbTable, newTable, resetTransform } from './state.ts';

/** Limbs of one piece of work between two looks at the clock. */
const PIECE = 256;
/** Sums of products of limbs below this are exact, and may be carried. */
const EXACT = 2 ** 52;

/** Splits an integer matrix into digits in [−2^21, 2^21] and returns how many planes are needed: 1 to 3. */
function splitDigits(state: LatticeState, matrix: number, largestRowSum: number): number {
  const { stride, active, planes } = state;
  // One plane suffices while the row sums keep every sum below 2^52.
  const count = largestRowSum * (LIMB / 2) < EXACT ? 1 : largestRowSum < 2 ** (2 * LIMB_BITS - 2) ? 2 : 3;
  if (count === 1) return 1;
  const f = state.kernels.view();
  for (let i = 0; i < active; i++) {
    for (let j = 0; j < active; j++) {
      const at = i * stride + j;
      let rest = f[matrix + at] as number;
      for (let p = 0; p < count; p++) {
        const over = Math.round(rest / LIMB);
        f[(planes[p] as number) + at] = p === count - 1 ? rest : rest - over * LIMB;
        rest = over;
      }
    }
  }
  return count;
}

/** table.other ← matrix · table.current in limbs [from, to) of every group, without carries. */
function multiplyLimbs(
  state: LatticeState,
  table: LimbTable,
  matrix: number,
  planes: number,
  band: number,
  group: number,
  from: number,
  to: number,
): void {
  const { kernels, stride, active } = state;
  for (let p = 0; p < planes; p++) {
    const at = group * table.groupStride + from;
    kernels.multiply(
      table.other + at,
      table.rowStride,
      planes === 1 ? matrix : (state.planes[p] as number),
      stride,
      table.current + at - p,
      table.rowStride,
      active,
      active,
      to - from,
      band,
      p === 0 ? 0 : 1,
    );
  }
}

function exchange(table: LimbTable): void {
  [table.current, table.other] = [table.other, table.current];
}

/** window ← U · window. */
export function applyToWindow(state: LatticeState, rowSum: number, band: number): void {
  const { window, kernels, active } = state;
  const planes = splitDigits(state, state.u, rowSum);
  for (let g = 0; g < window.groups; g++) multiplyLimbs(state, window, state.u, planes, band, g, 0, window.used);
  kernels.carry(window.other, window.rowStride, active, window.groups, window.groupStride, window.used);
  exchange(window);
}

/**
 * Exact rows ← transform · exact rows, transform ← identity. A generator: it yields between pieces of work of a few
 * milliseconds. The rows before are kept in the other buffers. `rowBits` bounds the bits of the new basis entries, and
 * `reducedAt` is the weight at which the new rows are reduced.
 */
export function* flush(state: LatticeState, rowBits: number, reducedAt: number): Generator<void, void, void> {
  const { active, stride, kernels } = state;
  if (state.transformBits === 0) return;
  const earlier = { rowsAt: state.rowsAt, residualLimbs: state.residuals.used, basisLimbs: state.basis.used };
  growBasis(state, Math.max(rowBits, 1));
  const planes = splitDigits(
    state,
    state.transform,
    rowSums(kernels.view(), state.transform, stride, active, active).sum,
  );
  for (const table of [state.residuals, state.basis]) {
    const batch = table.groups > state.m || table.used > PIECE ? 1 : table.groups;
    for (let g = 0; g < table.groups; g++) {
      for (let from = 0; from < table.used; from += PIECE) {
        multiplyLimbs(state, table, state.transform, planes, active, g, from, Math.min(table.used, from + PIECE));
        if (batch === 1 && table.used > PIECE) yield;
      }
      if (table === state.basis && g % 16 === 15) yield;
    }
    kernels.carry(table.other, table.rowStride, active, table.groups, table.groupStride, table.used);
    exchange(table);
    yield;
  }
  state.earlier = earlier;
  state.rowsAt = reducedAt;
  shrinkResiduals(state);
  resetTransform(state);
}

function growBasis(state: LatticeState, rowBits: number): void {
  const { basis, n, active, kernels } = state;
  const needed = limbsFor(rowBits);
  if (needed > basis.length) {
    const larger = newTable(kernels, n, n, Math.ceil(needed * 1.5));
    const f = kernels.view();
    for (let i = 0; i < active; i++) {
      for (let g = 0; g < n; g++) {
        const from = basis.current + i * basis.rowStride + g * basis.groupStride;
        f.copyWithin(larger.current + i * larger.rowStride + g * larger.groupStride, from, from + basis.used);
      }
    }
    larger.used = basis.used;
    state.basis = larger;
  }
  const table = state.basis;
  const f = kernels.view();
  for (let i = 0; i < active; i++) {
    for (let g = 0; g < n; g++) {
      const at = table.current + i * table.rowStride + g * table.groupStride;
      if (needed > table.used) f.fill(0, at + table.used, at + needed);
    }
  }
  table.used = Math.max(needed, table.used);
}

/** Drops leading limbs that are zero in every row, but one that is kept for carries. */
function shrinkResiduals(state: LatticeState): void {
  const { residuals, active } = state;
  const f = state.kernels.view();
  let used = residuals.used;
  while (used > 2 && isZeroLimb(f, residuals, active, used - 2)) used--;
  residuals.used = used;
}

function isZeroLimb(f: Float64Array, table: LimbTable, rows: number, limb: number): boolean {
  for (let i = 0; i < rows; i++) {
    for (let g = 0; g < table.groups; g++) {
      if (f[table.current + i * table.rowStride + g * table.groupStride + limb] !== 0) return false;
    }
  }
  return true;
}

/** Returns to the rows before the last flush, and to their weight. False when they are not kept any more. */
export function undoFlush(state: LatticeState): boolean {
  const { earlier } = state;
  if (earlier === undefined) return false;
  exchange(state.residuals);
  exchange(state.basis);
  state.residuals.used = earlier.residualLimbs;
  state.basis.used = earlier.basisLimbs;
  state.rowsAt = earlier.rowsAt;
  state.e = earlier.rowsAt;
  state.earlier = undefined;
  resetTransform(state);
  return true;
}

/** Largest row sum of absolute values (NaN if any is) and largest absolute value of an integer matrix that is zero from column i + band on in row i. */
export function rowSums(
  f: Float64Array,
  at: number,
  stride: number,
  n: number,
  band: number,
): { sum: number; largest: number } {
  let sum = 0;
  let largest = 0;
  for (let i = 0; i < n; i++) {
    let row = 0;
    const end = Math.min(n, i + band);
    for (let j = 0; j < end; j++) {
      const x = Math.abs(f[at + i * stride + j] as number);
      row += x;
      if (x > largest) largest = x;
    }
    if (!(row <= sum)) sum = row;
  }
  return { sum, largest };
}
