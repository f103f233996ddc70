/** Coordinates of f-alphabet images in the products of a space's generators, weight by weight. */
import { type Product, productsOf } from '../products.ts';
import type { Generator } from '../space.ts';
import { accumulateAll, type Combination, product } from './combination.ts';
import { type Decomposer, fProduct, fWords } from './decompose.ts';
import { type Fraction, inverse, ONE, opposite, plus, times, ZERO } from './fraction.ts';
import { generatorWords } from './words.ts';

export interface WeightBasis {
  readonly products: readonly Product[];
  readonly fWords: readonly string[];
  /** Row i gives the coordinate of product i from the coefficients of the f-words. */
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

/** Throws RangeError when the products of the generators are dependent. */
export function weightBasis(
  weight: number,
  least: 1 | 3,
  generators: readonly Generator[],
  imageOf: (generator: Generator) => Combination,
): WeightBasis {
  const products = productsOf(generators, weight);
  const words = fWords(weight, least);
  if (products.length !== words.length) throw new RangeError('weightBasis: expected as many products as f-words');
  const columns = products.map(({ powers }) => {
    let image: Combination = new Map([['', ONE]]);
    for (const { generator, count } of powers) {
      for (let k = 0; k < count; k++) image = product(image, imageOf(generator), fProduct);
    }
    return image;
  });
  const matrix = words.map((word) => columns.map((image) => image.get(word) ?? ZERO));
  return { products, fWords: words, inverse: invert(matrix) };
}

/** The coordinates of an image in the products, in their order. */
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
    if (pivotRow < 0) throw new RangeError('invert: expected independent products of generators');
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
