/** How far an expression and a value agree. */
import { type Ball, subtract } from '../number/ball.ts';
import { absolute, log10Of } from '../number/integer.ts';

const LOG10_2 = Math.log10(2);

/** log10 of the size of a ball's midpoint; −Infinity for zero. */
export function sizeLog10(x: Ball): number {
  return log10Of(x.mid) - x.bits * LOG10_2;
}

/**
 * Digits to which value and expression agree: −log10 of (|difference| + both radii) over |value|, so that digits which
 * nobody vouches for never count. Never negative.
 *
 * For several columns (real and imaginary part) pass the size of the whole value as `scaleLog10`.
 */
export function agreementDigits(value: Ball, expression: Ball, scaleLog10 = sizeLog10(value)): number {
  const gap = subtract(value, expression);
  const size = absolute(gap.mid) + gap.rad;
  if (size === 0n) return Number.POSITIVE_INFINITY;
  return Math.max(0, scaleLog10 - (log10Of(size) - gap.bits * LOG10_2));
}

/** Digits to which the midpoints agree, whatever the radii: where the written digits part from the expression. */
export function midpointAgreement(value: Ball, expression: Ball, scaleLog10 = sizeLog10(value)): number {
  const gap = subtract({ ...value, rad: 0n }, { ...expression, rad: 0n });
  if (gap.mid === 0n) return Number.POSITIVE_INFINITY;
  return Math.max(0, scaleLog10 - sizeLog10(gap));
}

/** Digits of the value that its own radius leaves right. */
export function vouchedDigits(value: Ball, scaleLog10 = sizeLog10(value)): number {
  if (value.rad === 0n) return Number.POSITIVE_INFINITY;
  return Math.max(0, scaleLog10 - (log10Of(value.rad) - value.bits * LOG10_2));
}
