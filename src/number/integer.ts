/** Exact integer helpers on native BigInt. */

export function absolute(value: bigint): bigint {
  return value < 0n ? -value : value;
}

/** Number of bits of |value|; 0 for 0. */
export function bitLength(value: bigint): number {
  const size = value < 0n ? -value : value;
  if (size <= 0x7fffffffn) return 32 - Math.clz32(Number(size));
  const hex = size.toString(16);
  return 4 * (hex.length - 1) + (32 - Math.clz32(Number.parseInt(hex[0] as string, 16)));
}

/** value / 2^shift rounded to nearest, halves up. */
export function roundShift(value: bigint, shift: number): bigint {
  if (shift <= 0) return value << BigInt(-shift);
  return ((value >> BigInt(shift - 1)) + 1n) >> 1n;
}

/** ⌊√value⌋ for value ≥ 0: Zimmermann, "Karatsuba square root", INRIA research report 3805 (1999). */
export function integerSqrt(value: bigint): bigint {
  if (value < 0n) throw new RangeError('integerSqrt: expected a non-negative integer');
  const length = bitLength(value);
  return squareRootWithRest(value, length + (length & 1)).root;
}

/** ⌊√value⌋ and value − ⌊√value⌋², for a value of `length` bits or one less, `length` even. */
function squareRootWithRest(value: bigint, length: number): { root: bigint; rest: bigint } {
  if (length <= 50) {
    const root = BigInt(Math.floor(Math.sqrt(Number(value))));
    return { root, rest: value - root * root };
  }
  const quarter = BigInt(length >> 2);
  const mask = (1n << quarter) - 1n;
  const high = squareRootWithRest(value >> (2n * quarter), length - 2 * (length >> 2));
  const dividend = (high.rest << quarter) | ((value >> quarter) & mask);
  const divisor = 2n * high.root;
  const quotient = dividend / divisor;
  const root = (high.root << quarter) + quotient;
  const rest = ((dividend - quotient * divisor) << quarter) + (value & mask) - quotient * quotient;
  return rest < 0n ? { root: root - 1n, rest: rest + 2n * root - 1n } : { root, rest };
}

export function gcd(a: bigint, b: bigint): bigint {
  let x = absolute(a);
  let y = absolute(b);
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}

/** Greatest common divisor of a list; 0 for an empty or all-zero list. */
export function gcdOf(values: readonly bigint[]): bigint {
  return values.reduce((g, v) => gcd(g, v), 0n);
}

/** log10 |value| as a double, right to about 1e-15 relative at any size; −Infinity for 0. */
export function log10Of(value: bigint): number {
  const size = absolute(value);
  const length = bitLength(size);
  if (length <= 1000) return Math.log10(Number(size));
  const drop = length - 64;
  return Math.log10(Number(size >> BigInt(drop))) + drop * Math.LOG10E * Math.LN2;
}
