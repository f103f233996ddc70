/** Values, reality and weight of any term. */
import type { Value } from '../number/complex.ts';
import { toAccuracy } from './accurate.ts';
import { undecided } from './arguments.ts';
import { ConstantCache } from './cache.ts';
import type { EvaluationContext } from './family.ts';
import { familyOf, type Member } from './registry.ts';
import { type Atom, evaluateStructure, isOperation, isRealStructure, operand } from './structure.ts';
import type { Term } from './term.ts';

export interface TermContext {
  /** Where known values are looked up and new ones kept; without it one that lives as long as the call. */
  readonly cache?: ConstantCache | undefined;
  readonly signal?: AbortSignal | undefined;
  /** Fraction of the pass that is done, 0 … 1. */
  readonly onProgress?: ((fraction: number) => void) | undefined;
}

/** Extra bits of a first attempt on a term that is more than one atom. */
const GUARD = 64;

/**
 * The value of a term to an absolute error of 2^−bits, proven. Throws InputError for an unknown name, wrong arguments, or a
 * divisor that cannot be told from zero; the signal's reason when cancelled.
 */
export function evaluateTerm(term: Term, bits: number, context: TermContext = {}): Value {
  const cache = context.cache ?? new ConstantCache();
  const atom = (leaf: Atom, work: number): Value => evaluateAtom(leaf, work, cache, context);
  if (isFamilyAtom(term)) return atom(term, bits);
  try {
    return toAccuracy(bits, GUARD, (work) => evaluateStructure(term, work, atom));
  } catch (error) {
    throw undecided(error);
  }
}

function isFamilyAtom(term: Term): term is Atom {
  return (term.kind === 'symbol' || term.kind === 'call') && !isOperation(term);
}

function evaluateAtom(atom: Atom, bits: number, cache: ConstantCache, context: TermContext): Value {
  const { family, args } = familyOf(atom);
  const text = family.text(args);
  const known = cache.get(text, bits);
  if (known !== undefined) return known;
  context.signal?.throwIfAborted();
  const value = family.evaluate(args, bits, familyContext(cache, context, context.onProgress));
  cache.put(text, bits, value);
  return value;
}

function familyContext(
  cache: ConstantCache,
  context: TermContext,
  onProgress: EvaluationContext['onProgress'],
): EvaluationContext {
  return {
    argument: (term, bits) => evaluateTerm(term, bits, { cache, signal: context.signal }),
    signal: context.signal,
    onProgress,
  };
}

/** The atoms of a term that belong to families, outermost only: what stands inside the arguments of a call is that family's business. */
export function atomsOf(term: Term): Atom[] {
  switch (term.kind) {
    case 'rational':
      return [];
    case 'sum':
      return term.terms.flatMap(atomsOf);
    case 'product':
      return term.factors.flatMap(atomsOf);
    case 'power':
      return [...atomsOf(term.base), ...atomsOf(term.exponent)];
    case 'symbol':
      return isOperation(term) ? [] : [term];
    case 'call':
      return isOperation(term) ? atomsOf(operand(term)) : [term];
  }
}

/** The values of many terms, each as by `evaluateTerm`; members of one family that can be computed together are. */
export function evaluateMany(terms: readonly Term[], bits: number, context: TermContext = {}): Value[] {
  const cache = context.cache ?? new ConstantCache();
  const work = terms.every(isFamilyAtom) ? bits : bits + GUARD;
  fill(cache, terms.flatMap(atomsOf), work, context);
  return terms.map((term) => {
    context.signal?.throwIfAborted();
    return evaluateTerm(term, bits, { cache, signal: context.signal });
  });
}

/** Computes what the cache lacks, family by family. */
function fill(cache: ConstantCache, atoms: readonly Atom[], bits: number, context: TermContext): void {
  const missing = new Map<string, Member>();
  for (const atom of atoms) {
    const member = familyOf(atom);
    const text = member.family.text(member.args);
    if (cache.get(text, bits) === undefined) missing.set(text, member);
  }
  const groups = new Map<Member['family'], { text: string; args: unknown }[]>();
  for (const [text, { family, args }] of missing) {
    groups.set(family, [...(groups.get(family) ?? []), { text, args }]);
  }
  let done = 0;
  for (const [family, members] of groups) {
    const share = members.length / missing.size;
    const start = done;
    const inner = familyContext(cache, context, (fraction) => context.onProgress?.(start + share * fraction));
    context.signal?.throwIfAborted();
    const args = members.map((m) => m.args);
    const values =
      family.evaluateMany !== undefined
        ? family.evaluateMany(args, bits, inner)
        : args.map((one) => family.evaluate(one, bits, inner));
    members.forEach(({ text }, j) => {
      cache.put(text, bits, values[j] as Value);
    });
    done += share;
    context.onProgress?.(done);
  }
}

/** Whether a term is known to be real from its form (and, under roots, from the sign of a sample). False for a real number that is not built of real parts. */
export function isRealTerm(term: Term): boolean {
  const cache = new ConstantCache();
  return isRealStructure(
    term,
    (atom) => {
      const { family, args } = familyOf(atom);
      return family.isReal(args);
    },
    (t) => evaluateTerm(t, 128, { cache }),
  );
}

/** The transcendental weight: rationals and algebraic numbers have 0, a product adds, a sum has one where all its terms agree; null where none is agreed. */
export function weightOf(term: Term): number | null {
  switch (term.kind) {
    case 'rational':
      return 0;
    case 'sum': {
      const [first, ...rest] = term.terms.map(weightOf);
      return first !== undefined && rest.every((w) => w === first) ? first : null;
    }
    case 'product':
      return addWeights(term.factors.map(weightOf));
    case 'power':
      return powerWeight(term.base, term.exponent);
    case 'symbol':
    case 'call': {
      if (isOperation(term)) return term.kind === 'symbol' ? 0 : weightOf(operand(term));
      const { family, args } = familyOf(term);
      return family.weight(args);
    }
  }
}

function addWeights(weights: readonly (number | null)[]): number | null {
  return weights.reduce<number | null>((sum, w) => (sum === null || w === null ? null : sum + w), 0);
}

function powerWeight(base: Term, exponent: Term): number | null {
  const weight = weightOf(base);
  if (weight === null || exponent.kind !== 'rational') return null;
  if (weight === 0) return 0;
  return exponent.q === 1n ? weight * Number(exponent.p) : null;
}
