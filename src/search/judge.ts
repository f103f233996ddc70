/** From the outcome of the relation engine to the record. */
import { assess } from '../evidence/assess.ts';
import { vectorsLog10 } from '../evidence/counting.ts';
import type { EvidenceItem, StabilityPoint } from '../evidence/evidence.ts';
import { add, type Ball, divide, fromInteger, subtract, timesInteger } from '../number/ball.ts';
import { log10Of } from '../number/integer.ts';
import type { Method, RelationOutcome } from '../relation/contract.ts';
import { dependentRecord, relationAmongConstants } from './dependence.ts';
import { budgetFor, digitsNeeded } from './estimate.ts';
import { LOG2_10, type Problem, type SearchOptions } from './problem.ts';
import type { SearchRecord } from './record.ts';
import { relate, relateRows } from './relate.ts';
import { emptyRecord, normText } from './report.ts';

const CHANCE =
  'The best candidate does not involve the value and is not a relation among the constants either: the digits are too few for this basis.';

/**
 * The record of an outcome found at `digits` digits: evidence and verdict for a relation, the bound for a negative.
 * `searches` counts the attempts on this value so far, those of the request's plan apart: chance had as many tries.
 */
export async function judge(
  problem: Problem,
  outcome: RelationOutcome,
  digits: number,
  options: SearchOptions,
  searches = 1,
): Promise<SearchRecord> {
  const { request, elements, value } = problem;
  const base = emptyRecord(request, problem.method);
  const budget = budgetFor(value.trusted, elements.length, problem.columns);
  if (outcome.kind === 'excluded') {
    return {
      ...base,
      outcome: 'excluded',
      verdict: 'excluded',
      normBound: normText(outcome.normBoundLog10),
      diagnosis: [
        `No integer relation among these ${budget.numbers} numbers has a norm below ${normText(outcome.normBoundLog10)}, provided that the ${value.trusted} trusted digits are right.`,
      ],
    };
  }
  if (outcome.kind === 'inconclusive') {
    const need = digitsNeeded(elements.length, 4, problem.columns);
    const advice =
      need > value.trusted
        ? [
            `This basis with coefficients of up to four digits needs about ${need} right digits; the value has ${value.trusted}.`,
          ]
        : [];
    return {
      ...base,
      normBound: outcome.normBoundLog10 > 0 ? normText(outcome.normBoundLog10) : null,
      diagnosis: [outcome.reason, ...advice],
    };
  }
  const integers = outcome.coefficients;
  if (integers[0] === 0n) {
    return (await dependentRecord(problem, integers, base, options)) ?? { ...base, diagnosis: [CHANCE] };
  }
  const among = await relationAmongConstants(problem, options);
  const dependent = among === null ? null : await dependentRecord(problem, among, base, options);
  if (dependent !== null) return dependent;
  const expression = expressionValue(problem, integers);
  const stability = await repeat(problem, integers, digits, options);
  const second = await otherMethod(problem, integers, digits, options);
  const assessment = assess({
    value: problem.believe(value.written),
    expression,
    scaleLog10: problem.scaleLog10,
    budget,
    digits: { written: value.written, trusted: value.trusted, used: digits },
    integers,
    weights: elements.map((e) => e.weight),
    confidenceLog10: outcome.confidenceLog10,
    stability,
    secondMethod: second,
    basisItems: [independentItem(problem), ...(await subBasisItem(problem, integers, digits, options))],
    searchesLog10: Math.log10(searches * (request.amongSearches ?? 1)),
  });
  return {
    ...base,
    ...problem.present(integers),
    outcome: 'relation',
    ...summary(assessment, outcome.normBoundLog10),
  };
}

function summary({ evidence, verdict, diagnosis }: ReturnType<typeof assess>, normBoundLog10: number) {
  const tenth = (x: number): number => Math.floor(x * 10) / 10;
  return {
    agreementDigits: tenth(evidence.agreementDigits),
    surplusDigits: tenth(evidence.surplusDigits),
    heldOut: { used: evidence.heldOut.used, predicted: evidence.heldOut.predicted },
    normBound: normBoundLog10 > 0 ? normText(normBoundLog10) : null,
    verdict,
    diagnosis,
    evidence,
  };
}

