import { describe, expect, it } from 'vitest';
import { type Ball, fromInteger, sqrt } from '../../src/number/ball.ts';
import { add, type ComplexBall, multiply, toComplex, type Value } from '../../src/number/complex.ts';
import {
  type AlgebraicOutcome,
  type AlgebraicRequest,
  powerRows,
  startAlgebraic,
} from '../../src/relation/algebraic.ts';
import {
  type Logarithm,
  NEGATIVE,
  POSITIVE,
  rootOfUnity,
  startMultiplicative,
} from '../../src/relation/multiplicative.ts';
import { mayVanish } from '../../src/relation/prepare.ts';
import { type Ring, type RingInteger, ringProduct, startRingRelation } from '../../src/relation/rings.ts';
import { type Random, randomFrom } from '../support/random.ts';

const METHODS = ['pslq', 'lattice'] as const;
const bitsOf = (digits: number): number => Math.ceil(digits / Math.log10(2));

function finish<T>(run: { step(): T | undefined }): T {
  for (;;) {
    const outcome = run.step();
    if (outcome !== undefined) return outcome;
  }
}

/** ⌊v^(1/k)·2^bits⌋ by Newton's iteration. */
function root(v: bigint, k: number, bits: number): bigint {
  const target = v << BigInt(bits * k);
  let x = 1n << BigInt(Math.ceil(target.toString(2).length / k) + 1);
  for (;;) {
    const next = (BigInt(k - 1) * x + target / x ** BigInt(k - 1)) / BigInt(k);
    if (next >= x) return x;
    x = next;
  }
}

/** mid/2^bits rounded to so many decimals, with the uncertainty of the rounding. */
function decimals(mid: bigint, bits: number, digits: number): Ball {
  const ten = 10n ** BigInt(digits);
  const rounded = (mid * ten + (1n << BigInt(bits - 1))) >> BigInt(bits);
  const fine = bitsOf(digits) + 8;
  return { mid: (rounded << BigInt(fine)) / ten, rad: (1n << BigInt(fine - 1)) / ten + 2n, bits: fine };
}

describe.each(METHODS)('relations over rings of complex integers (%s)', (method) => {
  const bits = 400;
  const randomComplex = (random: Random): ComplexBall => ({
    re: { mid: random.bits(bits), rad: 1n, bits },
    im: { mid: random.bits(bits), rad: 1n, bits },
  });
  const rootOfThree = sqrt(fromInteger(3n), bits + 40);
  const omega: ComplexBall = { re: { mid: -1n, rad: 0n, bits: 1 }, im: { ...rootOfThree, bits: rootOfThree.bits + 1 } };
  const i: ComplexBall = { re: fromInteger(0n), im: fromInteger(1n) };
  const elementOf = (x: RingInteger, ring: Ring): Value =>
    add(
      { re: fromInteger(x.a), im: fromInteger(0n) },
      multiply({ re: fromInteger(x.b), im: fromInteger(0n) }, ring === 'gaussian' ? i : omega, bits + 40),
    );

  it.each(['gaussian', 'eisenstein'] as const)('%s: a planted relation comes back up to a unit', (ring) => {
    const random = randomFrom(`ring ${ring}`);
    for (let k = 0; k < 4; k++) {
      const n = 3 + k;
      const small = (): RingInteger => ({ a: BigInt(random.integer(-99, 99)), b: BigInt(random.integer(-99, 99)) });
      const numbers: Value[] = Array.from({ length: n - 1 }, () => randomComplex(random));
      const relation = Array.from({ length: n - 1 }, small);
      // The last coefficient is 1, so that the relation has no common divisor.
      const sum = numbers.reduce<Value>(
        (s, z, at) => add(s, multiply(elementOf(relation[at] as RingInteger, ring), z, bits + 40)),
        { re: fromInteger(0n), im: fromInteger(0n) },
      );
      numbers.push(multiply(sum, fromInteger(-1n), bits + 40));
      relation.push({ a: 1n, b: 0n });
      const outcome = finish(startRingRelation({ numbers, ring, method }));
      expect(outcome.kind).toBe('relation');
      if (outcome.kind !== 'relation') continue;
      const unit = outcome.coefficients[n - 1] as RingInteger;
      expect(outcome.coefficients).toEqual(relation.map((x) => ringProduct(x, unit, ring)));
      const norm2 = relation.reduce(
        (s, x) => s + Number(x.a * x.a + x.b * x.b - (ring === 'gaussian' ? 0n : x.a * x.b)),
        0,
      );
      expect(outcome.normBoundLog10).toBeLessThanOrEqual(Math.log10(norm2) / 2 + 1e-9);
    }
  });

  it('a common divisor in the ring is taken out', () => {
    const random = randomFrom('ring divisor');
    const [x, y] = [randomComplex(random), randomComplex(random)];
    // 2x + 2iy + z·(1 + i)·… with all coefficients divisible by 1 + i.
    const z = add(
      multiply({ re: fromInteger(-3n), im: fromInteger(5n) }, x, bits + 20),
      multiply({ re: fromInteger(7n), im: fromInteger(2n) }, y, bits + 20),
    );
    const outcome = finish(startRingRelation({ numbers: [x, y, z], ring: 'gaussian', method }));
    expect(outcome).toMatchObject({
      kind: 'relation',
      coefficients: [
        { a: 5n, b: 3n },
        { a: 2n, b: -7n },
        { a: 0n, b: 1n },
      ],
    });
  });

  it('random complex numbers are excluded', () => {
    const random = randomFrom('ring random');
    const numbers = Array.from({ length: 5 }, () => randomComplex(random));
    for (const ring of ['gaussian', 'eisenstein'] as const) {
      const outcome = finish(startRingRelation({ numbers, ring, method }));
      expect(outcome.kind).toBe('excluded');
      expect(outcome.normBoundLog10).toBeGreaterThan(22);
    }
  });
});

