/** The families of nested sums and iterated integrals. */
import type { Family } from '../family.ts';
import { besselMoments } from '../integrals/bessel-moments.ts';
import { logSineIntegrals } from '../integrals/log-sine.ts';
import { centralBinomialSums } from './central-binomial.ts';
import { algebraicPolylogarithms, harmonicPolylogarithms, multiplePolylogarithms } from './hyperlogarithms.ts';
import { rootPolylogarithms } from './root-polylogarithms.ts';
import { alternatingSums, multipleZeta } from './zeta-values.ts';

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
export const sumFamilies: readonly Family<any>[] = [
  multipleZeta,
  alternatingSums,
  rootPolylogarithms,
  algebraicPolylogarithms,
  harmonicPolylogarithms,
  multiplePolylogarithms,
  centralBinomialSums,
  logSineIntegrals,
  besselMoments,
];
