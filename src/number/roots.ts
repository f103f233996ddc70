/** Roots of integers and balls, and the arithmetic-geometric mean. */
import {
  add,
  type Ball,
  divide,
  magnitude,
  multiply,
  subtract,
  timesInteger,
  timesPowerOfTwo,
  widen,
  withBits,
} from './ball.ts';
import { exp, log } from './elementary.ts';
import { PrecisionError } from './errors.ts';
import { absolute, bitLength, integerSqrt } from './integer.ts';

/** Above this degree exp and log are faster than Newton's iteration on the power. */
const LARGEST_NEWTON = 16;

/** The positive n-th root of a non-negative ball, n ≥ 1. Throws as `sqrt` does. */
export function root(x: Ball, n: number, bits: number): Ball {
  if (!Number.isInteger(n) || n < 1) throw new RangeError(`root: expected a positive integer degree, got ${n}`);
  if (x.mid + x.rad < 0n) throw new RangeError('root: expected a non-negative number');
  if (x.mid - x.rad < 0n) throw new PrecisionError('root: the argument cannot be told from a negative number');
  if (n > LARGEST_NEWTON && x.mid > x.rad) {
    const work = bits + 8 + Math.max(0, Math.ceil(magnitude(x) / n));
    return exp(divide(log(x, work), { mid: BigInt(n), rad: 0n, bits: 0 }, work), bits);
  }
  const scaled = (value: bigint): bigint => {
    const shift = n * bits - x.bits;
    return shift >= 0 ? value << BigInt(shift) : value >> BigInt(-shift);
  };
  if (x.mid === x.rad) return touchingZero(scaled(x.mid + x.rad), n, bits);
  const mid = integerRoot(scaled(x.mid), n);
  if (x.rad === 0n) return { mid, rad: 1n, bits };
  // x^(1/n) varies by at most r·x^(1/n)/(n(x − r)) over the ball.
  const below = BigInt(n) * (x.mid - x.rad);
  return { mid, rad: 2n + (x.rad * (mid + 1n)) / below, bits };
}

/** The roots of [0, top]. */
function touchingZero(top: bigint, n: number, bits: number): Ball {
  const half = (integerRoot(top, n) >> 1n) + 1n;
  return { mid: half, rad: half, bits };
}

/** ⌊value^(1/n)⌋ for value ≥ 0 and n ≥ 1. */
export function integerRoot(value: bigint, n: number): bigint {
  if (n === 1 || value < 2n) return value;
  if (n % 2 === 0) return integerRoot(integerSqrt(value), n / 2);
  let root = rootFromAbove(value, n);
  while (root ** BigInt(n) > value) root -= 1n;
  return root;
}

/**
 * The root or a few units more, by Newton's iteration on doubling precision: a step from above stays above (the arithmetic mean
 * is not less than the geometric one), and one step from half the bits and 8 more leaves less than a unit besides rounding.
 */
function rootFromAbove(value: bigint, n: number): bigint {
  const degree = BigInt(n);
  const length = bitLength(value);
  const step = (guess: bigint): bigint => ((degree - 1n) * guess + value / guess ** (degree - 1n)) / degree;
  if (length <= (24 + Math.log2(n)) * n) {
    let guess = 1n << BigInt(Math.floor((length - 1) / n) + 1);
    for (let next = step(guess); next < guess; next = step(guess)) guess = next;
    return guess;
  }
  const drop = Math.floor(length / (2 * n)) - 4 - Math.ceil(Math.log2(n) / 2);
  return step((rootFromAbove(value >> BigInt(drop * n), n) + 1n) << BigInt(drop));
}

/**
 * The arithmetic-geometric mean of two positive balls. The steps stop once the relative gap x = (a − b)/(a + b) is below a sixth of
 * the bits: M(a, b) = m (1 − x²/4 − 5x⁴/64 − …) with m = (a + b)/2; the coefficients beyond 1 are negative and sum to −1
 * (M vanishes at x = 1), so what follows x⁴ is below m x⁶.
 */
export function agm(a: Ball, b: Ball, bits: number): Ball {
  if (a.mid <= a.rad || b.mid <= b.rad) throw new PrecisionError('agm: expected two clearly positive numbers');
  const least = Math.min(...[a, b].map((x) => bitLength(x.mid - x.rad) - x.bits));
  const work = bits + 16 + Math.max(0, magnitude(a), magnitude(b)) + 2 * Math.max(0, -least);
  let x = withBits(a, work);
  let y = withBits(b, work);
  const enough = Math.ceil((bits + 16 + Math.max(0, magnitude(a), magnitude(b))) / 6);
  for (;;) {
    const mean = withBits(timesPowerOfTwo(add(x, y), -1), work);
    const gap = timesPowerOfTwo(subtract(x, y), -1);
    if ((absolute(gap.mid) + gap.rad) << BigInt(enough) <= mean.mid - mean.rad) return nearMean(mean, gap, bits, work);
    y = geometricMean(x, y, work);
    x = mean;
  }
}

/** m (1 − x²/4 − 5x⁴/64) with x = gap/m, widened by m x⁶. */
function nearMean(m: Ball, gap: Ball, bits: number, work: number): Ball {
  const ratio = divide(gap, m, work);
  const square = multiply(ratio, ratio, work);
  const fourth = multiply(square, square, work);
  const series = add(timesPowerOfTwo(square, -2), timesPowerOfTwo(timesInteger(fourth, 5n), -6));
  const rest = multiply(multiply(fourth, square, work), m, work);
  const value = subtract(m, multiply(series, m, work));
  return withBits(widen(withBits(value, work), absolute(rest.mid) + rest.rad), bits);
}

/** √(xy) for clearly positive x and y. */
export function geometricMean(x: Ball, y: Ball, bits: number): Ball {
  const product = multiply(x, y, 2 * bits);
  if (product.mid <= product.rad) throw new PrecisionError('geometricMean: expected clearly positive numbers');
  const mid = integerSqrt(product.mid);
  // √p varies by at most r/√(p − r) ≤ r/(√p − r/√p) over the ball; both floors are covered by the last units.
  const below = mid - product.rad / mid - 1n;
  if (below <= 0n) throw new PrecisionError('geometricMean: expected clearly positive numbers');
  return { mid, rad: 2n + product.rad / below, bits };
}
