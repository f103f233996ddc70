/**
 * Inverse central binomial sums with nested harmonic weights and signs,
 *
 *   binsum(s₁,…,s_d) = Σ_{n₁>…>n_d>0} 1/C(2n₁, n₁) · Π σ_j^{n_j} / n_j^{|s_j|},   σ_j the sign of s_j,
 *
 * so that binsum(2, 1) has the weight S₁(n − 1) beside 1/(n² C(2n, n)).
 *
 * With R₁(m) = Σ_{n≥m} σ₁ⁿ/(n^{s₁} C(2n, n)) and R_j(m) = Σ_{n≥m} σ_jⁿ R_{j−1}(n+1)/n^{s_j} the sum is R_d(1); the R_j run down
 * together from n = N with truncated divisions by n^s in units of 2^−W.
 *
 * **Radius.** 1/C(2n, n) errs by less than 2 units (computed upward), so a summand of R₁ by less than 3 and R₁ by less than
 * 3N; R_j errs by at most H_N times the error of R_{j−1} plus N, H_N ≤ 1 + ln N. **Truncation.** C(2n, n) ≥ 4ⁿ/(2n + 1) and the
 * inner sums are at most (1 + ln n)^{d−1}; for n > N ≥ 16 the summands (2n + 1)(1 + ln n)^{d−1} 4^{−n} fall by a factor below
 * 1/2 each as long as d ≤ 8, so what is left out is at most twice the first, made less than one unit by the choice of N.
 */
import { withBits } from '../../number/ball.ts';
import { InputError } from '../../number/errors.ts';
import type { EvaluationContext, Family } from '../family.ts';
import { centralInverses, powersOf, pulse } from './double-tails.ts';
import { integerIndices, weightOf } from './indices.ts';

export interface BinomialSumArgs {
  /** Signed, none zero, at most 8. */
  readonly indices: readonly number[];
}

const MAX_DEPTH = 8;

function parse(term: Parameters<Family['parse']>[0]): BinomialSumArgs | null {
  if (term.kind !== 'call' || term.name !== 'binsum') return null;
  const indices = term.groups.length === 1 ? integerIndices('binsum', term.groups[0] ?? []) : null;
  if (indices === null || indices.length === 0) {
    throw new InputError('bad-index', 'binsum takes non-zero integers, as in binsum(4) or binsum(-2,1).');
  }
  if (indices.length > MAX_DEPTH) {
    throw new InputError('too-deep', `binsum takes at most ${MAX_DEPTH} indices.`);
  }
  return { indices };
}

/** N, W and log2 of the error bound, see the header. */
function sizes(bits: number, depth: number): { work: number; steps: number; radius: bigint } {
  for (let guard = 12; ; guard += 4) {
    const work = bits + guard;
    let steps = Math.max(16, Math.ceil(work / 2));
    const tail = (n: number): number =>
      1 + Math.log2(2 * n + 3) + (depth - 1) * Math.log2(1 + Math.log(n + 1)) - 2 * (n + 1);
    while (tail(steps) > -work - 0.001) steps++;
    const harmonic = 1 + Math.log(steps);
    let error = 3 * steps;
    for (let j = 1; j < depth; j++) error = error * harmonic + steps;
    const log2Error = Math.log2(error + 1) + 0.001;
    if (log2Error <= guard) return { work, steps, radius: 1n << BigInt(Math.ceil(log2Error)) };
  }
}

interface Node {
  readonly parent: number;
  readonly exponent: number;
  readonly alternating: boolean;
}

/** The prefixes of all index lists, each once, parents first. */
function prefixTree(all: readonly BinomialSumArgs[]): { nodes: Node[]; ends: number[] } {
  const nodes: Node[] = [];
  const known = new Map<string, number>();
  const ends = all.map(({ indices }) => {
    let parent = -1;
    for (const s of indices) {
      const key = `${parent}:${s}`;
      const found = known.get(key);
      const node = found ?? nodes.push({ parent, exponent: Math.abs(s), alternating: s < 0 }) - 1;
      known.set(key, node);
      parent = node;
    }
    return parent;
  });
  return { nodes, ends };
}

function evaluateMany(all: readonly BinomialSumArgs[], bits: number, context: EvaluationContext) {
  const depth = all.reduce((most, { indices }) => Math.max(most, indices.length), 1);
  const { work, steps, radius } = sizes(bits + 1, depth);
  const { nodes, ends } = prefixTree(all);
  const top = nodes.reduce((most, node) => Math.max(most, node.exponent), 0);
  const empty = centralInverses(steps, work);
  const sums = nodes.map(() => 0n);
  for (let n = steps; n >= 1; n--) {
    const powers = powersOf(n, top);
    // Children first: they need R_{j−1}(n + 1), before n is added.
    for (let k = nodes.length - 1; k >= 0; k--) {
      const { parent, exponent, alternating } = nodes[k] as Node;
      const share = (parent < 0 ? (empty[n] as bigint) : (sums[parent] as bigint)) / (powers[exponent] as bigint);
      sums[k] = (sums[k] as bigint) + (alternating && n % 2 === 1 ? -share : share);
    }
    pulse(n, steps, context);
  }
  return ends.map((end) => withBits({ mid: sums[end] as bigint, rad: radius, bits: work }, bits + 2));
}

export const centralBinomialSums: Family<BinomialSumArgs> = {
  key: 'central-binomial-sums',
  title: 'Inverse central binomial sums',
  names: ['binsum'],
  parse,
  weight: ({ indices }) => weightOf(indices),
  latex: ({ indices }) => {
    const depth = indices.length;
    const name = (j: number): string => (depth === 1 ? 'n' : `n_{${j + 1}}`);
    const range = depth === 1 ? 'n\\ge1' : `${indices.map((_, j) => name(j)).join('>')}\\ge1`;
    const signs = indices.flatMap((s, j) => (s < 0 ? [name(j)] : []));
    const top = signs.length === 0 ? '1' : `(-1)^{${signs.join('+')}}`;
    const below = indices.map((s, j) => `${name(j)}${Math.abs(s) === 1 ? '' : `^{${Math.abs(s)}}`}`).join('');
    return `\\sum_{${range}}\\frac{${top}}{${below}\\binom{2${name(0)}}{${name(0)}}}`;
  },
  text: ({ indices }) => `binsum(${indices.join(',')})`,
  isReal: () => true,
  evaluate: (args, bits, context) => {
    const [value] = evaluateMany([args], bits, context);
    if (value === undefined) throw new RangeError('evaluate: expected one value');
    return value;
  },
  evaluateMany,
  definition:
    '\\mathrm{binsum}(s_1,\\dots,s_d)=\\sum_{n_1>\\dots>n_d>0}\\frac{1}{\\binom{2n_1}{n_1}}\\prod_j\\frac{\\sigma_j^{n_j}}{n_j^{|s_j|}},\\quad \\sigma_j=\\operatorname{sign}s_j',
  source:
    'Borwein, Broadhurst and Kamnitzer, Exper. Math. 10 (2001) 25; Davydychev and Kalmykov, Nucl. Phys. B 699 (2004) 3. Direct summation.',
  examples: ['binsum(1)', 'binsum(2)', 'binsum(3)', 'binsum(4)', 'binsum(-3)', 'binsum(2,1)'],
};
