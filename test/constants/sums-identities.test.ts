/** Nested sums against identities that their computation does not use. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { REAL_STEP, tailsSize } from '../../src/constants/sums/double-tails.ts';
import type { Letters } from '../../src/constants/sums/general-size.ts';
import { evaluateInPieces } from '../../src/constants/sums/path.ts';
import { planWords } from '../../src/constants/sums/plan.ts';
import { realTails } from '../../src/constants/sums/real-tails.ts';
import { evaluateRootSums, type RootSum } from '../../src/constants/sums/root-words.ts';
import { codeOf, letterOf, wordAtRoots } from '../../src/constants/sums/words.ts';
import { contains, fromInteger, negate, overlaps, sqrt, timesPowerOfTwo } from '../../src/number/ball.ts';
import { add, type ComplexBall, multiply, subtract, toComplex, type Value } from '../../src/number/complex.ts';
import { context, expectSame } from './sums-support.ts';

const BITS = 300;
const evaluate = (sums: readonly RootSum[], bits = BITS): Value[] => evaluateRootSums(sums, bits, context);
const total = (values: readonly Value[]): Value => values.reduce((a, b) => add(a, b), fromInteger(0n));

const order = fc.constantFrom(1, 2, 3, 4, 6, 8, 12);
const index = fc.integer({ min: 1, max: 4 });
/** Convergent sums of one order. */
const sums = (m: number, depth: number): fc.Arbitrary<RootSum> =>
  fc
    .record({
      indices: fc.array(index, { minLength: 1, maxLength: depth }),
      exponents: fc.array(fc.integer({ min: 0, max: m - 1 }), { minLength: depth, maxLength: depth }),
    })
    .map(({ indices, exponents }) => ({ indices, exponents: exponents.slice(0, indices.length), order: m }))
    .filter(({ indices, exponents }) => indices[0] !== 1 || exponents[0] !== 0);

/** All quasi-shuffles of two index lists with their arguments. */
function stuffle(a: RootSum, b: RootSum): RootSum[] {
  const m = a.order;
  const go = (i: number, j: number, s: number[], e: number[]): RootSum[] => {
    if (i === a.indices.length && j === b.indices.length) return [{ indices: s, exponents: e, order: m }];
    const [sa, ea] = [a.indices[i] as number, a.exponents[i] as number];
    const [sb, eb] = [b.indices[j] as number, b.exponents[j] as number];
    return [
      ...(i < a.indices.length ? go(i + 1, j, [...s, sa], [...e, ea]) : []),
      ...(j < b.indices.length ? go(i, j + 1, [...s, sb], [...e, eb]) : []),
      ...(i < a.indices.length && j < b.indices.length ? go(i + 1, j + 1, [...s, sa + sb], [...e, (ea + eb) % m]) : []),
    ];
  };
  return go(0, 0, [], []);
}

/** Sum as a word of [zeros before it, exponent of the letter] turned into letters; −1 is the letter 0. */
function toLetters({ indices, exponents, order: m }: RootSum): number[] {
  let a = 0;
  return indices.flatMap((s, k) => {
    a = (a + m - (exponents[k] as number)) % m;
    return [...Array<number>(s - 1).fill(-1), a];
  });
}

function fromLetters(letters: readonly number[], m: number): RootSum {
  const indices: number[] = [];
  const exponents: number[] = [];
  let zeros = 0;
  let before = 0;
  for (const letter of letters) {
    if (letter < 0) zeros++;
    else {
      indices.push(zeros + 1);
      exponents.push((before + m - letter) % m);
      before = letter;
      zeros = 0;
    }
  }
  return { indices, exponents, order: m };
}

function shuffle(a: readonly number[], b: readonly number[]): number[][] {
  if (a.length === 0) return [[...b]];
  if (b.length === 0) return [[...a]];
  return [
    ...shuffle(a.slice(1), b).map((w) => [a[0] as number, ...w]),
    ...shuffle(a, b.slice(1)).map((w) => [b[0] as number, ...w]),
  ];
}

