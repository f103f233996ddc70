/**
 * Alternating sums and multiple zeta values in the f-alphabet: exact decomposition by the motivic coaction.
 * Brown, "On the decomposition of motivic multiple zeta values", Adv. Stud. Pure Math. 63 (2012) 31; for alternating sums:
 * Deligne, Publ. Math. IHÉS 112 (2010) 101, and Glanois, J. Number Theory 160 (2016) 334.
 *
 * Words are written in the order of I(0; a₁, …, a_N; 1), a₁ nearest to 0, with the forms dt/(t − a) and the letters `0`, `1`
 * and `m` (for −1). The decomposition φ sends a word to polynomials in π² with coefficients among the words in letters f_r,
 * r odd (f₁ stands for log 2, f_r for ζ(r)); it is a homomorphism from shuffles to shuffles and satisfies
 *
 *   φ(w) = Σ_{r odd, r < N} f_r · (π_r ⊗ φ)(D_r w) + c(w)·(f_N, or π^N for even N),
 *   D_r I(a₀; a₁…a_N; a_{N+1}) = Σ_p I(a_p; a_{p+1}…a_{p+r}; a_{p+r+1}) ⊗ I(a₀; a₁…a_p a_{p+r+1}…a_N; a_{N+1}),
 *
 * where π_r takes the coefficient of f_r and kills products. Only the rational numbers c(w) are not given by lower weights:
 * they are found numerically once and kept as data. Regularised values of divergent words have I(0;0;1) = I(0;1;1) = 0.
 */
import { accumulate, accumulateAll, type Combination, shuffleWords } from './combination.ts';
import { type Fraction, fraction, ONE, opposite, ZERO } from './fraction.ts';

/** c of a convergent word. Throws when it is not known. */
export type PrimitivePart = (word: string) => Fraction;

/** f-words are `p` for each π², then one character per letter f_r. */
const LETTERS = '0123456789abc';

export function letterName(r: number): string {
  return LETTERS[r] as string;
}

/** Weight of an f-word. */
export function fWeight(word: string): number {
  return [...word].reduce((sum, c) => sum + (c === 'p' ? 2 : LETTERS.indexOf(c)), 0);
}

/** Words in the f-alphabet of this weight; `least` is the least odd letter (1 for alternating sums, 3 for zeta values). */
export function fWords(weight: number, least: 1 | 3): readonly string[] {
  const words: string[] = [];
  const extend = (word: string, left: number): void => {
    if (left === 0) words.push(word);
    for (let r = least; r <= left; r += 2) extend(word + letterName(r), left - r);
  };
  for (let k = 0; 2 * k <= weight; k++) extend('p'.repeat(k), weight - 2 * k);
  return words;
}

/** Shuffle product of two f-words; powers of π² commute with everything. */
export function fProduct(x: string, y: string): Combination {
  const strip = (word: string): [string, string] => {
    const at = word.lastIndexOf('p') + 1;
    return [word.slice(0, at), word.slice(at)];
  };
  const [px, lx] = strip(x);
  const [py, ly] = strip(y);
  return new Map([...shuffleWords(lx, ly)].map(([word, n]) => [px + py + word, n]));
}

/** f_N, or π^N for even N: the f-word whose coefficient in φ(w) is c(w). */
export function primitiveWord(weight: number): string {
  return weight % 2 === 1 ? letterName(weight) : 'p'.repeat(weight / 2);
}

export class Decomposer {
  readonly #primitive: PrimitivePart;
  readonly #images = new Map<string, Combination>();
  readonly #regular = new Map<string, Combination>();

  constructor(primitive: PrimitivePart) {
    this.#primitive = primitive;
  }

  /** φ of a word, regularised if it diverges. */
  image(word: string): Combination {
    const known = this.#images.get(word);
    if (known !== undefined) return known;
    const image = new Map<string, Fraction>();
    if (word === '') image.set('', ONE);
    else if (isConvergent(word)) {
      accumulateAll(image, this.knownPart(word), ONE);
      accumulate(image, primitiveWord(word.length), this.#primitive(word));
    } else {
      for (const [convergent, factor] of this.regularize(word)) accumulateAll(image, this.image(convergent), factor);
    }
    this.#images.set(word, image);
    return image;
  }

  /** φ(w) without the term of c(w), for a convergent word. */
  knownPart(word: string): Combination {
    const sum = new Map<string, Fraction>();
    const path = `0${word}1`;
    for (let r = 1; r < word.length; r += 2) {
      const right = new Map<string, Fraction>();
      for (let p = 0; p + r <= word.length; p++) {
        const left = this.#letterPart(path[p] as string, path.slice(p + 1, p + 1 + r), path[p + r + 1] as string);
        if (left.p !== 0n) accumulateAll(right, this.image(word.slice(0, p) + word.slice(p + r)), left);
      }
      for (const [fWord, factor] of right) accumulate(sum, inFront(r, fWord), factor);
    }
    return sum;
  }

  /** The word as a combination of convergent ones, by shuffles with the letters at the ends. */
  regularize(word: string): Combination {
    const known = this.#regular.get(word);
    if (known !== undefined) return known;
    const sum = new Map<string, Fraction>();
    if (word === '' || isConvergent(word)) sum.set(word, ONE);
    else if (!/^(0*|1*)$/.test(word)) {
      const front = /^0*/.exec(word)?.[0].length ?? 0;
      const back = /1*$/.exec(word)?.[0].length ?? 0;
      // l^k u = −(1/k) Σ of l^{k−1}u with one more l put in behind a letter of u; mirrored at the other end.
      const share = fraction(-1n, BigInt(front > 0 ? front : back));
      const rest = front > 0 ? word.slice(1) : word.slice(0, -1);
      const from = front;
      const to = front > 0 ? rest.length : rest.length - back;
      for (let at = from; at <= to; at++) {
        const inserted = rest.slice(0, at) + (front > 0 ? '0' : '1') + rest.slice(at);
        accumulateAll(sum, this.regularize(inserted), share);
      }
    }
    this.#regular.set(word, sum);
    return sum;
  }

  /** π_r of I(a; v; b) for a word v of odd length r, modulo products. */
  #letterPart(a: string, v: string, b: string): Fraction {
    if (a === b) return ZERO;
    const end = this.#from0(v, b);
    const start = this.#from0(v, a);
    if (start.p === 0n) return end;
    const sum = new Map([['', end]]);
    accumulate(sum, '', opposite(start));
    return sum.get('') ?? ZERO;
  }

  /** π_r of I(0; v; x). */
  #from0(v: string, x: string): Fraction {
    if (x === '0') return ZERO;
    const word = x === '1' ? v : v.replace(/[1m]/g, (c) => (c === '1' ? 'm' : '1'));
    const sum = new Map<string, Fraction>();
    for (const [convergent, factor] of this.regularize(word)) {
      accumulateAll(sum, new Map([['', this.#primitive(convergent)]]), factor);
    }
    return sum.get('') ?? ZERO;
  }
}

function inFront(r: number, fWord: string): string {
  const at = fWord.lastIndexOf('p') + 1;
  return fWord.slice(0, at) + letterName(r) + fWord.slice(at);
}

export function isConvergent(word: string): boolean {
  return !word.startsWith('0') && !word.endsWith('1');
}
