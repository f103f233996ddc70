/** The lattice method as the engine sees it. */
import { startLattice } from './lattice/index.ts';
import type { MethodEnd, SearchMethod } from './methods.ts';
import type { Prepared } from './prepare.ts';
import { weightRange } from './pslq/search.ts';

/** Times that a bound which doubles believe in may fail its proof before the rest of the digits is used. */
const ATTEMPTS = 3;

export const latticeMethod: SearchMethod = function* (prepared, options, progress) {
  const { integers, errors, endBits, lifts } = atOneScale(prepared);
  for (let attempt = 0; ; attempt++) {
    const last = attempt === ATTEMPTS;
    const maxNormLog10 = last ? Number.POSITIVE_INFINITY : options.maxNormLog10 + 0.1 * attempt;
    const run = startLattice({ integers, errors, endBits, accept: options.accept, maxNormLog10 });
    let result = run.step();
    while (result === undefined) {
      progress.fraction = run.progress.fraction;
      progress.iterations = run.progress.iterations;
      progress.normBoundLog10 = run.progress.floatNormBoundLog10;
      yield;
      result = run.step();
    }
    progress.iterations = result.iterations;
    const basis = result.basis();
    const weights = lifts.map((lift) => (result?.weightBits ?? 0) - lift);
    if (result.kind === 'bounded' && !last && !options.bounded(basis, weights)) continue;
    const found = result.kind === 'candidate' && result.candidate !== null;
    return {
      kind: result.kind,
      coefficients: found ? (result.candidate ?? undefined) : undefined,
      basis,
      weights,
    } satisfies MethodEnd;
  }
};

/** The columns lifted by powers of two so that their digits all end at one weight, not below one unit. */
function atOneScale(prepared: Prepared): {
  integers: bigint[][];
  errors: bigint[][];
  endBits: number;
  lifts: number[];
} {
  const { end } = weightRange(prepared);
  const endBits = Math.max(0, ...end);
  const lifts = end.map((e) => endBits - e);
  const lifted = (rows: readonly (readonly bigint[])[]): bigint[][] =>
    rows.map((row) => row.map((x, j) => x << BigInt(lifts[j] as number)));
  return { integers: lifted(prepared.integers), errors: lifted(prepared.errors), endBits, lifts };
}
