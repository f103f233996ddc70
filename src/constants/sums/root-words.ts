/** Words at roots of unity, evaluated together: picks the smallest ring for each and turns the passes into balls. */
import { add, type Ball, fromInteger, multiply, negate, sqrt, timesPowerOfTwo, withBits } from '../../number/ball.ts';
import type { ComplexBall, Value } from '../../number/complex.ts';
import type { EvaluationContext } from '../family.ts';
import { PAIR_STEP, REAL_STEP, tailsSize } from './double-tails.ts';
import { eisenstein, gaussian, type PairRing, pairTails } from './pair-tails.ts';
import { type Plan, planWords } from './plan.ts';
import { realTails } from './real-tails.ts';
import { type RingOrder, ringSize, ringTails } from './ring-tails.ts';
import { rootSymmetry, wordAtRoots } from './words.ts';

/** A convergent nested sum: indices s_j ≥ 1 and arguments e^{2πi·exponents_j/order}; s₁ = 1 only with exponent ≠ 0. */
export interface RootSum {
  readonly indices: readonly number[];
  readonly exponents: readonly number[];
  readonly order: number;
}

/** The same sum with the least order that carries its arguments. */
export function lowestOrder(sum: RootSum): RootSum {
  let common = sum.order;
  for (const e of sum.exponents) common = gcdNumber(common, e);
  return {
    indices: sum.indices,
    exponents: sum.exponents.map((e) => (e / common) % (sum.order / common)),
    order: sum.order / common,
  };
}

function gcdNumber(a: number, b: number): number {
  return b === 0 ? a : gcdNumber(b, a % b);
}

export type Ring = 2 | 4 | 6 | 8 | 12;

/** The ring that holds the roots of this order. Throws RangeError for other orders than 1, 2, 3, 4, 6, 8, 12. */
export function ringOf(order: number): Ring {
  if (order <= 2) return 2;
  if (order === 4) return 4;
  if (order === 3 || order === 6) return 6;
  if (order === 8 || order === 12) return order;
  throw new RangeError(`ringOf: expected a root of unity of order 1, 2, 3, 4, 6, 8 or 12, got ${order}`);
}

/** The sums as balls with a radius of at most 2^−bits; real balls for the orders 1 and 2, complex ones otherwise. */
export function evaluateRootSums(sums: readonly RootSum[], bits: number, context: EvaluationContext): Value[] {
  const results: Value[] = sums.map(() => fromInteger(0n));
  const groups = new Map<Ring, number[]>();
  const lowest = sums.map(lowestOrder);
  lowest.forEach((sum, k) => {
    const ring = ringOf(sum.order);
    groups.set(ring, [...(groups.get(ring) ?? []), k]);
  });
  for (const [order, members] of groups) {
    const words = members.map((k) => {
      const sum = lowest[k] as RootSum;
      return wordAtRoots(
        sum.indices,
        sum.exponents.map((e) => (e * order) / sum.order),
        order,
      );
    });
    const values = evaluateRootWords(words, order, bits, context);
    members.forEach((k, j) => {
      results[k] = values[j] as Value;
    });
  }
  return results;
}

/** Words with the letters e^{2πi·e/order} as code 1 + e; see `evaluateRootSums`. */
export function evaluateRootWords(
  words: readonly string[],
  order: Ring,
  bits: number,
  context: EvaluationContext,
): Value[] {
  const plan = planWords(words, rootSymmetry(order));
  if (order === 2) return realAnswers(plan, bits, context);
  if (order === 8 || order === 12) return ringAnswers(plan, order, bits, context);
  return pairAnswers(plan, order === 4 ? gaussian : eisenstein, bits, context);
}

function realAnswers(plan: Plan, bits: number, context: EvaluationContext): Ball[] {
  const size = tailsSize(bits + 1, plan.length, REAL_STEP);
  const values = realTails(plan, size, context);
  return plan.answers.map(({ core, sign }) => {
    const mid = values[core] as bigint;
    return withBits({ mid: sign === 1 ? mid : -mid, rad: size.radius, bits: size.work }, bits + 2);
  });
}

function pairAnswers(plan: Plan, ring: PairRing, bits: number, context: EvaluationContext): Value[] {
  const size = tailsSize(bits + 3, plan.length, PAIR_STEP);
  const { x, y } = pairTails(plan, ring, size, context);
  // With |error| ≤ r as a complex number, each of the real and the imaginary part is wrong by at most r.
  const half = ring.trace === 1 ? timesPowerOfTwo(sqrt(fromInteger(3n), size.work), -1) : fromInteger(1n);
  return plan.answers.map(({ core, sign, conjugate }) => {
    const exact = (mid: bigint): Ball => ({ mid: sign === 1 ? mid : -mid, rad: 0n, bits: size.work });
    const error: Ball = { mid: 0n, rad: size.radius, bits: size.work };
    const first = exact(x[core] as bigint);
    const second = exact(y[core] as bigint);
    const re = ring.trace === 1 ? add(first, timesPowerOfTwo(second, -1)) : first;
    const im = ring.trace === 1 ? multiply(second, half, size.work) : second;
    return {
      re: withBits(add(re, error), bits + 3),
      im: withBits(add(conjugate ? negate(im) : im, error), bits + 3),
    };
  });
}

function ringAnswers(plan: Plan, order: RingOrder, bits: number, context: EvaluationContext): ComplexBall[] {
  const size = ringSize(plan, order, bits + 3);
  const values = ringTails(plan, order, size, context);
  const roots = rootValues(order, size.work);
  const error: Ball = { mid: 0n, rad: size.radius, bits: size.work };
  return plan.answers.map(({ core, sign, conjugate }) => {
    const [first = 0n, ...rest] = values[core] as bigint[];
    let re: Ball = { mid: first, rad: 0n, bits: size.work };
    let im: Ball = fromInteger(0n);
    rest.forEach((x, j) => {
      const root = roots[j] as ComplexBall;
      const coordinate = { mid: x, rad: 0n, bits: size.work };
      re = add(re, multiply(coordinate, root.re, size.work));
      im = add(im, multiply(coordinate, root.im, size.work));
    });
    const part = (x: Ball, flip: boolean): Ball => withBits(add(flip ? negate(x) : x, error), bits + 3);
    return { re: part(re, sign < 0), im: part(im, sign < 0 !== conjugate) };
  });
}

/** e^{2πi·e/order} for e = 1 … order − 1. */
function rootValues(order: RingOrder, bits: number): ComplexBall[] {
  const zero = fromInteger(0n);
  const one = fromInteger(1n);
  const half = timesPowerOfTwo(one, -1);
  const irrational = timesPowerOfTwo(sqrt(fromInteger(order === 8 ? 2n : 3n), bits), -1);
  // cos(2πe/order) for the first quarter turn.
  const quarter = order === 8 ? [one, irrational, zero] : [one, irrational, half, zero];
  const steps = quarter.length - 1;
  const cosine = (e: number): Ball => {
    const folded = e > order / 2 ? order - e : e;
    return folded <= steps ? (quarter[folded] as Ball) : negate(quarter[2 * steps - folded] as Ball);
  };
  return Array.from({ length: order - 1 }, (_, k) => ({
    re: cosine(k + 1),
    im: cosine((k + 1 + order - steps) % order),
  }));
}
