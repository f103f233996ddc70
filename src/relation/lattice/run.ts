/**
 * The search: stages of feeding and reducing, the checksum after each, and the decision when to stop. A generator that
 * yields between pieces of work of a few milliseconds; deterministic.
 *
 * Progressive-precision lattice reduction. Compare: gradual feeding of bits (van Hoeij and Novocin, "Gradual sub-lattice
 * reduction and a new complexity for factoring polynomials", LATIN 2010), LLL in segments (Koy and Schnorr, "Segment LLL-reduction
 * of lattice bases", CaLC 2001), compressed bases (Ryan and Heninger, "Fast practical lattice reduction through iterated
 * compression", CRYPTO 2023), and PSLQ in levels (Bailey and Broadhurst, Math. Comp. 70 (2001) 1719).
 */
import { absolute, bitLength } from '../../number/integer.ts';
import { type Checksum, checksumOf } from './checksum.ts';
import { tour } from './enumerate.ts';
import { bitsToFeed, feed, type Profile, profile, residualBits } from './feed.ts';
import { applyToWindow, flush, rowSums, undoFlush } from './flush.ts';
import { type Arranged, arrange, type Cluster, clusters, JOIN_GAP, type Parked, parkFrom } from './groups.ts';
import type { Kernels } from './kernels/contract.ts';
import { timesPowerOfTwo } from './limbs.ts';
import { refresh, rescale } from './refresh.ts';
import { type ExactRow, exactRow, identity, type LatticeState, loadRows, newState, windowErrorBits } from './state.ts';
import { type SweepShape, sweep } from './sweep.ts';

export interface SearchInput {
  readonly integers: readonly (readonly bigint[])[];
  /** |integers[i][j] − true value| ≤ errors[i][j]. */
  readonly errors: readonly (readonly bigint[])[];
  /** The feed ends at weight 2^−endBits. */
  readonly endBits: number;
  readonly maxNormLog2: number;
  readonly accept: (coefficients: readonly bigint[]) => boolean;
}

export interface Progress {
  fraction: number;
  iterations: number;
  floatNormBoundLog2: number;
  refreshes: number;
  rollbacks: number;
}

export interface SearchEnd {
  readonly kind: 'candidate' | 'bounded' | 'exhausted' | 'unstable';
  readonly candidate: readonly bigint[] | undefined;
  /** log2 of the candidate's largest residual, in units of the integers; −Infinity for 0. Without a candidate: the smallest residual. */
  readonly residualLog2: number;
  /** The smallest among the rows that do not vanish within the errors. */
  readonly secondResidualLog2: number;
  /** log2 of the norm that every relation must reach, on the evidence of the factor just recomputed from the exact rows. */
  readonly floatNormBoundLog2: number;
  /** The final weight: the basis is reduced for rows [b | 2^−e·b·Y]. */
  readonly e: number;
}

/** Spread of the diagonal that a stage may reach, in bits: 53 less what LLL needs to decide. */
const RANGE = 35;
const MOST_RANGE = 38;
const LEAST_RANGE = 14;
/** The checksum may be off by this many bits before the factor is recomputed from the exact rows. */
const CHECK_TOLERANCE = 0.3;
/** Bits by which a refresh may move a diagonal entry before the stages become smaller, and below which they become larger. */
const DRIFT_TOO_MUCH = 0.3;
const DRIFT_TO_SPARE = 0.001;
/** Transforms beyond this have lost too many bits of the factor. */
const LARGE_TRANSFORM = 2 ** 30;
/** Entries of the transform stay below 2^this, so that its products are exact. */
const TRANSFORM_BITS = 52;
/** A residual this many bits below all others is put to the exact test at once. */
const GAP_TO_TEST = 24;
/** Bits by which the window must resolve the shortest row. */
const WINDOW_GUARD = 60;
/** Pending numbers join this many bits before they are touched, so that several join together. */
const ARRIVE_EARLY = 24;
/** Without a checksum the factor is recomputed every so many stages. */
const BLIND_STAGES = 8;
/** Bits by which the bound in doubles passes the one asked for, so that its proof will. */
const NORM_MARGIN = 0.04;
/** Lovász factor. */
const DELTA = 0.99;
/** Block size of the tours at the end, and the nodes all enumerations together may visit: about a second's work. */
const BLOCK = 22;
const ENUMERATION_NODES = 2e7;
/** The rows are tested again when the first became shorter by this many bits. */
const SHORTER = 0.3;
/** So many tours in a row that do not bring the ends of the profile together by FLATTER bits are the last. */
const IDLE_TOURS = 6;
const FLATTER = 0.1;
/** Sweeps after the last bit is fed. */
const MAX_FINAL_SWEEPS = 200;

