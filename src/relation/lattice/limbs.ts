/**
 * Integers as signed limbs in base 2^22, least significant first, held as doubles. With limbs in [−2^21, 2^21], the sum of
 * 2^10 products of a limb with an integer below 2^21 is exact.
 */
export const LIMB_BITS = 22;
export const LIMB = 2 ** LIMB_BITS;
const HALF = LIMB / 2;
/** Two limbs are eleven hexadecimal digits. */
const HEX_PER_PAIR = 11;

/** Integers of up to this many limbs are put together by shifts; longer ones by way of hexadecimal text, in linear time. */
const SHORT = 24;
const PAIR_BITS = BigInt(2 * LIMB_BITS);
const LONE_BITS = BigInt(LIMB_BITS);

/** Limbs that hold any integer of `bits` bits, with a whole limb to spare for carries. */
export function limbsFor(bits: number): number {
  return Math.ceil((bits + 2) / LIMB_BITS) + 1;
}

/** Writes `value` into f[at … at + length). Throws RangeError when it does not fit. */
export function writeLimbs(value: bigint, f: Float64Array, at: number, length: number): void {
  for (let k = 0; k < length; k++) f[at + k] = 0; // a call of fill costs more on runs this short
  if (value === 0n) return;
  const sign = value < 0n ? -1 : 1;
  const hex = (value < 0n ? -value : value).toString(16);
  let over = 0;
  let limb = 0;
  for (let end = hex.length; end > 0 || over > 0; end -= HEX_PER_PAIR) {
    const pair = end > 0 ? Number.parseInt(hex.slice(Math.max(0, end - HEX_PER_PAIR), end), 16) : 0;
    const high = Math.floor(pair / LIMB);
    for (let digit = pair - high * LIMB, k = 0; k < 2; digit = high, k++) {
      let x = digit + over;
      over = x >= HALF ? 1 : 0;
      x -= over * LIMB;
      if (limb < length) f[at + limb] = sign * x;
      else if (x !== 0) throw new RangeError(`writeLimbs: expected at most ${length} limbs, got a larger integer`);
      limb++;
    }
  }
}

/** The integer in f[at … at + length), of limbs in [−2^21, 2^21]. */
export function readLimbs(f: Float64Array, at: number, length: number): bigint {
  let top = length;
  while (top > 0 && f[at + top - 1] === 0) top--;
  if (top === 0) return 0n;
  if (top <= SHORT) {
    let value = 0n;
    for (let k = top - 1; k >= 0; k -= 2) {
      const pair = k > 0 ? (f[at + k] as number) * LIMB + (f[at + k - 1] as number) : (f[at] as number);
      value = (value << (k > 0 ? PAIR_BITS : LONE_BITS)) + BigInt(pair);
    }
    return value;
  }
  // Each pair is written with a borrow so that it lies in 0 … 2^44 − 1; what is left over beyond the last pair is the sign's.
  let hex = '';
  let borrow = 0;
  for (let k = 0; k < top; k += 2) {
    const low = (f[at + k] as number) + borrow;
    const lowDigit = low - Math.floor(low / LIMB) * LIMB;
    const high = (k + 1 < top ? (f[at + k + 1] as number) : 0) + Math.floor(low / LIMB);
    const highDigit = high - Math.floor(high / LIMB) * LIMB;
    borrow = Math.floor(high / LIMB);
    hex = (highDigit * LIMB + lowDigit).toString(16).padStart(HEX_PER_PAIR, '0') + hex;
  }
  const bits = BigInt(4 * hex.length);
  return (BigInt(borrow) << bits) + BigInt(`0x${hex}`);
}

/**
 * The integer in limbs as mantissa × 2^exponent, right to a few units of 2^−53: the sum begins at the highest non-zero
 * limb and takes four limbs (66 bits at least). `out` receives [mantissa, exponent]; exponent 0 for zero.
 */
export function leading(f: Float64Array, at: number, length: number, out: [number, number]): void {
  let top = length - 1;
  while (top >= 0 && f[at + top] === 0) top--;
  let sum = 0;
  let low = top;
  for (let taken = 0; taken < 4 && low >= 0; taken++, low--) sum = sum * LIMB + (f[at + low] as number);
  out[0] = sum;
  out[1] = top < 0 ? 0 : LIMB_BITS * (low + 1);
}

/** x·2^k without needless overflow or underflow. */
export function timesPowerOfTwo(x: number, k: number): number {
  if (k > 1000) return timesPowerOfTwo(x * 2 ** 1000, k - 1000);
  if (k < -1000) return x === 0 || k < -2200 ? 0 * x : timesPowerOfTwo(x * 2 ** -1000, k + 1000);
  return x * 2 ** k;
}
