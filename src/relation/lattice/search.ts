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
import { tour } from './enumerate.ts';
import type { Kernels } from './kernels/contract.ts';
import { Members } from './members.ts';
import { diagonalLog2, Stages } from './stages.ts';
import { type ExactRow, exactRow, newState } from './state.ts';
import { DELTA } from './sweep.ts';

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
  floatNormBoundLog2: number;
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

/** A residual this many bits below all others is put to the exact test at once. */
const GAP_TO_TEST = 24;
/** Bits by which the bound in doubles passes the one asked for, so that its proof will. */
const NORM_MARGIN = 0.04;
/** Sweeps after the last bit is fed. */
const MAX_FINAL_SWEEPS = 200;
/** Block size of the tours at the end, and the nodes all enumerations together may visit: about a second's work. */
const BLOCK = 22;
const ENUMERATION_NODES = 2e7;
/** The rows are tested again when the first became shorter by this many bits. */
const SHORTER = 0.3;
/** So many tours in a row that do not bring the ends of the profile together by FLATTER bits are the last. */
const IDLE_TOURS = 6;
const FLATTER = 0.1;

export class LatticeSearch {
  readonly progress: Progress = { fraction: 0, floatNormBoundLog2: 0 };
  readonly stages: Stages;
  readonly startBits: number;
  private readonly members: Members;
  private readonly input: SearchInput;
  private readonly errorNormsLog2: readonly number[];
  /** A smallest residual that failed the exact test; only one much smaller is worth another before the next flush. */
  private tested = Number.POSITIVE_INFINITY;

  constructor(input: SearchInput, kernels: Kernels) {
    this.input = input;
    const n = input.integers.length;
    const m = input.integers[0]?.length ?? 0;
    this.startBits = Math.max(1, ...input.integers.flat().map(bitLength));
    const state = newState(kernels, n, m, this.startBits);
    state.e = Math.max(this.startBits, input.endBits);
    this.stages = new Stages(state);
    this.members = new Members(input.integers, this.stages);
    this.errorNormsLog2 = Array.from({ length: m }, (_, j) => {
      const square = input.errors.reduce((sum, row) => sum + (row[j] as bigint) ** 2n, 0n);
      return square === 0n ? Number.NEGATIVE_INFINITY : bitLength(square) / 2;
    });
  }

  *run(): Generator<void, SearchEnd, void> {
    const { stages, members, input } = this;
    const { state } = stages;
    yield* members.arrive(0);
    const immediate = this.testExact();
    if (immediate !== undefined) return immediate;
    while (state.e > input.endBits) {
      if (yield* members.arrive(1)) continue;
      const b = members.limit(stages.nextFeed(input.endBits));
      let look = stages.windowShort(b);
      if (!look) {
        if (!(yield* stages.feedAndReduce(b)) && !(yield* members.rebuild())) return this.end('unstable');
        look = this.gapShows() || this.boundReached(NORM_MARGIN);
        yield;
      }
      if (look) {
        if (!(yield* stages.settle())) return this.end('unstable');
        const found = this.testExact();
        if (found !== undefined) return found;
        if (this.boundReached(NORM_MARGIN / 2)) return this.end('bounded');
      }
      yield* members.mind();
      this.note();
    }
    return yield* this.finish();
  }

  exactBasis(): ExactRow[] {
    return this.members.exactBasis();
  }

  private note(): void {
    const { progress, startBits, input } = this;
    progress.fraction = (startBits - this.stages.state.e) / Math.max(1, startBits - input.endBits);
    progress.floatNormBoundLog2 = Math.max(progress.floatNormBoundLog2, this.floatBound());
  }

  private gapShows(): boolean {
    const { stages } = this;
    stages.measureResiduals();
    const sizes = stages.residuals.slice(0, stages.state.active).sort();
    const smallest = sizes[0] as number;
    if (!(smallest < this.tested - GAP_TO_TEST)) return false;
    // Several relations may show together: the gap is sought anywhere.
    return sizes.some((size, k) => size < (sizes[k + 1] ?? stages.state.e) - GAP_TO_TEST);
  }

  /** log2 of the norm that every relation must reach, on the evidence of the doubles. */
  private floatBound(): number {
    const { stages, members } = this;
    const { state, shape } = stages;
    const least = Math.min(shape.least + state.scale, members.leastWaiting());
    let loss = 1;
    for (const norm of this.errorNormsLog2) loss += 4 ** (norm - state.e);
    return least - 2 * stages.checkError() - Math.log2(loss) / 2;
  }

  private boundReached(margin: number): boolean {
    return this.floatBound() > this.input.maxNormLog2 + margin;
  }

  /** After the last bit: sweeps until nothing moves, then every row is tested. */
  private *finish(): Generator<void, SearchEnd, void> {
    const { stages } = this;
    const { state } = stages;
    yield* this.members.arrive(Number.POSITIVE_INFINITY);
    let least = Number.POSITIVE_INFINITY;
    for (let k = 0; k < MAX_FINAL_SWEEPS; k++) {
      if (stages.windowShort(0) && !(yield* stages.settle())) return this.end('unstable');
      if (!(yield* stages.reduceOnce(state.e))) return this.end('unstable');
      yield;
      const potential = this.potential();
      if (potential > least - 1e-3) break;
      least = potential;
    }
    if (!(yield* stages.settle())) return this.end('unstable');
    this.note();
    const found = this.testExact();
    if (found !== undefined) return found;
    return this.boundReached(NORM_MARGIN / 2) ? this.end('bounded') : yield* this.strengthen();
  }

  /** Tours of block reduction until one changes nothing, a relation shows, or the nodes allowed are spent. */
  private *strengthen(): Generator<void, SearchEnd, void> {
    const { stages } = this;
    const { state } = stages;
    let best = Number.POSITIVE_INFINITY;
    for (let nodes = 0, idle = 0; nodes < ENUMERATION_NODES && idle < IDLE_TOURS; idle++) {
      const done = yield* tour(state, BLOCK, DELTA);
      nodes += done.nodes;
      if (done.insertions === 0) break;
      const first = stages.shape.first;
      if (!(yield* stages.reduceOnce(state.e, done.reach))) return this.end('unstable');
      yield;
      const slope = stages.shape.first - stages.shape.least;
      if (slope < best - FLATTER) [best, idle] = [slope, -1];
      if (stages.shape.first > first - SHORTER && !this.boundReached(NORM_MARGIN)) continue;
      if (!(yield* stages.settle())) return this.end('unstable');
      const found = this.testExact();
      if (found !== undefined) return found;
      if (this.boundReached(NORM_MARGIN / 2)) return this.end('bounded');
    }
    return (yield* stages.settle()) ? (this.testExact() ?? this.end('exhausted')) : this.end('unstable');
  }

  /** Σ (n − i)·log2 l_ii, which every swap of LLL lowers. */
  private potential(): number {
    const { state } = this.stages;
    return diagonalLog2(state).reduce((sum, x, i) => sum + (state.active - i) * (x + state.scale), 0);
  }

  /** Looks for the shortest exact row that vanishes within the errors and is accepted. The transform must be the identity. */
  private testExact(): SearchEnd | undefined {
    const { input } = this;
    const { state, residuals, shape } = this.stages;
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
    const { state, residuals } = this.stages;
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
