/**
 * What a double-tails pass has to carry: the words asked for and all that their recursions refer to, each once.
 *
 * With J_n(w) the integral of the word w against (1 − t₁)ⁿ t_kⁿ, J_n(1w) = J_n(w)/n and J_n(w0) = J_n(w)/n: every word is a
 * `core` (first letter ≠ 1, last letter ≠ 0) divided by a power of n, and only cores are carried.
 */
import { asItStands, type Canonicalize, codeOf, type Word } from './words.ts';

/** `core` −1 is the empty word. */
export interface Quotient {
  readonly core: number;
  /** Exponent of n that divides it. */
  readonly exponent: number;
}

export interface Reference {
  /** Index into the plan's quotients. */
  readonly quotient: number;
  readonly factor: number;
  readonly conjugate: boolean;
}

export interface Core {
  readonly word: Word;
  readonly first: number;
  readonly last: number;
  /** What is added to J_n(word) before the product with 1/((1 − a)b); for a single letter other than 0 and 1 the kernel knows the one term. */
  readonly references: readonly Reference[];
}

export interface Answer {
  readonly core: number;
  readonly sign: 1 | -1;
  readonly conjugate: boolean;
}

export interface Plan {
  readonly cores: readonly Core[];
  readonly quotients: readonly Quotient[];
  /** For each word asked for, in order. */
  readonly answers: readonly Answer[];
  /** Length of the longest core. */
  readonly length: number;
  readonly maxExponent: number;
}

/** Throws RangeError for a word that is not a core (its integral diverges). */
export function planWords(words: readonly Word[], canonicalize: Canonicalize = asItStands): Plan {
  const cores: (Core | undefined)[] = [];
  const indexOf = new Map<Word, number>();
  const quotients: Quotient[] = [];
  const quotientOf = new Map<string, number>();

  const quotient = (core: number, exponent: number): number => {
    const key = `${core}/${exponent}`;
    const known = quotientOf.get(key);
    if (known !== undefined) return known;
    quotientOf.set(key, quotients.length);
    return quotients.push({ core, exponent }) - 1;
  };

  const refer = (list: Reference[], word: Word, divisions: number, factor: number): void => {
    const { core: stripped, divisions: more } = strip(word);
    const target = stripped === '' ? { core: -1, sign: 1, conjugate: false } : coreOf(stripped);
    const index = quotient(target.core, divisions + more);
    const at = list.findIndex((r) => r.quotient === index && r.conjugate === target.conjugate);
    const old = list[at];
    if (old === undefined) list.push({ quotient: index, factor: factor * target.sign, conjugate: target.conjugate });
    else list[at] = { ...old, factor: old.factor + factor * target.sign };
  };

  const coreOf = (word: Word): Answer => {
    const { word: chosen, sign, conjugate } = canonicalize(word);
    const known = indexOf.get(chosen);
    if (known !== undefined) return { core: known, sign, conjugate };
    const index = cores.push(undefined) - 1;
    indexOf.set(chosen, index);
    const first = codeOf(chosen[0] as string);
    const last = codeOf(chosen[chosen.length - 1] as string);
    const references: Reference[] = [];
    if (chosen.length === 1) {
      references.push({ quotient: quotient(-1, 1), factor: 1, conjugate: false });
    } else {
      const sigma = first === 0 ? 1 : -1;
      refer(references, chosen.slice(1), 1, sigma);
      refer(references, chosen.slice(0, -1), 1, 1);
      refer(references, chosen.slice(1, -1), 2, sigma);
    }
    cores[index] = { word: chosen, first, last, references };
    return { core: index, sign, conjugate };
  };

  const answers = words.map((word) => {
    if (word === '' || word.startsWith('1') || word.endsWith('0')) {
      throw new RangeError(`planWords: expected a convergent word, got "${word}"`);
    }
    return coreOf(word);
  });
  const done = cores as Core[];
  return {
    cores: done,
    quotients,
    answers,
    length: done.reduce((most, core) => Math.max(most, core.word.length), 0),
    maxExponent: quotients.reduce((most, q) => Math.max(most, q.exponent), 0),
  };
}

/** Leading 1s, then trailing 0s, removed. */
function strip(word: Word): { core: Word; divisions: number } {
  let from = 0;
  let to = word.length;
  while (from < to && word[from] === '1') from++;
  while (to > from && word[to - 1] === '0') to--;
  return { core: word.slice(from, to), divisions: word.length - (to - from) };
}
