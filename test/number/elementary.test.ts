// Elementary functions of balls, against exact rationals (Taylor polynomials with Lagrange bounds), functional equations,
// and digits of π and log 2 from memory (A000796, A002162 of the OEIS).
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import * as ball from '../../src/number/ball.ts';
import { atan, atan2, exp, log, sinCos } from '../../src/number/elementary.ts';
import { absolute } from '../../src/number/integer.ts';
import { logTwo, piBall, SMOOTH_PRIMES, smoothLog } from '../../src/number/reduction.ts';
import { agm, integerRoot, root } from '../../src/number/roots.ts';

const SEED = 20_260_101;
const anyBits = fc.integer({ min: 4, max: 900 });
/** Exact dyadic numbers of very different sizes. */
const anyReal = fc
  .record({ mid: fc.bigInt({ min: -(1n << 120n), max: 1n << 120n }), bits: fc.integer({ min: 100, max: 260 }) })
  .map(({ mid, bits }): ball.Ball => ({ mid, rad: 0n, bits }));
const positive = anyReal.filter((x) => x.mid !== 0n).map((x) => ({ ...x, mid: absolute(x.mid) }));

/** Whether p/q lies in x. */
function holds(x: ball.Ball, p: bigint, q: bigint): boolean {
  return absolute(p * (1n << BigInt(x.bits)) - x.mid * q) <= x.rad * q;
}

/** Σ_{n<N} y^n/n! over a common denominator, for y = p/q. */
function taylorExp(p: bigint, q: bigint, count: number): { p: bigint; q: bigint } {
  let top = 0n;
  let bottom = 1n;
  for (let n = count; n >= 1; n--) {
    // 1 + (y/n)·(top/bottom + …): Horner from the inside
    const inner = top + bottom;
    top = p * inner;
    bottom = q * BigInt(n) * bottom;
  }
  return { p: top + bottom, q: bottom };
}

function run<T>(arbitrary: fc.Arbitrary<T>, check: (value: T) => void, numRuns = 150): void {
  fc.assert(fc.property(arbitrary, check), { seed: SEED, numRuns });
}

describe('against exact rationals', () => {
  it('exp: the ball meets the Taylor polynomial within its remainder', () => {
    run(
      fc.tuple(fc.bigInt({ min: -4000n, max: 4000n }), fc.bigInt({ min: 1000n, max: 9000n }), anyBits),
      ([p, q, bits]) => {
        const count = 40 + bits;
        const exact = taylorExp(p, q, count);
        // |y| ≤ 4: what is left is less than 4^n/n!·2 < 2^−bits/1000 for n = bits + 40.
        const value = exp(ball.fromRational(p, q, bits + 40), bits);
        const slack = ball.widen(value, 1n);
        expect(holds(slack, exact.p, exact.q)).toBe(true);
        expect(value.rad).toBeLessThanOrEqual(5n);
      },
      60,
    );
  });

  it('roots: rⁿ ≤ x < (r+1)ⁿ', () => {
    run(fc.tuple(fc.bigInt({ min: 0n, max: 1n << 700n }), fc.integer({ min: 1, max: 9 })), ([x, n]) => {
      const r = integerRoot(x, n);
      expect(r ** BigInt(n) <= x && x < (r + 1n) ** BigInt(n)).toBe(true);
    });
  });

  it('π and the logarithms begin as they are known to', () => {
    const digits = (x: ball.Ball): string => `${(x.mid * 10n ** 50n) >> BigInt(x.bits)}`;
    expect(digits(piBall(200))).toBe('314159265358979323846264338327950288419716939937510');
    expect(digits(logTwo(200))).toBe('69314718055994530941723212145817656807550013436025');
  });

  it('smooth logarithms agree with the general one, and shorter requests with longer ones', () => {
    for (const p of SMOOTH_PRIMES) {
      for (const bits of [700, 90, 3000, 10]) {
        expect(ball.overlaps(smoothLog(p, bits), log(ball.fromInteger(p), bits + 100))).toBe(true);
        expect(smoothLog(p, bits).rad).toBeLessThanOrEqual(2n);
      }
    }
    for (const bits of [5, 5000, 70]) expect(ball.contains(piBall(bits), piBall(6000))).toBe(true);
  });
});

