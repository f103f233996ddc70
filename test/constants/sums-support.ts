/** Helpers of the tests of nested sums. */
import { readFileSync } from 'node:fs';
import { expect } from 'vitest';
import { evaluateTerm } from '../../src/constants/evaluate.ts';
import type { EvaluationContext } from '../../src/constants/family.ts';
import { sumFamilies } from '../../src/constants/sums/index.ts';
import type { CallTerm, Term } from '../../src/constants/term.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { type Ball, overlaps } from '../../src/number/ball.ts';
import { isComplex, toComplex, type Value } from '../../src/number/complex.ts';

export const context: EvaluationContext = { argument: (term, bits) => evaluateTerm(term, bits) };

const integer = (text: string): Term => ({ kind: 'rational', p: BigInt(text), q: 1n });

function point(text: string): Term {
  const [base, exponent] = text.split('^') as [string, string | undefined];
  if (/^-[a-z]/.test(base)) {
    return { kind: 'product', factors: [integer('-1'), point(base.slice(1))] };
  }
  const term: Term = /^-?\d+$/.test(base) ? integer(base) : { kind: 'symbol', name: base };
  return exponent === undefined ? term : { kind: 'power', base: term, exponent: integer(exponent) };
}

/** A small reader for the calls that occur here, so that these tests do not lean on the grammar. */
export function readCall(text: string): CallTerm {
  const match = /^(\w+)\((.*)\)$/.exec(text);
  if (match === null) throw new Error(`not a call: ${text}`);
  const groups = (match[2] as string).split(';').map((group) => group.split(',').map(point));
  return { kind: 'call', name: match[1] as string, groups };
}

/** The family that claims a call, and the checked arguments. */
export function claim(text: string) {
  return claimTerm(/^\w+\([-\w,;^]*\)$/.test(text) ? readCall(text) : parseTerm(text), text);
}

function claimTerm(term: Term, text: string) {
  if (term.kind !== 'call') throw new Error(`not a call: ${text}`);
  for (const family of sumFamilies) {
    if (!family.names.includes(term.name)) continue;
    const args = family.parse(term);
    if (args !== null) return { family, args };
  }
  throw new Error(`nobody claims ${text}`);
}

export function value(text: string, bits: number): Value {
  const { family, args } = claim(text);
  return family.evaluate(args, bits, context);
}

export function real(text: string, bits: number): Ball {
  const result = value(text, bits);
  if (isComplex(result)) throw new Error(`not real: ${text}`);
  return result;
}

export function expectSame(x: Value, y: Value, what: string, bits: number): void {
  const a = toComplex(x);
  const b = toComplex(y);
  for (const part of ['re', 'im'] as const) {
    expect(overlaps(a[part], b[part]), `${what}: ${part} differs`).toBe(true);
    expect(a[part].rad <= 1n << BigInt(Math.max(0, a[part].bits - bits)), `${what}: radius too large`).toBe(true);
  }
}

/** A decimal text as a ball of so many half units of its last digit. */
export function decimalBall(text: string, bits: number, halfUnits = 1n): Ball {
  const match = /^(-?)(\d+)(?:\.(\d+))?$/.exec(text);
  if (match === null) throw new Error(`not a decimal: ${text}`);
  const places = (match[3] ?? '').length;
  const scaled = BigInt((match[2] as string) + (match[3] ?? ''));
  const scale = 2n * 10n ** BigInt(places);
  const mid = ((2n * scaled) << BigInt(bits)) / scale;
  return { mid: match[1] === '-' ? -mid : mid, rad: (halfUnits << BigInt(bits)) / scale + 2n, bits };
}

export interface ReferenceConstant {
  readonly id: string;
  readonly family: string;
  readonly digits: string;
}

export function referenceConstants(...families: readonly string[]): readonly ReferenceConstant[] {
  const path = new URL('../reference/constants.json', import.meta.url);
  const all = JSON.parse(readFileSync(path, 'utf8')) as { constants: ReferenceConstant[] };
  return all.constants.filter((entry) => families.includes(entry.family));
}
