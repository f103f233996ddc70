/**
 * The written rules that turn evidence into a verdict, in the order in which they are tried. Thresholds are in decimal
 * digits; a surplus of s digits means that chance gives such an agreement about once in 10^s searches.
 */
import type { Verdict } from './evidence.ts';

/** What the rules look at. */
export interface Findings {
  readonly surplusDigits: number;
  /** Held-out digits offered, and how many of them the relation predicted. */
  readonly heldOutOffered: number;
  readonly heldOutPredicted: number;
  /** Every repetition at another precision gave the same relation; null when the digits allow no repetition. */
  readonly stable: boolean | null;
  /** First significant digit (counted from 1) of the trusted ones that contradicts the relation; null when none does. */
  readonly firstWrongDigit: number | null;
  /** Digits known to be searched over before: log10 of the number of searches that this one belongs to. */
  readonly searchesLog10: number;
}

export interface Rule {
  readonly key: string;
  readonly verdict: Verdict;
  readonly text: string;
  readonly wouldChange: string;
  applies(found: Findings): boolean;
}

export const HOLDS_SURPLUS = 12;
export const TENTATIVE_SURPLUS = 6;
/** Surplus with which a relation is believed against the last digits of the value. */
export const TAIL_SURPLUS = 15;
const HELD_OUT_DIGITS = 4;

const surplus = (found: Findings): number => found.surplusDigits - found.searchesLog10;
const predicted = (found: Findings): boolean =>
  found.heldOutPredicted >= Math.min(HELD_OUT_DIGITS, found.heldOutOffered) && found.heldOutOffered > 0;

export const RULES: readonly Rule[] = [
  {
    key: 'no-surplus',
    verdict: 'spurious',
    text: `The agreement is fewer than ${TENTATIVE_SURPLUS} digits above what coefficients of this size reach by chance.`,
    wouldChange: 'More right digits of the value, or a smaller basis.',
    applies: (found) => surplus(found) < TENTATIVE_SURPLUS,
  },
  {
    key: 'wrong-tail',
    verdict: 'holds',
    text: `The relation has at least ${TAIL_SURPLUS} surplus digits and the value's own last digits contradict it: the tail of the value is wrong.`,
    wouldChange: 'A second evaluation of the value with the same digits there.',
    applies: (found) => found.firstWrongDigit !== null && surplus(found) >= TAIL_SURPLUS && found.stable !== false,
  },
  {
    key: 'contradicted',
    verdict: 'spurious',
    text: 'Trusted digits that the search did not use contradict the relation.',
    wouldChange: 'Fewer trusted digits, if the last ones may be wrong.',
    applies: (found) => found.firstWrongDigit !== null,
  },
  {
    key: 'unstable',
    verdict: 'tentative',
    text: 'Repeated with another number of digits, the search gives another answer.',
    wouldChange: 'More right digits of the value.',
    applies: (found) => found.stable === false,
  },
  {
    key: 'holds',
    verdict: 'holds',
    text: `At least ${HOLDS_SURPLUS} surplus digits, the held-out digits are predicted, and no repetition disagrees.`,
    wouldChange: 'One trusted digit of the value that contradicts it.',
    applies: (found) => surplus(found) >= HOLDS_SURPLUS && predicted(found),
  },
  {
    key: 'thin',
    verdict: 'tentative',
    text: `The relation agrees, but with fewer than ${HOLDS_SURPLUS} surplus digits or without held-out digits to predict.`,
    wouldChange: 'More right digits of the value.',
    applies: () => true,
  },
];

/** The first rule that applies. */
export function decide(found: Findings): Rule {
  return RULES.find((rule) => rule.applies(found)) as Rule;
}

/** Always said beside a verdict. */
export const NOT_A_PROOF = 'Numerical recognition is strong evidence, not a proof.';
