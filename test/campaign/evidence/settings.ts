/** What every part of the campaign shares: its settings, its constants, its numbers. */
import { ConstantCache } from '../../../src/constants/cache.ts';
import { evaluateTerm } from '../../../src/constants/evaluate.ts';
import { parseTerm } from '../../../src/expression/parse.ts';
import { add, type Ball, fromInteger, overInteger, timesInteger } from '../../../src/number/ball.ts';
import { formatMidpoint } from '../../../src/number/decimal.ts';
import type { Random } from '../../support/random.ts';

export interface Settings {
  readonly scale: number;
  readonly seed: string;
}

export function settings(args: readonly string[]): Settings & { readonly part: string } {
  const given = new Map(args.map((a) => a.split('=') as [string, string]));
  const scale = Number(given.get('scale') ?? '1');
  if (!(scale > 0)) throw new RangeError(`settings: expected a positive scale, got ${given.get('scale')}`);
  return { part: given.get('part') ?? 'all', scale, seed: given.get('seed') ?? 'evidence' };
}

/** Constants between which no linear relation is known. */
export const CONSTANTS: readonly string[] = [
  ...['1', 'pi^2', 'zeta(3)', 'pi^2*log(2)', 'Li(4,1/2)', 'log(2)^4', 'catalan', 'zeta(5)', 'pi', 'log(2)', 'log(3)'],
  ...['sqrt(2)', 'sqrt(3)', 'sqrt(5)', 'Cl(2,pi/3)', 'zeta(7)', 'zeta(9)', 'euler_gamma', 'log(5)', 'log(7)', 'pi^3'],
  ...['catalan*pi', 'zeta(3)*pi', 'zeta(3)*log(2)', 'Li(5,1/2)', 'log(3)^2', 'log(2)*log(3)', 'sqrt(7)', 'e'],
  ...['log(11)', 'zeta(11)', 'log(13)', 'sqrt(11)', 'sqrt(13)', 'sqrt(6)', 'sqrt(10)', 'log(17)', 'log(19)'],
  ...['zeta(13)', 'pi*log(2)'],
];

export const cache = new ConstantCache();

/** `count` of the constants, in random order. */
export function draw(random: Random, count: number): string[] {
  const pool = [...CONSTANTS];
  return Array.from({ length: count }, () => pool.splice(random.integer(0, pool.length - 1), 1)[0] as string);
}

/** Uniformly random digits, the first not zero. */
export function randomDigits(random: Random, digits: number): string {
  const low = 10n ** BigInt(digits - 1);
  return `0.${low + random.below(9n * low)}`;
}

export interface Planted {
  readonly value: string;
  /** Over (value, basis…), primitive up to sign. */
  readonly integers: readonly bigint[];
}

/** A value with this many right digits that is Σ cᵢ·bᵢ / c₀, all c uniform up to 10^height (c₀ not zero). Null when the sum nearly cancels. */
export function plant(random: Random, basis: readonly string[], height: number, digits: number): Planted | null {
  const limit = BigInt(Math.round(10 ** height));
  const lead = random.below(limit) + 1n;
  const numerators = basis.map(() => random.below(2n * limit + 1n) - limit);
  if (numerators.every((c) => c === 0n)) return null;
  const bits = Math.ceil((digits + 30) * Math.log2(10)) + 128;
  let sum: Ball = fromInteger(0n);
  basis.forEach((text, i) => {
    const constant = evaluateTerm(parseTerm(text), bits, { cache }) as Ball;
    sum = add(sum, timesInteger(constant, numerators[i] as bigint));
  });
  if (sum.mid === 0n) return null;
  return { value: formatMidpoint(overInteger(sum, lead), digits), integers: [-lead, ...numerators] };
}

/** Whether the integers of a record are a multiple of the planted ones. */
export function isPlanted(found: readonly string[], { integers }: Planted): boolean {
  const lead = BigInt(found[0] ?? '0');
  return lead !== 0n && integers.every((c, i) => c * lead === BigInt(found[i] as string) * (integers[0] as bigint));
}
