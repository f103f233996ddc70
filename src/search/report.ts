/** The parts of a record that follow from a relation. */

import { termText } from '../constants/term-text.ts';
import { combination } from '../expression/combination.ts';
import { toLatex } from '../expression/print-latex.ts';
import { gcd } from '../number/integer.ts';
import type { Method } from '../relation/contract.ts';
import { type BasisElement, readTyped } from './basis.ts';
import type { RelationEntry, SearchRecord } from './record.ts';
import type { SearchRequest } from './request.ts';

export const ENGINE_VERSION = '0.1.0';

/** A record with nothing found yet. */
export function emptyRecord(request: SearchRequest, method: Method): SearchRecord {
  return {
    format: 'digit-assay/record',
    version: 1,
    request,
    outcome: 'inconclusive',
    relation: [],
    integers: [],
    expression: null,
    agreementDigits: null,
    surplusDigits: null,
    heldOut: null,
    normBound: null,
    verdict: null,
    diagnosis: [],
    evidence: null,
    timings: { constantsMs: 0, relationMs: 0, evidenceMs: 0 },
    engine: { version: ENGINE_VERSION, method },
  };
}

/** Coefficients and expression of an integer relation; solved for the value where it takes part, else set to zero. */
export function relationRecord(
  elements: readonly BasisElement[],
  integers: readonly bigint[],
  divideBy: string | undefined,
): Pick<SearchRecord, 'relation' | 'integers' | 'expression'> {
  const lead = integers[0] as bigint;
  const solved = elements.map((element, k) => {
    const c = integers[k + 1] as bigint;
    if (lead === 0n) return { element, p: c, q: 1n };
    const divisor = gcd(c, lead);
    const sign = lead < 0n ? 1n : -1n;
    return { element, p: (sign * c) / divisor, q: (lead < 0n ? -lead : lead) / divisor };
  });
  const relation: RelationEntry[] = solved.map(({ element, p, q }) => ({
    constant: element.text,
    latex: element.latex,
    weight: element.weight,
    coefficient: q === 1n || p === 0n ? `${p}` : `${p}/${q}`,
  }));
  const sum = combination(solved.map(({ element, p, q }) => ({ p, q, text: element.text, latex: element.latex })));
  return { relation, integers: integers.map(String), expression: withFactor(sum, lead === 0n ? undefined : divideBy) };
}

/** The sum times the factor that the value had been divided by. */
function withFactor(
  sum: { text: string; latex: string },
  divideBy: string | undefined,
): { text: string; latex: string } {
  if (divideBy === undefined) return sum;
  const factor = readTyped(divideBy);
  const text = termText(factor);
  const latex = toLatex(factor);
  const bracket = factor.kind === 'sum';
  return {
    text: `${bracket ? `(${text})` : text}*(${sum.text})`,
    latex: `${bracket ? `\\left(${latex}\\right)` : latex}\\left(${sum.latex}\\right)`,
  };
}

/** A norm bound as text, rounded down to two digits. */
export function normText(log10: number): string {
  const exponent = Math.floor(log10);
  const lead = Math.floor(10 ** (log10 - exponent) * 10) / 10;
  return exponent < 6 ? `${Math.floor(10 ** log10 * 10) / 10}` : `${lead}e${exponent}`;
}
