/**
 * Spaces of multiple polylogarithms at 4th and 6th roots of unity. Their elements are real numbers that occur as real
 * parts or as imaginary parts; π counts as imaginary (it comes from log(−1)).
 *
 * The generators follow Deligne's rule: the words s that are reversed Lyndon words, at the arguments (x, 1, …, 1), and of
 * each sum the real part when weight − depth is even, the imaginary part when it is odd (the other part is a product of
 * lower ones). Depth 1 is written by the classical constants of which it is a rational multiple.
 */
import { lyndonWords } from './lyndon.ts';
import { fibonacci, makeSpace } from './products.ts';
import type { Generator, Parity, Space } from './space.ts';

const pi: Generator = { text: 'pi', weight: 1, parity: 'imaginary' };
const generator = (text: string, weight: number, parity: Parity): Generator => ({ text, weight, parity });

function deligneGenerators(
  maxWeight: number,
  letters: (letter: number) => boolean,
  point: string,
  depthOne: (weight: number) => string,
): readonly Generator[] {
  const weights = Array.from({ length: maxWeight }, (_, k) => k + 1);
  return weights.flatMap((weight) =>
    lyndonWords(weight, letters).map((word) => {
      const even = (weight - word.length) % 2 === 0;
      const parity = even ? 'real' : 'imaginary';
      if (word.length === 1) return generator(depthOne(weight), weight, parity);
      const points = [point, ...word.slice(1).map(() => '1')];
      const sum = `MPL(${[...word].reverse().join(',')};${points.join(',')})`;
      return generator(even ? `re(${sum})` : `im(${sum})`, weight, parity);
    }),
  );
}

export const fourthRootSpace: Space = makeSpace({
  key: 'fourth-roots',
  title: 'Sums at 4th roots of unity',
  alphabet: '0, 1, −1, i, −i',
  maxWeight: 6,
  dimension: (weight) => 2 ** weight,
  dimensionFormula: '2^w',
  status: 'spanning proven, independence conjectured',
  source:
    'Dimensions, upper bound and the Lyndon rule: Deligne, Publ. Math. IHÉS 112 (2010) 101; Deligne and Goncharov, Ann. Sci. ENS 38 (2005) 1.',
  generators: [
    pi,
    ...deligneGenerators(
      6,
      () => true,
      'i',
      (weight) => {
        if (weight === 1) return 'log(2)';
        if (weight === 2) return 'catalan';
        return weight % 2 === 1 ? `zeta(${weight})` : `beta(${weight})`;
      },
    ),
  ],
});

export const unramifiedSixthRootSpace: Space = makeSpace({
  key: 'sixth-roots-unramified',
  title: 'Sums at 6th roots of unity, unramified',
  alphabet: '0, 1, e^{iπ/3}',
  maxWeight: 8,
  dimension: (weight) => fibonacci(weight + 1),
  dimensionFormula: 'F_{w+1}\\ (\\text{Fibonacci},\\ F_1 = F_2 = 1)',
  status: 'spanning proven, independence conjectured',
  source:
    'Dimensions and upper bound: Deligne, Publ. Math. IHÉS 112 (2010) 101. Its use for Feynman integrals: Broadhurst, Eur. Phys. J. C 8 (1999) 311.',
  generators: [
    pi,
    ...deligneGenerators(
      8,
      (letter) => letter >= 2,
      'r6',
      (weight) => (weight % 2 === 1 ? `zeta(${weight})` : `Cl(${weight},pi/3)`),
    ),
  ],
});

export const fullSixthRootSpace: Space = makeSpace({
  key: 'sixth-roots',
  title: 'Sums at 6th roots of unity',
  alphabet: '0 and all six roots of unity',
  maxWeight: 4,
  dimension: (weight) => fibonacci(2 * weight + 2),
  dimensionFormula: 'F_{2w+2}\\ (\\text{Fibonacci},\\ F_1 = F_2 = 1)',
  status: 'spanning proven, independence conjectured',
  source:
    'Dimensions: Broadhurst, Eur. Phys. J. C 8 (1999) 311; upper bound: Deligne, Publ. Math. IHÉS 112 (2010) 101. The generators were chosen and checked numerically here.',
  generators: [
    pi,
    generator('log(2)', 1, 'real'),
    generator('log(3)', 1, 'real'),
    generator('Cl(2,pi/3)', 2, 'imaginary'),
    generator('Li(2,1/4)', 2, 'real'),
    generator('zeta(3)', 3, 'real'),
    generator('Li(3,1/4)', 3, 'real'),
    generator('Li(3,1/3)', 3, 'real'),
    generator('im(Li(3,(1+i*sqrt(3))/4))', 3, 'imaginary'),
    generator('im(Li(3,i/sqrt(3)))', 3, 'imaginary'),
    generator('Li(4,1/2)', 4, 'real'),
    generator('Li(4,1/3)', 4, 'real'),
    generator('Li(4,-1/3)', 4, 'real'),
    generator('Li(4,1/4)', 4, 'real'),
    generator('Li(4,2/3)', 4, 'real'),
    generator('Cl(4,pi/3)', 4, 'imaginary'),
    generator('im(Li(4,(1+i*sqrt(3))/4))', 4, 'imaginary'),
    generator('im(Li(4,i/sqrt(3)))', 4, 'imaginary'),
    generator('im(MPL(2,1,1;r6,r3,1))', 4, 'imaginary'),
    generator('im(MPL(2,1,1;1,r6,r3))', 4, 'imaginary'),
  ],
});
