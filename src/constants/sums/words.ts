/**
 * Words of iterated integrals. The word a₁a₂…a_k stands for ∫ over 1 > t₁ > … > t_k > 0 of Π ω(a_j, t_j), where
 * ω(0, t) = dt/t and ω(a, t) = dt/(a − t). With these forms
 *
 *   Li_{s₁,…,s_d}(x₁,…,x_d) = Σ_{n₁>…>n_d>0} Π x_j^{n_j} / n_j^{s_j}  =  0^{s₁−1} a₁ 0^{s₂−1} a₂ … 0^{s_d−1} a_d,
 *
 * a_j = 1/(x₁ ⋯ x_j), without signs. A word is a string with one character a letter: `0` is the letter 0, `1` the letter 1;
 * the further characters are numbered by `letterOf` and get their meaning from the alphabet that goes with the word.
 */
export type Word = string;

const FIRST = 48;

/** The character of the letter with this code: 0 → '0', 1 → '1', then upwards. */
export function letterOf(code: number): string {
  return String.fromCharCode(FIRST + code);
}

export function codeOf(letter: string): number {
  return letter.charCodeAt(0) - FIRST;
}

/**
 * The word of a nested sum at roots of unity of order M. `exponents[j]` is that of x_j = e^{2πi·exponent/M}; the letter
 * a_j = e^{2πi·e/M} has code 1 + e.
 */
export function wordAtRoots(indices: readonly number[], exponents: readonly number[], order: number): Word {
  let word = '';
  let total = 0;
  indices.forEach((s, j) => {
    total = (total + order - ((exponents[j] as number) % order)) % order;
    word += '0'.repeat(s - 1) + letterOf(1 + total);
  });
  return word;
}

/** A word up to what the letters' symmetries can change: its value is `sign` times (the conjugate of) that of `word`. */
export interface Canonical {
  readonly word: Word;
  readonly sign: 1 | -1;
  readonly conjugate: boolean;
}

export type Canonicalize = (word: Word) => Canonical;

/** No symmetry at all. */
export const asItStands: Canonicalize = (word) => ({ word, sign: 1, conjugate: false });

/**
 * Symmetries of words at roots of unity of order M: duality t → 1 − t, which reverses the word, swaps 0 and 1 and turns a
 * letter a into 1 − a with a sign (inside the alphabet for a = e^{±iπ/3} only), and conjugation of all letters.
 */
export function rootSymmetry(order: number): Canonicalize {
  const known = new Map<Word, Canonical>();
  const up = order % 6 === 0 ? letterOf(1 + order / 6) : '';
  const down = order % 6 === 0 ? letterOf(1 + order - order / 6) : '';
  const partner: Record<string, string> = { '0': '1', '1': '0', ...(up === '' ? {} : { [up]: down, [down]: up }) };
  const conjugateOf = (word: Word): Word =>
    [...word].map((c) => (c === '0' || c === '1' ? c : letterOf(1 + order - (codeOf(c) - 1)))).join('');
  const dualOf = (word: Word): { word: Word; sign: 1 | -1 } | null => {
    let dual = '';
    let sign: 1 | -1 = 1;
    for (const c of word) {
      const d = partner[c];
      if (d === undefined) return null;
      if (c !== '0' && c !== '1') sign = sign === 1 ? -1 : 1;
      dual = d + dual;
    }
    return { word: dual, sign };
  };
  return (word) => {
    const cached = known.get(word);
    if (cached !== undefined) return cached;
    const conjugated = conjugateOf(word);
    const options: Canonical[] = [{ word, sign: 1, conjugate: false }];
    if (conjugated !== word) options.push({ word: conjugated, sign: 1, conjugate: true });
    for (const { word: base, conjugate } of [...options]) {
      const dual = dualOf(base);
      if (dual !== null) options.push({ ...dual, conjugate });
    }
    const best = options.reduce((a, b) => (b.word < a.word ? b : a));
    known.set(word, best);
    return best;
  };
}
