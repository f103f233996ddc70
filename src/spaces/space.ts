/** What a space of constants is: the contract that requests, the interface and the reductions work with. */

/** Whether a number occurs in real parts or (divided by i) in imaginary parts of the sums that span the space. */
export type Parity = 'real' | 'imaginary';

export interface SpaceOptions {
  /** All weights from 0 up to `weight` instead of exactly `weight`; the constant 1 is the weight-0 element. */
  readonly lower?: boolean;
  /** Keep only the elements of this parity. Without effect where the space has real elements only. */
  readonly parity?: Parity;
  /** Typed text that multiplies every element, for example `sqrt(3)` or `1/pi`. */
  readonly times?: string;
}

/** A real number that is not a polynomial in the generators of lower weight; the space is spanned by their products. */
export interface Generator {
  /** Typed text, for example `zeta(5,3)`; `pi` with `step` 2 stands for π². */
  readonly text: string;
  readonly weight: number;
  readonly parity: Parity;
  /** Only powers that are multiples of this occur; 1 where absent. `weight` belongs to the step. */
  readonly step?: number;
}

/** A ℚ-vector space of constants of given alphabet and weight, with the generating set used in the literature. */
export interface Space {
  /** Stable kebab-case key used in requests, for example `alternating`. */
  readonly key: string;
  readonly title: string;
  readonly alphabet: string;
  readonly maxWeight: number;
  /** Dimension of the weight-graded piece, by the formula of the literature. */
  dimension(weight: number): number;
  readonly dimensionFormula: string;
  readonly status: 'proven' | 'conjectured' | 'spanning proven, independence conjectured';
  readonly source: string;
  /** By weight, then as in the literature; empty for a space whose elements are not products of generators. */
  readonly generators: readonly Generator[];
  /** Whether it has elements of both parities. */
  readonly hasImaginary: boolean;
  /** Typed texts of the elements (products of generators), by weight and then with the earlier generators first. Throws RangeError for a weight that is not an integer from 0 to maxWeight. */
  basis(weight: number, options?: SpaceOptions): readonly string[];
}
