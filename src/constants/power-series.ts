/**
 * Polylogarithms by their power series, several s in one pass.
 *
 * **Direct sum** for rationals |x| ≤ 0.7: a power errs by less than 1/(1 − |x|) < 4 units, a summand by less than 5, the tail
 * is less than |x|^N/(1 − |x|), made less than one unit.
 */
import type { Ball } from '../number/ball.ts';
import { bitLength } from '../number/integer.ts';
import type { EvaluationContext } from './family.ts';
import { pulse } from './polylog-kernels.ts';

/** Σ_{k≥1} x^k/k^s for rational x = p/q, |x| ≤ 0.7, for each exponent. */
export function directSums(
  p: bigint,
  q: bigint,
  exponents: readonly number[],
  work: number,
  context: EvaluationContext,
): Ball[] {
  return directOdd(p, q, p, q, 1, 1, exponents, work, context);
}

/** Σ_{k≥0} first·ratio^k/(stride·k + offset)^s with |first| ≤ 1, |ratio| ≤ 0.7. */
export function directOdd(
  firstP: bigint,
  firstQ: bigint,
  p: bigint,
  q: bigint,
  stride: number,
  offset: number,
  exponents: readonly number[],
  work: number,
  context: EvaluationContext,
): Ball[] {
  const ratio = Math.abs(Number((p << 60n) / q)) * 2 ** -60 + 1e-15;
  const n = Math.ceil((work + 2 + Math.log2(1 / (1 - ratio))) / -Math.log2(ratio)) + 1;
  const powers = exponents.map(BigInt);
  const sums = exponents.map(() => 0n);
  const halving = p === 1n && (q & (q - 1n)) === 0n ? BigInt(bitLength(q) - 1) : 0n;
  let term = (firstP << BigInt(work)) / firstQ;
  for (let k = 0; k < n; k++) {
    const base = BigInt(stride * k + offset);
    for (let e = 0; e < powers.length; e++) {
      sums[e] = (sums[e] as bigint) + term / base ** (powers[e] as bigint);
    }
    if (halving > 0n && term >= 0n) term >>= halving;
    else term = (term * p) / q;
    pulse(k + 1, n, context);
  }
  return sums.map((mid) => ({ mid, rad: BigInt(5 * n + 2), bits: work }));
}

/**
 * Li_s(sign·φ^−m) = Σ sign^k φ^{−mk}/k^s with F_{N−mk}/F_N for φ^{−mk}: that errs by less than 1/F_N a term, and so do the truncated
 * divisions; what is left out is less than 3 φ^−N < 3/F_N. F_N ≥ 2^work (2N + 4) makes it all less than one unit, and the
 * quotient adds one.
 */
export function goldenSums(
  m: number,
  sign: 1 | -1,
  exponents: readonly number[],
  work: number,
  context: EvaluationContext,
): Ball[] {
  const count = Math.ceil((work + 4 + Math.log2(2 * work + 100)) / (Math.log2((1 + Math.sqrt(5)) / 2) * m)) + 2;
  const top = count * m;
  let [lower, upper] = fibonacciPair(top);
  const whole = upper;
  const powers = exponents.map(BigInt);
  const sums = exponents.map(() => 0n);
  for (let k = 1; k <= count; k++) {
    for (let j = 0; j < m; j++) [lower, upper] = [upper - lower, lower];
    const weight = sign < 0 && k % 2 === 1 ? -upper : upper;
    for (let e = 0; e < powers.length; e++) sums[e] = (sums[e] as bigint) + weight / BigInt(k) ** (powers[e] as bigint);
    pulse(k, count, context);
  }
  return sums.map((sum) => ({ mid: (sum << BigInt(work)) / whole, rad: 2n, bits: work }));
}

/** F_{n−1}, F_n by doubling. */
function fibonacciPair(n: number): [bigint, bigint] {
  if (n === 1) return [0n, 1n];
  const half = n >> 1;
  const [before, at] = fibonacciPair(half);
  // F_{2h−1} = F_h² + F_{h−1}², F_{2h} = F_h (2F_{h−1} + F_h)
  const odd = at * at + before * before;
  const even = at * (2n * before + at);
  return n % 2 === 0 ? [odd, even] : [even, odd + even];
}
