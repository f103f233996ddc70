// The contract of every family in the registry: what it lists parses, its text parses back, the radius keeps its promise, and
// the ball contains what is computed with 200 more bits.
import { describe, expect, it } from 'vitest';
import { accuracyOf } from '../../src/constants/accurate.ts';
import { ConstantCache } from '../../src/constants/cache.ts';
import { evaluateMany, evaluateTerm, isRealTerm, weightOf } from '../../src/constants/evaluate.ts';
import { families, familyOf } from '../../src/constants/registry.ts';
import type { Term } from '../../src/constants/term.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { contains } from '../../src/number/ball.ts';
import { isComplex, toComplex, type Value } from '../../src/number/complex.ts';
import { InputError } from '../../src/number/errors.ts';
import { randomFrom } from '../support/random.ts';

function atom(text: string): Extract<Term, { kind: 'symbol' | 'call' }> {
  const term = parseTerm(text);
  if (term.kind !== 'symbol' && term.kind !== 'call') throw new TypeError(`${text} is not an atom`);
  return term;
}

function holds(outer: Value, inner: Value): boolean {
  const a = toComplex(outer);
  const b = toComplex(inner);
  return contains(a.re, b.re) && contains(a.im, b.im);
}

/** Families whose single evaluation takes seconds at a few hundred bits get one example and few bits. */
const COSTLY = new Set(['bessel-moments', 'log-sine', 'log-sine-integrals']);

describe.each(families.map((family) => [family.key, family] as const))('%s', (key, family) => {
  const examples = COSTLY.has(key) ? family.examples.slice(0, 1) : family.examples;
  const random = randomFrom(`families ${key}`);

  it('parses what it lists, prints it and parses that back', () => {
    for (const text of family.examples) {
      const member = familyOf(atom(text));
      expect(member.family.key, text).toBe(key);
      const canonical = family.text(member.args);
      expect(family.text(familyOf(atom(canonical)).args), text).toBe(canonical);
      expect(family.latex(member.args).length, text).toBeGreaterThan(0);
    }
  });

  it('keeps the radius it promises, and holds the value computed 200 bits higher', { timeout: 30_000 }, () => {
    for (const text of examples) {
      const bits = random.integer(20, COSTLY.has(key) ? 60 : 400);
      const term = parseTerm(text);
      const value = evaluateTerm(term, bits);
      expect(accuracyOf(value), `${text} at ${bits}`).toBeGreaterThanOrEqual(bits);
      expect(holds(value, evaluateTerm(term, bits + 200)), `${text} at ${bits}`).toBe(true);
      if (isRealTerm(term)) expect(isComplex(value), text).toBe(false);
    }
  });

  it('gives the same constants in one pass', { timeout: 30_000 }, () => {
    const terms = examples.map(parseTerm);
    const together = evaluateMany(terms, 150, { cache: new ConstantCache() });
    terms.forEach((term, j) => {
      expect(holds(together[j] as Value, evaluateTerm(term, 400)), examples[j]).toBe(true);
    });
  });
});

describe('interval honesty', () => {
  it('holds for 120 random pairs of constant and precision, products and roots among them', { timeout: 60_000 }, () => {
    const random = randomFrom('interval honesty');
    const pool = families
      .filter((f) => !COSTLY.has(f.key))
      .flatMap((f) => f.examples)
      .filter((text) => isRealTerm(parseTerm(text)));
    for (let trial = 0; trial < 120; trial++) {
      const [a, b] = [0, 1].map(() => pool[random.integer(0, pool.length - 1)] as string);
      const text = [`${a}`, `${a}*${b}`, `${a}-1/3*${b}`, `abs(${a})^(1/3)`, `${a}/${b}`][trial % 5] as string;
      const bits = random.integer(10, 500);
      const term = parseTerm(text);
      expect(holds(evaluateTerm(term, bits), evaluateTerm(term, bits + 200)), `${text} at ${bits}`).toBe(true);
    }
  });
});

