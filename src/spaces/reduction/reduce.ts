/**
 * Writes constants exactly in the generating set of a space: multiple zeta values up to weight 12 in `mzv`, alternating sums
 * up to weight 8 in `alternating` (and, up to weight 5, in `polylog-half`; zeta values also in `mzv-hoffman`), together with log 2, even powers of π, ζ(n),
 * Li_n(1/2), Li_n(±1), and sums, products and powers of all these.
 *
 * The decomposition is exact arithmetic (decompose.ts) on top of one stored fraction a word, which was read off from 150
 * digits and verified at 300 (test/campaign/reductions.ts); so a reduction is numerically certain but not proven.
 */

import type { CallTerm, Term } from '../../constants/term.ts';
import { InputError } from '../../number/errors.ts';
import alternatingData from '../data/alternating.json' with { type: 'json' };
import zetaData from '../data/mzv.json' with { type: 'json' };
import { hoffmanIndices } from '../real-sums.ts';
import { spaceOf } from '../registry.ts';
import { accumulateAll, type Combination, product } from './combination.ts';
import {
  coordinates,
  generatorImage,
  type ImagedElement,
  imagedProducts,
  type WeightBasis,
  weightBasis,
} from './coordinates.ts';
import { Decomposer, fProduct, fWeight } from './decompose.ts';
import { type Fraction, fraction, ONE, readFraction } from './fraction.ts';
import { convergentWords, polylogAtHalf, signedSum } from './words.ts';

export interface ReducedTerm {
  /** Typed text of a product of generators, as in the space's basis; `1` for a rational number. */
  readonly element: string;
  readonly coefficient: Fraction;
}

export interface Reducer {
  /** The terms with non-zero coefficients, by weight and in the order of the basis; null for a constant that is not known to lie in the space, or is past its weight. */
  reduce(term: Term): readonly ReducedTerm[] | null;
}

/** Spaces that `makeReducer` knows. */
export const reducibleSpaces: readonly string[] = ['mzv', 'mzv-hoffman', 'alternating', 'polylog-half'];

/** A reducer into this space; keeps what it has worked out. Throws InputError for a space without reductions. */
export function makeReducer(spaceKey: string): Reducer {
  if (!reducibleSpaces.includes(spaceKey)) {
    throw new InputError('no-reductions', `There are no stored reductions into "${spaceKey}".`);
  }
  const space = spaceOf(spaceKey);
  const zetas = spaceKey.startsWith('mzv');
  const least = zetas ? 3 : 1;
  const letters = zetas ? ['0', '1'] : ['0', '1', 'm'];
  const decomposer = new Decomposer(primitiveTable((zetas ? zetaData : alternatingData).weights, letters));
  const bases = new Map<number, WeightBasis>();
  const basisAt = (weight: number): WeightBasis => {
    const known = bases.get(weight);
    if (known !== undefined) return known;
    const made = weightBasis(weight, least, elementsAt(spaceKey, weight, decomposer));
    bases.set(weight, made);
    return made;
  };
  const reduce = (term: Term): ReducedTerm[] | null => {
    const image = imageOf(term, space.maxWeight, zetas, decomposer);
    if (image === null) return null;
    const byWeight = new Map<number, Map<string, Fraction>>();
    for (const [word, factor] of image) {
      const weight = fWeight(word);
      const part = byWeight.get(weight) ?? new Map<string, Fraction>();
      part.set(word, factor);
      byWeight.set(weight, part);
    }
    return [...byWeight]
      .sort(([a], [b]) => a - b)
      .flatMap(([weight, part]) => {
        const basis = basisAt(weight);
        return coordinates(part, basis).flatMap((coefficient, k) =>
          coefficient.p === 0n ? [] : [{ element: basis.elements[k] as string, coefficient }],
        );
      });
  };
  return { reduce };
}

function elementsAt(spaceKey: string, weight: number, decomposer: Decomposer): readonly ImagedElement[] {
  if (spaceKey !== 'mzv-hoffman') {
    return imagedProducts(weight, spaceOf(spaceKey).generators, (generator) => generatorImage(generator, decomposer));
  }
  return hoffmanIndices(weight).map((indices) => {
    const image = new Map<string, Fraction>();
    for (const [word, factor] of signedSum(indices)) accumulateAll(image, decomposer.image(word), factor);
    return { text: indices.length === 0 ? '1' : `zeta(${indices.join(',')})`, image };
  });
}

