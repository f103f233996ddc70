/** From a relation and the numbers it was found among to the list of evidence and the verdict. */
import type { Ball } from '../number/ball.ts';
import { log10Of } from '../number/integer.ts';
import { agreementDigits, midpointAgreement, vouchedDigits } from './agreement.ts';
import { vectorsLog10 } from './counting.ts';
import type { Budget, DigitRun, Evidence, EvidenceItem, StabilityPoint, Verdict } from './evidence.ts';
import { factoredText, smallFactors } from './factors.ts';
import { decide, HOLDS_SURPLUS, TENTATIVE_SURPLUS } from './verdict.ts';

export interface Case {
  /** One ball a column, from all written digits of the value: exact where written, radius half a unit of the last one. */
  readonly value: readonly Ball[];
  /** The expression at higher precision than the value, one ball a column. */
  readonly expression: readonly Ball[];
  /** log10 of the size of the value, all columns together. */
  readonly scaleLog10: number;
  readonly budget: Budget;
  /** Significant digits written, believed, and used by the search. */
  readonly digits: { readonly written: number; readonly trusted: number; readonly used: number };
  /** Over (value, basis…), as found. */
  readonly integers: readonly bigint[];
  readonly weights: readonly (number | null)[];
  readonly confidenceLog10: number;
  readonly stability: readonly StabilityPoint[];
  /** Whether the other method found the same relation; null when it was not asked. */
  readonly secondMethod: { readonly method: string; readonly same: boolean } | null;
  readonly searchesLog10: number;
  /** Items about the basis, worked out by whoever can search in it. */
  readonly basisItems?: readonly EvidenceItem[];
}

export interface Assessment {
  readonly evidence: Evidence;
  readonly verdict: Verdict;
  readonly diagnosis: readonly string[];
}

/** Agreement may end this many digits before the trusted ones do: the last digit is rounded, and the relation multiplies nothing. */
const LAST_PLACE = 1;

export function assess(found: Case): Assessment {
  const { trusted, used, written } = found.digits;
  const reach = Math.min(
    ...found.value.map((v, j) => midpointAgreement(v, found.expression[j] as Ball, found.scaleLog10)),
  );
  const vouched = Math.min(
    ...found.value.map((v, j) =>
      Math.max(agreementDigits(v, found.expression[j] as Ball, found.scaleLog10), 0) === 0
        ? 0
        : vouchedDigits(v, found.scaleLog10),
    ),
  );
  const agreement = Math.max(0, Math.min(reach, vouched));
  const contradictedAt = reach < trusted - LAST_PLACE ? Math.floor(reach) + 1 : null;
  const credited = Math.min(agreement, trusted);
  const normLog10 = log10Of(found.integers.reduce((sum, c) => sum + c * c, 0n)) / 2;
  const possible = vectorsLog10(found.integers.length, normLog10);
  const surplusDigits = credited - possible;
  const offered = trusted - used;
  const predictedDigits = Math.max(0, Math.min(offered, Math.round(Math.min(reach, trusted) - used)));
  const stable = found.stability.length === 0 ? null : found.stability.every((point) => point.sameRelation);
  const rule = decide({
    surplusDigits,
    heldOutOffered: offered,
    heldOutPredicted: contradictedAt === null ? offered : predictedDigits,
    stable: found.secondMethod?.same === false ? false : stable,
    firstWrongDigit: contradictedAt,
    searchesLog10: found.searchesLog10,
  });
  const heldOut = { used, predicted: contradictedAt === null ? offered : predictedDigits, offered };
  const evidence: Evidence = {
    budget: found.budget,
    digits: { trusted, used, heldOut: offered },
    agreementDigits: agreement,
    normLog10,
    vectorsLog10: possible,
    surplusDigits,
    confidenceLog10: found.confidenceLog10,
    heldOut,
    stability: found.stability,
    strip: strip(written, trusted, used, reach),
    items: [
      agreementItem(agreement, trusted, contradictedAt),
      surplusItem(surplusDigits, possible, credited),
      heldOutItem(heldOut),
      stabilityItem(found.stability),
      ...(found.secondMethod === null ? [] : [methodItem(found.secondMethod)]),
      coefficientItem(found.integers),
      weightItem(found),
      ...(found.basisItems ?? []),
    ],
    rule: { key: rule.key, text: rule.text, wouldChange: rule.wouldChange },
  };
  return { evidence, verdict: rule.verdict, diagnosis: diagnose(rule.key, contradictedAt, trusted, reach, written) };
}

function strip(written: number, trusted: number, used: number, reach: number): DigitRun[] {
  const good = Math.min(written, Math.floor(reach + LAST_PLACE));
  const runs: DigitRun[] = [];
  const push = (from: number, to: number, part: DigitRun['part']): void => {
    if (to > from) runs.push({ from, to, part });
  };
  push(0, Math.min(used, good), 'used');
  push(Math.min(used, good), used, 'contradicted');
  push(used, Math.max(used, Math.min(trusted, good)), 'predicted');
  push(Math.max(used, Math.min(trusted, good)), trusted, 'contradicted');
  push(trusted, written, 'beyond');
  return runs;
}

