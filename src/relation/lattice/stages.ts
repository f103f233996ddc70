/**
 * One stage after another on the same rows: feed, sweep, apply the transform exactly, check the determinant; and what to do when
 * the check fails. Everything here is true of any rows; which rows take part is decided in members.ts.
 */
import type { Checksum } from './checksum.ts';
import { bitsToFeed, feed, type Profile, profile, residualBits } from './feed.ts';
import { applyToWindow, flush, rowSums, undoFlush } from './flush.ts';
import { refresh, rescale } from './refresh.ts';
import { identity, type LatticeState, windowErrorBits } from './state.ts';
import { DELTA, type SweepShape, sweep } from './sweep.ts';

/** Spread of the diagonal that a stage may reach, in bits: 53 less what LLL needs to decide. */
const RANGE = 35;
const MOST_RANGE = 38;
const LEAST_RANGE = 14;
/** After a rebuild. */
const RESTART_RANGE = 28;
const MAX_RESTARTS = 30;
/** The checksum may be off by this many bits before the factor is recomputed from the exact rows. */
const CHECK_TOLERANCE = 0.3;
/** Bits by which a refresh may move a diagonal entry before the stages become smaller, and below which they become larger. */
const DRIFT_TOO_MUCH = 0.3;
const DRIFT_TO_SPARE = 0.001;
/** Transforms beyond this have lost too many bits of the factor. */
const LARGE_TRANSFORM = 2 ** 30;
/** Entries of the transform stay below 2^this, so that its products are exact. */
const TRANSFORM_BITS = 52;
/** A single stage's transform is applied in exact arithmetic only below this. */
const LARGEST_ROW_SUM = 2 ** 50;
/** Bits by which the window must resolve the shortest row. */
const WINDOW_GUARD = 60;
/** Without a checksum the factor is recomputed every so many stages. */
const BLIND_STAGES = 8;

export interface StageCounts {
  iterations: number;
  /** How often the factor was recomputed from the exact rows. */
  refreshes: number;
  /** How often that did not help, and the search went back to the rows before the last flush. */
  rollbacks: number;
}

export class Stages {
  readonly state: LatticeState;
  readonly counts: StageCounts = { iterations: 0, refreshes: 0, rollbacks: 0 };
  /** Undefined when the determinant is not known; then drift only shows at a refresh. */
  checksum: Checksum | undefined;
  /** Of the factor, kept up to date after every stage. */
  shape: Profile = { drop: 0, least: 0, largest: 0, first: 0, sum: 0 };
  /** log2 of the largest residual of every active row, as last measured. */
  readonly residuals: Float64Array;
  private range = RANGE;
  private restarts = 0;

  constructor(state: LatticeState) {
    this.state = state;
    this.residuals = new Float64Array(state.n);
  }

  /** The bits that the next stage should feed, the feed ending at weight 2^−end. */
  nextFeed(end: number): number {
    return bitsToFeed(this.state, this.shape, this.measureResiduals(), this.range, end);
  }

  /** Feeds b bits and reduces once. False when double precision fails for good. */
  *feedAndReduce(b: number): Generator<void, boolean, void> {
    const before = this.state.e;
    feed(this.state, b);
    return yield* this.reduceOnce(before);
  }

  /** Notes log2 of every active residual; returns the largest. */
  measureResiduals(): number {
    const { state, residuals } = this;
    const f = state.kernels.view();
    let largest = Number.NEGATIVE_INFINITY;
    for (let i = 0; i < state.active; i++) {
      const bits = residualBits(state, f, i);
      residuals[i] = bits;
      if (bits > largest) largest = bits;
    }
    return largest;
  }

  /** Whether the window would not resolve the residuals after b more bits: time to flush. */
  windowShort(b: number): boolean {
    const { state, shape } = this;
    if (state.transformBits === 0) return false;
    const room = state.e - b + state.scale + shape.least - WINDOW_GUARD;
    if (windowErrorBits(state) > room) this.measureTransform();
    return windowErrorBits(state) > room;
  }

  /** The bound for the entries of the transform, which products let grow too fast, from the entries themselves. */
  private measureTransform(): void {
    const { state } = this;
    if (state.transformBits === 0) return;
    const { largest } = rowSums(state.kernels.view(), state.transform, state.stride, state.active, state.active);
    state.transformBits = Math.log2(largest) + 1e-6;
  }

