/**
 * Harmonic polylogarithms H, multiple polylogarithms G with any letters, and nested sums MPL with algebraic arguments: one
 * evaluation (iterated.ts) behind three notations. Radii: double-tails.ts, general-tails.ts and path.ts.
 */
import { add, fromInteger, sign, square, subtract } from '../../number/ball.ts';
import { toComplex, type Value } from '../../number/complex.ts';
import { InputError } from '../../number/errors.ts';
import type { EvaluationContext, Family } from '../family.ts';
import { isRational, rational, type Term } from '../term.ts';
import { termLatex } from '../term-latex.ts';
import { termText } from '../term-text.ts';
import { integerIndices, weightOf } from './indices.ts';
import { evaluateIntegrals, type IteratedIntegral, pathLetter, refuseDivergent } from './iterated.ts';
import { isPlainlyReal, polarOf } from './polar.ts';

export interface HyperlogArgs {
  readonly integral: IteratedIntegral;
  readonly text: string;
  readonly latex: string;
  readonly weight: number;
  readonly real: boolean;
}

const MAX_LETTERS = 16;
const SOURCE_METHOD =
  'Method: double tails after Akhilesh, J. Number Theory 170 (2017) 228; path composition: Borwein, Bradley, Broadhurst and Lisoněk, Trans. AMS 353 (2001) 907.';

const evaluate = (args: HyperlogArgs, bits: number, context: EvaluationContext): Value => {
  const [value] = evaluateMany([args], bits, context);
  if (value === undefined) throw new RangeError('evaluate: expected one value');
  return value;
};

function evaluateMany(all: readonly HyperlogArgs[], bits: number, context: EvaluationContext): Value[] {
  const values = evaluateIntegrals(
    all.map((args) => args.integral),
    bits,
    context,
  );
  return values.map((value, k) => ((all[k] as HyperlogArgs).real ? toComplex(value).re : value));
}

/** Real letters and end point, and no logarithm of a negative number from trailing zeros. */
function isRealIntegral(letters: readonly Term[], end: Term, integral: IteratedIntegral): boolean {
  const ratios = integral.letters.every(
    ({ kind, polar }) => kind !== 'other' || (polar !== null ? polar.root.order <= 2 : false),
  );
  const plain = ratios || (letters.every(isPlainlyReal) && isPlainlyReal(end));
  if (!plain) return false;
  if (integral.letters.at(-1)?.kind !== 'zero') return true;
  return polarOf(end)?.root.order === 1;
}

function groupsOf(term: Parameters<Family['parse']>[0], name: string, example: string): [readonly Term[], Term] | null {
  if (term.kind !== 'call' || term.name !== name) return null;
  const [letters, ends] = term.groups;
  const end = ends?.[0];
  if (term.groups.length !== 2 || letters === undefined || end === undefined || ends?.length !== 1) {
    throw new InputError(
      'wrong-arguments',
      `${name} needs its letters, a semicolon and the end point, as in ${example}.`,
    );
  }
  if (letters.length > MAX_LETTERS) {
    throw new InputError('too-heavy', `${name} takes at most ${MAX_LETTERS} letters.`);
  }
  if (isRational(end) && end.p === 0n) throw new InputError('zero-end', `The end point of ${name} must not be 0.`);
  return [letters, end];
}

function integralOf(letters: readonly Term[], end: Term, sign: 1 | -1, what: string): IteratedIntegral {
  const integral = { letters: letters.map((letter) => pathLetter(letter, end)), end, sign };
  refuseDivergent(integral, what);
  return integral;
}

function parseG(term: Parameters<Family['parse']>[0]): HyperlogArgs | null {
  const parts = groupsOf(term, 'G', 'G(0,1,r6;1/2)');
  if (parts === null) return null;
  const [letters, end] = parts;
  const text = `G(${letters.map(termText).join(',')};${termText(end)})`;
  const nonZero = letters.filter((t) => !(isRational(t) && t.p === 0n)).length;
  const integral = integralOf(letters, end, nonZero % 2 === 0 ? 1 : -1, text);
  const latex = `G(${letters.map(termLatex).join(',')};${termLatex(end)})`;
  return { integral, text, latex, weight: letters.length, real: isRealIntegral(letters, end, integral) };
}

function parseH(term: Parameters<Family['parse']>[0]): HyperlogArgs | null {
  const parts = groupsOf(term, 'H', 'H(0,1,-1;1/2)');
  if (parts === null) return null;
  const [indices, end] = parts;
  const letters: Term[] = [];
  let negatives = 0;
  for (const index of indices) {
    if (!isRational(index) || index.q !== 1n || index.p > 64n || index.p < -64n) {
      throw new InputError('bad-index', 'The indices of H are 0, 1 and -1; an integer n stands for n-1 zeros and a 1.');
    }
    const n = Number(index.p);
    for (let k = 1; k < Math.abs(n); k++) letters.push(rational(0n));
    letters.push(rational(BigInt(Math.sign(n))));
    if (n < 0) negatives++;
  }
  if (letters.length > MAX_LETTERS) throw new InputError('too-heavy', `H takes at most ${MAX_LETTERS} letters.`);
  const text = `H(${letters.map(termText).join(',')};${termText(end)})`;
  // f₁ = dt/(1 − t), f₋₁ = dt/(1 + t) = −dt/(−1 − t).
  const integral = integralOf(letters, end, negatives % 2 === 0 ? 1 : -1, text);
  const latex = `H(${letters.map(termLatex).join(',')};${termLatex(end)})`;
  return { integral, text, latex, weight: letters.length, real: isRealIntegral(letters, end, integral) };
}

