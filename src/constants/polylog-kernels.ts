/**
 * Kernel of z·Σ_{k≥0} z^k/(stride·k + offset)^s, one pass for several s.
 *
 * **Acceleration** (Cohen, Rodriguez Villegas and Zagier, Exper. Math. 9 (2000) 3, for any z off [1, ∞)). a_k = 1/(stride·k +
 * offset)^s = ∫₀¹ y^k dμ with a positive measure of mass a₀ ≤ 1. With P(y) = T_n(1 − 2y) = Σ p_k y^k, |P| ≤ 1 on [0, 1], and
 * (P(1/z) − P(y))/(1 − zy) = Σ c_k y^k, that is c_k = z c_{k−1} − p_k, c_n = 0, the approximation z Σ c_k a_k / P(1/z) errs by
 * at most |z| sup_y 1/|1 − zy| / |P(1/z)|.
 * **Rounding.** c runs in fixed point with F fraction bits, as coordinates over 1, √d, upward by z where |z| < 1, otherwise
 * downward by 1/z. A step adds at most ε = 3 + √|d| units: two truncations, and the error of a multiplier kept to more bits
 * than c has. The factor has modulus at most 1 (1 + 10⁻¹² allowed for, a factor 2 at the end), so c errs by less than
 * 2((n + 1)ε + e₀) with e₀ the error of the start P(1/z) (a ball); the sum over k by (1 + ln n) times that plus nε. These radii
 * go through ball arithmetic to the result. For a real root the coordinates may grow as the conjugate of z does, and cancel in
 * u + v√d; that costs length, not accuracy, since truncation errors are multiplied by z alone.
 */
import {
  add as addReal,
  type Ball,
  fromInteger,
  multiply as multiplyReal,
  negate,
  sqrt,
  widen,
  withBits,
} from '../number/ball.ts';
import { add, divide, isComplex, multiply, subtract, toComplex, type Value } from '../number/complex.ts';
import { absolute, bitLength, integerSqrt } from '../number/integer.ts';
import type { EvaluationContext } from './family.ts';

/** (alpha + beta√root)/gamma exactly; beta = 0 for a rational. */
export interface ExactPoint {
  readonly alpha: bigint;
  readonly beta: bigint;
  readonly gamma: bigint;
  readonly root: bigint;
}

/** A point off the cut [1, ∞): doubles for choosing, values for computing, and the exact form where there is a small one. */
export interface Point {
  readonly re: number;
  readonly im: number;
  value(bits: number): Value;
  readonly exact: ExactPoint | null;
}

/** The denominators (stride·k + offset)^s. */
export interface Denominators {
  readonly stride: number;
  readonly offset: number;
  readonly exponents: readonly number[];
}

const LOG2_T3 = 2.5432;

/** log2 |w + √(w² − 1)| ≥ 0 for w = 1 − 2/z: bits won by a term. */
export function bitsPerTerm(re: number, im: number): number {
  const size = re * re + im * im;
  const wr = 1 - (2 * re) / size;
  const wi = (2 * im) / size;
  // |w − 1| + |w + 1| = 2 cosh ξ for the foci ±1, and |w + √(w² − 1)| = e^ξ.
  const c = (Math.hypot(wr - 1, wi) + Math.hypot(wr + 1, wi)) / 2;
  return Math.log2(c + Math.sqrt(Math.max(0, c * c - 1)));
}

/** An upper bound of sup 1/|1 − zy| over 0 ≤ y ≤ 1, with a factor 2 for the doubles. */
function poleBound(re: number, im: number): number {
  if (re <= 0) return 2;
  const size = Math.hypot(re, im);
  return 2 / Math.max(1 - size, Math.abs(im) / size);
}

interface Multiplier extends ExactPoint {
  /** gamma = 2^shift, or −1. */
  readonly shift: number;
}

/** z or 1/z as multiplier: exact where known, otherwise rounded to `bits` fraction bits. */
function multiplierOf(z: Point, inverse: boolean, bits: number): Multiplier {
  if (z.exact !== null) {
    const { alpha, beta, gamma, root } = z.exact;
    if (!inverse) return { ...z.exact, shift: -1 };
    const norm = alpha * alpha - root * beta * beta;
    const sign = norm < 0n ? -1n : 1n;
    return { alpha: sign * gamma * alpha, beta: -sign * gamma * beta, gamma: sign * norm, root, shift: -1 };
  }
  const value = z.value(bits + 16);
  const { re, im } = toComplex(inverse ? divide(fromInteger(1n), value, bits + 4) : value);
  const gamma = 1n << BigInt(bits);
  return { alpha: withBits(re, bits).mid, beta: withBits(im, bits).mid, gamma, root: -1n, shift: bits };
}