  /**
   * One sweep, applied exactly; `before` is the weight at which the rows before it were reduced, `reach` as for `sweep` when U does not
   * begin as the identity. False when double precision fails for good.
   */
  *reduceOnce(before: number, reach?: number): Generator<void, boolean, void> {
    const { state, counts } = this;
    const { kernels, stride, active } = state;
    counts.iterations++;
    if (reach === undefined) identity(kernels.view(), state.u, stride, active);
    const band = sweep(state, sweepShape(active), reach ?? 0);
    const { sum, largest } = rowSums(kernels.view(), state.u, stride, active, band);
    if (!(sum < LARGEST_ROW_SUM)) return yield* this.abandonStage(before);
    if (state.transformBits + Math.log2(sum) > TRANSFORM_BITS) this.measureTransform();
    if (state.transformBits + Math.log2(sum) > TRANSFORM_BITS) yield* this.flushRows(before);
    applyToWindow(state, sum, band);
    if (state.transformBits === 0) kernels.view().copyWithin(state.transform, state.u, state.u + active * stride);
    else {
      kernels.multiply(state.spare, stride, state.u, stride, state.transform, stride, active, active, active, band, 0);
      [state.transform, state.spare] = [state.spare, state.transform];
    }
    state.transformBits += Math.log2(sum) + 1e-6;
    this.shape = profile(state);
    const periodic = this.checksum === undefined && counts.iterations % BLIND_STAGES === 0;
    if (!periodic && largest <= LARGE_TRANSFORM && this.checkError() <= CHECK_TOLERANCE) {
      rescale(state);
      this.shape = profile(state);
      return true;
    }
    if (!periodic) this.range = Math.max(LEAST_RANGE, this.range - 1);
    return yield* this.settle();
  }

  /** Begins again with smaller stages after the rows were rebuilt. False when their determinant is wrong, or it happened too often. */
  restart(): boolean {
    this.range = RESTART_RANGE;
    return this.restarts++ < MAX_RESTARTS && this.checkError() <= CHECK_TOLERANCE;
  }

  /** The transform of this stage cannot be held exactly: back to the weight before it, and feed less. */
  private *abandonStage(before: number): Generator<void, boolean, void> {
    const { state } = this;
    this.range -= 2;
    state.e = before;
    return this.range >= LEAST_RANGE && (yield* this.settle());
  }

  /** |Σ log2 l_ii − what it must be|; 0 when unknown, Infinity when not a number. */
  checkError(): number {
    const { state, shape, checksum } = this;
    const off =
      checksum === undefined ? 0 : Math.abs(shape.sum + state.active * state.scale - checksum.expected(state.e));
    return Number.isFinite(shape.sum) && off >= 0 ? off : Number.POSITIVE_INFINITY;
  }

  /** Brings the exact rows up to date. */
  *flushRows(reducedAt: number): Generator<void, void, void> {
    const { state, shape } = this;
    const rowBits = Math.ceil(shape.largest + state.scale + Math.log2(state.n)) + 4;
    yield* flush(state, Number.isFinite(rowBits) ? rowBits : 0, reducedAt);
  }

  /** Exact rows brought up to date and the factor recomputed from them; goes back when the determinant is still wrong. */
  *settle(): Generator<void, boolean, void> {
    const { state, counts } = this;
    yield* this.flushRows(state.e);
    this.recompute();
    if (this.checkError() <= CHECK_TOLERANCE) return true;
    counts.rollbacks++;
    this.range -= 4;
    if (this.range < LEAST_RANGE || !undoFlush(state)) return false;
    this.recompute();
    return this.checkError() <= CHECK_TOLERANCE;
  }

  /** The factor from the exact rows; what it moved tells whether the stages since the last time were too bold. */
  private recompute(): void {
    const { state, counts } = this;
    const before = diagonalLog2(state);
    refresh(state);
    const after = diagonalLog2(state);
    let drift = 0;
    for (let i = 0; i < after.length; i++)
      drift = Math.max(drift, Math.abs((after[i] as number) - (before[i] as number)));
    if (!(drift < DRIFT_TOO_MUCH)) this.range = Math.max(LEAST_RANGE, this.range - 1);
    else if (drift < DRIFT_TO_SPARE) this.range = Math.min(MOST_RANGE, this.range + 1);
    counts.refreshes++;
    rescale(state);
    this.shape = profile(state);
    this.measureResiduals();
  }
}

/** log2 of the diagonal of L. */
export function diagonalLog2(state: LatticeState): Float64Array {
  const f = state.kernels.view();
  return Float64Array.from({ length: state.active }, (_, i) =>
    Math.log2(f[state.l + i * (state.stride + 1)] as number),
  );
}

/** Measured: wider windows reduce more per stage, at a cost that grows with the cube of the width. */
function sweepShape(active: number): SweepShape {
  if (active <= 28) return { width: active, step: active, delta: DELTA };
  if (active < 60) return { width: 20, step: 10, delta: DELTA };
  if (active < 76) return { width: 24, step: 12, delta: DELTA };
  return { width: 28, step: 16, delta: DELTA };
}
