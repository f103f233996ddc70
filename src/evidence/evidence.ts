/** The evidence for and against a relation, as data: shown, exported and re-checked in the same form. */

export type Verdict = 'holds' | 'tentative' | 'spurious' | 'excluded';

/** One item of evidence with its plain-language reason. */
export interface EvidenceItem {
  /** Stable kebab-case key: `agreement`, `surplus`, `held-out`, `stability`, `second-method`, `coefficients`, `weights`, `tail`, `dependence`, `sub-basis`. */
  readonly key: string;
  readonly title: string;
  readonly speaks: 'for' | 'against' | 'neutral';
  /** One or two plain sentences with the numbers in them. */
  readonly reason: string;
}

/** A run of the value's significant digits, `from` inclusive and `to` exclusive, counted from the first significant digit. */
export interface DigitRun {
  readonly from: number;
  readonly to: number;
  readonly part: 'used' | 'predicted' | 'contradicted' | 'beyond';
}

/** One repetition of the search at another number of digits. */
export interface StabilityPoint {
  readonly digitsUsed: number;
  /** Digits of the whole value to which the relation found at this precision agrees. */
  readonly agreementDigits: number;
  readonly sameRelation: boolean;
}

export interface Budget {
  /** Numbers offered, the value included. */
  readonly numbers: number;
  /** Digits the search may use. */
  readonly digits: number;
  /** Decimal digits that every coefficient may have before a hit means nothing: digits / numbers. */
  readonly coefficientDigits: number;
}

export interface Evidence {
  readonly budget: Budget;
  readonly digits: { readonly trusted: number; readonly used: number; readonly heldOut: number };
  readonly agreementDigits: number;
  /** log10 of the Euclidean norm of the integer relation. */
  readonly normLog10: number;
  /** log10 of the number of integer vectors of this dimension with at most this norm. */
  readonly vectorsLog10: number;
  readonly surplusDigits: number;
  readonly confidenceLog10: number;
  readonly heldOut: { readonly used: number; readonly predicted: number; readonly offered: number };
  readonly stability: readonly StabilityPoint[];
  readonly strip: readonly DigitRun[];
  readonly items: readonly EvidenceItem[];
  /** Which written rule decided, and what would change it. */
  readonly rule: { readonly key: string; readonly text: string; readonly wouldChange: string };
}
