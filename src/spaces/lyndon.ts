/**
 * Lyndon words: strictly smaller than each of their proper suffixes. They index the generators of a free Lie algebra, and
 * with it the algebra generators of a space of nested sums whose motivic Lie algebra is free
 * (Broadhurst, hep-th/9604128; Deligne, Publ. Math. IHÉS 112 (2010) 101).
 */

/** The Lyndon words with the given sum whose letters all pass `allowed`, shortest first, then lexicographically. */
export function lyndonWords(sum: number, allowed: (letter: number) => boolean): readonly (readonly number[])[] {
  const words: number[][] = [];
  const extend = (word: number[], left: number): void => {
    if (left === 0) {
      if (isLyndon(word)) words.push(word);
      return;
    }
    for (let letter = word[0] ?? 1; letter <= left; letter++) {
      if (allowed(letter)) extend([...word, letter], left - letter);
    }
  };
  extend([], sum);
  return words.sort((a, b) => a.length - b.length || compareWords(a, b));
}

export function isLyndon(word: readonly number[]): boolean {
  return word.length > 0 && word.every((_, k) => k === 0 || compareWords(word, word.slice(k)) < 0);
}

function compareWords(a: readonly number[], b: readonly number[]): number {
  const common = Math.min(a.length, b.length);
  for (let k = 0; k < common; k++) {
    const difference = (a[k] as number) - (b[k] as number);
    if (difference !== 0) return difference;
  }
  return a.length - b.length;
}