function primitiveTable(weights: readonly string[], letters: readonly string[]): (word: string) => Fraction {
  const tables = new Map<number, Map<string, string>>();
  return (word) => {
    let table = tables.get(word.length);
    if (table === undefined) {
      const entries = (weights[word.length - 1] ?? '').split(' ');
      table = new Map(convergentWords(word.length, letters).map((w, k) => [w, entries[k] as string]));
      tables.set(word.length, table);
    }
    const entry = table.get(word);
    if (entry === undefined) throw new RangeError(`primitiveTable: expected a stored word, got ${word}`);
    return readFraction(entry);
  };
}

/** φ of a term, or null when it is outside. */
function imageOf(term: Term, maxWeight: number, zetas: boolean, decomposer: Decomposer): Combination | null {
  const go = (t: Term): Combination | null => imageOf(t, maxWeight, zetas, decomposer);
  switch (term.kind) {
    case 'rational':
      return term.p === 0n ? new Map() : new Map([['', fraction(term.p, term.q)]]);
    case 'symbol':
      return null;
    case 'sum': {
      const sum = new Map<string, Fraction>();
      for (const part of term.terms) {
        const image = go(part);
        if (image === null) return null;
        accumulateAll(sum, image, ONE);
      }
      return sum;
    }
    case 'product': {
      let total: Combination = new Map([['', ONE]]);
      for (const factor of term.factors) {
        const image = go(factor);
        if (image === null) return null;
        total = product(total, image, fProduct);
        if (heaviest(total) > maxWeight) return null;
      }
      return total;
    }
    case 'power': {
      const { base, exponent } = term;
      if (exponent.kind !== 'rational' || exponent.q !== 1n || exponent.p < 0n || exponent.p > BigInt(maxWeight))
        return null;
      const n = Number(exponent.p);
      if (base.kind === 'symbol' && base.name === 'pi' && n % 2 === 0) return new Map([['p'.repeat(n / 2), ONE]]);
      return go({ kind: 'product', factors: Array<Term>(n).fill(base) });
    }
    case 'call': {
      const words = callWords(term);
      if (words === null) return null;
      const image = new Map<string, Fraction>();
      for (const [word, factor] of words) {
        if (word.length > maxWeight || word.startsWith('0') || word.endsWith('1')) return null;
        if (zetas && word.includes('m')) return null;
        accumulateAll(image, decomposer.image(word), factor);
      }
      return image;
    }
  }
}

function heaviest(image: Combination): number {
  return [...image.keys()].reduce((most, word) => Math.max(most, fWeight(word)), 0);
}

function callWords({ name, groups }: CallTerm): Combination | null {
  const lists = groups.map((group) => group.map((t) => (t.kind === 'rational' ? fraction(t.p, t.q) : null)));
  if (lists.some((list) => list.includes(null))) return null;
  const [first = [], second = []] = lists as Fraction[][];
  const integers = (list: readonly Fraction[]): number[] | null =>
    list.every((x) => x.q === 1n && x.p !== 0n && x.p >= -64n && x.p <= 64n) ? list.map((x) => Number(x.p)) : null;
  if (name === 'log') {
    const [x] = first;
    return first.length === 1 && x !== undefined && x.p === 2n && x.q === 1n ? new Map([['m', ONE]]) : null;
  }
  if (name === 'zeta' && groups.length === 1) {
    const indices = integers(first);
    return indices === null ? null : signedSum(indices);
  }
  if (name === 'Li' && groups.length === 1 && first.length === 2) {
    const [n, x] = first as [Fraction, Fraction];
    if (n.q !== 1n || n.p < 1n || n.p > 12n) return null;
    if (x.p === 1n && x.q === 2n) return polylogAtHalf(Number(n.p));
    return x.q === 1n && (x.p === 1n || x.p === -1n) ? signedSum([Number(n.p * x.p)]) : null;
  }
  if (name === 'MPL' && groups.length === 2 && first.length === second.length) {
    const indices = integers(first);
    const signs = integers(second);
    if (indices === null || signs === null || indices.some((s) => s < 1) || signs.some((z) => Math.abs(z) !== 1))
      return null;
    return signedSum(indices.map((s, j) => s * (signs[j] as number)));
  }
  return null;
}