export class LatticeSearch {
  readonly state: LatticeState;
  readonly progress: Progress = { fraction: 0, iterations: 0, floatNormBoundLog2: 0, refreshes: 0, rollbacks: 0 };
  private readonly input: SearchInput;
  private readonly errorNormsLog2: readonly number[];
  readonly startBits: number;
  private readonly pending: Cluster[];
  private readonly parked: Parked[] = [];
  /** Undefined when the active rows do not span a coordinate lattice; then drift only shows at a refresh. */
  private checksum: Checksum | undefined;
  private range = RANGE;
  private shape: Profile = { drop: 0, least: 0, largest: 0, first: 0, sum: 0 };
  /** A smallest residual that failed the exact test; only one much smaller is worth another before the next flush. */
  private tested = Number.POSITIVE_INFINITY;
  private readonly residuals: Float64Array;

  constructor(input: SearchInput, kernels: Kernels) {
    this.input = input;
    const n = input.integers.length;
    const m = input.integers[0]?.length ?? 0;
    this.startBits = Math.max(1, ...input.integers.flat().map(bitLength));
    this.state = newState(kernels, n, m, this.startBits);
    this.residuals = new Float64Array(n);
    this.pending = clusters(input.integers);
    this.errorNormsLog2 = Array.from({ length: m }, (_, j) => {
      const square = input.errors.reduce((sum, row) => sum + (row[j] as bigint) ** 2n, 0n);
      return square === 0n ? Number.NEGATIVE_INFINITY : bitLength(square) / 2;
    });
  }

  *run(): Generator<void, SearchEnd, void> {
    const { state, input, progress } = this;
    state.e = Math.max(this.startBits, input.endBits);
    yield* this.regroup(this.arrivals(0), []);
    const immediate = this.testExact();
    if (immediate !== undefined) return immediate;
    while (state.e > input.endBits) {
      yield* this.join();
      const largest = this.measureResiduals();
      const b = bitsToFeed(state, this.shape, largest, this.range, input.endBits);
      if (this.arrivalsDue(b)) {
        yield* this.flushRows(state.e);
        yield* this.regroup(this.arrivals(b), this.exactRows());
        continue;
      }
      let look = this.windowShort(b);
      if (!look) {
        const before = state.e;
        feed(state, b);
        if (!(yield* this.reduceOnce(before))) return this.end('unstable');
        look = this.gapShows() || this.floatBound() > input.maxNormLog2 + NORM_MARGIN;
        yield;
      }
      if (look) {
        if (!(yield* this.settle())) return this.end('unstable');
        const found = this.testExact();
        if (found !== undefined) return found;
        if (this.floatBound() > input.maxNormLog2 + NORM_MARGIN / 2) return this.end('bounded');
      }
      progress.fraction = (this.startBits - state.e) / Math.max(1, this.startBits - input.endBits);
      progress.floatNormBoundLog2 = Math.max(progress.floatNormBoundLog2, this.floatBound());
    }
    return yield* this.finish();
  }

  /** The whole basis, exact: active rows, then parked, then pending ones. Only while no stage is under way. */
  exactBasis(): ExactRow[] {
    const waiting = [...[...this.parked].reverse(), ...this.pending].flatMap((group) => group.rows);
    return [...this.exactRows(), ...waiting];
  }

  private exactRows(): ExactRow[] {
    return Array.from({ length: this.state.active }, (_, i) => exactRow(this.state, i));
  }

