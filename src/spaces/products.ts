/** Spaces from their generators: all products of a weight, in order, as typed texts. */
import type { Generator, Parity, Space, SpaceOptions } from './space.ts';

export interface Product {
  readonly text: string;
  readonly parity: Parity;
  /** The generators that occur, each with the number of its steps. */
  readonly powers: readonly GeneratorPower[];
}

export interface GeneratorPower {
  readonly generator: Generator;
  readonly count: number;
}

/**
 * The products of generators whose weights add up to `weight`; the empty product at weight 0 is `1`. Ordered so that
 * higher powers of earlier generators come first. Two imaginary factors make a real product (i² is rational).
 */
export function productsOf(generators: readonly Generator[], weight: number): readonly Product[] {
  const found: Product[] = [];
  const extend = (index: number, left: number, powers: readonly GeneratorPower[]): void => {
    if (left === 0) {
      found.push(productOf(powers));
      return;
    }
    const generator = generators[index];
    if (generator === undefined) return;
    for (let count = Math.floor(left / generator.weight); count >= 0; count--) {
      extend(index + 1, left - count * generator.weight, count === 0 ? powers : [...powers, { generator, count }]);
    }
  };
  extend(0, weight, []);
  return found;
}

function productOf(powers: readonly GeneratorPower[]): Product {
  const factors = powers.map(({ generator, count }) => powerText(generator.text, count * (generator.step ?? 1)));
  const flips = powers.filter(({ generator, count }) => generator.parity === 'imaginary' && count % 2 === 1);
  return {
    text: factors.length === 0 ? '1' : factors.join('*'),
    parity: flips.length % 2 === 1 ? 'imaginary' : 'real',
    powers,
  };
}

function powerText(base: string, exponent: number): string {
  return exponent === 1 ? base : `${base}^${exponent}`;
}

/** A space from its description and generators: its elements are their products. */
export function makeSpace(parts: Omit<Space, 'basis' | 'hasImaginary'>): Space {
  return spaceOfElements(parts, (weight) => productsOf(parts.generators, weight));
}

/** A space whose elements of each weight are given. */
export function spaceOfElements(
  parts: Omit<Space, 'basis' | 'hasImaginary'>,
  elements: (weight: number) => readonly Pick<Product, 'text' | 'parity'>[],
): Space {
  const hasImaginary = parts.generators.some((generator) => generator.parity === 'imaginary');
  const basis = (weight: number, options: SpaceOptions = {}): readonly string[] => {
    if (!Number.isInteger(weight) || weight < 0 || weight > parts.maxWeight) {
      throw new RangeError(`basis: expected a weight from 0 to ${parts.maxWeight} for ${parts.key}, got ${weight}`);
    }
    const { lower = false, parity, times } = options;
    const weights = lower ? Array.from({ length: weight + 1 }, (_, w) => w) : [weight];
    return weights
      .flatMap(elements)
      .filter((element) => !hasImaginary || parity === undefined || element.parity === parity)
      .map((element) => withFactor(element.text, times));
  };
  return { ...parts, hasImaginary, basis };
}

function withFactor(text: string, factor: string | undefined): string {
  if (factor === undefined || factor === '1') return text;
  const safe = /[+-]/.test(factor) ? `(${factor})` : factor;
  return text === '1' ? safe : `${safe}*${text}`;
}

/** Fibonacci numbers with F(1) = F(2) = 1. */
export function fibonacci(n: number): number {
  let [a, b] = [0, 1];
  for (let k = 0; k < n; k++) [a, b] = [b, a + b];
  return a;
}
