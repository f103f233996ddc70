/**
 * Euler's constant by Brent and McMillan, Math. Comp. 34 (1980) 305, third algorithm:
 *
 *   γ = S/I − T/I² − log n,  I = Σ_{k<N} n^{2k}/k!²,  S = Σ_{k<N} H_k n^{2k}/k!²,
 *   T = (1/4n) Σ_{k<2n} (2k)!³/(k!⁴ 8^{2k} (2n)^{2k}),
 *
 * N = ⌈αn⌉ with α(log α − 1) = 3. Truncation: the error is below 24 e^{−8n} (Brent and Johansson, Math. Comp. 84 (2015) 2351,
 * theorem 1). All sums are exact fractions by binary splitting; three divisions and a product round.
 */
import type { Ball } from '../number/ball.ts';
import { smoothLog } from '../number/reduction.ts';
import { splitSeries } from '../number/splitting.ts';

const ALPHA = 4.970625759544233;

/** Exact sums over a range of k: P, Q products of n², k²; T/Q the sum of products; C/D the harmonic sum; V/(QD) the weighted one. */
interface Harmonic {
  readonly P: bigint;
  readonly Q: bigint;
  readonly T: bigint;
  readonly C: bigint;
  readonly D: bigint;
  readonly V: bigint;
}

function harmonicSplit(square: bigint, from: number, to: number): Harmonic {
  if (to - from === 1) {
    const k = BigInt(from);
    return { P: square, Q: k * k, T: square, C: 1n, D: k, V: square };
  }
  const middle = (from + to) >> 1;
  const l = harmonicSplit(square, from, middle);
  const r = harmonicSplit(square, middle, to);
  return {
    P: l.P * r.P,
    Q: l.Q * r.Q,
    T: l.T * r.Q + l.P * r.T,
    C: l.C * r.D + l.D * r.C,
    D: l.D * r.D,
    V: l.V * (r.Q * r.D) + l.P * (l.C * (r.T * r.D) + l.D * r.V),
  };
}

/** The least number ≥ n without prime factors above 7, and its exponents of 2, 3, 5, 7. */
function smoothAbove(n: number): { value: number; exponents: readonly number[] } {
  for (let value = n; ; value++) {
    let rest = value;
    const exponents = [2, 3, 5, 7].map((p) => {
      let e = 0;
      while (rest % p === 0) {
        rest /= p;
        e++;
      }
      return e;
    });
    if (rest === 1) return { value, exponents };
  }
}

/** γ with `work` fraction bits. Rounding: S/I 1 unit, T/I² less than 4, truncation less than 1, each log p 2 units times its exponent. */
export function eulerGamma(work: number): Ball {
  const { value: n, exponents } = smoothAbove(Math.ceil((work * Math.LN2 + Math.log(24)) / 8) + 1);
  const square = BigInt(n) * BigInt(n);
  const bits = BigInt(work);
  const { Q, T, D, V } = harmonicSplit(square, 1, Math.ceil(ALPHA * n));
  const ratio = (V << bits) / (D * (Q + T));
  const tail = splitSeries(
    { p: (k) => BigInt(2 * k - 1) ** 3n, q: (k) => BigInt(32 * k) * square, a: () => 1n },
    1,
    2 * n,
  );
  const inverse = (Q << bits) / (Q + T);
  const correction = ((tail.Q + tail.T) << bits) / (tail.Q * BigInt(4 * n));
  const square2 = (inverse * inverse) >> bits;
  let mid = ratio - ((square2 * correction) >> bits);
  let rad = 6n;
  [2n, 3n, 5n, 7n].forEach((p, j) => {
    const e = BigInt(exponents[j] as number);
    if (e === 0n) return;
    const log = smoothLog(p, work);
    mid -= e * log.mid;
    rad += e * log.rad;
  });
  return { mid, rad, bits: work };
}
