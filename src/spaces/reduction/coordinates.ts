/** Coordinates of f-alphabet images in the elements of a space, weight by weight. */
import { productsOf } from '../products.ts';
import type { Generator } from '../space.ts';
import { accumulateAll, type Combination, product } from './combination.ts';
import { type Decomposer, fProduct, fWords } from './decompose.ts';
import { type Fraction, inverse, ONE, opposite, plus, times, ZERO } from './fraction.ts';
import { generatorWords } from './words.ts';

/** An element of a space with its image. */
export interface ImagedElement {
  readonly text: string;
  readonly image: Combination;
}

export interface WeightBasis {
  /** Typed texts of the elements. */
  readonly elements: readonly string[];
  readonly fWords: readonly string[];
  /** Row i gives the coordinate of element i from the coefficients of the f-words. */
  readonly inverse: readonly (readonly Fraction[])[];
}

/** φ of a generator; c of its words is as the decomposer knows it. */
export function generatorImage(generator: Generator, decomposer: Decomposer): Combination {
  if (generator.text === 'pi') return new Map([['p', ONE]]);
  const image = new Map<string, Fraction>();
  for (const [word, factor] of generatorWords(generator.text)) {
    accumulateAll(image, decomposer.image(word), factor);
  }
  return image;
}

/** The products of the generators at a weight. */
export function imagedProducts(
  weight: number,
  generators: readonly Generator[],
  imageOf: (generator: Generator) => Combination,
): readonly ImagedElement[] {
  return productsOf(generators, weight).map(({ text, powers }) => {
    let image: Combination = new Map([['', ONE]]);
    for (const { generator, count } of powers) {
      for (let k = 0; k < count; k++) image = product(image, imageOf(generator), fProduct);
    }
    return { text, image };
  });
}

/** Throws RangeError when the elements are dependent or do not fill the weight. */
export function weightBasis(weight: number, least: 1 | 3, elements: readonly ImagedElement[]): WeightBasis {
  const words = fWords(weight, least);
  if (elements.length !== words.length) throw new RangeError('weightBasis: expected as many elements as f-words');
  const matrix = words.map((word) => elements.map(({ image }) => image.get(word) ?? ZERO));
  return { elements: elements.map(({ text }) => text), fWords: words, inverse: invert(matrix) };
}

/** The coordinates of an image in the elements, in their order. */
export function coordinates(image: Combination, basis: WeightBasis): Fraction[] {
  return basis.inverse.map((row) =>
    row.reduce((sum, entry, j) => {
      const value = image.get(basis.fWords[j] as string);
      return value === undefined || entry.p === 0n ? sum : plus(sum, times(entry, value));
    }, ZERO),
  );
}

/** Gauss–Jordan over ℚ. Throws RangeError for a singular matrix. */
function invert(matrix: readonly (readonly Fraction[])[]): Fraction[][] {
  const size = matrix.length;
  const rows = matrix.map((row, i) => [...row, ...row.map((_, j) => (i === j ? ONE : ZERO))]);
  for (let c = 0; c < size; c++) {
    const pivotRow = rows.findIndex((row, i) => i >= c && (row[c] as Fraction).p !== 0n);
    if (pivotRow < 0) throw new RangeError('invert: expected independent elements');
    const pivot = rows[pivotRow] as Fraction[];
    rows[pivotRow] = rows[c] as Fraction[];
    const scale = inverse(pivot[c] as Fraction);
    const scaled = pivot.map((entry) => times(entry, scale));
    rows[c] = scaled;
    for (let i = 0; i < size; i++) {
      const row = rows[i] as Fraction[];
      const factor = opposite(row[c] as Fraction);
      if (i === c || factor.p === 0n) continue;
      rows[i] = row.map((entry, j) => {
        const other = scaled[j] as Fraction;
        return other.p === 0n ? entry : plus(entry, times(factor, other));
      });
    }
  }
  return rows.map((row) => row.slice(size));
}
