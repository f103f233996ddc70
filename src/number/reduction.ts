/**
 * π and the logarithms of 2, 3, 5, 7: the constants that reducing an argument needs. Each is remembered at the highest
 * precision asked for so far, and only ever extended; a memory changes the time of a result, never the result's validity.
 */
import { type Ball, withBits } from './ball.ts';
import { integerSqrt } from './integer.ts';
import { splitSeries } from './splitting.ts';

/** Computes a constant to a radius of at most 2^−bits. */
type Compute<T> = (bits: number) => T;

/** The most precise result so far, computed again (with an eighth more bits than asked for after the first time) when it is too short. */
function remembered<T>(compute: Compute<T>): Compute<T> {
  let known: { bits: number; value: T } | undefined;
  return (bits) => {
    if (known === undefined || known.bits < bits) {
      const target = known === undefined ? bits : bits + (bits >> 3);
      known = { bits: target, value: compute(target) };
    }
    return known.value;
  };
}

const C3_OVER_24 = 10939058860032000n;
const A = 13591409n;
const B = 545140134n;
/** log2(640320³/1728). */
const BITS_PER_TERM = 47.11;

/**
 * π by the series of Chudnovsky and Chudnovsky (1988).
 *
 * Truncation: the series alternates and (6n)!/((3n)! n!³) ≤ 1728ⁿ, so that after N terms its relative error is below
 * (1 + 40.2 N) 2^{−47.11 N}; N ≥ w/47.11 + 2 makes that less than 2^−w/64 for every N < 10¹¹. Rounding: the integer square
 * root is short by less than one unit in 100·2^w, the quotient by less than one unit of 2^−w. Radius: 2 units.
 */
export function computePi(bits: number): Ball {
  const work = bits + 4;
  const count = Math.floor(work / BITS_PER_TERM) + 3;
  const { Q, T } = splitSeries(
    {
      p: (n) => {
        const six = BigInt(6 * n);
        return -((six - 5n) * (six - 1n) * BigInt(2 * n - 1));
      },
      q: (n) => {
        const k = BigInt(n);
        return k * k * k * C3_OVER_24;
      },
      a: (n) => A + B * BigInt(n),
    },
    1,
    count,
  );
  const root = integerSqrt(10005n << BigInt(2 * work));
  return { mid: (426880n * Q * root) / (A * Q + T), rad: 2n, bits: work };
}

const rememberedPi = remembered(computePi);

/** π with `bits` fraction bits and a radius of at most two units. */
export function piBall(bits: number): Ball {
  return withBits(rememberedPi(bits), bits);
}

/**
 * acoth x for an integer x ≥ 2, in units of 2^−work, too small by less than 2.
 *
 * Σ_{k<N} 1/((2k+1) x^{2k+1}); what is left out is less than 2·x^{−2N−1}/(2N+1) < 1 unit; the quotient is floored.
 */
export function acothFixed(x: bigint, work: number): bigint {
  const count = Math.max(2, Math.ceil(work / (2 * Math.log2(Number(x)))) + 1);
  const square = x * x;
  const { Q, T } = splitSeries(
    { p: (k) => BigInt(2 * k - 1), q: (k) => BigInt(2 * k + 1) * square, a: () => 1n },
    1,
    count,
  );
  return ((Q + T) << BigInt(work)) / (Q * x);
}

/** The primes whose logarithms come together. */
export const SMOOTH_PRIMES: readonly bigint[] = [2n, 3n, 5n, 7n];
const ACOTH_ARGUMENTS = [251n, 449n, 4801n, 8749n] as const;
/**
 * log of 2, 3, 5, 7 as integer combinations of 2 acoth of 251, 449, 4801, 8749. They invert
 * 252/250 = 2·3²·5⁻³·7, 450/448 = 2⁻⁵·3²·5²·7⁻¹, 4802/4800 = 2⁻⁵·3⁻¹·5⁻²·7⁴, 8750/8748 = 2⁻¹·3⁻⁷·5⁴·7.
 */
const COMBINATIONS = [
  [72n, 27n, -19n, 31n],
  [114n, 43n, -30n, 49n],
  [167n, 63n, -44n, 72n],
  [202n, 76n, -53n, 87n],
] as const;

/** The four logarithms. Radius: errors below 2 units each, combined, are below 2·2·(202 + 76 + 53 + 87) < 2¹¹ units. */
function computeLogs(bits: number): readonly Ball[] {
  const work = bits + 14;
  const values = ACOTH_ARGUMENTS.map((x) => acothFixed(x, work));
  return COMBINATIONS.map((row) => {
    const mid = row.reduce((sum, k, j) => sum + 2n * k * (values[j] as bigint), 0n);
    return { mid, rad: 1n << 11n, bits: work };
  });
}

const rememberedLogs = remembered(computeLogs);

/** log p for p = 2, 3, 5 or 7, with `bits` fraction bits and a radius of at most two units. Throws RangeError for another p. */
export function smoothLog(prime: bigint, bits: number): Ball {
  const index = SMOOTH_PRIMES.indexOf(prime);
  const log = rememberedLogs(bits)[index];
  if (log === undefined) throw new RangeError(`smoothLog: expected 2, 3, 5 or 7, got ${prime}`);
  return withBits(log, bits);
}

/** log 2 with `bits` fraction bits and a radius of at most two units. */
export function logTwo(bits: number): Ball {
  return smoothLog(2n, bits);
}
