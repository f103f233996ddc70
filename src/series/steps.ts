/**
 * A value that is a Laurent series, and the steps that normalise it. The digits as given are never changed: a list of
 * steps is applied to them anew each time, so that every step can be edited, switched off or taken back.
 */
import type { TermContext } from '../constants/evaluate.ts';
import { rational, type Term } from '../constants/term.ts';
import { makePower, parseTerm } from '../expression/parse.ts';
import type { Ball } from '../number/ball.ts';
import { isComplex, type Value } from '../number/complex.ts';
import { parseDecimal, toBall } from '../number/decimal.ts';
import { InputError } from '../number/errors.ts';
import { dependsOn, expandTerm, MOST_TERMS } from './expand.ts';
import {
  addSeries,
  endOf,
  multiplySeries,
  rescaled,
  type Series,
  sizeOf,
  subtractSeries,
  truncated,
} from './laurent.ts';
import { reportOf, type SeriesReport } from './report.ts';

/** One coefficient as given: digits, or an exact rational `p/q` (an integer of at most 15 digits without a point is exact). */
export type CoefficientText = string | { readonly re: string; readonly im: string };

/** A series as given; coefficient k belongs to variable^(low + k). */
export interface SeriesText {
  readonly variable: string;
  readonly low: number;
  readonly coefficients: readonly CoefficientText[];
  /** Trusted significant digits of each coefficient; default all that were written. */
  readonly trustedDigits?: readonly (number | null)[];
}

interface Switch {
  /** A step that is off is kept in the list and passed over. */
  readonly off?: boolean;
}
export type Step = Switch &
  (
    | { readonly kind: 'multiply' | 'divide'; readonly factor: string }
    | { readonly kind: 'add' | 'subtract'; readonly expression: string }
    | { readonly kind: 'add-series' | 'subtract-series'; readonly series: SeriesText }
    /** variable → factor·variable; the factor is free of the variable. */
    | { readonly kind: 'rescale'; readonly factor: string }
  );

/** Bits of a series all of whose coefficients are exact: 100 digits. */
const EXACT_BITS = 340;

/** The balls of a series as given. Throws InputError for unreadable coefficients. */
export function readSeries(text: SeriesText, bits = EXACT_BITS): Series {
  if (!Number.isInteger(text.low) || Math.abs(text.low) > 1000) {
    throw new InputError(
      'bad-exponent',
      'The lowest exponent of a series must be a whole number of at most 1000 in size.',
    );
  }
  if (text.coefficients.length === 0 || text.coefficients.length > MOST_TERMS) {
    throw new InputError('bad-length', `A series must have 1 to ${MOST_TERMS} coefficients.`);
  }
  const coefficients = text.coefficients.map((c, k): Value => {
    const trusted = text.trustedDigits?.[k] ?? undefined;
    if (typeof c === 'string') return readReal(c, trusted, bits);
    return { re: readReal(c.re, trusted, bits), im: readReal(c.im, trusted, bits) };
  });
  return { low: text.low, coefficients };
}

function readReal(text: string, trusted: number | undefined, bits: number): Ball {
  const exact = /^\s*([-+]?)(\d{1,15})(?:\s*\/\s*(\d{1,15}))?\s*$/.exec(text.replace(/[−–]/g, '-'));
  if (exact !== null) {
    const q = BigInt(exact[3] ?? '1');
    if (q === 0n) throw new InputError('division-by-zero', `“${text.trim()}” divides by zero.`);
    const p = BigInt(`${exact[1]}${exact[2]}`.replace('+', ''));
    if (p % q === 0n) return { mid: p / q, rad: 0n, bits: 0 };
    return { mid: (p << BigInt(bits)) / q, rad: 1n, bits };
  }
  const decimal = parseDecimal(text);
  return trusted === undefined ? toBall(decimal) : toBall(decimal, trusted);
}

export interface StepsResult {
  readonly result: SeriesReport;
  /** The series after each step; null for steps that are off. */
  readonly after: readonly (SeriesReport | null)[];
}

