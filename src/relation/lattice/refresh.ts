/** The triangular factor recomputed from the exact rows. */
import { RowFactor } from './factor.ts';
import { LIMB_BITS, leading, timesPowerOfTwo } from './limbs.ts';
import { type LatticeState, runAt } from './state.ts';

/** L ← triangular factor of the exact rows [y·2^−e | b], in units of 2^scale. The transform must be the identity. */
export function refresh(state: LatticeState): void {
  const { active, n, m, l, stride } = state;
  const factor = new RowFactor(active, n + m);
  const row = new Float64Array(n + m);
  const powers = Float64Array.from({ length: state.basis.used }, (_, k) =>
    timesPowerOfTwo(1, LIMB_BITS * k - state.scale),
  );
  const f = state.kernels.view();
  for (let i = 0; i < active; i++) {
    doubleRow(state, f, i, row, powers);
    factor.project(row);
    factor.push(row, 0);
    const at = l + i * stride;
    f.fill(0, at, at + stride);
    for (let j = 0; j <= i; j++) f[at + j] = row[j] as number;
  }
}

const parts: [number, number] = [0, 0];

function doubleRow(state: LatticeState, f: Float64Array, i: number, row: Float64Array, powers: Float64Array): void {
  const { n, m, residuals, basis, e, scale } = state;
  for (let j = 0; j < m; j++) {
    leading(f, runAt(residuals, i, j), residuals.used, parts);
    row[j] = timesPowerOfTwo(parts[0], parts[1] - e - scale);
  }
  for (let j = 0; j < n; j++) {
    const at = runAt(basis, i, j);
    let sum = 0;
    for (let k = basis.used - 1; k >= 0; k--) sum += (f[at + k] as number) * (powers[k] as number);
    row[m + j] = sum;
  }
}

/** Keeps L in the middle of the range of doubles. */
export function rescale(state: LatticeState): void {
  const { active, l, stride } = state;
  const f = state.kernels.view();
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < active; i++) least = Math.min(least, f[l + i * stride + i] as number);
  if (!(least > 2 ** 60)) return;
  const by = 2 ** -60;
  for (let i = 0; i < active; i++)
    for (let j = 0; j <= i; j++) f[l + i * stride + j] = (f[l + i * stride + j] as number) * by;
  state.scale += 60;
}
