/** One search from request to record: constants, relation, evidence. */
import { type ConstantCache, evaluateTerm } from '../constants/evaluate.ts';
import { assess } from '../evidence/assess.ts';
import { vectorsLog10 } from '../evidence/counting.ts';
import type { StabilityPoint } from '../evidence/evidence.ts';
import { add, type Ball, containsZero, divide, fromInteger, subtract, timesInteger, withBits } from '../number/ball.ts';
import { divide as divideValues, isComplex, toComplex, type Value } from '../number/complex.ts';
import { InputError } from '../number/errors.ts';
import { gcd, log10Of } from '../number/integer.ts';
import type { Method, RelationOutcome } from '../relation/contract.ts';
import { startRelation } from '../relation/relation.ts';
import { type BasisElement, readTyped, resolveBasis } from './basis.ts';
import { budgetFor, digitsNeeded, digitsUsed } from './estimate.ts';
import { believing, type ReadValue, readMaxNorm, readValue } from './intake.ts';
import { basisValues, inColumns } from './numbers.ts';
import { pacer } from './pause.ts';
import type { SearchProgress, SearchRecord } from './record.ts';
import { emptyRecord, relationRecord } from './report.ts';
import type { SearchRequest } from './request.ts';

export interface SearchOptions {
  readonly signal?: AbortSignal | undefined;
  readonly onProgress?: ((progress: SearchProgress) => void) | undefined;
  readonly cache?: ConstantCache | undefined;
}

/** Guard bits of the constants beyond the digits of the value: coefficients and comparisons cost this much at most. */
const GUARD_BITS = 64;
const LOG2_10 = Math.log2(10);

/** The numbers of a search, in columns. */
interface Problem {
  readonly request: SearchRequest;
  readonly elements: readonly BasisElement[];
  readonly value: ReadValue;
  readonly columns: number;
  /** The value divided by its prefactor, believing so many digits. */
  believe(digits: number): Ball[];
  readonly constants: readonly (readonly Ball[])[];
  readonly scaleLog10: number;
  readonly method: Method;
}

/**
 * Runs one search. Rejects with InputError for a request that cannot be carried out (one plain sentence), and with the
 * signal's reason when it is aborted. Everything else, a negative answer included, is a record.
 */
export async function runSearch(request: SearchRequest, options: SearchOptions = {}): Promise<SearchRecord> {
  const clock = { constantsMs: 0, relationMs: 0, evidenceMs: 0 };
  const start = performance.now();
  const report = reporter(options, start);
  report('constants', 0);
  const problem = prepareProblem(request, options, (fraction) => report('constants', fraction));
  clock.constantsMs = performance.now() - start;

  const searchStart = performance.now();
  const used = digitsUsed(problem.value.trusted);
  let digits = used;
  let outcome = await relationAt(problem, digits, problem.method, options, report);
  if (outcome.kind !== 'relation' && problem.value.trusted > used) {
    // Nothing is left to predict then, but the negative is as strong as the digits allow.
    digits = problem.value.trusted;
    outcome = await relationAt(problem, digits, problem.method, options, report);
  }
  clock.relationMs = performance.now() - searchStart;

  const evidenceStart = performance.now();
  report('evidence', 0);
  const record = await judge(problem, outcome, digits, options, clock);
  clock.evidenceMs = performance.now() - evidenceStart;
  report('evidence', 1);
  return { ...record, timings: { ...clock } };
}

type Report = (stage: SearchProgress['stage'], fraction: number, iterations?: number, normBoundLog10?: number) => void;

function reporter(options: SearchOptions, start: number): Report {
  let last = Number.NEGATIVE_INFINITY;
  let stageStart = start;
  let stageNow = '';
  return (stage, fraction, iterations = 0, normBoundLog10 = 0) => {
    const now = performance.now();
    if (stage !== stageNow) {
      stageNow = stage;
      stageStart = now;
    } else if (now - last < 60) return;
    last = now;
    const spent = now - stageStart;
    const remainingMs = fraction > 0.05 && spent > 200 ? (spent * (1 - fraction)) / fraction : null;
    options.onProgress?.({ stage, fraction, iterations, normBoundLog10, elapsedMs: now - start, remainingMs });
  };
}

function prepareProblem(request: SearchRequest, options: SearchOptions, onProgress: (f: number) => void): Problem {
  const form = request.form ?? 'linear';
  if (form !== 'linear')
    throw new InputError('unknown-form', `The form “${form}” is not known here; relations are linear.`);
  if (request.basis === undefined) throw new InputError('empty-basis', 'The request names no basis.');
  const value = readValue(request);
  const elements = resolveBasis(request.basis);
  const columns = value.parts.length;
  const context = { cache: options.cache, signal: options.signal, onProgress };
  const bits = Math.max(64, Math.ceil((value.written - value.leadExponent) * LOG2_10)) + GUARD_BITS;
  const divisor = request.divideBy === undefined ? null : divisorValue(request.divideBy, bits + 64, options);
  const believe = (digits: number): Ball[] => {
    const parts = believing(value, digits);
    if (divisor === null) return parts;
    const whole: Value = columns === 1 ? (parts[0] as Ball) : { re: parts[0] as Ball, im: parts[1] as Ball };
    const quotient = divideValues(whole, divisor, bits);
    if (columns === 1 && isComplex(quotient)) {
      throw new InputError(
        'complex-divisor',
        `The value divided by ${request.divideBy} is complex; give it as a complex value.`,
      );
    }
    return columns === 1 ? [quotient as Ball] : [toComplex(quotient).re, toComplex(quotient).im];
  };
  const constants = inColumns(basisValues(elements, bits, context), elements, columns);
  const sizes = believe(value.trusted).map((b) => log10Of(b.mid) - b.bits / LOG2_10);
  return {
    request,
    elements,
    value,
    columns,
    believe,
    constants,
    scaleLog10: Math.max(...sizes),
    method: request.method ?? 'pslq',
  };
}

