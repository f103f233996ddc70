import { describe, expect, it } from 'vitest';
import { sumFamilies } from '../../src/constants/sums/index.ts';
import { type Ball, overlaps } from '../../src/number/ball.ts';
import { toComplex } from '../../src/number/complex.ts';
import { InputError } from '../../src/number/errors.ts';
import { claim, context, decimalBall, readCall, real, referenceConstants, value } from './sums-support.ts';

const BITS = 3330;

function agrees(ball: Ball, digits: string): void {
  expect(ball.rad <= 1n << BigInt(ball.bits - BITS)).toBe(true);
  expect(overlaps(ball, decimalBall(digits, BITS + 10))).toBe(true);
}

describe('nested sums against 1,000 digits from PARI/GP 2.15.2 (test/reference/constants.json)', () => {
  for (const { id, family, digits } of referenceConstants('mzv', 'alternating', 'sixth-root', 'central-binomial')) {
    it(`${family}: ${id}`, () => {
      const part = /^(re|im)\((.*)\)$/.exec(id);
      const binomial = /^sum 1\/\(n\^(\d+) binomial\(2n,n\)\)$/.exec(id);
      if (part !== null) agrees(toComplex(value(part[2] as string, BITS))[part[1] as 're' | 'im'], digits);
      else agrees(real(binomial === null ? id : `binsum(${binomial[1]})`, BITS), digits);
    });
  }

  it('orders 8 and 12 (PARI/GP 2.15.2, polylogmult, 38 digits)', () => {
    const known: readonly (readonly [string, string, string])[] = [
      ['MPL(2,1;r8,1)', '-0.22391706758694607161864573311416474738', '0.25507165205506532252964175650251679493'],
      ['MPL(2,1;r12,1)', '-0.076698429154051071192420423285331160857', '0.42966345361127129773310004089144015871'],
      [
        'MPL(3,1,1;r12,r12^5,i)',
        '-0.014448379299246996849275869972106722845',
        '0.015063526741186503247466199438696312852',
      ],
      ['MPL(1,2;r8,r8^3)', '-0.026380383659372082306016312885707959204', '-0.55989798007542519099559970217043868703'],
      [
        'MPL(2,1;r12^5,r12^7)',
        '-0.23239936019454070220395576481248650255',
        '0.090012657363863747558215548469386858723',
      ],
    ];
    for (const [text, re, im] of known) {
      const got = toComplex(value(text, 200));
      // The last two printed digits of PARI/GP may be off by some.
      expect(overlaps(got.re, decimalBall(re, 200, 100n)), text).toBe(true);
      expect(overlaps(got.im, decimalBall(im, 200, 100n)), text).toBe(true);
    }
  });
});

describe('claims and refusals', () => {
  it('canonical texts parse back', () => {
    for (const family of sumFamilies) {
      for (const text of family.examples) {
        const found = claim(text);
        expect(found.family.key).toBe(family.key);
        expect(found.family.text(found.args)).toBe(text);
      }
    }
    const { family, args } = claim('MPL(2,1;r6^1,r6^0)');
    expect(family.text(args)).toBe('MPL(2,1;r6,1)');
    expect(family.text(claim('MPL(2,1;r6^3,-r6)').args)).toBe('MPL(2,1;-1,r3^2)');
  });

  it('leaves single ζ values to others', () => {
    for (const family of sumFamilies) {
      if (family.names.includes('zeta')) expect(family.parse(readCall('zeta(3)'))).toBe(null);
    }
  });

  it.each([
    ['zeta(1,2)', 'divergent'],
    ['zeta(1,-2)', 'divergent'],
    ['MPL(1,2;1,r6)', 'divergent'],
    ['zeta(3,0)', 'zero-index'],
    ['zeta(60,5)', 'too-heavy'],
    ['MPL(2,1;r6)', 'wrong-arguments'],
    ['MPL(2,-1;r6,1)', 'bad-index'],
    ['MPL(2,1;r8,r3)', 'unsupported-roots'],
    ['binsum(0)', 'zero-index'],
  ])('%s is refused as %s', (text, code) => {
    let caught: unknown;
    try {
      claim(text);
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(InputError);
    expect((caught as InputError).code).toBe(code);
  });

  it('typesets', () => {
    const latex = (text: string): string => {
      const { family, args } = claim(text);
      return family.latex(args);
    };
    expect(latex('zeta(5,3)')).toBe('\\zeta(5,3)');
    expect(latex('zeta(-5,1)')).toBe('\\zeta(\\bar{5},1)');
    expect(latex('MPL(2,1;r6,1)')).toBe('\\mathrm{Li}_{2,1}(e^{i\\pi/3},1)');
    expect(latex('MPL(2,1;r3^2,i)')).toBe('\\mathrm{Li}_{2,1}(e^{-2i\\pi/3},i)');
    expect(latex('binsum(2)')).toBe('\\sum_{n\\ge1}\\frac{1}{n^{2}\\binom{2n}{n}}');
  });
});

describe('long passes', () => {
  const texts = [
    'zeta(5,3)',
    'MPL(2,1;r6,1)',
    'MPL(2,1;r8,1)',
    'G(0,sqrt(2),-1;1)',
    'binsum(3)',
    'bessel(1,0,3)',
    'Ls(4,pi/3)',
  ];

  it.each(texts)('%s hears a cancel and reports how far it is', (text) => {
    const { family, args } = claim(text);
    const fractions: number[] = [];
    family.evaluate(args, 800, { ...context, onProgress: (fraction) => fractions.push(fraction) });
    expect(fractions.length).toBeGreaterThan(2);
    for (const fraction of fractions) expect(fraction >= 0 && fraction <= 1).toBe(true);
    const controller = new AbortController();
    controller.abort(new Error('stopped'));
    expect(() => family.evaluate(args, 800, { ...context, signal: controller.signal })).toThrow('stopped');
  });
});
