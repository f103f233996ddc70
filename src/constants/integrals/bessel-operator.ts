/**
 * The differential operator of products of n functions I₀, K₀, and the ε-expanded recurrence of its Frobenius solution.
 *
 * With θ = t d/dt: L₀ = 1, L₁ = θ, L_{k+1} = θL_k − k(n+1−k) t² L_{k−1}; L_{n+1} annihilates I₀^a K₀^b, n = a + b (Bronstein,
 * Mulders and Weil, ISSAC 1997; Borwein and Salvy, Exper. Math. 17 (2008) 223). Written L_{n+1} = Σ_j t^{2j} p_j(θ), p₀(s) = s^{n+1}, the
 * solution Σ_m c_m(ε) t^{2m+ε} with c₀ = 1 has Σ_j p_j(2(m−j)+ε) c_{m−j}(ε) = 0.
 */

/** p_j as coefficient lists, lowest degree first; index j = 0 … ⌊(n+1)/2⌋. */
export function besselOperator(n: number): readonly (readonly bigint[])[] {
  let before: bigint[][] = [[1n]];
  let now: bigint[][] = [[0n, 1n]];
  for (let k = 1; k <= n; k++) {
    const next = now.map((p, j) => timesLinear(p, BigInt(2 * j)));
    const factor = BigInt(k * (n + 1 - k));
    before.forEach((p, j) => {
      const target = next[j + 1] ?? [];
      p.forEach((c, i) => {
        target[i] = (target[i] ?? 0n) - factor * c;
      });
      next[j + 1] = target;
    });
    before = now;
    now = next;
  }
  return now;
}

/** (s + shift)·p(s). */
function timesLinear(p: readonly bigint[], shift: bigint): bigint[] {
  const result = [0n, ...p];
  p.forEach((c, i) => {
    result[i] = (result[i] as bigint) + shift * c;
  });
  return result;
}

/** p(at + ε) mod ε^size. */
export function taylorShift(p: readonly bigint[], at: bigint, size: number): bigint[] {
  const work = [...p];
  const result: bigint[] = [];
  for (let i = 0; i < size; i++) {
    // Synthetic division by (s − at): the remainder is the next Taylor coefficient.
    for (let d = work.length - 2; d >= i; d--) work[d] = (work[d] as bigint) + at * (work[d + 1] as bigint);
    result.push(work[i] ?? 0n);
  }
  return result;
}

/** Product of two truncated polynomials mod ε^size. */
export function truncatedProduct(a: readonly bigint[], b: readonly bigint[], size: number): bigint[] {
  const result = Array<bigint>(size).fill(0n);
  a.forEach((x, i) => {
    if (x === 0n) return;
    for (let j = 0; i + j < size && j < b.length; j++) {
      result[i + j] = (result[i + j] as bigint) + x * (b[j] as bigint);
    }
  });
  return result;
}