describe('multiplicative relations', () => {
  const bits = 300;
  it('recovers exponents, sign and root of unity', () => {
    const random = randomFrom('multiplicative');
    const logs = Array.from({ length: 4 }, () => random.bits(bits));
    const exponents = [3n, -7n, 2n, 5n];
    // The last number is the inverse of the product of powers of the others, times a root of unity.
    const product = -logs.reduce((s, x, k) => s + x * (exponents[k] as bigint), 0n);
    const moduli = [...logs, product].map((mid) => ({ mid, rad: 40n, bits }));
    const real = moduli.map((modulus, k): Logarithm => ({ modulus, turn: k === 1 ? NEGATIVE : POSITIVE }));
    expect(finish(startMultiplicative({ numbers: real, method: 'pslq' }))).toMatchObject({
      kind: 'relation',
      coefficients: [...exponents, 1n],
      root: { p: 1, q: 2 },
    });
    const turns = logs.map(() => random.bits(bits));
    const rest = -turns.reduce((s, x, k) => s + x * (exponents[k] as bigint), 0n) + (5n << BigInt(bits)) / 12n;
    const complex = moduli.map(
      (modulus, k): Logarithm => ({ modulus, turn: { mid: turns[k] ?? rest, rad: 3n, bits } }),
    );
    expect(finish(startMultiplicative({ numbers: complex, method: 'lattice' }))).toMatchObject({
      coefficients: [...exponents, 1n],
      root: { p: 5, q: 12 },
    });
    const off = complex.map((x, k) => (k === 0 ? { ...x, turn: { ...x.turn, mid: random.bits(bits) } } : x));
    const outcome = finish(startMultiplicative({ numbers: off, method: 'pslq' }));
    expect(outcome).toMatchObject({ kind: 'relation', coefficients: [...exponents, 1n], root: undefined });
  });

  it('names a root of unity only from an argument known well enough', () => {
    expect(rootOfUnity({ mid: -(1n << 60n) / 3n, rad: 1n, bits: 60 })).toEqual({ p: 2, q: 3 });
    expect(rootOfUnity({ mid: 7n << 60n, rad: 9n, bits: 60 })).toEqual({ p: 0, q: 1 });
    expect(rootOfUnity({ mid: 1n << 20n, rad: 1n << 10n, bits: 30 })).toBeUndefined();
    expect(rootOfUnity({ mid: 123456789123456789n, rad: 1n, bits: 60 })).toBeUndefined();
  });
});

