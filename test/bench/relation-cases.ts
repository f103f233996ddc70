/** The inputs of the relation benchmark; made the same way in Node and in a browser worker, from SHA-256 in counter mode. */

export interface Case {
  readonly name: string;
  readonly integers: readonly bigint[];
  /** The planted relation, or a coefficient known from the literature. */
  readonly expected: { readonly relation?: readonly bigint[]; readonly first?: bigint };
  readonly n: number;
  readonly digits: number;
}

export interface Random {
  bits(bits: number): bigint;
  below(limit: bigint): bigint;
}

/** n uniform numbers of `digits` digits with a planted relation of `height`-digit coefficients. */
export function plantedCase(random: Random, n: number, height: number, digits: number): Case {
  const bits = bitsOf(digits);
  const limit = 10n ** BigInt(height);
  const relation = Array.from({ length: n }, () => random.below(2n * limit - 1n) - limit + 1n);
  if (relation[n - 1] === 0n) relation[n - 1] = 1n;
  const integers = Array.from({ length: n }, () => random.bits(bits));
  let sum = 0n;
  for (let i = 0; i < n - 1; i++) sum += (relation[i] as bigint) * (integers[i] as bigint);
  integers[n - 1] = -sum / (relation[n - 1] as bigint);
  return { name: `${n}/${height}/${digits}`, integers, expected: { relation }, n, digits };
}

/**
 * Powers 0 … 120 of α = r·(r − 2), where r is the parameter at which the 8-cycle of x → r·x·(1 − x) loses stability; computed from the
 * map itself. α has degree 120, with constant coefficient 257^30 (Bailey and Broadhurst, Math. Comp. 70 (2001) 1719, §5).
 */
export function bifurcationCase(digits: number): Case {
  const bits = bitsOf(digits);
  const guard = 64;
  const alpha = bifurcationPoint(bits + guard);
  const integers: bigint[] = [1n << BigInt(bits + guard)];
  for (let k = 1; k <= 120; k++) integers.push(((integers[k - 1] as bigint) * alpha) >> BigInt(bits + guard));
  // The relative error of α^120 is 120 times that of α; `digits` digits of the largest power are kept.
  const drop = BigInt((integers[120] as bigint).toString(2).length - bits);
  return {
    name: 'degree 120',
    integers: integers.map((x) => x >> drop),
    expected: { first: 257n ** 30n },
    n: 121,
    digits,
  };
}

function bitsOf(digits: number): number {
  return Math.ceil(digits * Math.log2(10));
}

/**
 * r·(r − 2) to `bits` fraction bits, by Newton's iteration for (x, r) with f⁸(x) = x and (f⁸)'(x) = −1, on doubling precision. The
 * derivatives are carried along the cycle: D = ∂x₈/∂x, R = ∂x₈/∂r, DD = ∂D/∂x, DR = ∂D/∂r.
 */
export function bifurcationPoint(bits: number): bigint {
  const target = bits + 64;
  let w = 64;
  let [x, r] = startInDoubles().map((value) => BigInt(Math.round(value * 2 ** 52)) << 12n) as [bigint, bigint];
  for (let good = 40; good < target; ) {
    good = Math.min(target, 2 * good - 12);
    const next = good + 64;
    x <<= BigInt(next - w);
    r <<= BigInt(next - w);
    w = next;
    const shift = BigInt(w);
    const one = 1n << shift;
    const times = (a: bigint, b: bigint): bigint => (a * b) >> shift;
    let [X, D, R, DD, DR] = [x, one, 0n, 0n, 0n];
    for (let k = 0; k < 8; k++) {
      const slope = times(r, one - 2n * X);
      const byR = times(X, one - X);
      const [nDD, nDR] = [
        -2n * times(r, times(D, D)) + times(slope, DD),
        times(one - 2n * X - 2n * times(r, R), D) + times(slope, DR),
      ];
      [X, R, D] = [times(r, byR), times(slope, R) + byR, times(slope, D)];
      [DD, DR] = [nDD, nDR];
    }
    const [f, g, a] = [X - x, D + one, D - one];
    const det = times(a, DR) - times(R, DD);
    x -= ((times(f, DR) - times(R, g)) << shift) / det;
    r -= ((times(a, g) - times(DD, f)) << shift) / det;
  }
  const value = (r * (r - (2n << BigInt(w)))) >> BigInt(w);
  return value >> BigInt(w - bits);
}

/** The same in doubles, from a point of the attracting 8-cycle just below r ≈ 3.5644. */
function startInDoubles(): [number, number] {
  let r = 3.5643;
  let x = 0.5;
  for (let k = 0; k < 80_000; k++) x = r * x * (1 - x);
  for (let round = 0; round < 40; round++) {
    let [X, D, R, DD, DR] = [x, 1, 0, 0, 0];
    for (let k = 0; k < 8; k++) {
      const slope = r * (1 - 2 * X);
      const byR = X * (1 - X);
      [DD, DR] = [-2 * r * D * D + slope * DD, (1 - 2 * X - 2 * r * R) * D + slope * DR];
      [X, R, D] = [r * byR, slope * R + byR, slope * D];
    }
    const [f, g, a] = [X - x, D + 1, D - 1];
    const det = a * DR - R * DD;
    x -= (f * DR - R * g) / det;
    r -= (a * g - DD * f) / det;
  }
  return [x, r];
}
