/** Which rows take part at present: see groups.ts for those that wait. */
import { bitLength } from '../../number/integer.ts';
import { checksumOf } from './checksum.ts';
import { profile } from './feed.ts';
import { type Arranged, arrange, type Cluster, clusters, JOIN_GAP, type Parked, parkFrom, SPREAD } from './groups.ts';
import { timesPowerOfTwo } from './limbs.ts';
import { diagonalLog2, type Stages } from './stages.ts';
import { type ExactRow, exactRow, type LatticeState, loadRows } from './state.ts';

/** Pending numbers join this many bits before they are touched, so that several join together. */
const ARRIVE_EARLY = 8;
const BEARABLE_DROP = 24;
const MAX_REBUILD_PASSES = 5000;

export class Members {
  private readonly integers: readonly (readonly bigint[])[];
  private readonly stages: Stages;
  private readonly pending: Cluster[];
  private readonly parked: Parked[] = [];

  constructor(integers: readonly (readonly bigint[])[], stages: Stages) {
    this.integers = integers;
    this.stages = stages;
    this.pending = clusters(integers);
  }

  /** How many of b bits to feed before someone has to join; at least 1. */
  limit(b: number): number {
    const { state, shape } = this.stages;
    const next = this.pending[0];
    const last = this.parked.at(-1);
    const untilPending = next === undefined ? b : state.e - next.bits - 1;
    const untilParked = last === undefined ? b : last.least - JOIN_GAP - shape.largest - state.scale;
    return Math.max(1, Math.min(b, Math.ceil(untilPending), Math.ceil(untilParked)));
  }

  /** Makes the pending rows active that the next `b` bits would touch, with some to come soon after. False when there are none. */
  *arrive(b: number): Generator<void, boolean, void> {
    const { state } = this.stages;
    if (this.pending.length === 0 || (this.pending[0] as Cluster).bits < state.e - b) return false;
    const arrivals: ExactRow[] = [];
    while (this.pending.length > 0 && (this.pending[0] as Cluster).bits >= state.e - b - ARRIVE_EARLY) {
      arrivals.push(...(this.pending.shift() as Cluster).rows);
    }
    yield* this.regroup(arrivals, []);
    return true;
  }

  /** Sets rows aside when a gap has opened, and brings parked rows back when the others have grown near them. */
  *mind(): Generator<void, void, void> {
    const { stages } = this;
    const { state } = stages;
    if (stages.shape.largest - stages.shape.least >= SPREAD) yield* this.part();
    for (;;) {
      const last = this.parked.at(-1);
      if (last === undefined || stages.shape.largest + state.scale < last.least - JOIN_GAP) return;
      this.parked.pop();
      yield* this.regroup([], last.rows);
    }
  }

  /**
   * What is left when doubles fail on the active rows: exact size reductions and exchanges of neighbours until the diagonal falls by
   * less than doubles can bear. Slow, and rarely needed. False when it does not help.
   */
  *rebuild(): Generator<void, boolean, void> {
    const { stages } = this;
    let rows = this.activeRows();
    for (let pass = 0; pass < MAX_REBUILD_PASSES; pass++) {
      const arranged = yield* arrange(rows, stages.state.e);
      rows = arranged.rows;
      yield;
      if (!exchangeNeighbours(rows, arranged.diagonal, pass & 1)) break;
    }
    yield* this.activate(rows);
    return stages.shape.drop < BEARABLE_DROP + 1 && stages.restart();
  }

  /** log2 of the shortest that a row not active can be, beyond the span of the active ones. */
  leastWaiting(): number {
    return Math.min(...[...this.parked, ...this.pending].map((group) => group.least));
  }

  /** The whole basis, exact, shorter groups first. Only while no stage is under way. */
  exactBasis(): ExactRow[] {
    const { state, shape } = this.stages;
    const active = { rows: this.activeRows(), least: shape.least + state.scale };
    return [active, ...this.parked, ...this.pending].sort((p, q) => p.least - q.least).flatMap((group) => group.rows);
  }

  /**
   * Parts the active rows at a gap. While the residuals of the short ones are small against their lengths the long ones go on growing
   * by themselves, and the short ones wait; once they count, it is the long ones that stand still and wait.
   */
  private *part(): Generator<void, void, void> {
    const { stages, pending } = this;
    const { state } = stages;
    const diagonal = Array.from(diagonalLog2(state));
    const from = parkFrom(diagonal);
    if (from === state.active) return;
    const least = Math.min(...diagonal.slice(0, from)) + state.scale;
    yield* stages.flushRows(state.e);
    const rows = this.activeRows();
    const residual = Math.max(...rows.slice(0, from).flatMap((row) => row.y.map(bitLength)));
    const bits = residual - Math.floor(least);
    if (bits >= state.e - 1) {
      yield* this.activate(rows);
      return;
    }
    pending.push({ rows: rows.slice(0, from), bits, least });
    pending.sort((p, q) => q.bits - p.bits);
    yield* this.activate(rows.slice(from));
  }

  private activeRows(): ExactRow[] {
    const { state } = this.stages;
    return Array.from({ length: state.active }, (_, i) => exactRow(state, i));
  }

  /** Makes the rows in front, the active ones and those behind active, except for those that a gap parks. */
  private *regroup(front: readonly ExactRow[], behind: readonly ExactRow[]): Generator<void, void, void> {
    yield* this.stages.flushRows(this.stages.state.e);
    yield* this.activate([...front, ...this.activeRows(), ...behind]);
  }

  private *activate(rows: readonly ExactRow[]): Generator<void, void, void> {
    const { stages } = this;
    const { state } = stages;
    const arranged = yield* arrange(rows, state.e);
    const count = parkFrom(arranged.diagonal);
    if (count < arranged.rows.length) {
      const least = Math.min(...arranged.diagonal.slice(count));
      this.parked.push({ rows: arranged.rows.slice(count), least });
    }
    const active = arranged.rows.slice(0, count);
    yield* loadRows(state, active);
    state.scale = Math.floor(Math.min(...arranged.diagonal.slice(0, count)));
    loadFactor(state, arranged, count);
    // Rows that are part of a basis of ℤⁿ span all integer vectors on their support when there are as many as it has places.
    const support = this.integers.filter((_, j) => active.some((row) => row.b[j] !== 0n));
    stages.checksum = support.length === active.length ? checksumOf(support) : undefined;
    stages.shape = profile(state);
    stages.measureResiduals();
  }
}

/** Exchanges rows k − 1 and k wherever the second is clearly shorter, k of one parity; false when the diagonal falls little enough. */
function exchangeNeighbours(rows: ExactRow[], diagonal: readonly number[], parity: number): boolean {
  let top = Number.NEGATIVE_INFINITY;
  let drop = 0;
  for (const x of diagonal) {
    top = Math.max(top, x);
    drop = Math.max(drop, top - x);
  }
  if (drop < BEARABLE_DROP) return false;
  for (let k = 1 + parity; k < rows.length; k += 2) {
    // With |μ| ≤ ½ the product of the first k diagonal entries shrinks at every exchange, which bounds their number.
    if ((diagonal[k] as number) < (diagonal[k - 1] as number) - 0.25) {
      [rows[k - 1], rows[k]] = [rows[k] as ExactRow, rows[k - 1] as ExactRow];
    }
  }
  return true;
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
