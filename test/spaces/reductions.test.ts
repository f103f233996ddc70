import { describe, expect, it } from 'vitest';
import { evaluateRootSums } from '../../src/constants/sums/root-words.ts';
import { call, rational, symbol, type Term } from '../../src/constants/term.ts';
import {
  add,
  type Ball,
  containsZero,
  fromInteger,
  multiply,
  overInteger,
  subtract,
  timesInteger,
} from '../../src/number/ball.ts';
import { isComplex } from '../../src/number/complex.ts';
import { InputError } from '../../src/number/errors.ts';
import { fractionText } from '../../src/spaces/reduction/fraction.ts';
import { makeReducer, type Reducer } from '../../src/spaces/reduction/reduce.ts';
import { passWord, polylogAtHalf } from '../../src/spaces/reduction/words.ts';

const integers = (...values: number[]): Term[] => values.map((v) => rational(BigInt(v)));
const zeta = (...indices: number[]): Term => call('zeta', ...integers(...indices));
const li = (n: number, p: number, q: number): Term => call('Li', rational(BigInt(n)), rational(BigInt(p), BigInt(q)));

function reduced(reducer: Reducer, term: Term): Record<string, string> | null {
  const terms = reducer.reduce(term);
  return terms && Object.fromEntries(terms.map(({ element, coefficient }) => [element, fractionText(coefficient)]));
}

const mzv = makeReducer('mzv');
const alternating = makeReducer('alternating');