/** The letters e^{2πi·e/order} from √3 and 1/2, for orders that divide 4 or 6. */
function rootLetters(list: readonly (readonly [number, number])[]): Letters {
  const zero = fromInteger(0n);
  const half = timesPowerOfTwo(fromInteger(1n), -1);
  return {
    exact: list.map(() => null),
    values: (bits) => {
      const high = timesPowerOfTwo(sqrt(fromInteger(3n), bits + 4), -1);
      const one = fromInteger(1n);
      const quarter: ComplexBall[] = [
        { re: one, im: zero },
        { re: high, im: half },
        { re: half, im: high },
      ];
      return list.map(([exponent, m]) => {
        const twelfths = (12 * exponent) / m;
        const { re, im } = quarter[twelfths % 3] as ComplexBall;
        const turns = Math.floor(twelfths / 3) % 4;
        if (turns === 0) return { re, im };
        if (turns === 1) return { re: negate(im), im: re };
        return turns === 2 ? { re: negate(re), im: negate(im) } : { re: im, im: negate(re) };
      });
    },
  };
}

describe('identities', () => {
  const pair = order.chain((m) => fc.tuple(sums(m, 2), sums(m, 2)));

  it('quasi-shuffle product of the sums', () => {
    fc.assert(
      fc.property(pair, ([a, b]) => {
        const [x, y, ...rest] = evaluate([a, b, ...stuffle(a, b)]) as [Value, Value, ...Value[]];
        expectSame(multiply(x, y, BITS), total(rest), JSON.stringify([a, b]), BITS - 8);
      }),
      { seed: 11, numRuns: 40 },
    );
  });

  it('shuffle product of the integrals', () => {
    const light = pair.filter(([a, b]) => toLetters(a).length + toLetters(b).length <= 8);
    fc.assert(
      fc.property(light, ([a, b]) => {
        const words = shuffle(toLetters(a), toLetters(b)).map((w) => fromLetters(w, a.order));
        const [x, y, ...rest] = evaluate([a, b, ...words]) as [Value, Value, ...Value[]];
        expectSame(multiply(x, y, BITS), total(rest), JSON.stringify([a, b]), BITS - 10);
      }),
      { seed: 12, numRuns: 25 },
    );
  });

  it('duality, with a pass that does not know it', () => {
    const words = ['00001001', '0101', '001011', '0010110011', '000111', '0001000101'];
    const duals = words.map((w) =>
      [...w]
        .reverse()
        .map((c) => (c === '0' ? '1' : '0'))
        .join(''),
    );
    const plan = planWords([...words, ...duals]);
    const size = tailsSize(BITS, plan.length, REAL_STEP);
    const values = realTails(plan, size, context);
    words.forEach((w, k) => {
      const mid = (j: number): bigint => values[plan.answers[j]?.core as number] as bigint;
      const gap = mid(k) - mid(words.length + k);
      expect(gap <= 2n * size.radius && gap >= -2n * size.radius, w).toBe(true);
    });
  });

  it('path composition: the integrals cut in two and more pieces', () => {
    const bits = 200;
    const light = fc.constantFrom(2, 3, 4, 6).chain((m) => sums(m, 3));
    fc.assert(
      fc.property(
        light.filter((a) => toLetters(a).length <= 6),
        (a) => {
          const word = wordAtRoots(a.indices, a.exponents, a.order);
          const used = [...new Set(word)].filter((c) => c !== '0' && c !== '1');
          const letters = rootLetters(used.map((c) => [codeOf(c) - 1, a.order]));
          const renamed = [...word].map((c) => (used.includes(c) ? letterOf(2 + used.indexOf(c)) : c)).join('');
          const [cut] = evaluateInPieces([renamed], letters, bits, context);
          const [whole] = evaluate([a], bits);
          expectSame(cut as Value, whole as Value, JSON.stringify(a), bits);
        },
      ),
      { seed: 15, numRuns: 25 },
    );
  });

  it('sum theorem: the values of one weight and depth add up to ζ(weight) (Granville 1997; Zagier)', () => {
    const compositions = (w: number, d: number): number[][] =>
      d === 1
        ? [[w]]
        : Array.from({ length: w - d + 1 }, (_, k) => k + 1).flatMap((s) =>
            compositions(w - s, d - 1).map((c) => [s, ...c]),
          );
    for (const [weight, depth] of [
      [6, 2],
      [7, 3],
      [9, 4],
    ] as const) {
      const list = compositions(weight, depth).filter((c) => (c[0] as number) > 1);
      const zeros = (n: number): number[] => Array<number>(n).fill(0);
      const [z, ...rest] = evaluate([
        { indices: [weight], exponents: [0], order: 1 },
        ...list.map((indices) => ({ indices, exponents: zeros(depth), order: 1 })),
      ]) as [Value, ...Value[]];
      expectSame(z, total(rest), `${weight}, ${depth}`, BITS - 8);
    }
  });

  it('distribution: summing over all m-th roots of the arguments', () => {
    for (const [indices, m, points] of [
      [[2, 1], 2, [0, 0]],
      [[3, 2], 2, [1, 0]],
      [[2, 2], 3, [0, 1]],
      [[2, 1], 4, [0, 0]],
    ] as const) {
      // Σ over y_j^m = x_j of Li(y) = m^(depth − weight) Li(x), at x_j = e^{2πi·points_j/2}.
      const big = 2 * m;
      const all: RootSum[] = [];
      for (let a = 0; a < m; a++) {
        for (let b = 0; b < m; b++) {
          all.push({ indices, exponents: [points[0] + 2 * a, points[1] + 2 * b].map((e) => e % big), order: big });
        }
      }
      const [x, ...rest] = evaluate([{ indices, exponents: points, order: 2 }, ...all]) as [Value, ...Value[]];
      const weight = indices[0] + indices[1];
      const scaled = multiply(total(rest), fromInteger(BigInt(m) ** BigInt(weight - 2)), BITS);
      expectSame(x, scaled, JSON.stringify([indices, m]), BITS - 16);
    }
  });

  it('conjugate arguments give conjugate values, and reducible orders the same value', () => {
    fc.assert(
      fc.property(
        order.chain((m) => sums(m, 3)),
        (a) => {
          const conjugate = { ...a, exponents: a.exponents.map((e) => (a.order - e) % a.order) };
          const doubled = a.order <= 6 ? { ...a, exponents: a.exponents.map((e) => 2 * e), order: 2 * a.order } : a;
          const [x, y, z] = evaluate([a, conjugate, doubled]).map(toComplex);
          if (x === undefined || y === undefined || z === undefined) throw new Error('three values expected');
          expect(overlaps(x.re, y.re)).toBe(true);
          expect(overlaps(x.im, { ...y.im, mid: -y.im.mid })).toBe(true);
          expectSame(x, z, 'reducible', BITS);
        },
      ),
      { seed: 13, numRuns: 20 },
    );
  });

  it('a ball contains the value computed 200 bits higher, and is as small as promised', () => {
    const bits = fc.integer({ min: 10, max: 1200 });
    fc.assert(
      fc.property(
        order.chain((m) => sums(m, 3)),
        bits,
        (a, b) => {
          const [low] = evaluate([a], b).map(toComplex);
          const [high] = evaluate([a], b + 200).map(toComplex);
          if (low === undefined || high === undefined) throw new Error('two values expected');
          for (const part of ['re', 'im'] as const) {
            const { mid, bits: fine } = high[part];
            expect(contains(low[part], { mid, rad: 0n, bits: fine }), `${JSON.stringify(a)} at ${b}`).toBe(true);
            expect(low[part].rad <= 1n << BigInt(Math.max(0, low[part].bits - b))).toBe(true);
          }
        },
      ),
      { seed: 14, numRuns: 60 },
    );
  });

  it('differences of unlike sums are not lost in the radius', () => {
    const [x, y] = evaluate([
      { indices: [5, 3], exponents: [0, 0], order: 1 },
      { indices: [3, 5], exponents: [0, 0], order: 1 },
    ]) as [Value, Value];
    expect(overlaps(toComplex(subtract(x, y)).re, fromInteger(0n))).toBe(false);
  });
});