/** T_n(w) as a ball. */
function chebyshev(n: number, w: Value, bits: number): Value {
  let low: Value = fromInteger(1n);
  let high: Value = w;
  const twice = (x: Value): Value => add(x, x);
  for (const digit of n.toString(2)) {
    const middle = subtract(twice(multiply(low, high, bits)), w);
    if (digit === '1') [low, high] = [middle, subtract(twice(multiply(high, high, bits)), fromInteger(1n))];
    else [low, high] = [subtract(twice(multiply(low, low, bits)), fromInteger(1n)), middle];
  }
  return low;
}

interface Pass {
  readonly sums: { u: bigint; v: bigint }[];
  /** P(1/z) in units, with its error. */
  readonly scale: Value;
  readonly multiplier: Multiplier;
}

/** The recurrence for c with its sums Σ c_k a_k; `fraction` is F. */
class Recurrence {
  private readonly m: Multiplier;
  private readonly shift: bigint;
  private readonly powers: readonly bigint[];
  private readonly denominators: Denominators;
  readonly sums: { u: bigint; v: bigint }[];
  u: bigint;
  v: bigint;

  constructor(m: Multiplier, denominators: Denominators, u: bigint, v: bigint) {
    this.m = m;
    this.shift = BigInt(Math.max(0, m.shift));
    this.powers = denominators.exponents.map(BigInt);
    this.denominators = denominators;
    this.sums = denominators.exponents.map(() => ({ u: 0n, v: 0n }));
    this.u = u;
    this.v = v;
  }

  /** (u, v) times the multiplier, each coordinate truncated. */
  turn(): void {
    const { alpha, beta, gamma, root, shift } = this.m;
    if (beta === 0n) {
      this.u = shift >= 0 ? (this.u * alpha) >> this.shift : (this.u * alpha) / gamma;
      return;
    }
    const u = this.u * alpha + this.v * beta * root;
    const v = this.v * alpha + this.u * beta;
    this.u = shift >= 0 ? u >> this.shift : u / gamma;
    this.v = shift >= 0 ? v >> this.shift : v / gamma;
  }

  collect(k: number): void {
    const base = BigInt(this.denominators.stride * k + this.denominators.offset);
    for (let e = 0; e < this.powers.length; e++) {
      const power = base ** (this.powers[e] as bigint);
      const sum = this.sums[e] as { u: bigint; v: bigint };
      sum.u += this.u / power;
      if (this.m.beta !== 0n) sum.v += this.v / power;
    }
  }
}

export function pulse(k: number, n: number, context: EvaluationContext): void {
  if (k % 64 !== 0) return;
  context.signal?.throwIfAborted();
  context.onProgress?.(Math.min(1, k / n));
}

/** c₀, c₁, … upward for |z| < 1. */
function upward(
  z: Point,
  n: number,
  fraction: number,
  size: number,
  d: Denominators,
  context: EvaluationContext,
): Pass {
  const m = multiplierOf(z, false, size + 8);
  const w = subtract(fromInteger(1n), divide(fromInteger(2n), z.value(size + 40), size + 32));
  const scale = chebyshev(n, w, size + 32);
  const start = toComplex(scale);
  const re = withBits(start.re, fraction);
  const im = withBits(start.im, fraction);
  let p = 1n << BigInt(fraction);
  // A real number has many coordinates over 1, √root; any will do.
  const v = m.beta === 0n || m.root > 0n ? 0n : overRoot(im.mid, m.root);
  const c = new Recurrence(m, d, re.mid - p, v);
  c.collect(0);
  for (let k = 1; k < n; k++) {
    p = (p * BigInt(-2 * (n + k - 1) * (n - k + 1))) / BigInt((2 * k - 1) * k);
    c.turn();
    c.u -= p;
    c.collect(k);
    pulse(k, n, context);
  }
  return { sums: c.sums, scale, multiplier: m };
}

/** im/√|root|, within one unit, for an imaginary coordinate in units. */
function overRoot(im: bigint, root: bigint): bigint {
  const size = absolute(root);
  if (size === 1n) return im;
  const value = integerSqrt((im * im) / size);
  return im < 0n ? -value : value;
}

