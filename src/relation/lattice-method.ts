/** The lattice method as the engine sees it. */
import { startLattice } from './lattice/index.ts';
import type { Basis, MethodEnd, MethodOptions, SearchMethod } from './methods.ts';
import { type Prepared, residualsOf } from './prepare.ts';
import { weightRange } from './pslq/search.ts';
import { withinErrors } from './significance.ts';

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
    yield;
    const basis = result.basis();
    yield;
    const weights = lifts.map((lift) => (result?.weightBits ?? 0) - lift);
    if (result.kind === 'bounded' && !last && !options.bounded(basis, weights)) continue;
    // Several relations that become visible together leave no gap for the search to notice: look at the basis as well.
    const coefficients =
      result.candidate ?? (result.kind === 'bounded' ? undefined : vanishingRow(prepared, options, basis));
    return {
      kind: coefficients === undefined ? result.kind : 'candidate',
      coefficients,
      basis,
      weights,
    } satisfies MethodEnd;
  }
};

function vanishingRow(prepared: Prepared, options: MethodOptions, basis: Basis): readonly bigint[] | undefined {
  return basis.find((row) => withinErrors(prepared, row, residualsOf(prepared, row)) && options.accept(row));
}

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
