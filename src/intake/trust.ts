/** How many digits of a pasted number can be believed: a guess with its reason, and what two evaluations have in common. */
import { canonicalText, type Decimal } from '../number/decimal.ts';
import { absolute, bitLength, log10Of } from '../number/integer.ts';

export interface TrustGuess {
  readonly digits: number;
  readonly reason: 'uncertainty' | 'float' | 'zeros' | 'written';
  /** One plain sentence for the preview. */
  readonly note: string;
}

/** Binary formats by bits of the mantissa; `digits` are those that the format always carries. */
const FORMATS: readonly { bits: number; digits: number; name: string }[] = [
  { bits: 24, digits: 6, name: 'a single-precision float (24 bits)' },
  { bits: 53, digits: 15, name: 'a double (53 bits)' },
  { bits: 64, digits: 18, name: 'an extended double (64 bits)' },
  { bits: 113, digits: 33, name: 'a quadruple-precision float (113 bits)' },
];
/** Digits beyond those of a format that must fit before it is believed: odds of 10^−4 per format for random digits. */
const SURE = 4;
const SUSPICIOUS_ZEROS = 6;

/** Decimal exponent of the leading digit. */
function leadOf(d: Decimal): number {
  return d.significantDigits - 1 + d.exponent;
}

export function guessTrust(d: Decimal): TrustGuess {
  const written = d.significantDigits;
  if (d.coefficient === 0n) return { digits: 0, reason: 'written', note: 'The value is zero.' };
  if (d.uncertainty !== undefined && d.uncertainty.coefficient > 0n) {
    const u = log10Of(2n * d.uncertainty.coefficient) + d.uncertainty.exponent;
    const digits = Math.max(0, Math.min(written, Math.floor(leadOf(d) + 1 - u)));
    return { digits, reason: 'uncertainty', note: `The stated uncertainty leaves ${digits} digits.` };
  }
  const zeros = trailingZeros(d.coefficient);
  const float = FORMATS.find((f) => isFloat(d, f.bits));
  if (float !== undefined && written - zeros > 1) {
    return {
      digits: float.digits,
      reason: 'float',
      note: `The ${written} digits are exactly those of ${float.name}, which carries ${float.digits}.`,
    };
  }
  if (zeros >= SUSPICIOUS_ZEROS && zeros < written - 1) {
    const kept = written - zeros;
    return {
      digits: kept,
      reason: 'zeros',
      note: `The last ${zeros} digits are zeros and may be padding; ${kept} digits are left without them.`,
    };
  }
  return { digits: written, reason: 'written', note: `All ${written} digits written.` };
}

/** Zeros at the end; the digits are only written out when there are enough of them to matter. */
function trailingZeros(coefficient: bigint): number {
  if (coefficient % 10n ** BigInt(SUSPICIOUS_ZEROS) !== 0n) return 0;
  return /0*$/.exec(`${coefficient}`)?.[0].length ?? 0;
}

/** Whether the decimal is a `bits`-bit binary float written out, to within half a unit of its last digit. */
function isFloat(d: Decimal, bits: number): boolean {
  if (d.significantDigits < bits * Math.log10(2) + SURE || d.significantDigits > 1200) return false;
  const c = absolute(d.coefficient);
  // x = c·n/m with n, m powers of ten; the float is k·2^shift with 2^(bits−1) ≤ k < 2^bits
  const n = d.exponent >= 0 ? 10n ** BigInt(d.exponent) : 1n;
  const m = d.exponent < 0 ? 10n ** BigInt(-d.exponent) : 1n;
  const shift = bitLength(c * n) - bitLength(m) - bits;
  const [up, down] = shift >= 0 ? [1n << BigInt(shift), 1n] : [1n, 1n << BigInt(-shift)];
  const k = (2n * c * n * down + m * up) / (2n * m * up);
  const difference = absolute(k * up * m - c * n * down);
  return 2n * difference <= n * down;
}

export interface Comparison {
  /** Significant digits to which the two agree: ⌊−log10 of the relative difference⌋, at most those written. */
  readonly digits: number;
  /** Whether they agree as far as both are written. */
  readonly same: boolean;
  /** Digits written in the shorter one. */
  readonly written: number;
  /** Canonical texts of both, and the index in `first` at which their characters part. */
  readonly first: string;
  readonly second: string;
  readonly partsAt: number;
}

/** Compares two evaluations of the same quantity. */
export function compareEvaluations(a: Decimal, b: Decimal): Comparison {
  const [first, second] = [canonicalText(a), canonicalText(b)];
  let partsAt = 0;
  while (partsAt < first.length && first[partsAt] === second[partsAt]) partsAt += 1;
  const exponent = Math.min(a.exponent, b.exponent);
  const at = (d: Decimal): bigint => d.coefficient * 10n ** BigInt(d.exponent - exponent);
  const difference = absolute(at(a) - at(b));
  const written = Math.min(a.significantDigits, b.significantDigits);
  // One unit of the last digit of the shorter one: rounding alone may make that difference.
  const unit = 10n ** BigInt(Math.max(a.exponent, b.exponent) - exponent);
  if (difference <= unit) return { digits: written, same: true, written, first, second, partsAt };
  const lead = Math.max(leadOf(a), leadOf(b));
  const digits = Math.max(0, Math.min(written, Math.floor(lead - exponent - log10Of(difference) + 1)));
  return { digits, same: false, written, first, second, partsAt };
}