describe('radii: the result contains the one with 200 more bits and is narrow', () => {
  const check = (f: (x: ball.Ball, bits: number) => ball.Ball, widest: bigint, x: ball.Ball, bits: number): void => {
    const value = f(x, bits);
    expect(ball.contains(value, f(x, bits + 200))).toBe(true);
    expect(value.rad).toBeLessThanOrEqual(widest);
  };
  const small = anyReal.filter((x) => ball.magnitude(x) < 12);
  it('exp', () => run(fc.tuple(small, anyBits), ([x, bits]) => check(exp, 5n, x, bits)));
  it('log', () => run(fc.tuple(positive, anyBits), ([x, bits]) => check(log, 4n, x, bits)));
  it('sin', () => run(fc.tuple(anyReal, anyBits), ([x, bits]) => check((y, b) => sinCos(y, b).sin, 4n, x, bits)));
  it('cos', () => run(fc.tuple(anyReal, anyBits), ([x, bits]) => check((y, b) => sinCos(y, b).cos, 4n, x, bits)));
  it('atan', () => run(fc.tuple(anyReal, anyBits), ([x, bits]) => check(atan, 4n, x, bits)));
  it('fifth root', () => run(fc.tuple(positive, anyBits), ([x, bits]) => check((y, b) => root(y, 5, b), 1n, x, bits)));
  it('agm', () =>
    run(fc.tuple(positive, positive, anyBits), ([x, y, bits]) => {
      const value = agm(x, y, bits);
      expect(ball.contains(value, agm(x, y, bits + 200))).toBe(true);
      expect(ball.contains(value, agm(y, x, bits + 200))).toBe(true);
    }));
});

describe('inputs with a radius: points of the input stay inside', () => {
  const wide = fc
    .record({ x: anyReal, rad: fc.bigInt({ min: 0n, max: 1n << 90n }), at: fc.bigInt({ min: -16n, max: 16n }) })
    .map(({ x, rad, at }) => ({ x: { ...x, rad }, point: { mid: x.mid * 16n + rad * at, rad: 0n, bits: x.bits + 4 } }))
    .filter(({ x }) => ball.magnitude(x) < 12);
  it('exp, sin, cos, atan', () => {
    run(fc.tuple(wide, anyBits), ([{ x, point }, bits]) => {
      expect(ball.contains(exp(x, bits), exp(point, bits + 300))).toBe(true);
      expect(ball.contains(sinCos(x, bits).sin, sinCos(point, bits + 300).sin)).toBe(true);
      expect(ball.contains(sinCos(x, bits).cos, sinCos(point, bits + 300).cos)).toBe(true);
      expect(ball.contains(atan(x, bits), atan(point, bits + 300))).toBe(true);
    });
  });
  it('log, root', () => {
    run(fc.tuple(wide, anyBits), ([{ x, point }, bits]) => {
      if (x.mid <= x.rad) return;
      expect(ball.contains(log(x, bits), log(point, bits + 300))).toBe(true);
      expect(ball.contains(root(x, 3, bits), root(point, 3, bits + 300))).toBe(true);
    });
  });
});

describe('functional equations', () => {
  const moderate = anyReal.filter((x) => ball.magnitude(x) < 5 && x.mid !== 0n);
  it('log(exp x) = x, exp(x)·exp(−x) = 1', () => {
    run(fc.tuple(moderate, anyBits), ([x, bits]) => {
      const value = exp(x, bits + 60);
      expect(ball.contains(log(value, bits), x)).toBe(true);
      const one = ball.multiply(value, exp(ball.negate(x), bits + 60), bits);
      expect(ball.contains(one, ball.fromInteger(1n))).toBe(true);
    });
  });
  it('sin² + cos² = 1, tan(atan x) = x, and the angle of (cos x, sin x) is x', () => {
    run(fc.tuple(moderate, anyBits), ([x, bits]) => {
      const { sin, cos } = sinCos(x, bits + 40);
      const norm = ball.add(ball.square(sin, bits), ball.square(cos, bits));
      expect(ball.contains(norm, ball.fromInteger(1n))).toBe(true);
      const angle = sinCos(atan(x, bits + 40), bits + 40);
      expect(ball.contains(ball.divide(angle.sin, angle.cos, bits), x)).toBe(true);
      if (ball.magnitude(x) <= 1) expect(ball.contains(atan2(sin, cos, bits), x)).toBe(true);
    });
  });
});

describe('refusals', () => {
  it('names what it expected', () => {
    expect(() => log(ball.fromInteger(0n), 50)).toThrow('positive');
    expect(() => log({ mid: 1n, rad: 1n, bits: 3 }, 50)).toThrow('zero');
    expect(() => exp(ball.fromInteger(1n << 40n), 50)).toThrow('below 2^32');
    expect(() => root(ball.fromInteger(-1n), 3, 50)).toThrow('non-negative');
    expect(() => atan2({ mid: 0n, rad: 1n, bits: 3 }, ball.fromInteger(-1n), 50)).toThrow('angle');
  });
});
