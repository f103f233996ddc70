/** One stage of reduction: LLL on overlapping windows from the first row to the last, then a size reduction of all rows. */
import { type LatticeState, WINDOW_STRIDE } from './state.ts';

/** Lovász factor. */
export const DELTA = 0.99;

export interface SweepShape {
  readonly width: number;
  readonly step: number;
  readonly delta: number;
}

/**
 * U ← sweep · U, L ← reduced. On entry U is the identity, or a transform already done to L whose rows reach `reach` columns beyond the
 * diagonal. Returns how far the rows of U reach now.
 */
export function sweep(state: LatticeState, shape: SweepShape, reach: number): number {
  const { kernels, l, u, stride, active } = state;
  const width = Math.min(shape.width, active);
  const band = width + 1 + reach;
  for (let start = 0; ; start += shape.step) {
    const w = Math.min(width, active - start);
    reduceWindow(state, start, w, shape.delta, band);
    if (start + w >= active) break;
  }
  kernels.sizeReduce(l, stride, u, stride, 1, active, active, band);
  return band;
}

/** LLL on rows start … start + w − 1, done to all of L and to U, whose row i reaches up to column i + band − 1. */
export function reduceWindow(state: LatticeState, start: number, w: number, delta: number, band: number): void {
  const { kernels, l, u, stride, active, windowU, windowQ } = state;
  const below = start + w;
  // Rows with large components along earlier ones would lose their own in rounding.
  kernels.sizeReduce(l, stride, u, stride, start, below, active, band);
  if (kernels.reduce(l, stride, start, w, windowU, windowQ, WINDOW_STRIDE, delta) === 0) return;
  kernels.multiplyLeft(l + start * stride, stride, windowU, WINDOW_STRIDE, w, start);
  kernels.multiplyLeft(u + start * stride, stride, windowU, WINDOW_STRIDE, w, Math.min(active, start + band));
  kernels.multiplyRight(l + below * stride + start, stride, windowQ, WINDOW_STRIDE, active - below, w);
}
