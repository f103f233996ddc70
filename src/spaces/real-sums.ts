/** The spaces of multiple zeta values and of alternating sums: real elements only. */
import { fibonacci, makeSpace, spaceOfElements } from './products.ts';
import type { Generator, Space } from './space.ts';

const real = (text: string, weight: number): Generator => ({ text, weight, parity: 'real' });
const piSquared: Generator = { text: 'pi', weight: 2, parity: 'real', step: 2 };

/** d(w) = d(w−2) + d(w−3) with d(0) = 1, d(1) = 0, d(2) = 1. */
function zagierDimension(weight: number): number {
  const d = [1, 0, 1];
  for (let w = 3; w <= weight; w++) d.push((d[w - 2] as number) + (d[w - 3] as number));
  return d[weight] as number;
}

export const multipleZetaSpace: Space = makeSpace({
  key: 'mzv',
  title: 'Multiple zeta values',
  alphabet: '0, 1',
  maxWeight: 12,
  dimension: zagierDimension,
  dimensionFormula: 'd_w = d_{w-2} + d_{w-3},\\quad d_0 = d_2 = 1,\\ d_1 = 0',
  status: 'spanning proven, independence conjectured',
  source:
    'Dimensions: Zagier, First European Congress of Mathematics II (1994) 497. Upper bound: Brown, Ann. of Math. 175 (2012) 949; Terasoma, Invent. Math. 149 (2002) 339. Generators: Blümlein, Broadhurst and Vermaseren, Comput. Phys. Commun. 181 (2010) 582.',
  generators: [
    piSquared,
    real('zeta(3)', 3),
    real('zeta(5)', 5),
    real('zeta(7)', 7),
    real('zeta(5,3)', 8),
    real('zeta(9)', 9),
    real('zeta(7,3)', 10),
    real('zeta(11)', 11),
    real('zeta(5,3,3)', 11),
    real('zeta(9,3)', 12),
    real('zeta(6,4,1,1)', 12),
  ],
});

/** The index lists of 2s and 3s with this sum, lexicographically. */
export function hoffmanIndices(weight: number): readonly (readonly number[])[] {
  if (weight === 0) return [[]];
  return [2, 3].filter((s) => s <= weight).flatMap((s) => hoffmanIndices(weight - s).map((rest) => [s, ...rest]));
}

export const hoffmanSpace: Space = spaceOfElements(
  {
    key: 'mzv-hoffman',
    title: 'Multiple zeta values, indices 2 and 3',
    alphabet: '0, 1',
    maxWeight: 12,
    dimension: zagierDimension,
    dimensionFormula: 'd_w = d_{w-2} + d_{w-3},\\quad d_0 = d_2 = 1,\\ d_1 = 0',
    status: 'spanning proven, independence conjectured',
    source: 'Hoffman, J. Algebra 194 (1997) 477; spanning: Brown, Ann. of Math. 175 (2012) 949.',
    generators: [],
  },
  (weight) =>
    hoffmanIndices(weight).map((indices) => ({
      text: indices.length === 0 ? '1' : `zeta(${indices.join(',')})`,
      parity: 'real',
    })),
);

const alternatingGenerators: readonly Generator[] = [
  piSquared,
  real('log(2)', 1),
  real('zeta(3)', 3),
  real('Li(4,1/2)', 4),
  real('zeta(5)', 5),
  real('Li(5,1/2)', 5),
  real('zeta(-5,-1)', 6),
  real('Li(6,1/2)', 6),
  real('zeta(7)', 7),
  real('zeta(-5,1,1)', 7),
  real('zeta(-3,-3,1)', 7),
  real('Li(7,1/2)', 7),
  real('zeta(5,3)', 8),
  real('zeta(-7,-1)', 8),
  real('zeta(-5,1,1,1)', 8),
  real('zeta(-3,3,1,1)', 8),
  real('Li(8,1/2)', 8),
];

export const alternatingSpace: Space = makeSpace({
  key: 'alternating',
  title: 'Alternating sums',
  alphabet: '0, 1, −1',
  maxWeight: 8,
  dimension: (weight) => fibonacci(weight + 1),
  dimensionFormula: 'F_{w+1}\\ (\\text{Fibonacci},\\ F_1 = F_2 = 1)',
  status: 'spanning proven, independence conjectured',
  source:
    'Dimensions and numbers of generators: Broadhurst, hep-th/9604128. Upper bound: Deligne, Publ. Math. IHÉS 112 (2010) 101. The generators keep those of the multiple zeta values, take the polylogarithms at 1/2, and otherwise the words that keep coefficients small; that they suffice and are independent was checked here by the coaction (src/spaces/reduction).',
  generators: alternatingGenerators,
});

/** The same elements as `alternating` up to weight 5, where single polylogarithms still suffice. */
export const polylogHalfSpace: Space = makeSpace({
  key: 'polylog-half',
  title: 'ζ values, log 2 and polylogarithms at 1/2',
  alphabet: '0, 1, −1',
  maxWeight: 5,
  dimension: (weight) => fibonacci(weight + 1),
  dimensionFormula: 'F_{w+1}\\ (\\text{Fibonacci},\\ F_1 = F_2 = 1)',
  status: 'spanning proven, independence conjectured',
  source: 'Alternating sums up to weight 5: Broadhurst, hep-th/9604128; Deligne, Publ. Math. IHÉS 112 (2010) 101.',
  generators: alternatingGenerators.filter((generator) => generator.weight <= 5),
});