const round = (x: number): string => (Number.isFinite(x) ? (Math.floor(x * 10) / 10).toFixed(1) : 'all');

function agreementItem(agreement: number, trusted: number, wrongAt: number | null): EvidenceItem {
  const reason =
    wrongAt === null
      ? `Value and expression agree to ${round(agreement)} digits; ${trusted} digits are trusted.`
      : `Value and expression agree to ${round(agreement)} digits and part at digit ${wrongAt}, before the ${trusted} trusted digits end.`;
  return { key: 'agreement', title: 'Agreement', speaks: wrongAt === null ? 'for' : 'against', reason };
}

function surplusItem(surplus: number, possible: number, credited: number): EvidenceItem {
  const speaks = surplus >= HOLDS_SURPLUS ? 'for' : surplus < TENTATIVE_SURPLUS ? 'against' : 'neutral';
  const odds =
    surplus > 0 ? `by chance about once in 10^${Math.floor(surplus)} searches` : 'by chance in most searches';
  return {
    key: 'surplus',
    title: 'Surplus digits',
    speaks,
    reason: `Coefficients of this size among this many numbers could reproduce ${round(Math.max(0, possible))} digits by chance; ${round(credited)} agree. A surplus of ${round(surplus)} digits occurs ${odds}.`,
  };
}

function heldOutItem({ used, predicted, offered }: Evidence['heldOut']): EvidenceItem {
  if (offered === 0) {
    return {
      key: 'held-out',
      title: 'Held-out digits',
      speaks: 'neutral',
      reason: `All ${used} trusted digits were needed for the search; none was left to be predicted.`,
    };
  }
  return {
    key: 'held-out',
    title: 'Held-out digits',
    speaks: predicted >= offered ? 'for' : 'against',
    reason: `The search saw ${used} digits; of the ${offered} held out, the relation predicts ${predicted}.`,
  };
}

function stabilityItem(points: readonly StabilityPoint[]): EvidenceItem {
  const base = { key: 'stability', title: 'Stability' } as const;
  if (points.length === 0)
    return { ...base, speaks: 'neutral', reason: 'The digits are too few for a repetition at another precision.' };
  const at = points.map((p) => p.digitsUsed).join(', ');
  return points.every((p) => p.sameRelation)
    ? { ...base, speaks: 'for', reason: `Searches with ${at} digits give the same relation.` }
    : {
        ...base,
        speaks: 'against',
        reason: `Repeated with ${at} digits, the search does not always give this relation.`,
      };
}

function methodItem({ method, same }: NonNullable<Case['secondMethod']>): EvidenceItem {
  const name = method === 'pslq' ? 'PSLQ' : 'Lattice reduction';
  return {
    key: 'second-method',
    title: 'Second method',
    speaks: same ? 'for' : 'against',
    reason: same
      ? `${name}, run independently, gives the same relation.`
      : `${name}, run independently, does not give this relation.`,
  };
}

function coefficientItem(integers: readonly bigint[]): EvidenceItem {
  const lead = integers[0] as bigint;
  const smooth = smallFactors(lead).rest <= 1n && (smallFactors(lead).primes.at(-1)?.[0] ?? 1) < 100;
  return {
    key: 'coefficients',
    title: 'Coefficients',
    speaks: smooth ? 'for' : 'neutral',
    reason: `The common denominator is ${lead < 0n ? -lead : lead}${lead === 1n || lead === -1n ? '' : ` = ${factoredText(lead)}`}${smooth ? ', made of small primes as in known results' : ''}.`,
  };
}

function weightItem({ integers, weights }: Case): EvidenceItem {
  const present = weights.filter((_, k) => integers[k + 1] !== 0n);
  const known = present.filter((w): w is number => w !== null);
  const base = { key: 'weights', title: 'Weights', speaks: 'neutral' } as const;
  if (known.length < present.length || known.length === 0)
    return { ...base, reason: 'Not every constant in the relation has an agreed weight.' };
  const [low, high] = [Math.min(...known), Math.max(...known)];
  if (low === high) return { ...base, speaks: 'for', reason: `Every constant in the relation has weight ${low}.` };
  return { ...base, reason: `The constants in the relation have weights from ${low} to ${high}.` };
}

function diagnose(rule: string, wrongAt: number | null, trusted: number, reach: number, written: number): string[] {
  if (wrongAt !== null && rule === 'wrong-tail')
    return [`The value's digits from ${wrongAt} on look wrong (${trusted} were trusted).`];
  if (wrongAt !== null) return [`The relation and the value part at digit ${wrongAt} of ${trusted}.`];
  const beyond = Math.min(Math.floor(reach), written) - trusted;
  return beyond > 0 ? [`${beyond} digits beyond the trusted ones agree as well.`] : [];
}
