import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { besselOperator } from '../../src/constants/integrals/bessel-operator.ts';
import { contains, fromInteger, multiply, overInteger, overlaps, sqrt, timesInteger } from '../../src/number/ball.ts';
import { InputError } from '../../src/number/errors.ts';
import { claim, context, decimalBall, expectSame, real, value } from './sums-support.ts';

const BITS = 400;
const pi = () => context.argument({ kind: 'symbol', name: 'pi' }, BITS) as ReturnType<typeof real>;

const problems = JSON.parse(readFileSync(new URL('../reference/problems-open.json', import.meta.url), 'utf8')) as {
  problems: { id: string; value: string }[];
};
const problem = (id: string): string => problems.problems.find((p) => p.id === id)?.value ?? '';

describe('Bessel moments', () => {
  it('closed forms of Bailey, Borwein, Broadhurst and Glasser (2008)', () => {
    const square = multiply(pi(), pi(), BITS);
    expectSame(real('bessel(0,0,1)', BITS), overInteger(pi(), 2n), 'K0', BITS);
    expectSame(real('bessel(0,0,2)', BITS), overInteger(square, 4n), 'K0^2', BITS);
    expectSame(real('bessel(1,1,3)', BITS), overInteger(square, 16n), 't I0 K0^3', BITS);
    const seven = overInteger(timesInteger(real('MPL(3;1)', BITS), 7n), 8n);
    expectSame(real('bessel(1,0,4)', BITS), seven, 't K0^4', BITS);
    const third = multiply(real('bessel(1,1,2)', BITS), timesInteger(sqrt(fromInteger(3n), BITS), 3n), BITS);
    expectSame(third, pi(), 't I0 K0^2', BITS - 4);
  });

  it.each([
    ['bessel(0,0,3)', '6.9488227810796297894364364454708297577'],
    ['bessel(0,0,4)', '27.241338417805973406709980264557935024'],
    ['bessel(2,1,2)', '0.49846663971898145844616334240727391841'],
    ['bessel(1,2,3)', '0.66034486901867235783726683170599426385'],
    ['bessel(3,1,4)', '0.085937290691768452423841745787646958034'],
  ])('%s (PARI/GP 2.15.2, intnum, 38 digits)', (text, digits) => {
    expect(overlaps(real(text, 160), decimalBall(digits, 160, 100n))).toBe(true);
  });

  it('t K0^3 to 300 digits (test/reference/problems-open.json)', () => {
    expect(overlaps(real('bessel(1,0,3)', 1000), decimalBall(problem('bessel-k0-cubed'), 1010, 4n))).toBe(true);
  });

  it('the operators of two and three factors (Borwein and Salvy 2008)', () => {
    // θ³ − 4t²θ − 4t² and θ⁴ − 10t²θ² − 20t²θ − 12t² + 9t⁴ (multiplied out by hand).
    expect(besselOperator(2)).toEqual([
      [0n, 0n, 0n, 1n],
      [-4n, -4n],
    ]);
    expect(besselOperator(3).map((p) => [...p])).toEqual([[0n, 0n, 0n, 0n, 1n], [-12n, -20n, -10n], [9n]]);
  });

  it('a ball contains the value computed 150 bits higher', () => {
    const moments = fc.constantFrom(
      'bessel(0,0,1)',
      'bessel(2,0,3)',
      'bessel(1,1,3)',
      'bessel(0,1,2)',
      'bessel(4,0,2)',
    );
    fc.assert(
      fc.property(moments, fc.integer({ min: 20, max: 300 }), (text, bits) => {
        const [low, high] = [real(text, bits), real(text, bits + 150)];
        expect(contains(low, { ...high, rad: 0n }), `${text} at ${bits}`).toBe(true);
        expect(low.rad << BigInt(bits) <= 1n << BigInt(low.bits)).toBe(true);
      }),
      { seed: 31, numRuns: 20 },
    );
  });

  it.each([
    ['bessel(1,2,2)', 'divergent'],
    ['bessel(1,2)', 'wrong-arguments'],
    ['bessel(1,5,9)', 'too-heavy'],
  ])('%s is refused as %s', (text, code) => expectRefused(text, code));
});

describe('log-sine integrals', () => {
  // mpmath 1.2.1, quad at 30 digits.
  it.each([
    ['Ls(2,pi/3)', '1.01494160640965362502120255427'],
    ['Ls(3,2*pi/3)', '-2.14476721256949439148264211222'],
    ['Ls(4,1,pi/3)', '-0.255548541292907628552389761683'],
    ['Ls(5,2,3*pi/2)', '-11.637257008366091860441369346'],
    ['Ls(3,2,pi/2)', '-1.2919281950124925073115131278'],
    ['Ls(4,pi/6)', '5.98019090083318270145130643888'],
  ])('%s', (text, digits) => {
    expect(overlaps(real(text, 140), decimalBall(digits, 140, 200n))).toBe(true);
  });

  it('closed forms: Ls(3,π) = −π³/12 (Lewin), Ls(4,π/3) to 300 digits (test/reference/problems-open.json)', () => {
    const cube = multiply(multiply(pi(), pi(), BITS), pi(), BITS);
    expectSame(real('Ls(3,pi)', BITS), overInteger(timesInteger(cube, -1n), 12n), 'Ls(3,pi)', BITS);
    expectSame(real('Ls(3,2*pi)', BITS), overInteger(timesInteger(cube, -1n), 6n), 'Ls(3,2*pi)', BITS);
    expectSame(real('Ls(1,pi)', BITS), timesInteger(pi(), -1n), 'Ls(1,pi)', BITS);
    expect(overlaps(real('Ls(4,pi/3)', 1000), decimalBall(problem('log-sine-4-third'), 1010, 4n))).toBe(true);
  });

  it.each([
    ['Ls(4,pi/5)', 'bad-angle'],
    ['Ls(3,-pi)', 'bad-angle'],
    ['Ls(3,5,pi)', 'bad-index'],
    ['Ls(3)', 'wrong-arguments'],
  ])('%s is refused as %s', (text, code) => expectRefused(text, code));

  it('texts parse back', () => {
    for (const text of ['Ls(3,2*pi/3)', 'Ls(4,1,pi/3)', 'Ls(3,pi)', 'bessel(1,2,3)']) {
      const { family, args } = claim(text);
      expect(family.text(args)).toBe(text);
    }
  });
});

function expectRefused(text: string, code: string): void {
  let caught: unknown;
  try {
    value(text, 60);
  } catch (error) {
    caught = error;
  }
  expect(caught).toBeInstanceOf(InputError);
  expect((caught as InputError).code).toBe(code);
}
