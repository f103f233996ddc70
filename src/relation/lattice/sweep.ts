/** One stage of reduction: LLL on overlapping windows from the first row to the last, then a size reduction of all rows. */
import { identity, type LatticeState, WINDOW_STRIDE } from './state.ts';

export interface SweepShape {
  readonly width: number;
  readonly step: number;
  readonly delta: number;
}

/** U ← the transform of one sweep, L ← reduced. Returns the number of operations inside the windows. */
export function sweep(state: LatticeState, shape: SweepShape): number {
  const { kernels, l, u, stride, active, windowU, windowQ } = state;
  identity(kernels.view(), u, stride, active);
  let operations = 0;
  const width = Math.min(shape.width, active);
  for (let start = 0; ; start += shape.step) {
    const w = Math.min(width, active - start);
    kernels.sizeReduce(l, stride, u, stride, start, start + w, active, width + 1);
    const done = kernels.reduce(l, stride, start, w, windowU, windowQ, WINDOW_STRIDE, shape.delta);
    if (done !== 0) {
      operations += Math.abs(done);
      if (start > 0) kernels.multiplyLeft(l + start * stride, stride, windowU, WINDOW_STRIDE, w, start);
      kernels.multiplyLeft(u + start * stride, stride, windowU, WINDOW_STRIDE, w, Math.min(active, start + w));
      const below = start + w;
      kernels.multiplyRight(l + below * stride + start, stride, windowQ, WINDOW_STRIDE, active - below, w);
    }
    if (start + w >= active) break;
  }
  kernels.sizeReduce(l, stride, u, stride, 1, active, active, width + 1);
  return operations;
}
