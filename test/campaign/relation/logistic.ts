/** The parameter r of the map x → r·x·(1 − x) at which its cycle of length 2^k loses stability: multiplier −1. From the map alone. */
import type { Ball } from '../../../src/number/ball.ts';

/** Newton's iteration on (x, r) for f^N(x) = x, (f^N)'(x) = −1, in fixed point, with derivatives carried along. */
export function bifurcationPoint(period: number, near: number, digits: number): Ball {
  const bits = Math.ceil(digits / Math.log10(2)) + 128;
  const one = 1n << BigInt(bits);
  const times = (a: bigint, b: bigint): bigint => (a * b) >> BigInt(bits);
  let r = BigInt(Math.round(near * 2 ** 52)) << BigInt(bits - 52);
  let x = BigInt(Math.round(cyclePoint(period, near) * 2 ** 52)) << BigInt(bits - 52);
  for (let step = 0; step < 60; step++) {
    let [y, yx, yr, mult, multX, multR] = [x, one, 0n, one, 0n, 0n];
    for (let k = 0; k < period; k++) {
      const slope = one - 2n * y;
      const factor = times(r, slope);
      multX = times(multX, factor) - 2n * times(mult, times(r, yx));
      multR = times(multR, factor) + times(mult, slope - 2n * times(r, yr));
      mult = times(mult, factor);
      const image = times(y, one - y);
      [yx, yr] = [times(factor, yx), image + times(factor, yr)];
      y = times(r, image);
    }
    const [f, g] = [y - x, mult + one];
    const [fx, fr] = [yx - one, yr];
    const det = times(fx, multR) - times(fr, multX);
    const dx = ((times(f, multR) - times(fr, g)) * one) / det;
    const dr = ((times(fx, g) - times(f, multX)) * one) / det;
    x -= dx;
    r -= dr;
    const size = dr < 0n ? -dr : dr;
    if (size < 1n << 40n) return { mid: r, rad: 1n << 100n, bits };
  }
  throw new Error('bifurcationPoint: no convergence');
}

/** A point of the attracting cycle for a parameter a little below, by iteration. */
function cyclePoint(period: number, r: number): number {
  let x = 0.4;
  for (let k = 0; k < 200_000 * period; k++) x = (r - 1e-5) * x * (1 - x);
  return x;
}