  /** Removes and returns the pending numbers that the next b bits would touch, with some to come soon after. */
  private arrivals(b: number): ExactRow[] {
    const rows: ExactRow[] = [];
    while (this.pending.length > 0 && (this.pending[0] as Cluster).bits >= this.state.e - b - ARRIVE_EARLY) {
      rows.push(...(this.pending.shift() as Cluster).rows);
    }
    return rows;
  }

  private arrivalsDue(b: number): boolean {
    return this.pending.length > 0 && (this.pending[0] as Cluster).bits >= this.state.e - b - 1;
  }

  /** Makes arrivals and rows active, except for those that a gap parks. */
  private *regroup(arrivals: readonly ExactRow[], rows: readonly ExactRow[]): Generator<void, void, void> {
    const { state } = this;
    if (arrivals.length + rows.length === 0) return;
    const arranged = yield* arrange([...arrivals, ...rows], state.e);
    const count = parkFrom(arranged.diagonal);
    if (count < arranged.rows.length) {
      const least = Math.min(...arranged.diagonal.slice(count));
      this.parked.push({ rows: arranged.rows.slice(count), least });
    }
    const active = arranged.rows.slice(0, count);
    yield* loadRows(state, active);
    state.scale = Math.floor(Math.min(...arranged.diagonal.slice(0, count)));
    loadFactor(state, arranged, count);
    this.checksum = this.checksumFor(active);
    this.shape = profile(state);
    this.measureResiduals();
    this.tested = Number.POSITIVE_INFINITY;
  }

  /** Rows that are part of a basis of ℤⁿ span all integer vectors on their support when there are as many as it has places. */
  private checksumFor(rows: readonly ExactRow[]): Checksum | undefined {
    const support = this.input.integers.filter((_, j) => rows.some((row) => row.b[j] !== 0n));
    return support.length === rows.length ? checksumOf(support) : undefined;
  }

  /** Parked rows come back when the others have grown near them. */
  private *join(): Generator<void, void, void> {
    for (;;) {
      const last = this.parked.at(-1);
      if (last === undefined || this.shape.largest + this.state.scale < last.least - JOIN_GAP) return;
      yield* this.flushRows(this.state.e);
      this.parked.pop();
      yield* this.regroup([], [...this.exactRows(), ...last.rows]);
    }
  }

