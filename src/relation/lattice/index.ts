/** The lattice method: integer relations by lattice reduction in doubles on exact residuals, precision fed in gradually. */
import { bitLength } from '../../number/integer.ts';
import { type KernelChoice, newKernels } from './kernels/load.ts';
import { LatticeSearch, type SearchEnd } from './search.ts';

export interface LatticeInput {
  /** n rows × m columns; all at one scale, so that one unit means the same precision everywhere. */
  readonly integers: readonly (readonly bigint[])[];
  /** Bounds for |integer − true value|, in units; 1 each by default. */
  readonly errors?: readonly (readonly bigint[])[];
  /** The feed ends at weight 2^−endBits; by default at half the inverse of ‖errors‖, past which the bits carry no information. */
  readonly endBits?: number;
  /** Stop when every relation with norm up to 10^this is ruled out on the evidence of doubles. */
  readonly maxNormLog10?: number;
  /** A row that vanishes within the errors ends the search only if this agrees. */
  readonly accept?: (coefficients: readonly bigint[]) => boolean;
  readonly kernels?: KernelChoice;
}

export interface LatticeResult {
  /** 'candidate': a vector that vanishes within the errors. 'bounded': maxNormLog10 is reached. 'exhausted': all bits are fed. 'unstable': double precision failed. */
  readonly kind: SearchEnd['kind'];
  readonly candidate: readonly bigint[] | null;
  /** log2 of the largest residual of the candidate (or of the row with the smallest), in units; −Infinity for 0. */
  readonly residualLog2: number;
  /** The same of the next best row. */
  readonly secondResidualLog2: number;
  /** The rows are reduced in the norm of [b | 2^−weightBits·b·integers]. */
  readonly weightBits: number;
  /** Bits of the largest integer fed so far. */
  readonly fedBits: number;
  /** log10 of the norm that every relation must reach, on the evidence of doubles. */
  readonly floatNormBoundLog10: number;
  readonly iterations: number;
  /** The exact basis of ℤⁿ at the end, as rows, roughly shortest first; its determinant is ±1. */
  basis(): bigint[][];
}

export interface LatticeProgress {
  /** Share of the bits fed. */
  readonly fraction: number;
  readonly iterations: number;
  readonly floatNormBoundLog10: number;
  /** How often the factor was recomputed from the exact rows, and how often the search went back to an earlier state. */
  readonly refreshes: number;
  readonly rollbacks: number;
}

export interface LatticeRun {
  /** Works for a few milliseconds; returns the result once there is one. */
  step(): LatticeResult | undefined;
  readonly progress: LatticeProgress;
  readonly kernels: 'webassembly' | 'typescript';
}

const STEP_MILLISECONDS = 4;

/** Throws RangeError for rows that are empty or differ in length. */
export function startLattice(input: LatticeInput): LatticeRun {
  const { integers } = input;
  const m = integers[0]?.length ?? 0;
  if (integers.length < 1 || m < 1 || integers.some((row) => row.length !== m)) {
    throw new RangeError('startLattice: expected at least one row, all of the same positive length');
  }
  const errors = input.errors ?? integers.map((row) => row.map(() => 1n));
  const kernels = newKernels(input.kernels ?? 'auto');
  const search = new LatticeSearch(
    {
      integers,
      errors,
      endBits: Math.max(0, Math.floor(input.endBits ?? defaultEnd(errors))),
      maxNormLog2: (input.maxNormLog10 ?? Number.POSITIVE_INFINITY) / Math.log10(2),
      accept: input.accept ?? (() => true),
    },
    kernels,
  );
  const work = search.run();
  let result: LatticeResult | undefined;
  return {
    kernels: kernels.kind,
    get progress() {
      const { fraction, floatNormBoundLog2 } = search.progress;
      const { iterations, refreshes, rollbacks } = search.stages.counts;
      return { fraction, iterations, floatNormBoundLog10: floatNormBoundLog2 * Math.log10(2), refreshes, rollbacks };
    },
    step() {
      const until = performance.now() + STEP_MILLISECONDS;
      while (result === undefined) {
        const next = work.next();
        if (next.done) result = resultOf(search, next.value);
        else if (performance.now() >= until) break;
      }
      return result;
    },
  };
}

function defaultEnd(errors: readonly (readonly bigint[])[]): number {
  let bits = 0;
  for (let j = 0; j < (errors[0]?.length ?? 0); j++) {
    const square = errors.reduce((sum, row) => sum + (row[j] as bigint) ** 2n, 0n);
    bits = Math.max(bits, Math.ceil(bitLength(square) / 2) + 1);
  }
  return bits;
}

function resultOf(search: LatticeSearch, end: SearchEnd): LatticeResult {
  return {
    kind: end.kind,
    candidate: end.candidate ?? null,
    residualLog2: end.residualLog2,
    secondResidualLog2: end.secondResidualLog2,
    weightBits: end.e,
    fedBits: search.startBits - end.e,
    floatNormBoundLog10: Math.max(0, end.floatNormBoundLog2 * Math.log10(2)),
    iterations: search.stages.counts.iterations,
    basis: () => search.exactBasis().map((row) => row.b),
  };
}
