/** Bases to try on a value of which nothing is known but a largest weight: growing by weight, alphabet and factor. */
import { InputError } from '../number/errors.ts';
import { spaceOf } from '../spaces/registry.ts';
import type { PlanBasis } from './plan.ts';

/** Elements of a space at weights 0 … `weight` (at most what the space has), of one parity, times a factor. */
function upTo(space: string, weight: number, parity: 'real' | 'imaginary', times?: string): readonly string[] {
  const found = spaceOf(space);
  return found.basis(Math.min(weight, found.maxWeight), {
    lower: true,
    parity,
    ...(times === undefined ? {} : { times }),
  });
}

/** Products of weight `weight` and less of numbers of weight one, 1 included. */
function products(letters: readonly string[], weight: number): readonly string[] {
  const grow = (from: number, left: number): string[][] => {
    const here: string[][] = [[]];
    if (left === 0) return here;
    for (let k = from; k < letters.length; k++) {
      for (const rest of grow(k, left - 1)) here.push([letters[k] as string, ...rest]);
    }
    return here;
  };
  return grow(0, weight).map((word) => {
    const counts = new Map<string, number>();
    for (const letter of word) counts.set(letter, (counts.get(letter) ?? 0) + 1);
    return [...counts].map(([letter, n]) => (n === 1 ? letter : `${letter}^${n}`)).join('*') || '1';
  });
}

const GOLDEN = 'log((1+sqrt(5))/2)';
const WEIGHT_ONE = ['1', 'pi', 'log(2)', 'log(3)', 'log(1+sqrt(2))', 'log(2+sqrt(3))', GOLDEN];
const ROOTS = ['sqrt(2)', 'sqrt(3)', 'sqrt(5)', 'sqrt(6)', 'pi*sqrt(2)', 'pi*sqrt(3)', 'pi/sqrt(3)'];
/** Arguments k/24 without those that reflection and multiplication express by others. */
const GAMMAS = ['Gamma(1/24)', 'Gamma(5/24)', 'Gamma(7/24)', 'Gamma(11/24)', 'Gamma(1/8)', 'Gamma(1/4)', 'Gamma(1/3)'];

/**
 * The rungs in the order in which they are to be climbed. Each weight first among multiple zeta values, then with
 * alternating sums, then at roots of unity, then with the factors √3, 1/π and √3/π; then units of quadratic fields, gamma
 * values at rationals, and algebraic numbers. Throws InputError for a weight that is none. Bases contain everything of lower weight, so that mixed weights are found.
 */
export function ladderBases(maxWeight: number): readonly PlanBasis[] {
  if (!Number.isInteger(maxWeight) || maxWeight < 0) {
    throw new InputError('bad-weight', 'The largest weight of a ladder must be a whole number from 0 on.');
  }
  const rungs: PlanBasis[] = [{ title: 'rational', basis: ['1'] }];
  const add = (title: string, basis: readonly string[]): void => void rungs.push({ title, basis: [...new Set(basis)] });
  for (let w = 2; w <= Math.min(maxWeight, 12); w++) add(`multiple zeta values, weight ≤ ${w}`, upTo('mzv', w, 'real'));
  for (let w = 1; w <= Math.min(maxWeight, 6); w++) {
    const sums = upTo('alternating', w, 'real');
    add(`alternating sums, weight ≤ ${w}`, sums);
    if (w > 1) add(`π times alternating sums, weight ≤ ${w}`, upTo('alternating', w - 1, 'real', 'pi'));
  }
  for (let w = 1; w <= Math.min(maxWeight, 5); w++) {
    add(`unramified sums at sixth roots of unity, weight ≤ ${w}`, [
      ...upTo('sixth-roots-unramified', w, 'real'),
      ...upTo('sixth-roots-unramified', w, 'imaginary'),
    ]);
  }
  add('quadratic units', [...WEIGHT_ONE, ...ROOTS]);
  if (maxWeight >= 2) add('products of quadratic units', products(WEIGHT_ONE.slice(1), Math.min(2, maxWeight)));
  for (let w = 1; w <= Math.min(maxWeight, 3); w++) {
    for (const [name, times] of [
      ['√3', 'sqrt(3)'],
      ['1/π', '1/pi'],
      ['√3/π', 'sqrt(3)/pi'],
    ] as const) {
      add(`sums at sixth roots of unity with ${name}, weight ≤ ${w}`, [
        ...upTo('sixth-roots', w, 'real'),
        ...upTo('sixth-roots', w, 'imaginary', times),
      ]);
    }
    add(`sums at fourth roots of unity, weight ≤ ${w}`, [
      ...upTo('fourth-roots', w, 'real'),
      ...upTo('fourth-roots', w, 'imaginary'),
    ]);
  }
  rungs.push({
    title: 'product of powers of gamma values',
    basis: [...GAMMAS, 'pi', '2', '3'],
    form: 'multiplicative',
  });
  for (const degree of [4, 12, 30]) rungs.push({ title: `algebraic of degree ≤ ${degree}`, form: 'algebraic', degree });
  return rungs;
}
