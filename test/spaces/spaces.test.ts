import { describe, expect, it } from 'vitest';
import { evaluateMany, evaluateTerm } from '../../src/constants/evaluate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { containsZero, overlaps } from '../../src/number/ball.ts';
import { isComplex, multiply, toComplex } from '../../src/number/complex.ts';
import { InputError } from '../../src/number/errors.ts';
import { lyndonWords } from '../../src/spaces/lyndon.ts';
import { spaceOf, spaces } from '../../src/spaces/registry.ts';

describe('spaces', () => {
  it.each(spaces.map((space) => [space.key, space] as const))('%s: as many products as its dimension', (_, space) => {
    for (let weight = 0; weight <= space.maxWeight; weight++) {
      expect(space.basis(weight)).toHaveLength(space.dimension(weight));
      expect(new Set(space.basis(weight)).size).toBe(space.dimension(weight));
    }
  });

  it('dimensions are those of the literature (OEIS A000931 shifted, A000045, A000079, A001906; from memory)', () => {
    const dimensions = (key: string): number[] => {
      const space = spaceOf(key);
      return Array.from({ length: space.maxWeight + 1 }, (_, weight) => space.dimension(weight));
    };
    expect(dimensions('mzv')).toEqual([1, 0, 1, 1, 1, 2, 2, 3, 4, 5, 7, 9, 12]);
    expect(dimensions('alternating')).toEqual([1, 1, 2, 3, 5, 8, 13, 21, 34]);
    expect(dimensions('fourth-roots')).toEqual([1, 2, 4, 8, 16, 32, 64]);
    expect(dimensions('sixth-roots-unramified')).toEqual([1, 1, 2, 3, 5, 8, 13, 21, 34]);
    expect(dimensions('sixth-roots')).toEqual([1, 3, 8, 21, 55]);
  });

  it('lays out products by weight, lower weights and parity', () => {
    expect(spaceOf('polylog-half').basis(3)).toEqual(['pi^2*log(2)', 'log(2)^3', 'zeta(3)']);
    expect(spaceOf('polylog-half').basis(4)).toEqual([
      'pi^4',
      'pi^2*log(2)^2',
      'log(2)^4',
      'log(2)*zeta(3)',
      'Li(4,1/2)',
    ]);
    expect(spaceOf('polylog-half').basis(2, { lower: true })).toEqual(['1', 'log(2)', 'pi^2', 'log(2)^2']);
    expect(spaceOf('fourth-roots').basis(2)).toEqual(['pi^2', 'pi*log(2)', 'log(2)^2', 'catalan']);
    expect(spaceOf('fourth-roots').basis(2, { parity: 'imaginary' })).toEqual(['pi*log(2)', 'catalan']);
    expect(spaceOf('mzv').basis(8)).toEqual(['pi^8', 'pi^2*zeta(3)^2', 'zeta(3)*zeta(5)', 'zeta(5,3)']);
    expect(spaceOf('mzv').basis(3, { parity: 'imaginary' })).toEqual(['zeta(3)']);
    expect(spaceOf('mzv').basis(3, { lower: true, times: 'sqrt(3)' })).toEqual([
      'sqrt(3)',
      'sqrt(3)*pi^2',
      'sqrt(3)*zeta(3)',
    ]);
  });

  it('splits the 4th and full 6th roots into real and imaginary parts as measured in the literature', () => {
    const count = (key: string, weight: number, parity: 'real' | 'imaginary'): number =>
      spaceOf(key).basis(weight, { parity }).length;
    for (let weight = 1; weight <= 6; weight++) {
      expect(count('fourth-roots', weight, 'real')).toBe(2 ** (weight - 1));
      expect(count('fourth-roots', weight, 'imaginary')).toBe(2 ** (weight - 1));
    }
    expect([1, 2, 3, 4].map((w) => count('sixth-roots', w, 'real'))).toEqual([2, 5, 12, 30]);
    expect([1, 2, 3, 4].map((w) => count('sixth-roots', w, 'imaginary'))).toEqual([1, 3, 9, 25]);
  });

  it('every element is a typed constant that evaluates to a real number', () => {
    for (const space of spaces) {
      const texts = space.basis(Math.min(space.maxWeight, 4), { lower: true });
      const generators = space.generators.map((generator) => generator.text);
      for (const [k, value] of evaluateMany([...texts, ...generators].map(parseTerm), 80).entries()) {
        expect(isComplex(value), `${space.key} ${[...texts, ...generators][k]}`).toBe(false);
        expect(containsZero(toComplex(value).re)).toBe(false);
      }
    }
  });

  it('a factor multiplies every element', () => {
    for (const times of ['sqrt(3)', '1/pi', '2-sqrt(3)', '-1']) {
      const factor = evaluateTerm(parseTerm(times), 90);
      const plain = spaceOf('polylog-half').basis(3, { lower: true });
      const scaled = spaceOf('polylog-half').basis(3, { lower: true, times });
      plain.forEach((text, k) => {
        const product = multiply(evaluateTerm(parseTerm(text), 90), factor, 90);
        const direct = evaluateTerm(parseTerm(scaled[k] as string), 90);
        expect(overlaps(toComplex(product).re, toComplex(direct).re), scaled[k]).toBe(true);
      });
    }
  });

  it('refuses unknown spaces and weights out of range', () => {
    expect(() => spaceOf('mvz')).toThrow(InputError);
    expect(() => spaceOf('mzv').basis(13)).toThrow(RangeError);
    expect(() => spaceOf('mzv').basis(2.5)).toThrow(RangeError);
  });

  it('counts Lyndon compositions (OEIS A059966, from memory)', () => {
    expect([1, 2, 3, 4, 5, 6, 7, 8].map((n) => lyndonWords(n, () => true).length)).toEqual([1, 1, 2, 3, 6, 9, 18, 30]);
  });
});