describe('refusals', () => {
  it.each([
    ['zetta(3)', 'unknown-constant', 'Did you mean zeta?'],
    ['catalna', 'unknown-constant', 'Did you mean catalan?'],
    ['xyz', 'unknown-constant', 'no constant or function'],
    ['zeta(1)', 'divergent', 'diverges'],
    ['zeta(1/2)', 'bad-argument', 'integers'],
    ['zeta(0)', 'bad-argument', 'zeta(3)'],
    ['pi(2)', 'wrong-arguments', 'takes no arguments'],
    ['zeta', 'wrong-arguments', 'zeta(3)'],
    ['log(0)', 'pole', 'infinite'],
    ['log(2,3)', 'wrong-arguments', 'one argument'],
    ['log(zeta(3))', 'bad-argument', 'elementary'],
    ['exp(10^12)', 'too-large', 'too large'],
    ['tan(pi/2)', 'pole', 'infinite'],
    ['beta(0)', 'bad-argument', 'beta(4)'],
    ['L(-5,2)', 'bad-discriminant', 'fundamental discriminant'],
    ['L(-3,0)', 'bad-argument', 'positive'],
    ['L(-3)', 'wrong-arguments', '2 integers'],
    ['Li(1,1)', 'divergent', 'diverges'],
    ['Li(1/2,1/2)', 'wrong-arguments', 'integer order'],
    ['Li(0,1/2)', 'bad-argument', 'between'],
    ['Li(2,1-10^-9)', 'too-close', 'too close'],
    ['Cl(1,0)', 'divergent', 'diverges'],
    ['Cl(2,i)', 'bad-argument', 'real angle'],
    ['Ti(2,0)', 'bad-argument', 'Ti(2,1/2)'],
    ['hurwitz(1,1/2)', 'bad-argument', 'between'],
    ['hurwitz(2,-1/2)', 'bad-argument', 'positive'],
    ['polygamma(1,sqrt(2))', 'wrong-arguments', 'rational'],
    ['Gamma(-3)', 'pole', 'infinite'],
    ['Gamma(pi)', 'wrong-arguments', 'rational'],
    ['K(1)', 'bad-modulus', 'modulus'],
    ['K(2)', 'bad-modulus', 'modulus'],
    ['Pi(1,1/2)', 'bad-argument', 'less than 1'],
    ['agm(-1,2)', 'bad-argument', 'positive'],
    ['sqrt(1,2)', 'wrong-arguments', 'one argument'],
    ['1/(sqrt(2)^2-2)', 'undecided', 'cannot be told from zero'],
    ['2^(1/1000003)', 'too-large', 'exponent'],
  ])('%s: %s', (text, code, words) => {
    let caught: unknown;
    try {
      evaluateTerm(parseTerm(text), 64);
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(InputError);
    expect((caught as InputError).code).toBe(code);
    expect((caught as InputError).message).toContain(words);
    expect((caught as InputError).message).toMatch(/[.?]$/);
  });
});

describe('weights', () => {
  it.each([
    ['pi^2*log(2)', 3],
    ['zeta(3)+pi^3', 3],
    ['zeta(3)+pi^2', null],
    ['sqrt(3)*Cl(2,pi/3)', 2],
    ['Li(4,1/2)', 4],
    ['e', null],
    ['L(-3,2)/pi', 1],
    ['5/7', 0],
  ])('%s has weight %s', (text, weight) => {
    expect(weightOf(parseTerm(text))).toBe(weight);
  });
});

describe('reality', () => {
  it.each([
    ['sqrt(2)', true],
    ['sqrt(-2)', false],
    ['i', false],
    ['re(Li(2,i))', true],
    ['Li(2,i)', false],
    ['Li(2,2)', false],
    ['Li(2,-5)', true],
    ['log(3)', true],
    ['log(-3)', false],
    ['log(sqrt(2)-1)', true],
    ['asin(1/2)', true],
    ['asin(2)', false],
    ['(1-sqrt(2))^(1/3)', false],
    ['pi^e', true],
  ])('%s: %s', (text, real) => {
    const term = parseTerm(text);
    expect(isRealTerm(term)).toBe(real);
    expect(isComplex(evaluateTerm(term, 50))).toBe(!real);
  });
});

describe('cache', () => {
  it('serves a shorter request from the longer value, only extends, and tells once', () => {
    const told: string[] = [];
    const cache = new ConstantCache((entry) => told.push(`${entry.text}:${entry.bits}`));
    const term = parseTerm('catalan');
    const long = evaluateTerm(term, 500, { cache });
    const short = evaluateTerm(term, 100, { cache });
    expect(told).toEqual(['catalan:500']);
    expect(accuracyOf(short)).toBeGreaterThanOrEqual(100);
    expect(holds(short, long)).toBe(true);
    evaluateTerm(term, 600, { cache });
    expect(told).toEqual(['catalan:500', 'catalan:600']);
    expect(cache.entries().length).toBe(1);
  });

  it('hears a cancel and reports progress', () => {
    const controller = new AbortController();
    const seen: number[] = [];
    const terms = ['zeta(5)', 'zeta(7)', 'Li(5,1/2)'].map(parseTerm);
    evaluateMany(terms, 2000, { onProgress: (fraction) => seen.push(fraction) });
    expect(seen.at(-1)).toBeCloseTo(1);
    expect(seen.every((f, j) => f >= 0 && f <= 1 && (j === 0 || f >= (seen[j - 1] as number) - 1e-9))).toBe(true);
    controller.abort(new Error('stop'));
    expect(() => evaluateMany(terms, 2000, { signal: controller.signal })).toThrow('stop');
  });
});
