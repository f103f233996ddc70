/** How many integer vectors there are: what a relation's coefficients could encode by chance. */
import { log10BallVolume } from '../relation/significance.ts';

/** Above this many the volume of the ball is used instead of counting. */
const EXACT_LIMIT = 2000;

/**
 * log10 of the number of non-zero integer vectors of dimension m with Euclidean norm at most 10^normLog10, up to sign.
 * Counted exactly for norm² up to 2000, from the volume of the ball of radius² N² + m/12 beyond (every integer point
 * carries its unit cube, whose mean squared distance from the centre is m/12).
 */
export function vectorsLog10(m: number, normLog10: number): number {
  if (!Number.isInteger(m) || m < 1) throw new RangeError(`vectorsLog10: expected a positive dimension, got ${m}`);
  const squared = 10 ** (2 * normLog10);
  if (squared <= EXACT_LIMIT) return Math.log10(Math.max(1, (countUpTo(m, Math.round(squared)) - 1) / 2));
  const radius = normLog10 > 8 ? normLog10 : Math.log10(squared + m / 12) / 2;
  return log10BallVolume(m) + m * radius - Math.log10(2);
}

/** Integer vectors of dimension m with squared norm at most s, the zero vector included, by convolving with the squares. */
function countUpTo(m: number, s: number): number {
  let counts = new Float64Array(s + 1);
  counts[0] = 1;
  for (let k = 0; k < m; k++) {
    const next = new Float64Array(s + 1);
    for (let n = 0; n <= s; n++) {
      const base = counts[n] as number;
      if (base === 0) continue;
      next[n] = (next[n] as number) + base;
      for (let r = 1; n + r * r <= s; r++) next[n + r * r] = (next[n + r * r] as number) + 2 * base;
    }
    counts = next;
  }
  return counts.reduce((sum, c) => sum + c, 0);
}
