/** A ℚ-vector space of constants of given alphabet and weight, with the generating set used in the literature. */
export interface SpaceOptions {
  /** All weights from 0 up to `weight` instead of exactly `weight`; the constant 1 is the weight-0 element. */
  readonly lower?: boolean;
  /** Keep only the elements that are real parts, or imaginary parts, where the space has both. */
  readonly parity?: 'real' | 'imaginary';
}

export interface Space {
  /** Stable kebab-case key used in requests, for example `alternating`. */
  readonly key: string;
  readonly title: string;
  readonly alphabet: string;
  readonly maxWeight: number;
  /** Dimension of the weight-graded piece. */
  dimension(weight: number): number;
  readonly dimensionFormula: string;
  readonly status: 'proven' | 'conjectured' | 'spanning proven, independence conjectured';
  readonly source: string;
  /** Typed texts of the elements (products of generators), ordered by weight and then as in the literature. Throws RangeError past maxWeight. */
  basis(weight: number, options?: SpaceOptions): readonly string[];
}