const ONE = rational(1n);

function parseMpl(term: Parameters<Family['parse']>[0]): HyperlogArgs | null {
  if (term.kind !== 'call' || term.name !== 'MPL') return null;
  const [first, points] = term.groups;
  if (term.groups.length !== 2 || first === undefined || points === undefined || first.length !== points.length)
    return null;
  const indices = integerIndices('MPL', first);
  if (indices === null || indices.some((s) => s < 1)) return null;
  const text = `MPL(${indices.join(',')};${points.map(termText).join(',')})`;
  const letters: Term[] = [];
  points.forEach((point, j) => {
    if (isRational(point) && point.p === 0n) throw new InputError('zero-argument', `An argument of ${text} is 0.`);
    for (let k = 1; k < (indices[j] as number); k++) letters.push(rational(0n));
    const product: Term = { kind: 'product', factors: points.slice(0, j + 1) };
    const polar = polarOf(product);
    if (polar !== null && polar.p > polar.q) {
      throw divergentSum(text);
    }
    letters.push({ kind: 'power', base: product, exponent: rational(-1n) });
  });
  if (letters.length > MAX_LETTERS) throw new InputError('too-heavy', `${text} is heavier than ${MAX_LETTERS}.`);
  const integral = integralOf(letters, ONE, 1, text);
  const latex = `\\mathrm{Li}_{${indices.join(',')}}(${points.map(termLatex).join(',')})`;
  return { integral, text, latex, weight: weightOf(indices), real: isRealIntegral(points, ONE, integral) };
}

/** Refuses a nested sum whose letters 1/(z₁⋯z_j) are certainly inside the unit circle; exact ones were checked on parsing. */
function refuseOutside({ integral, text }: HyperlogArgs, context: EvaluationContext): void {
  for (const { kind, polar, over } of integral.letters) {
    if (kind !== 'other' || polar !== null) continue;
    const { re, im } = toComplex(context.argument(over[0], 128));
    const norm = add(square(re, 200), square(im, 200));
    if (sign(subtract(norm, fromInteger(1n))) === -1) throw divergentSum(text);
  }
}

function divergentSum(text: string): InputError {
  const message = `${text} diverges: a product of its first arguments is larger than 1 in modulus.`;
  return new InputError('divergent', message);
}

const shared = {
  weight: (args: HyperlogArgs) => args.weight,
  latex: (args: HyperlogArgs) => args.latex,
  text: (args: HyperlogArgs) => args.text,
  isReal: (args: HyperlogArgs) => args.real,
  evaluate,
  evaluateMany,
} as const;

export const harmonicPolylogarithms: Family<HyperlogArgs> = {
  ...shared,
  key: 'harmonic-polylogarithms',
  title: 'Harmonic polylogarithms',
  names: ['H'],
  parse: parseH,
  definition:
    'H(a_1,\\dots,a_n;x)=\\int_0^x f_{a_1}(t)\\,H(a_2,\\dots,a_n;t)\\,dt,\\quad f_0=\\tfrac1t,\\ f_1=\\tfrac1{1-t},\\ f_{-1}=\\tfrac1{1+t},\\quad H(0,\\dots,0;x)=\\tfrac{\\log^n x}{n!}',
  source: `Definition: Remiddi and Vermaseren, Int. J. Mod. Phys. A 15 (2000) 725. ${SOURCE_METHOD}`,
  examples: ['H(0,1,-1;1/2)', 'H(1,0,1;1/3)', 'H(0,-1,1;1)', 'H(0,1;i)'],
};

export const multiplePolylogarithms: Family<HyperlogArgs> = {
  ...shared,
  key: 'multiple-polylogarithms',
  title: 'Multiple polylogarithms G',
  names: ['G'],
  parse: parseG,
  definition:
    'G(a_1,\\dots,a_n;z)=\\int_0^z\\frac{dt}{t-a_1}\\,G(a_2,\\dots,a_n;t)\\text{ on the straight path},\\quad G(0,\\dots,0;z)=\\tfrac{\\log^n z}{n!}',
  source: `Definition: Goncharov, Math. Res. Lett. 5 (1998) 497; Vollinga and Weinzierl, Comput. Phys. Commun. 167 (2005) 177. ${SOURCE_METHOD}`,
  examples: ['G(0,1,r6;1/2)', 'G(0,r6,1;1)', 'G(0,2,3;1)', 'G(0,sqrt(2),-1;1)'],
};

export const algebraicPolylogarithms: Family<HyperlogArgs> = {
  ...shared,
  evaluate: (args, bits, context) => {
    refuseOutside(args, context);
    return evaluate(args, bits, context);
  },
  evaluateMany: (all, bits, context) => {
    for (const args of all) refuseOutside(args, context);
    return evaluateMany(all, bits, context);
  },
  key: 'algebraic-nested-sums',
  title: 'Nested sums at algebraic arguments',
  names: ['MPL'],
  parse: parseMpl,
  definition:
    '\\mathrm{Li}_{s_1,\\dots,s_d}(z_1,\\dots,z_d)=\\sum_{n_1>\\dots>n_d>0}\\prod_j\\frac{z_j^{n_j}}{n_j^{s_j}},\\quad |z_1\\cdots z_j|\\le1',
  source: `Definition: Goncharov, Math. Res. Lett. 5 (1998) 497. ${SOURCE_METHOD}`,
  examples: ['MPL(2,1;1/2,1)', 'MPL(3,1;1/3,-1)', 'MPL(2,1;1/2,r6)'],
};
