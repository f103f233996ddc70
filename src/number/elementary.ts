/**
 * Exponential, logarithm, sine, cosine and arc tangent of real balls.
 *
 * Each function evaluates a fixed-point kernel at the midpoint (kernels.ts, error below 2 units of the working precision) and
 * adds the variation of the function over the ball, bounded by its derivative. The result has `bits` fraction bits; for an
 * exact argument its radius is at most 4 units.
 */
import { add, type Ball, divide, magnitude, subtract, timesInteger, timesPowerOfTwo, widen, withBits } from './ball.ts';
import { PrecisionError } from './errors.ts';
import { absolute, bitLength } from './integer.ts';
import { atanSmallFixed, expFixed, logNearOneFixed, sinCosFixed } from './kernels.ts';
import { logTwo, piBall } from './reduction.ts';

/** Arguments of exp above 2^32 would need results of more than 2^32 bits. */
const LARGEST_EXPONENT = 2 ** 32;

/** e^x. Throws RangeError when the result would have more than 2³² bits. */
export function exp(x: Ball, bits: number): Ball {
  const size = magnitude(x);
  if (size > 32) {
    if (x.mid > 0n) throw new RangeError('exp: expected an argument below 2^32');
    return { mid: 0n, rad: 1n, bits };
  }
  let k = Math.floor(Math.max(-LARGEST_EXPONENT, approximate(x) * Math.LOG2E));
  const work = Math.max(8, bits + Math.max(k, -bits) + 8);
  const reduce = (): Ball => withBits(subtract(withBits(x, work), timesInteger(logTwo(work + 34), BigInt(k))), work);
  let argument = reduce();
  if (argument.mid < 0n) {
    k -= 1;
    argument = reduce();
  }
  const point = argument.mid < 0n ? 0n : argument.mid;
  // Keeps the kernel's argument in [0, 1); the distance moved counts as radius.
  const slack = absolute(argument.mid - point);
  const top = argument.rad + slack;
  if (top >> BigInt(work) !== 0n) throw new PrecisionError('exp: the argument is not known well enough');
  const value = expFixed(point, work);
  // |e^m − e^x| ≤ e^m (e^r − 1) ≤ 2 r e^m for r ≤ 1.
  const rad = 2n + ((2n * top * (value + 2n)) >> BigInt(work)) + (top === 0n ? 0n : 1n);
  return withBits(timesPowerOfTwo({ mid: value, rad, bits: work }, k), bits);
}

/** The midpoint as a double. */
function approximate(x: Ball): number {
  const drop = Math.max(0, bitLength(x.mid) - 64);
  return Number(x.mid >> BigInt(drop)) * 2 ** (drop - x.bits);
}

/** The natural logarithm. Throws RangeError for a ball without a positive point and PrecisionError when it is not clearly positive. */
export function log(x: Ball, bits: number): Ball {
  if (x.mid + x.rad <= 0n) throw new RangeError('log: expected a positive number');
  if (x.mid <= x.rad) throw new PrecisionError('log: the argument cannot be told from zero at this precision');
  // x = m·2^e with m in [3/4, 3/2).
  const length = bitLength(x.mid);
  const high = x.mid >> BigInt(Math.max(0, length - 2));
  const e = length - x.bits - (length >= 2 && high === 3n ? 0 : 1);
  const work = bits + 4 + bitLength(BigInt(Math.abs(e)));
  const m = withBits({ mid: x.mid, rad: 0n, bits: x.bits + e }, work);
  const value = { mid: logReduced(m.mid, work), rad: 4n + 2n * m.rad, bits: work };
  const whole = e === 0 ? value : add(value, timesInteger(logTwo(work), BigInt(e)));
  // log varies by at most r/(m − r).
  const below = x.mid - x.rad;
  const variation = x.rad === 0n ? 0n : ((x.rad << BigInt(work)) + below - 1n) / below;
  return withBits(widen(whole, variation), bits);
}

/**
 * log m for m in [3/4, 3/2), error below 4 units. y = log m to a part of the bits; then log m = y + log(1 + d), d = m e^{−y} − 1.
 * y is exact as it stands; e^{|y|} errs by less than 2 units, d after one product or quotient by less than 5·(1/0.75)… < 4 units of the
 * guarded last place (3 bits), log(1 + d) by less than 2 more.
 */
function logReduced(m: bigint, work: number): bigint {
  if (work <= 44) {
    const y = Math.log(Number(m) / 2 ** work);
    return BigInt(Math.round(y * 2 ** work));
  }
  const guard = work + 4;
  const part = Math.max(40, Math.ceil(work / 8));
  const rough = logReduced(part >= work ? m : m >> BigInt(work - part), part);
  const y = rough << BigInt(guard - part);
  const power = expFixed(absolute(y), guard);
  const scaled = m << 4n;
  const ratio = y >= 0n ? (scaled << BigInt(guard)) / power : (scaled * power) >> BigInt(guard);
  const value = y + logNearOneFixed(ratio - (1n << BigInt(guard)), guard);
  return (value + 8n) >> 4n;
}

