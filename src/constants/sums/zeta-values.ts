/**
 * Multiple zeta values and alternating sums: ζ(s₁,…,s_d) = Σ_{n₁>…>n_d>0} Π σ_j^{n_j} / n_j^{|s_j|}, σ_j the sign of s_j.
 * Method and proof of the radius: see double-tails.ts.
 */
import { InputError } from '../../number/errors.ts';
import type { Family } from '../family.ts';
import type { CallTerm, SymbolTerm } from '../term.ts';
import { integerIndices, weightOf } from './indices.ts';
import { evaluateRootSums, type RootSum } from './root-words.ts';

export interface ZetaArgs {
  /** Signed, none zero. */
  readonly indices: readonly number[];
}

function parse(term: CallTerm | SymbolTerm, alternating: boolean): ZetaArgs | null {
  if (term.kind !== 'call' || term.name !== 'zeta' || term.groups.length !== 1) return null;
  const list = term.groups[0] ?? [];
  const indices = integerIndices('zeta', list);
  if (indices === null) {
    if (list.length < 2) return null;
    throw new InputError('bad-index', 'The indices of a multiple zeta value must be integers, as in zeta(5,3).');
  }
  const signed = indices.some((s) => s < 0);
  if (signed !== alternating || (!signed && indices.length < 2)) return null;
  if (indices[0] === 1) {
    throw new InputError(
      'divergent',
      `zeta(${indices.join(',')}) diverges: the first index, which belongs to the outermost sum, must not be 1.`,
    );
  }
  return { indices };
}

function toSum({ indices }: ZetaArgs): RootSum {
  return { indices: indices.map(Math.abs), exponents: indices.map((s) => (s < 0 ? 1 : 0)), order: 2 };
}

const common = {
  names: ['zeta'],
  weight: ({ indices }: ZetaArgs) => weightOf(indices),
  latex: ({ indices }: ZetaArgs) => `\\zeta(${indices.map((s) => (s < 0 ? `\\bar{${-s}}` : s)).join(',')})`,
  text: ({ indices }: ZetaArgs) => `zeta(${indices.join(',')})`,
  isReal: () => true,
  source:
    'Convention with n₁ largest as in Borwein, Bradley and Broadhurst, hep-th/9611004. Method: Akhilesh, J. Number Theory 170 (2017) 228.',
} as const;

const evaluate: Family<ZetaArgs>['evaluate'] = (args, bits, context) => {
  const [value] = evaluateRootSums([toSum(args)], bits, context);
  if (value === undefined) throw new RangeError('evaluate: expected one value');
  return value;
};

const evaluateMany: NonNullable<Family<ZetaArgs>['evaluateMany']> = (args, bits, context) =>
  evaluateRootSums(args.map(toSum), bits, context);

export const multipleZeta: Family<ZetaArgs> = {
  ...common,
  key: 'multiple-zeta',
  title: 'Multiple zeta values',
  parse: (term) => parse(term, false),
  evaluate,
  evaluateMany,
  definition: '\\zeta(s_1,\\dots,s_d)=\\sum_{n_1>\\dots>n_d>0}\\frac{1}{n_1^{s_1}\\cdots n_d^{s_d}},\\quad s_1\\ge 2',
  examples: ['zeta(5,3)', 'zeta(7,3)', 'zeta(5,3,3)', 'zeta(9,3)', 'zeta(6,4,1,1)', 'zeta(2,1)', 'zeta(3,1)'],
};

export const alternatingSums: Family<ZetaArgs> = {
  ...common,
  key: 'alternating-sums',
  title: 'Alternating sums',
  parse: (term) => parse(term, true),
  evaluate,
  evaluateMany,
  definition:
    '\\zeta(s_1,\\dots,s_d)=\\sum_{n_1>\\dots>n_d>0}\\prod_j\\frac{\\sigma_j^{n_j}}{n_j^{|s_j|}},\\quad \\sigma_j=\\operatorname{sign}s_j;\\ \\bar{s}\\text{ stands for }-s',
  examples: ['zeta(-1)', 'zeta(-3,1)', 'zeta(-3,-1)', 'zeta(-5,1)', 'zeta(-5,-1)', 'zeta(-5,1,1)', 'zeta(-3,3,1)'],
};
