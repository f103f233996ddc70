/** Binary splitting of hypergeometric series: Haible and Papanikolaou, "Fast multiprecision evaluation of series of rational numbers", ANTS-III (1998). */

/** Σ a(n) Π_{k=from…n} p(k)/q(k) over from ≤ n < to equals T/Q; P and Q are the products of all p and q. */
export interface Split {
  readonly P: bigint;
  readonly Q: bigint;
  readonly T: bigint;
}

export interface SeriesTerms {
  p(n: number): bigint;
  q(n: number): bigint;
  a(n: number): bigint;
}

/** Below this many terms a plain loop beats the recursion in V8. */
const BLOCK = 6;

/** The exact sum of the terms from ≤ n < to. `to` > `from`. */
export function splitSeries(terms: SeriesTerms, from: number, to: number): Split {
  if (to - from <= BLOCK) return block(terms, from, to);
  const middle = (from + to) >> 1;
  const left = splitSeries(terms, from, middle);
  const right = splitSeries(terms, middle, to);
  return { P: left.P * right.P, Q: left.Q * right.Q, T: left.T * right.Q + left.P * right.T };
}

function block(terms: SeriesTerms, from: number, to: number): Split {
  let P = terms.p(from);
  let Q = terms.q(from);
  let T = terms.a(from) * P;
  for (let n = from + 1; n < to; n++) {
    const q = terms.q(n);
    P *= terms.p(n);
    Q *= q;
    T = T * q + terms.a(n) * P;
  }
  return { P, Q, T };
}

/** Π f(n) over from ≤ n < to by halving; 1 for an empty range. */
export function splitProduct(f: (n: number) => bigint, from: number, to: number): bigint {
  if (to - from <= 8) {
    let product = 1n;
    for (let n = from; n < to; n++) product *= f(n);
    return product;
  }
  const middle = (from + to) >> 1;
  return splitProduct(f, from, middle) * splitProduct(f, middle, to);
}
