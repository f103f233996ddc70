/** Constants as combinations of words I(0; a₁, …, a_N; 1) with letters 0, 1 and m (−1); see decompose.ts for the order and the forms. */
import { wordAtRoots } from '../../constants/sums/words.ts';
import { accumulate, type Combination } from './combination.ts';
import { type Fraction, fraction, ONE } from './fraction.ts';

/** The nested sum with these signed indices, a negative one carrying (−1)ⁿ. */
export function signedSum(indices: readonly number[]): Combination {
  const ahead = wordAtRoots(
    indices.map(Math.abs),
    indices.map((s) => (s < 0 ? 1 : 0)),
    2,
  );
  const word = [...ahead]
    .reverse()
    .map((c) => (c === '2' ? 'm' : c))
    .join('');
  return new Map([[word, indices.length % 2 === 0 ? ONE : fraction(-1n)]]);
}

/** The same word with the first letter nearest to 1 and the forms dt/(a − t), as double-tails passes take it; `sign` times that one is I. */
export function passWord(word: string): { word: string; sign: 1 | -1 } {
  const letters = [...word];
  const odd = letters.filter((c) => c !== '0').length % 2 === 1;
  return {
    word: letters
      .reverse()
      .map((c) => (c === 'm' ? '2' : c))
      .join(''),
    sign: odd ? -1 : 1,
  };
}

/** Li_n(1/2): with t = 2s/(1+s) its form dt/t becomes ds/s − ds/(1+s), and dt/(2−t) becomes ds/(1+s). */
export function polylogAtHalf(n: number): Combination {
  const sum = new Map<string, Fraction>();
  for (let choice = 0; choice < 2 ** (n - 1); choice++) {
    let word = 'm';
    let sign = 1n;
    for (let k = 0; k < n - 1; k++) {
      const minus = ((choice >> k) & 1) === 1;
      word += minus ? 'm' : '0';
      if (minus) sign = -sign;
    }
    accumulate(sum, word, fraction(sign));
  }
  return sum;
}

/** The generators of the spaces of real sums, π excepted. Throws RangeError for any other text. */
export function generatorWords(text: string): Combination {
  if (text === 'log(2)') return new Map([['m', ONE]]);
  const half = /^Li\((\d+),1\/2\)$/.exec(text);
  if (half !== null) return polylogAtHalf(Number(half[1]));
  const zeta = /^zeta\(([-\d,]+)\)$/.exec(text);
  if (zeta !== null) return signedSum((zeta[1] as string).split(',').map(Number));
  throw new RangeError(`generatorWords: expected a generator of the real spaces, got ${text}`);
}

/** All convergent words of this length, in the order of the stored data. */
export function convergentWords(length: number, letters: readonly string[]): readonly string[] {
  let words = letters.filter((c) => c !== '0');
  if (length === 1) return words.filter((c) => c !== '1');
  for (let k = 1; k < length; k++) {
    const last = k === length - 1;
    words = words.flatMap((w) => letters.filter((c) => !(last && c === '1')).map((c) => w + c));
  }
  return words;
}
