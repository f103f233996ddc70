/** What a user asks for. Numbers travel as text: a JavaScript number never stands for digits. */
export interface ComplexText {
  readonly re: string;
  readonly im: string;
}

export interface SpaceSpec {
  readonly space: string;
  readonly weight: number;
  readonly lower?: boolean;
  readonly parity?: 'real' | 'imaginary';
  /** Every element is multiplied by this typed factor, for example `sqrt(3)` or `1/pi`. */
  readonly times?: string;
}

/** A constant known only by pasted digits. A search never uses more digits than it has. */
export interface PastedConstant {
  readonly name: string;
  readonly digits: string;
  readonly trustedDigits?: number;
  readonly latex?: string;
}

export type BasisEntry = string | PastedConstant;
export type BasisSpec = readonly BasisEntry[] | SpaceSpec;
export type Form = 'linear' | 'multiplicative' | 'algebraic';

export interface SearchRequest {
  readonly value: string | ComplexText;
  /** Significant decimal digits of the value believed right; default all that were given. */
  readonly trustedDigits?: number;
  /** Typed expression that the value is divided by first. */
  readonly divideBy?: string;
  readonly basis?: BasisSpec;
  readonly form?: Form;
  /** Degree sought, for the algebraic form. */
  readonly degree?: number;
  readonly method?: 'pslq' | 'lattice';
  /** Upper limit of the Euclidean norm of the integer relation, as decimal text such as "1e12". */
  readonly maxNorm?: string;
  readonly label?: string;
  /** How many searches of a plan this one is of (default 1): the logarithm is taken off the surplus, since chance had as many tries. */
  readonly amongSearches?: number;
}
