import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Letters } from '../../src/constants/sums/general-size.ts';
import { evaluateWordsOnPath } from '../../src/constants/sums/path.ts';
import { contains, fromInteger, fromRational, overInteger, overlaps } from '../../src/number/ball.ts';
import { add, isComplex, multiply, subtract, toComplex, type Value } from '../../src/number/complex.ts';
import { InputError } from '../../src/number/errors.ts';
import { claim, context, decimalBall, expectSame, value } from './sums-support.ts';

describe('harmonic polylogarithms, G and MPL', () => {
  // PARI/GP 2.15.2, 38 digits: polylogmult (with arguments x_j = a_{j−1}/a_j), polylog, and intnum where marked.
  it.each([
    ['H(0,1,-1;1/2)', '0.073940786239791930104163441765046785306', '0'],
    ['H(2,-1;1/2)', '0.073940786239791930104163441765046785306', '0'],
    ['H(1,0,1;1/3)', '0.076833528121994876208452559660316923243', '0'],
    ['H(1,0;1/2)', '-1.0626935403832139305697588464863450805', '0'],
    ['H(-1,0,0;1/2)', '0.88081835452566462057185451002230179014', '0'], // intnum
    ['H(0,1;999/1000)', '1.6370226052761177426957986049795006117', '0'],
    ['G(0,2,3;1)', '0.059911064727742273794893486420222443749', '0'],
    ['G(0,sqrt(2),-1;1)', '-0.22476470827746474696486313158626023523', '0'],
    ['G(0,1,r6;1/2)', '0.034107268345369329850202836113080021333', '-0.079244893576876123116870601893162502804'],
    ['G(0,r6,1;1)', '0', '-0.38279353926296074290711500082841228645'],
    ['G(1+i,0;1/2+i/3)', '0.65313743241655358866299678213305421589', '-0.49084568445931450678116006587270088476'], // intnum
    ['G(i/2,1/3-i;1)', '0.38233815986930841798327651558762443293', '-0.44756431060024322499522963250266759909'], // intnum
    ['MPL(2,1;1/2,r6)', '0.034107268345369329850202836113080021333', '0.079244893576876123116870601893162502804'],
    ['MPL(2,1;1/3,-1/2)', '-0.015840227355563571086651563227036252333', '0'],
    ['MPL(3,1;1/3,-1)', '-0.014760798863737109761773892548342442892', '0'],
    ['MPL(2,1;1/2,i)', '-0.0094229747572129248529586194656748397957', '0.080416128021444874826251777152767015431'],
  ])('%s', (text, re, im) => {
    const got = toComplex(value(text, 200));
    expect(overlaps(got.re, decimalBall(re, 200, 100n)) || re === '0').toBe(true);
    if (im === '0') expect(got.im.mid === 0n || text.startsWith('G(0,r6')).toBe(true);
    else expect(overlaps(got.im, decimalBall(im, 200, 100n))).toBe(true);
  });

  it('canonical texts parse back to the same constant', () => {
    for (const text of [
      'H(0,1,-1;1/2)',
      'G(1+i,0;1/2+1/3*i)',
      'G(0,sqrt(2),-1;1)',
      'MPL(2,1;1/2,i)',
      'G(r6^2,1;-1/2)',
    ]) {
      const first = claim(text);
      const again = claim(first.family.text(first.args));
      expect(again.family.text(again.args)).toBe(first.family.text(first.args));
      expect(again.family.key).toBe(first.family.key);
      expectSame(
        first.family.evaluate(first.args, 80, context),
        again.family.evaluate(again.args, 80, context),
        text,
        80,
      );
    }
  });

  it.each([
    ['H(1,0;1)', 'divergent'],
    ['H(0,1;2)', 'on-path'],
    ['G(0,1/2;1)', 'on-path'],
    ['G(0,sqrt(2)/2;1)', 'on-path'],
    ['G(0,1;0)', 'zero-end'],
    ['H(0,1)', 'wrong-arguments'],
    ['H(0,1/2;1/3)', 'bad-index'],
    ['MPL(2,1;2,1)', 'divergent'],
    ['MPL(2,1;1/2,0)', 'zero-argument'],
    ['MPL(2,1;sqrt(2),1)', 'divergent'],
    ['MPL(2,1;1+i/2,1)', 'divergent'],
    ['G(sqrt(4),1/3-i;2)', 'undecided'],
    ['G(3,2-sqrt(4);2)', 'undecided'],
  ])('%s is refused as %s', (text, code) => {
    let caught: unknown;
    try {
      value(text, 60);
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(InputError);
    expect((caught as InputError).code).toBe(code);
  });

  it('shuffle products, trailing zeros included', () => {
    const bits = 150;
    for (const end of ['1/2', 'i/2', '1/3+i/4']) {
      for (const [a, b] of [
        ['0', '1'],
        ['1', '-1'],
        ['0', '0'],
        ['2', 'r6'],
      ] as const) {
        const product = multiply(value(`G(${a};${end})`, bits), value(`G(${b};${end})`, bits), bits);
        const sum = add(value(`G(${a},${b};${end})`, bits), value(`G(${b},${a};${end})`, bits));
        expectSame(sum, product, `${a} ${b} ${end}`, bits - 4);
      }
    }
  });

  it('power series: an independent route for words with letters outside the unit disc', () => {
    const bits = 160;
    const letter = fc.record({
      p: fc.integer({ min: 11, max: 40 }),
      q: fc.integer({ min: 3, max: 8 }),
      minus: fc.boolean(),
    });
    fc.assert(
      fc.property(
        fc.array(letter, { minLength: 1, maxLength: 3 }),
        fc.array(fc.integer({ min: 0, max: 2 }), { minLength: 3, maxLength: 3 }),
        (list, zeros) => {
          const points = list.map(({ p, q, minus }) => ({ p: BigInt(minus ? -p : p), q: BigInt(q) }));
          const letters: Letters = {
            values: (b) => points.map(({ p, q }) => fromRational(p, q, b + 4)),
            exact: list.map(() => null),
          };
          const word = points.map((_, k) => '0'.repeat(zeros[k] as number) + String.fromCharCode(50 + k)).join('');
          const exact: Letters = { ...letters, exact: points };
          const [general] = evaluateWordsOnPath([word], letters, bits, context);
          const [small] = evaluateWordsOnPath([word], exact, bits, context);
          if (general === undefined || small === undefined) throw new Error('values expected');
          expectSame(general, small, word, bits);
          expectSame(general, series(points, zeros, bits), word, bits - 8);
        },
      ),
      { seed: 21, numRuns: 25 },
    );
  });

  it('a ball contains the value computed 200 bits higher', () => {
    const texts = [
      'H(0,1,-1;1/2)',
      'H(1,1,0;9/10)',
      'G(0,1,r6;1/2)',
      'G(1+i,2;1)',
      'G(i/5,3;1)',
      'MPL(2,1;1/2,r6)',
      'G(r12,1;1)',
    ];
    fc.assert(
      fc.property(fc.constantFrom(...texts), fc.integer({ min: 20, max: 500 }), (text, bits) => {
        const low = toComplex(value(text, bits));
        const high = toComplex(value(text, bits + 200));
        for (const part of ['re', 'im'] as const) {
          expect(contains(low[part], { ...high[part], rad: 0n }), `${text} at ${bits}`).toBe(true);
          expect(low[part].rad << BigInt(bits) <= 1n << BigInt(low[part].bits)).toBe(true);
        }
      }),
      { seed: 22, numRuns: 25 },
    );
  });

  it('real functions are real balls', () => {
    expect(isComplex(value('H(0,1,-1;1/2)', 60))).toBe(false);
    expect(isComplex(value('G(0,sqrt(2),-1;1)', 60))).toBe(false);
    expect(isComplex(value('H(0,1;i)', 60))).toBe(true);
    expectSame(subtract(value('H(0;1/2)', 90), value('zeta(-1)', 90)), fromInteger(0n), 'log(1/2)', 80);
  });
});

/** Σ over n₁ > … > n_d of Π a_j^{−(n_j − n_{j+1})} / n_j^{s_j}, cut where the terms are below 2^−bits. */
function series(points: readonly { p: bigint; q: bigint }[], zeros: readonly number[], bits: number): Value {
  const work = bits + 40;
  const steps = Math.ceil(work / Math.log2(11 / 8)) + 50;
  // inner[j] = Σ_{n_j = n} … as it stands before n grows; the terms are exact up to truncation.
  let inner: bigint[] = [];
  const sums = points.map(() => 0n);
  const partial = points.map(() => 0n);
  for (let n = 1; n <= steps; n++) {
    for (let j = 0; j < points.length; j++) {
      const { p, q } = points[j] as { p: bigint; q: bigint };
      // partial_j(n) = Σ_{m < n} a_j^{−(n−m)} c_{j+1}(m), c_d+1(0) = 1.
      const below = j === points.length - 1 ? (n === 1 ? 1n << BigInt(work) : 0n) : (inner[j + 1] ?? 0n);
      partial[j] = (((partial[j] as bigint) + below) * q) / p;
    }
    inner = points.map((_, j) => (partial[j] as bigint) / BigInt(n) ** BigInt((zeros[j] as number) + 1));
    sums[0] = (sums[0] as bigint) + (inner[0] as bigint);
  }
  return overInteger({ mid: sums[0] as bigint, rad: 1n << 30n, bits: work }, 1n);
}
