/**
 * Multiple polylogarithms at roots of unity: MPL(s₁,…,s_d; z₁,…,z_d) = Σ_{n₁>…>n_d>0} Π z_j^{n_j} / n_j^{s_j}.
 * Method and proof of the radius: see double-tails.ts for the orders 1, 2, 3, 4, 6 and ring-tails.ts for 8 and 12.
 */
import { InputError } from '../../number/errors.ts';
import type { Family } from '../family.ts';
import { integerIndices, weightOf } from './indices.ts';
import { evaluateRootSums, type RootSum } from './root-words.ts';
import { leastCommonMultiple, type Root, rootLatex, rootOfUnity, rootText } from './roots.ts';

export interface RootPolylogArgs {
  readonly indices: readonly number[];
  readonly roots: readonly Root[];
}

const EXAMPLE = 'MPL(2,1;r6,1)';
/** Orders of the ring that holds all arguments together. */
const ORDERS: readonly number[] = [1, 2, 3, 4, 6, 8, 12];

function parse(term: Parameters<Family['parse']>[0]): RootPolylogArgs | null {
  if (term.kind !== 'call' || term.name !== 'MPL') return null;
  const [first, second] = term.groups;
  if (term.groups.length !== 2 || first === undefined || second === undefined || first.length !== second.length) {
    throw new InputError(
      'wrong-arguments',
      `MPL needs as many arguments as indices, parted by a semicolon, as in ${EXAMPLE}.`,
    );
  }
  const indices = integerIndices('MPL', first);
  if (indices === null || indices.length === 0 || indices.some((s) => s < 1)) {
    throw new InputError('bad-index', `The indices of MPL must be positive integers, as in ${EXAMPLE}.`);
  }
  const roots: Root[] = [];
  for (const term of second) {
    const root = rootOfUnity(term);
    if (root === null) return null;
    roots.push(root);
  }
  const order = roots.reduce((m, root) => leastCommonMultiple(m, root.order), 1);
  if (!ORDERS.includes(order)) {
    throw new InputError(
      'unsupported-roots',
      'The arguments of MPL together must be roots of unity of order 1, 2, 3, 4, 6, 8 or 12.',
    );
  }
  if (indices[0] === 1 && roots[0]?.order === 1) {
    throw new InputError('divergent', 'This sum diverges: with first index 1 the first argument must not be 1.');
  }
  return { indices, roots };
}

function toSum({ indices, roots }: RootPolylogArgs): RootSum {
  const order = roots.reduce((m, root) => leastCommonMultiple(m, root.order), 1);
  return { indices, exponents: roots.map((root) => root.exponent * (order / root.order)), order };
}

export const rootPolylogarithms: Family<RootPolylogArgs> = {
  key: 'root-polylogarithms',
  title: 'Multiple polylogarithms at roots of unity',
  names: ['MPL'],
  parse,
  weight: ({ indices }) => weightOf(indices),
  latex: ({ indices, roots }) => `\\mathrm{Li}_{${indices.join(',')}}(${roots.map(rootLatex).join(',')})`,
  text: ({ indices, roots }) => `MPL(${indices.join(',')};${roots.map(rootText).join(',')})`,
  isReal: ({ roots }) => roots.every((root) => root.order <= 2),
  evaluate: (args, bits, context) => {
    const [value] = evaluateRootSums([toSum(args)], bits, context);
    if (value === undefined) throw new RangeError('evaluate: expected one value');
    return value;
  },
  evaluateMany: (args, bits, context) => evaluateRootSums(args.map(toSum), bits, context),
  definition:
    '\\mathrm{Li}_{s_1,\\dots,s_d}(z_1,\\dots,z_d)=\\sum_{n_1>\\dots>n_d>0}\\prod_j\\frac{z_j^{n_j}}{n_j^{s_j}};\\quad r_N=e^{2\\pi i/N}',
  source:
    'Definition: Goncharov, Math. Res. Lett. 5 (1998) 497; Borwein, Bradley, Broadhurst and Lisoněk, Trans. AMS 353 (2001) 907. Method: Akhilesh, J. Number Theory 170 (2017) 228, extended to roots of unity.',
  examples: [
    'MPL(2,1;r6,1)',
    'MPL(3,1;r3,-1)',
    'MPL(2,1;i,1)',
    'MPL(3,1,2;r6,r6,1)',
    'MPL(2,1;r8,1)',
    'MPL(2,1;r12,1)',
  ],
};