export interface SinCos {
  readonly sin: Ball;
  readonly cos: Ball;
}

/** sin x and cos x together. */
export function sinCos(x: Ball, bits: number): SinCos {
  const size = Math.max(0, magnitude(x));
  if (size > 2 ** 24) throw new RangeError('sinCos: expected an argument below 2^(2^24)');
  const work = bits + 4;
  // x = k·π/2 + f with |f| ≤ π/4 about.
  const half = timesPowerOfTwo(piBall(work + size + 8), -1);
  const k = size === 0 ? 0n : nearest(x, half);
  const f = withBits(subtract(x, timesInteger(half, k)), work);
  const one = 1n << BigInt(work);
  if (f.rad > one) return wholeCircle(bits);
  const { sin, cos } = sinCosFixed(absolute(f.mid), work);
  const rad = 2n + f.rad;
  const s = withBits({ mid: f.mid < 0n ? -sin : sin, rad, bits: work }, bits);
  const c = withBits({ mid: cos, rad, bits: work }, bits);
  const minus = (b: Ball): Ball => ({ ...b, mid: -b.mid });
  switch (Number(((k % 4n) + 4n) % 4n)) {
    case 0:
      return { sin: s, cos: c };
    case 1:
      return { sin: c, cos: minus(s) };
    case 2:
      return { sin: minus(s), cos: minus(c) };
    default:
      return { sin: minus(c), cos: s };
  }
}

function wholeCircle(bits: number): SinCos {
  const any = { mid: 0n, rad: 1n << BigInt(bits), bits };
  return { sin: any, cos: any };
}

/** The integer nearest to the quotient of the midpoints (ties and rounding do not matter). */
function nearest(x: Ball, y: Ball): bigint {
  const quotient = (x.mid << BigInt(y.bits + 1)) / (y.mid << BigInt(x.bits));
  return (quotient + 1n) >> 1n;
}

/** atan x, in (−π/2, π/2). */
export function atan(x: Ball, bits: number): Ball {
  const work = bits + 4;
  const one = 1n << BigInt(work);
  const negative = x.mid < 0n;
  const mid = absolute(x.mid);
  const inverted = mid >> BigInt(x.bits) !== 0n;
  const exact = { mid, rad: 0n, bits: x.bits };
  // 1/x for x ≥ 1; the reduced argument lies in [0, 1].
  const t = inverted ? divide({ mid: 1n, rad: 0n, bits: 0 }, exact, work) : withBits(exact, work);
  let value: Ball = { mid: atanReduced(t.mid > one ? one : t.mid, work), rad: 4n + t.rad, bits: work };
  if (inverted) value = subtract(timesPowerOfTwo(piBall(work + 1), -1), value);
  value = withBits(value, work);
  const spread = withBits({ mid: 0n, rad: x.rad, bits: x.bits }, work).rad;
  return withBits({ mid: negative ? -value.mid : value.mid, rad: value.rad + spread, bits: work }, bits);
}

/**
 * atan t for t in [0, 1], error below 4 units. y = atan t to a part of the bits; then atan t = y + atan((t cos y − sin y)/(cos y + t sin y)).
 * sin and cos err by less than 2 units; the numerator by less than 5, and the denominator is at least cos y > 0.7: less than
 * 11 units of the guarded last place (5 bits), and 2 from the series.
 */
function atanReduced(t: bigint, work: number): bigint {
  if (work <= 44) return BigInt(Math.round(Math.atan(Number(t) / 2 ** work) * 2 ** work));
  const guard = work + 5;
  const bits = BigInt(guard);
  const part = Math.max(40, Math.ceil(work / 8));
  const rough = atanReduced(part >= work ? t : t >> BigInt(work - part), part);
  const y = (rough < 0n ? 0n : rough) << BigInt(guard - part);
  const { sin, cos } = sinCosFixed(y, guard);
  const scaled = t << 5n;
  const top = ((scaled * cos) >> bits) - sin;
  const below = cos + ((scaled * sin) >> bits);
  const value = y + atanSmallFixed((top << bits) / below, guard);
  return (value + 16n) >> 5n;
}

/** The angle of the point (x, y), in (−π, π]. Throws PrecisionError where the ball touches the cut or the origin. */
export function atan2(y: Ball, x: Ball, bits: number): Ball {
  const exactZero = y.mid === 0n && y.rad === 0n;
  if (x.mid > x.rad && absolute(y.mid) <= x.mid) return atan(divide(y, x, bits + 4), bits);
  if (absolute(y.mid) > y.rad) {
    const quarter = timesPowerOfTwo(piBall(bits + 4), -1);
    const rest = atan(divide(x, y, bits + 4), bits + 4);
    const signed = y.mid > 0n ? quarter : { ...quarter, mid: -quarter.mid };
    return withBits(subtract(signed, rest), bits);
  }
  if (exactZero && -x.mid > x.rad) return piBall(bits);
  if (x.mid > x.rad) return atan(divide(y, x, bits + 4), bits);
  throw new PrecisionError('atan2: the angle cannot be told at this precision');
}
