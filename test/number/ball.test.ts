import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import * as ball from '../../src/number/ball.ts';
import { bitLength, integerSqrt, log10Of } from '../../src/number/integer.ts';

/** A ball together with an exact rational point p/q inside it. */
const ballAndPoint = fc
  .record({
    mid: fc.bigInt({ min: -(1n << 200n), max: 1n << 200n }),
    rad: fc.bigInt({ min: 0n, max: 1n << 80n }),
    bits: fc.integer({ min: 0, max: 220 }),
    position: fc.bigInt({ min: -64n, max: 64n }),
  })
  .map(({ mid, rad, bits, position }) => ({
    ball: { mid, rad, bits },
    p: mid * 64n + rad * position,
    q: 64n << BigInt(bits),
  }));

/** Whether p/q lies in the ball, decided in exact rationals. */
function holds(x: ball.Ball, p: bigint, q: bigint): boolean {
  const scaled = p << BigInt(x.bits);
  const low = (x.mid - x.rad) * q;
  const high = (x.mid + x.rad) * q;
  return q > 0n ? low <= scaled && scaled <= high : high <= scaled && scaled <= low;
}

const anyBits = fc.integer({ min: 0, max: 300 });

describe('balls contain the exact result of every point (property against exact rationals)', () => {
  it('add, subtract, multiply', () => {
    fc.assert(
      fc.property(ballAndPoint, ballAndPoint, anyBits, (x, y, bits) => {
        expect(holds(ball.add(x.ball, y.ball), x.p * y.q + y.p * x.q, x.q * y.q)).toBe(true);
        expect(holds(ball.subtract(x.ball, y.ball), x.p * y.q - y.p * x.q, x.q * y.q)).toBe(true);
        expect(holds(ball.multiply(x.ball, y.ball, bits), x.p * y.p, x.q * y.q)).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });

  it('divide', () => {
    fc.assert(
      fc.property(ballAndPoint, ballAndPoint, anyBits, (x, y, bits) => {
        if (ball.containsZero(y.ball)) {
          expect(() => ball.divide(x.ball, y.ball, bits)).toThrow('divisor');
          return;
        }
        expect(holds(ball.divide(x.ball, y.ball, bits), x.p * y.q, x.q * y.p)).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });

  it('withBits, overInteger, timesPowerOfTwo, power', () => {
    fc.assert(
      fc.property(ballAndPoint, anyBits, fc.integer({ min: -40, max: 40 }), (x, bits, k) => {
        expect(holds(ball.withBits(x.ball, bits), x.p, x.q)).toBe(true);
        if (k !== 0) expect(holds(ball.overInteger(x.ball, BigInt(k)), x.p, x.q * BigInt(k))).toBe(true);
        const up = k > 0 ? 1n << BigInt(k) : 1n;
        const down = k < 0 ? 1n << BigInt(-k) : 1n;
        expect(holds(ball.timesPowerOfTwo(x.ball, k), x.p * up, x.q * down)).toBe(true);
        if (k >= 0) {
          const n = k % 6;
          expect(holds(ball.power(x.ball, n, bits), x.p ** BigInt(n), x.q ** BigInt(n))).toBe(true);
        }
      }),
      { numRuns: 2000 },
    );
  });

  it('sqrt', () => {
    fc.assert(
      fc.property(ballAndPoint, anyBits, (x, bits) => {
        const y = ball.multiply(x.ball, x.ball, 400);
        if (y.mid - y.rad < 0n) return;
        const root = ball.sqrt(y, bits);
        const p = x.p < 0n ? -x.p : x.p;
        expect(holds(root, p, x.q)).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('integer helpers', () => {
  it('bitLength and integerSqrt meet their definitions', () => {
    fc.assert(
      fc.property(fc.bigInt({ min: 0n, max: 1n << 700n }), fc.integer({ min: 0, max: 690 }), (seed, drop) => {
        const value = seed >> BigInt(drop);
        const bits = bitLength(value);
        expect(value < 1n << BigInt(bits)).toBe(true);
        if (value > 0n) expect(value >= 1n << BigInt(bits - 1)).toBe(true);
        const root = integerSqrt(value);
        expect(root * root <= value && (root + 1n) * (root + 1n) > value).toBe(true);
      }),
      { numRuns: 3000 },
    );
  });

  it('log10Of is right at any size', () => {
    expect(log10Of(10n ** 5000n)).toBeCloseTo(5000, 9);
    expect(log10Of(-(3n * 10n ** 40n))).toBeCloseTo(40 + Math.log10(3), 12);
    expect(log10Of(0n)).toBe(Number.NEGATIVE_INFINITY);
  });
});