describe('reductions', () => {
  it('multiple zeta values known in closed form', () => {
    // Euler: ζ(2,1) = ζ(3), ζ(4,1) = 2ζ(5) − ζ(2)ζ(3); ζ(3,1) = π⁴/360 (from memory).
    expect(reduced(mzv, zeta(2, 1))).toEqual({ 'zeta(3)': '1' });
    expect(reduced(mzv, zeta(3, 1))).toEqual({ 'pi^4': '1/360' });
    expect(reduced(mzv, zeta(4, 1))).toEqual({ 'pi^2*zeta(3)': '-1/6', 'zeta(5)': '2' });
    // ζ({3,1}^n) = 2π^{4n}/(4n+2)!: Borwein, Bradley, Broadhurst and Lisoněk, Electron. J. Combin. 5 (1998) R38.
    expect(reduced(mzv, zeta(3, 1, 3, 1))).toEqual({ 'pi^8': '1/1814400' });
    expect(reduced(mzv, zeta(3, 1, 3, 1, 3, 1))).toEqual({ 'pi^12': '1/43589145600' });
    // ζ({2}^n) = π^{2n}/(2n+1)!.
    expect(reduced(mzv, zeta(2, 2, 2, 2, 2))).toEqual({ 'pi^10': '1/39916800' });
    expect(reduced(mzv, zeta(5, 3))).toEqual({ 'zeta(5,3)': '1' });
    expect(reduced(mzv, zeta(6))).toEqual({ 'pi^6': '1/945' });
  });

  it('alternating sums known in closed form', () => {
    expect(reduced(alternating, zeta(-1))).toEqual({ 'log(2)': '-1' });
    expect(reduced(alternating, zeta(-2))).toEqual({ 'pi^2': '-1/12' });
    // ζ(−1,−1): from the square of log 2, (log²2 − ζ(2))/2.
    expect(reduced(alternating, zeta(-1, -1))).toEqual({ 'pi^2': '-1/12', 'log(2)^2': '1/2' });
    expect(reduced(alternating, zeta(-2, 1))).toEqual({ 'zeta(3)': '1/8' });
    // Li₂(1/2) and Li₃(1/2): Landen (from memory).
    expect(reduced(alternating, li(2, 1, 2))).toEqual({ 'pi^2': '1/12', 'log(2)^2': '-1/2' });
    expect(reduced(alternating, li(3, 1, 2))).toEqual({ 'pi^2*log(2)': '-1/12', 'log(2)^3': '1/6', 'zeta(3)': '7/8' });
    expect(reduced(alternating, li(4, 1, 2))).toEqual({ 'Li(4,1/2)': '1' });
  });

  it('relations of test/reference/problems-open.json (PARI/GP 2.15.2)', () => {
    expect(reduced(mzv, zeta(2, 3, 3))).toEqual({
      'pi^8': '793/1134000',
      'pi^2*zeta(3)^2': '1/3',
      'zeta(3)*zeta(5)': '-9',
      'zeta(5,3)': '-27/10',
    });
    expect(reduced(alternating, zeta(-2, 1, -2))).toEqual({ 'pi^2*zeta(3)': '-5/96', 'zeta(5)': '5/8' });
  });

  it('polynomials of weights mixed', () => {
    const squared: Term = { kind: 'power', base: zeta(2), exponent: rational(2n) };
    const term: Term = {
      kind: 'sum',
      terms: [rational(3n, 2n), { kind: 'product', factors: [rational(5n), squared] }, zeta(2, 1)],
    };
    expect(reduced(mzv, term)).toEqual({ '1': '3/2', 'zeta(3)': '1', 'pi^4': '5/36' });
    const cancels: Term = { kind: 'sum', terms: [zeta(2, 1), { kind: 'product', factors: [rational(-1n), zeta(3)] }] };
    expect(reduced(mzv, cancels)).toEqual({});
  });

  it('into the values with indices 2 and 3', () => {
    const hoffman = makeReducer('mzv-hoffman');
    expect(reduced(hoffman, zeta(2, 3, 2))).toEqual({ 'zeta(2,3,2)': '1' });
    expect(reduced(hoffman, zeta(2, 1))).toEqual({ 'zeta(3)': '1' });
    // There and back must be the identity.
    const terms = hoffman.reduce(zeta(5, 3, 3)) ?? [];
    const back: Term = {
      kind: 'sum',
      terms: terms.map(({ element, coefficient }) => ({
        kind: 'product',
        factors: [rational(coefficient.p, coefficient.q), zeta(...element.slice(5, -1).split(',').map(Number))],
      })),
    };
    expect(reduced(mzv, back)).toEqual({ 'zeta(5,3,3)': '1' });
  });

  it('says null outside, and refuses spaces without reductions', () => {
    expect(mzv.reduce(zeta(-3, 1))).toBe(null);
    expect(mzv.reduce(zeta(7, 6))).toBe(null);
    expect(mzv.reduce(symbol('catalan'))).toBe(null);
    expect(mzv.reduce(zeta(1, 2))).toBe(null);
    expect(alternating.reduce(zeta(-7, 2))).toBe(null);
    expect(alternating.reduce(call('zeta', rational(10n ** 12n)))).toBe(null);
    expect(() => makeReducer('sixth-roots')).toThrow(InputError);
  });

  it('Li_n(1/2) as a combination of words has the value of its power series', () => {
    for (const n of [1, 2, 4, 6]) {
      const bits = 200;
      let sum = fromInteger(0n);
      for (const [word, factor] of polylogAtHalf(n)) {
        const { word: pass, sign } = passWord(word);
        const indices = pass.split(/(?<=[12])/).map((part) => part.length);
        const letters = [...pass].filter((c) => c !== '0').map((c) => (c === '2' ? 1 : 0));
        const exponents = letters.map((a, j) => (a + (j === 0 ? 0 : (letters[j - 1] as number))) % 2);
        sum = add(sum, timesInteger(single(indices, exponents, bits), factor.p * BigInt(sign)));
      }
      let series = fromInteger(0n);
      for (let k = 1; k <= bits; k++) {
        const term = (1n << BigInt(bits + 20 - k)) / BigInt(k) ** BigInt(n);
        series = add(series, { mid: term, rad: 1n, bits: bits + 20 });
      }
      expect(containsZero(subtract(sum, { ...series, rad: series.rad + (1n << 21n) }))).toBe(true);
    }
  });

  it('reductions at 1,000 digits, of words spread over all weights', () => {
    const bits = 3330;
    const value = (indices: number[]): Ball =>
      single(
        indices.map(Math.abs),
        indices.map((s) => (s < 0 ? 1 : 0)),
        bits + 60,
      );
    const values: Record<string, Ball> = {
      pi2: timesInteger(value([2]), 6n),
      'log(2)': timesInteger(value([-1]), -1n),
    };
    const generator = (text: string): Ball => {
      const known = values[text];
      if (known !== undefined) return known;
      const made = value(text.slice(5, -1).split(',').map(Number));
      values[text] = made;
      return made;
    };
    const cases: [Reducer, number[]][] = [
      [mzv, [4, 2, 2]],
      [mzv, [2, 3, 1, 2]],
      [mzv, [3, 5, 3]],
      [mzv, [2, 1, 5, 1, 3]],
      [mzv, [4, 4, 4]],
    ];
    for (const [reducer, indices] of cases) {
      const terms = reducer.reduce(zeta(...indices));
      if (terms === null) throw new Error('a reduction expected');
      let sum = value(indices);
      for (const { element, coefficient } of terms) {
        let term = fromInteger(1n);
        for (const factor of element.split('*')) {
          const [base, power] = factor.split('^') as [string, string | undefined];
          const count = base === 'pi' ? Number(power) / 2 : Number(power ?? 1);
          for (let k = 0; k < count; k++) term = multiply(term, generator(base === 'pi' ? 'pi2' : base), bits + 60);
        }
        sum = subtract(sum, overInteger(timesInteger(term, coefficient.p), coefficient.q));
      }
      expect(containsZero(sum), indices.join()).toBe(true);
      expect(sum.rad < 1n << 60n).toBe(true);
    }
  });
});

function single(indices: readonly number[], exponents: readonly number[], bits: number): Ball {
  const [ball] = evaluateRootSums([{ indices, exponents, order: 2 }], bits, {
    argument: () => {
      throw new Error('unused');
    },
  });
  if (ball === undefined || isComplex(ball)) throw new Error('one real value expected');
  return ball;
}