describe.each(METHODS)('minimal polynomials (%s)', (method) => {
  const solve = (request: Omit<AlgebraicRequest, 'method'>): AlgebraicOutcome =>
    finish(startAlgebraic({ ...request, method }));
  const fine = 3000;

  it('2^(1/6) + 3^(1/5): degree 30 from 200 and from 250 digits, also when a higher degree is allowed', () => {
    const x = root(2n, 6, fine) + root(3n, 5, fine);
    for (const [digits, degree] of [
      [200, 30],
      [250, 30],
      [250, 32],
      [400, 33],
    ] as const) {
      const outcome = solve({ value: decimals(x, fine, digits), degree });
      expect(outcome.kind).toBe('algebraic');
      if (outcome.kind !== 'algebraic') continue;
      expect(outcome.polynomial.length).toBe(31);
      expect(outcome.irreducible).toBe(true);
      // Independent of the search: 3,000 bits of x, not only the digits given.
      expect(mayVanish(powerRows({ mid: x, rad: 2n, bits: fine }, 30), outcome.polynomial)).toBe(true);
      // Only ±2^(1/6) + 3^(1/5) are real among the 30 conjugates.
      expect(outcome.root).toMatchObject({ realIndex: 2, realRoots: 2 });
    }
  });

  it('too few digits for the degree: no polynomial is made up', () => {
    const x = root(2n, 6, fine) + root(3n, 5, fine);
    for (const digits of [60, 100, 150]) {
      const outcome = solve({ value: decimals(x, fine, digits), degree: 30 });
      expect(['excluded', 'inconclusive']).toContain(outcome.kind);
    }
  });

  it('takes the factor that vanishes, and tells conjugates apart', () => {
    const a = root(2n, 2, fine);
    const b = root(3n, 2, fine);
    const expected = [1n, 0n, -10n, 0n, 1n];
    [-a - b, a - b, b - a, a + b].forEach((x, k) => {
      const outcome = solve({ value: decimals(x, fine, 100), degree: 9 });
      expect(outcome).toMatchObject({
        kind: 'algebraic',
        polynomial: expected,
        irreducible: true,
        root: { realIndex: k + 1, realRoots: 4 },
      });
    });
  });

  it('complex numbers', () => {
    // ∛2·e^{2πi/3} and a primitive 7th root of unity would need π; i + √2 and ∛2·ω do not.
    const s = root(2n, 2, fine);
    const cube = root(2n, 3, fine);
    const three = root(3n, 2, fine);
    const first: Value = { re: decimals(s, fine, 80), im: fromInteger(1n) };
    expect(solve({ value: first, degree: 6 })).toMatchObject({
      kind: 'algebraic',
      polynomial: [9n, 0n, -2n, 0n, 1n],
      irreducible: true,
    });
    const second: Value = {
      re: decimals(-cube >> 1n, fine, 80),
      im: decimals((cube * three) >> BigInt(fine + 1), fine, 80),
    };
    const outcome = solve({ value: second, degree: 5 });
    expect(outcome).toMatchObject({ kind: 'algebraic', polynomial: [-2n, 0n, 0n, 1n], irreducible: true });
    if (outcome.kind === 'algebraic') expect(outcome.root?.radiusLog2).toBeLessThan(1);
  });

  it('rational, integer and zero values', () => {
    expect(solve({ value: decimals((7n << 3000n) / 12n, fine, 60), degree: 4 })).toMatchObject({
      polynomial: [-7n, 12n],
      irreducible: true,
    });
    expect(solve({ value: fromInteger(5n), degree: 3 })).toMatchObject({ polynomial: [-5n, 1n] });
    expect(solve({ value: fromInteger(0n), degree: 3 })).toMatchObject({ polynomial: [0n, 1n] });
  });

  it('a wrong tail is noticed, with the place where agreement stops', () => {
    const x = decimals(root(5n, 3, fine) + root(2n, 2, fine), fine, 120);
    const wrong = { ...x, mid: x.mid + (1n << BigInt(x.bits - bitsOf(110))) };
    const outcome = solve({ value: wrong, degree: 6 });
    expect(outcome.kind).toBe('contradicted');
    if (outcome.kind !== 'contradicted') return;
    expect(Math.abs(outcome.agreementBits - bitsOf(110))).toBeLessThan(12);
  });

  it('random digits have no polynomial', () => {
    const random = randomFrom('transcendental');
    const outcome = solve({ value: decimals(random.bits(fine), fine, 100), degree: 8 });
    expect(outcome.kind).toBe('excluded');
  });

  it('refuses a degree below 1', () => {
    expect(() => startAlgebraic({ value: fromInteger(2n), degree: 0, method })).toThrow('degree');
    expect(toComplex(fromInteger(2n)).im.mid).toBe(0n);
  });
});