/** The series with all steps applied. Throws InputError that names the step by its number. */
export function applySteps(original: SeriesText, steps: readonly Step[], context: TermContext = {}): StepsResult {
  let series = readSeries(original);
  let report = reportOf(series, original.variable);
  const after = steps.map((step, index) => {
    if (step.off === true) return null;
    try {
      const next = applyStep(series, step, original.variable, context);
      report = reportOf(next, original.variable, report);
      series = next;
    } catch (error) {
      if (error instanceof InputError) {
        throw new InputError(error.code, `Step ${index + 1}: ${error.message}`, error.at);
      }
      throw error;
    }
    return report;
  });
  return { result: report, after };
}

/** The series after one step. */
export function applyStep(s: Series, step: Step, variable: string, context: TermContext = {}): Series {
  switch (step.kind) {
    case 'multiply':
      return multiplyBy(s, parseFactor(step.factor), variable, context);
    case 'divide':
      return multiplyBy(s, makePower(parseFactor(step.factor), rational(-1n)), variable, context);
    case 'add':
    case 'subtract': {
      const other = expandBelow(parseTerm(step.expression), variable, endOf(s), bitsOf(s) + 64, context);
      return step.kind === 'add' ? addSeries(s, other) : subtractSeries(s, other);
    }
    case 'add-series':
    case 'subtract-series': {
      if (step.series.variable !== variable) {
        throw new InputError('other-variable', `This is a series in ${step.series.variable}, not in ${variable}.`);
      }
      const other = readSeries(step.series, bitsOf(s) + 64);
      return step.kind === 'add-series' ? addSeries(s, other) : subtractSeries(s, other);
    }
    case 'rescale': {
      const term = parseFactor(step.factor);
      if (dependsOn(term, variable)) {
        throw new InputError('not-constant', `The factor of ${variable} must not contain ${variable} itself.`);
      }
      const bits = bitsOf(s) + 64;
      const probe = expandTerm(term, variable, 1, 64, context).coefficients[0] as Value;
      const powers = Math.abs(s.low) + Math.abs(endOf(s));
      const guard = powers * (Math.abs(sizeOf(probe)) + 2) + Math.max(0, topSize(s));
      const value = (t: Term): Value => expandTerm(t, variable, 1, bits + guard, context).coefficients[0] as Value;
      return rescaled(s, value(term), value(makePower(term, rational(-1n))), bits + guard);
    }
  }
}

/** Zero as a factor or divisor is the one constant that the parser folds to a rational and that can be refused by its form. */
function parseFactor(text: string): Term {
  const term = parseTerm(text);
  if (term.kind === 'rational' && term.p === 0n) throw new InputError('zero-factor', 'The factor is zero.');
  return term;
}

/** s times the expansion of a factor, whose error is kept below what is known of s. */
export function multiplyBy(s: Series, factor: Term, variable: string, context: TermContext = {}): Series {
  const count = s.coefficients.length;
  const lead = expandTerm(factor, variable, 1, 64, context).coefficients[0] as Value;
  const bits = bitsOf(s) + 64 + Math.max(0, topSize(s)) + Math.max(0, -sizeOf(lead));
  return multiplySeries(s, expandTerm(factor, variable, count, bits, context), bits);
}

/** A typed series with all its powers below variable^end. */
function expandBelow(term: Term, variable: string, end: number, bits: number, context: TermContext): Series {
  if (term.kind === 'rational' && term.p === 0n) return { low: end, coefficients: [] };
  const { low } = expandTerm(term, variable, 1, 64, context);
  if (low >= end) return { low: end, coefficients: [] };
  return truncated(expandTerm(term, variable, end - low, bits, context), end);
}

function bitsOf(s: Series): number {
  const bits = s.coefficients.map((c) => (isComplex(c) ? Math.max(c.re.bits, c.im.bits) : c.bits));
  return Math.max(EXACT_BITS, ...bits);
}

function topSize(s: Series): number {
  return Math.max(...s.coefficients.map(sizeOf).map((b) => (Number.isFinite(b) ? b : 0)));
}