function divisorValue(text: string, bits: number, options: SearchOptions): Value {
  const divisor = evaluateTerm(readTyped(text), bits, { cache: options.cache, signal: options.signal });
  const zero = isComplex(divisor) ? containsZero(divisor.re) && containsZero(divisor.im) : containsZero(divisor);
  if (zero) throw new InputError('zero-divisor', `${text} is zero, so nothing can be divided by it.`);
  return divisor;
}

async function relationAt(
  problem: Problem,
  digits: number,
  method: Method,
  options: SearchOptions,
  report: Report | null,
): Promise<RelationOutcome> {
  const { maxNorm } = problem.request;
  const run = startRelation({
    rows: [problem.believe(digits), ...problem.constants],
    method,
    ...(maxNorm === undefined ? {} : { maxNormLog10: readMaxNorm(maxNorm) }),
  });
  const pause = pacer(options.signal);
  for (;;) {
    options.signal?.throwIfAborted();
    const outcome = run.step();
    report?.('relation', run.progress.fraction, run.progress.iterations, run.progress.normBoundLog10);
    if (outcome !== undefined) return outcome;
    await pause();
  }
}

async function judge(
  problem: Problem,
  outcome: RelationOutcome,
  digits: number,
  options: SearchOptions,
  clock: SearchRecord['timings'],
): Promise<SearchRecord> {
  const { request, elements, value } = problem;
  const base = emptyRecord(request, problem.method, clock);
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
  if (integers[0] === 0n) return dependent(problem, integers, base, options);
  const expression = expressionValue(problem, integers);
  const stability = await repeat(problem, integers, expression, digits, options);
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
    searchesLog10: 0,
  });
  return {
    ...base,
    ...relationRecord(elements, integers, request.divideBy),
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

/** Repeats the search with fewer digits, as few as the relation itself needs and one step between. */
async function repeat(
  problem: Problem,
  integers: readonly bigint[],
  expression: readonly Ball[],
  used: number,
  options: SearchOptions,
): Promise<StabilityPoint[]> {
  const norm = log10Of(integers.reduce((sum, c) => sum + c * c, 0n)) / 2;
  const least = Math.ceil(vectorsLog10(integers.length, norm) / problem.columns) + 10;
  if (least >= used - 1) return [];
  const points: StabilityPoint[] = [];
  for (const digits of new Set([Math.ceil((least + used) / 2)])) {
    const again = await relationAt(problem, digits, problem.method, options, null);
    const found = again.kind === 'relation' && same(again.coefficients, integers);
    points.push({
      digitsUsed: digits,
      sameRelation: found,
      agreementDigits: found ? digitsOf(problem, expression) : 0,
    });
  }
  return points;
}

function digitsOf(problem: Problem, expression: readonly Ball[]): number {
  const value = problem.believe(problem.value.trusted);
  const gaps = value.map((v, j) => {
    const gap = subtract(withBits(v, v.bits), expression[j] as Ball);
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
  const again = await relationAt(problem, digits, method, options, null);
  return { method, same: again.kind === 'relation' && same(again.coefficients, integers) };
}

/** A relation among the constants alone, confirmed with constants at twice the digits. */
function dependent(
  problem: Problem,
  integers: readonly bigint[],
  base: SearchRecord,
  options: SearchOptions,
): SearchRecord {
  const { elements, columns } = problem;
  const bits = 2 * Math.ceil(problem.value.written * LOG2_10) + GUARD_BITS;
  const values = inColumns(
    basisValues(elements, bits, { cache: options.cache, signal: options.signal }),
    elements,
    columns,
  );
  const vanishes = Array.from({ length: columns }, (_, j) =>
    values.reduce((sum, row, k) => add(sum, timesInteger(row[j] as Ball, integers[k + 1] as bigint)), fromInteger(0n)),
  ).every(containsZero);
  if (!vanishes) {
    return {
      ...base,
      diagnosis: [
        'The best candidate does not involve the value and is not a relation among the constants either: the digits are too few for this basis.',
      ],
    };
  }
  const rest = integers.slice(1).reduce((g, c) => gcd(g, c), 0n);
  const involved = elements.filter((_, k) => integers[k + 1] !== 0n).map((e) => e.text);
  return {
    ...base,
    ...relationRecord(
      elements,
      integers.map((c) => c / (rest === 0n ? 1n : rest)),
      undefined,
    ),
    outcome: 'basis-dependent',
    diagnosis: [
      `The constants ${involved.join(', ')} are linearly dependent: the relation holds to ${Math.floor(bits / LOG2_10)} digits without the value. Leave one of them out and search again.`,
    ],
  };
}

/** A norm bound as text, rounded down to two digits. */
function normText(log10: number): string {
  const exponent = Math.floor(log10);
  const lead = Math.floor(10 ** (log10 - exponent) * 10) / 10;
  return exponent < 6 ? `${Math.floor(10 ** log10 * 10) / 10}` : `${lead}e${exponent}`;
}