  /** Notes log2 of every active residual; returns the largest. */
  private measureResiduals(): number {
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

  private windowShort(b: number): boolean {
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

  private gapShows(): boolean {
    this.measureResiduals();
    const sizes = this.residuals.slice(0, this.state.active).sort();
    const smallest = sizes[0] as number;
    if (!(smallest < this.tested - GAP_TO_TEST)) return false;
    // Several relations may show together: the gap is sought anywhere.
    return sizes.some((size, k) => size < (sizes[k + 1] ?? this.state.e) - GAP_TO_TEST);
  }

  /** One sweep, applied exactly; `reach` as for `sweep` when U is not to begin as the identity. False when double precision fails for good. */
  private *reduceOnce(before: number, reach?: number): Generator<void, boolean, void> {
    const { state, progress } = this;
    const { kernels, stride, active } = state;
    progress.iterations++;
    if (reach === undefined) identity(kernels.view(), state.u, stride, active);
    const band = sweep(state, sweepShape(active), reach ?? 0);
    const { sum, largest } = rowSums(kernels.view(), state.u, stride, active, band);
    if (!(sum < 2 ** 50)) return yield* this.abandonStage(before);
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
    const periodic = this.checksum === undefined && progress.iterations % BLIND_STAGES === 0;
    if (!periodic && largest <= LARGE_TRANSFORM && this.checkError() <= CHECK_TOLERANCE) {
      rescale(state);
      this.shape = profile(state);
      return true;
    }
    if (!periodic) this.range = Math.max(LEAST_RANGE, this.range - 1);
    return yield* this.settle();
  }

  /** The transform of this stage cannot be held exactly: back to the weight before it, and feed less. */
  private *abandonStage(before: number): Generator<void, boolean, void> {
    const { state } = this;
    this.range -= 2;
    state.e = before;
    return this.range >= LEAST_RANGE && (yield* this.settle());
  }

  /** |Σ log2 l_ii − what it must be|; 0 when unknown, Infinity when not a number. */
  private checkError(): number {
    const { state, shape, checksum } = this;
    const off =
      checksum === undefined ? 0 : Math.abs(shape.sum + state.active * state.scale - checksum.expected(state.e));
    return Number.isFinite(shape.sum) && off >= 0 ? off : Number.POSITIVE_INFINITY;
  }

  private *flushRows(reducedAt: number): Generator<void, void, void> {
    const { state, shape } = this;
    const rowBits = Math.ceil(shape.largest + state.scale + Math.log2(state.n)) + 4;
    yield* flush(state, Number.isFinite(rowBits) ? rowBits : 0, reducedAt);
  }

  /** Exact rows brought up to date and the factor recomputed from them; goes back when the determinant is still wrong. */
  private *settle(): Generator<void, boolean, void> {
    const { state, progress } = this;
    yield* this.flushRows(state.e);
    this.recompute();
    if (this.checkError() <= CHECK_TOLERANCE) return true;
    progress.rollbacks++;
    this.range -= 4;
    if (this.range < LEAST_RANGE || !undoFlush(state)) return false;
    this.recompute();
    return this.checkError() <= CHECK_TOLERANCE;
  }

  /** The factor from the exact rows; what it moved tells whether the stages since the last time were too bold. */
  private recompute(): void {
    const { state, progress } = this;
    const before = diagonalLog2(state);
    refresh(state);
    const after = diagonalLog2(state);
    let drift = 0;
    for (let i = 0; i < after.length; i++)
      drift = Math.max(drift, Math.abs((after[i] as number) - (before[i] as number)));
    if (!(drift < DRIFT_TOO_MUCH)) this.range = Math.max(LEAST_RANGE, this.range - 1);
    else if (drift < DRIFT_TO_SPARE) this.range = Math.min(MOST_RANGE, this.range + 1);
    progress.refreshes++;
    rescale(state);
    this.shape = profile(state);
    this.measureResiduals();
  }

  /** log2 of the norm that every relation must reach, on the evidence of the doubles. */
  private floatBound(): number {
    const { state, shape, parked, pending } = this;
    let least = shape.least + state.scale;
    for (const group of parked) least = Math.min(least, group.least);
    if (pending.length > 0) least = Math.min(least, 0);
    let loss = 1;
    for (const norm of this.errorNormsLog2) loss += 4 ** (norm - state.e);
    return least - 2 * this.checkError() - Math.log2(loss) / 2;
  }

  /** After the last bit: sweeps until nothing moves, then every row is tested. */
  private *finish(): Generator<void, SearchEnd, void> {
    const { state, progress } = this;
    if (this.pending.length > 0) {
      yield* this.flushRows(state.e);
      yield* this.regroup(this.arrivals(Number.POSITIVE_INFINITY), this.exactRows());
    }
    let sum = Number.NaN;
    for (let k = 0; k < MAX_FINAL_SWEEPS; k++) {
      if (this.windowShort(0) && !(yield* this.settle())) return this.end('unstable');
      if (!(yield* this.reduceOnce(state.e))) return this.end('unstable');
      yield;
      const potential = this.potential();
      if (potential > sum - 1e-3) break;
      sum = potential;
    }
    if (!(yield* this.settle())) return this.end('unstable');
    progress.fraction = 1;
    return this.testExact() ?? (yield* this.strengthen());
  }

  /** Tours of block reduction until one changes nothing, a relation shows, or the nodes allowed are spent. */
  private *strengthen(): Generator<void, SearchEnd, void> {
    const { state } = this;
    let best = Number.POSITIVE_INFINITY;
    for (let nodes = 0, idle = 0; nodes < ENUMERATION_NODES && idle < IDLE_TOURS; idle++) {
      const done = yield* tour(state, BLOCK, DELTA);
      nodes += done.nodes;
      if (done.insertions === 0) break;
      const first = this.shape.first;
      if (!(yield* this.reduceOnce(state.e, done.reach))) return this.end('unstable');
      yield;
      const slope = this.shape.first - this.shape.least;
      if (slope < best - FLATTER) [best, idle] = [slope, -1];
      if (this.shape.first > first - SHORTER) continue;
      if (!(yield* this.settle())) return this.end('unstable');
      const found = this.testExact();
      if (found !== undefined) return found;
    }
    return (yield* this.settle()) ? (this.testExact() ?? this.end('exhausted')) : this.end('unstable');
  }

  /** Σ (n − i)·log2 l_ii, which every swap of LLL lowers. */
  private potential(): number {
    const { active, l, stride, kernels } = this.state;
    const f = kernels.view();
    let sum = 0;
    for (let i = 0; i < active; i++) sum += (active - i) * Math.log2(f[l + i * stride + i] as number);
    return sum;
  }

  /** Looks for the shortest exact row that vanishes within the errors and is accepted. The transform must be the identity. */
  private testExact(): SearchEnd | undefined {
    const { state, input, residuals, shape } = this;
    const possible = shape.largest + state.scale + Math.log2(state.n) + Math.max(...this.errorNormsLog2) + 2;
    let best: { b: readonly bigint[]; norm: bigint; at: number } | undefined;
    for (let i = 0; i < state.active; i++) {
      if ((residuals[i] as number) > possible) continue;
      const { y, b } = exactRow(state, i);
      if (!vanishes(y, b, input)) continue;
      const norm = b.reduce((sum, c) => sum + c * c, 0n);
      if ((best === undefined || norm < best.norm) && input.accept(b)) best = { b, norm, at: i };
    }
    if (best === undefined) {
      this.tested = Math.min(...residuals.subarray(0, state.active));
      return undefined;
    }
    return { ...this.end('candidate', best.at), candidate: best.b };
  }

  private end(kind: SearchEnd['kind'], at?: number): SearchEnd {
    const { state, residuals } = this;
    const sizes = residuals.subarray(0, state.active);
    const chosen = at ?? sizes.indexOf(Math.min(...sizes));
    const others = [...sizes].filter((_, i) => i !== chosen);
    return {
      kind,
      candidate: undefined,
      residualLog2: sizes[chosen] as number,
      secondResidualLog2: Math.min(...others),
      floatNormBoundLog2: kind === 'unstable' ? 0 : this.floatBound(),
      e: state.e,
    };
  }
}

/** Whether |b·Y| is within the errors, column by column, and b·Y is what the row says: exact. */
function vanishes(y: readonly bigint[], b: readonly bigint[], input: SearchInput): boolean {
  return y.every((residual, j) => {
    let sum = 0n;
    let allowed = 0n;
    b.forEach((c, i) => {
      if (c === 0n) return;
      sum += c * (input.integers[i]?.[j] as bigint);
      allowed += absolute(c) * (input.errors[i]?.[j] as bigint);
    });
    return sum === residual && absolute(residual) <= allowed;
  });
}

function diagonalLog2(state: LatticeState): Float64Array {
  const f = state.kernels.view();
  return Float64Array.from({ length: state.active }, (_, i) =>
    Math.log2(f[state.l + i * (state.stride + 1)] as number),
  );
}

function loadFactor(state: LatticeState, arranged: Arranged, count: number): void {
  const f = state.kernels.view();
  for (let i = 0; i < count; i++) {
    const at = state.l + i * state.stride;
    const exponent = (arranged.exponents[i] as number) - state.scale;
    f.fill(0, at, at + state.stride);
    for (let j = 0; j <= i; j++) f[at + j] = timesPowerOfTwo(arranged.coordinates[i]?.[j] as number, exponent);
  }
}

/** Measured: wider windows reduce more per stage, at a cost that grows with the cube of the width. */
function sweepShape(active: number): SweepShape {
  if (active <= 28) return { width: active, step: active, delta: DELTA };
  if (active < 60) return { width: 20, step: 10, delta: DELTA };
  if (active < 76) return { width: 24, step: 12, delta: DELTA };
  return { width: 28, step: 16, delta: DELTA };
}