/** −Σ cᵢ bᵢ / c₀, a column each. */
function expressionValue(problem: Problem, integers: readonly bigint[]): Ball[] {
  const lead = fromInteger(-(integers[0] as bigint));
  return Array.from({ length: problem.columns }, (_, j) => {
    let sum: Ball = fromInteger(0n);
    problem.constants.forEach((row, k) => {
      sum = add(sum, timesInteger(row[j] as Ball, integers[k + 1] as bigint));
    });
    return divide(sum, lead, sum.bits + 8);
  });
}

const same = (a: readonly bigint[], b: readonly bigint[]): boolean =>
  a.length === b.length && a.every((x, k) => x === b[k]);

/** Up to this many numbers² × digits a search is repeated at three precisions; beyond, each costs too much. */
const SCAN_LIMIT = 100_000;

/** Repeats the search with fewer digits, spread between as few as the relation itself needs and those used. */
async function repeat(
  problem: Problem,
  integers: readonly bigint[],
  used: number,
  options: SearchOptions,
): Promise<StabilityPoint[]> {
  const norm = log10Of(integers.reduce((sum, c) => sum + c * c, 0n)) / 2;
  const least = Math.ceil(vectorsLog10(integers.length, norm) / problem.columns) + 10;
  if (least >= used - 1) return [];
  const shares = integers.length ** 2 * used <= SCAN_LIMIT ? [0.25, 0.5, 0.75] : [0.5];
  const points: StabilityPoint[] = [];
  for (const digitsUsed of new Set(shares.map((share) => Math.ceil(least + share * (used - least))))) {
    const again = await relate(problem, digitsUsed, problem.method, options, null);
    const involved = again.kind === 'relation' && again.coefficients[0] !== 0n;
    points.push({
      digitsUsed,
      sameRelation: involved && same(again.coefficients, integers),
      agreementDigits: involved ? digitsOf(problem, expressionValue(problem, again.coefficients)) : 0,
    });
  }
  return points;
}

/** Said once the constants have been searched for a relation among themselves and none showed. */
function independentItem({ elements, value }: Problem): EvidenceItem {
  const one = elements.length < 2;
  return {
    key: 'dependence',
    title: 'Independence of the basis',
    speaks: one ? 'neutral' : 'for',
    reason: one
      ? 'The basis has one constant.'
      : `The ${elements.length} constants alone show no relation at ${value.written} digits.`,
  };
}

/** The search again with only the constants that take part; nothing when all do. */
async function subBasisItem(
  problem: Problem,
  integers: readonly bigint[],
  digits: number,
  options: SearchOptions,
): Promise<EvidenceItem[]> {
  const kept = problem.constants.filter((_, k) => integers[k + 1] !== 0n);
  const unused = problem.constants.length - kept.length;
  if (unused === 0) return [];
  const rows = [problem.believe(digits), ...kept];
  const again = await relateRows(rows, problem.method, undefined, options, null);
  const present = integers.filter((c, k) => k === 0 || c !== 0n);
  const agrees = again.kind === 'relation' && same(again.coefficients, present);
  const without = `without the ${unused === 1 ? 'constant' : `${unused} constants`} that came out zero`;
  return [
    {
      key: 'sub-basis',
      title: 'Smaller basis',
      speaks: agrees ? 'for' : 'against',
      reason: agrees
        ? `Searched again ${without}, the same relation comes back.`
        : `Searched again ${without}, the relation does not come back.`,
    },
  ];
}

function digitsOf(problem: Problem, expression: readonly Ball[]): number {
  const value = problem.believe(problem.value.trusted);
  const gaps = value.map((v, j) => {
    const gap = subtract(v, expression[j] as Ball);
    return gap.mid === 0n ? problem.value.trusted : problem.scaleLog10 - (log10Of(gap.mid) - gap.bits / LOG2_10);
  });
  return Math.max(0, Math.min(problem.value.trusted, ...gaps));
}

/** The other method on the same numbers. */
async function otherMethod(
  problem: Problem,
  integers: readonly bigint[],
  digits: number,
  options: SearchOptions,
): Promise<{ method: Method; same: boolean } | null> {
  const method: Method = problem.method === 'pslq' ? 'lattice' : 'pslq';
  if (method === 'pslq' && integers.length > 40) return null;
  const again = await relate(problem, digits, method, options, null);
  return { method, same: again.kind === 'relation' && same(again.coefficients, integers) };
}