/** c_{n−1}, …, c₀ downward for |z| ≥ 1; P(1/z) = c₀ + p₀ comes out at the end. */
function downward(
  z: Point,
  n: number,
  fraction: number,
  size: number,
  d: Denominators,
  context: EvaluationContext,
): Pass {
  const m = multiplierOf(z, true, size + 8);
  const sign = n % 2 === 0 ? 1n : -1n;
  let p = sign << BigInt(2 * n - 1 + fraction);
  const c = new Recurrence(m, d, 0n, 0n);
  for (let k = n - 1; k >= 0; k--) {
    // c_k = (c_{k+1} + p_{k+1})/z
    c.u += p;
    c.turn();
    c.collect(k);
    p = (p * BigInt((2 * k + 1) * (k + 1))) / BigInt(-2 * (n + k) * (n - k));
    pulse(n - k, n, context);
  }
  const error = BigInt(Math.ceil(2 * (n + 1) * stepError(m)));
  return { sums: c.sums, scale: coordinates(c.u + p, c.v, m, error, fraction), multiplier: m };
}

function stepError(m: Multiplier): number {
  return 3 + Math.sqrt(Number(absolute(m.root)));
}

/** u + v√root in units of 2^−fraction, given that u + v√root is within `error` of the truth. */
function coordinates(u: bigint, v: bigint, m: Multiplier, error: bigint, fraction: number): Value {
  const re: Ball = { mid: u, rad: error, bits: fraction };
  if (m.beta === 0n) return re;
  const size = bitLength(v) + fraction + 8;
  const other: Ball = { mid: v, rad: 0n, bits: fraction };
  const scaled = m.root === -1n ? other : multiplyReal(other, sqrt(fromInteger(absolute(m.root)), size), fraction);
  if (m.root > 0n) return addReal(re, scaled);
  return { re, im: widen(withBits(scaled, fraction), error) };
}

/** z·Σ z^k a_k for each exponent, with about `work` right bits; the balls tell exactly. */
export function acceleratedSums(z: Point, d: Denominators, work: number, context: EvaluationContext): Value[] {
  const rate = bitsPerTerm(z.re, z.im);
  const modulus = Math.hypot(z.re, z.im);
  const pole = Math.max(2, poleBound(z.re, z.im) * modulus);
  const n = Math.max(4, Math.ceil((work + 4 + Math.log2(pole)) / rate) + 1);
  const fraction = Math.ceil(2 * Math.log2(n)) + 12;
  const size = fraction + Math.ceil(n * Math.max(LOG2_T3, rate)) + 8;
  const down = modulus >= 1 - 1e-13;
  const { sums, scale, multiplier: m } = (down ? downward : upward)(z, n, fraction, size, d, context);
  // A coordinate of the start is within 2 units of what the ball says, in the place of √root.
  const start = down ? 0 : 2 * Math.max(...radii(scale, fraction)) + 2 * stepError(m);
  const c = 2 * ((n + 1) * stepError(m) + start);
  const error = BigInt(Math.ceil((1 + Math.log(n)) * c + n * stepError(m)));
  const point = z.value(work + 16);
  // |z| sup 1/|1 − zy| / |P(1/z)|: a ball around zero in each part.
  const missing = divide(fromInteger(BigInt(Math.ceil(pole))), lowerSize(scale), work + 8) as Ball;
  const tail = absolute(missing.mid) + missing.rad;
  return sums.map(({ u, v }) => {
    const sum = coordinates(u, v, m, error, fraction);
    const value = multiply(point, divide(sum, scale, work + 8), work + 8);
    if (!isComplex(value)) return widen(withBits(value, work + 8), tail);
    return { re: widen(value.re, tail), im: widen(value.im, tail) };
  });
}

/** Radii in units of 2^−fraction, as doubles rounded up. */
function radii(x: Value, fraction: number): number[] {
  const { re, im } = toComplex(x);
  return [re, im].map((part) => Number(withBits(part, fraction).rad) + 1);
}

/** A positive ball that is at most |x| everywhere: the larger part is at least |x|/√2 and counts alone. */
function lowerSize(x: Value): Ball {
  const { re, im } = toComplex(x);
  const part = absolute(re.mid) << BigInt(im.bits) > absolute(im.mid) << BigInt(re.bits) ? re : im;
  return part.mid < 0n ? negate(part) : part;
}
