/** Exact arithmetic in quadratic fields, to recognise arguments such as (√5 − 1)/2 or (1 + i√3)/4 however they are typed. */
import { addFractions, type Fraction, fraction } from './exact.ts';
import type { Term } from './term.ts';

/** a + b√d with d square-free, or b = 0 (then d = 1). */
export interface Quadratic {
  readonly a: Fraction;
  readonly b: Fraction;
  readonly d: bigint;
}

const ZERO: Fraction = { p: 0n, q: 1n };
const LARGEST_RADICAND = 1_000_000n;

function fromFraction(a: Fraction): Quadratic {
  return { a, b: ZERO, d: 1n };
}

function times(x: Fraction, y: Fraction): Fraction {
  return fraction(x.p * y.p, x.q * y.q);
}

/** The common field of two elements, or null. */
function common(x: Quadratic, y: Quadratic): bigint | null {
  if (x.b.p === 0n) return y.d;
  return y.b.p === 0n || y.d === x.d ? x.d : null;
}

function normal(a: Fraction, b: Fraction, d: bigint): Quadratic {
  return b.p === 0n ? fromFraction(a) : { a, b, d };
}

function multiply(x: Quadratic, y: Quadratic): Quadratic | null {
  const d = common(x, y);
  if (d === null) return null;
  const a = addFractions(times(x.a, y.a), times({ p: d, q: 1n }, times(x.b, y.b)));
  return normal(a, addFractions(times(x.a, y.b), times(x.b, y.a)), d);
}

function add(x: Quadratic, y: Quadratic): Quadratic | null {
  const d = common(x, y);
  return d === null ? null : normal(addFractions(x.a, y.a), addFractions(x.b, y.b), d);
}

export function invert({ a, b, d }: Quadratic): Quadratic | null {
  const norm = addFractions(times(a, a), times({ p: -d, q: 1n }, times(b, b)));
  if (norm.p === 0n) return null;
  const inverse = fraction(norm.q, norm.p);
  return normal(times(a, inverse), times({ p: -b.p, q: b.q }, inverse), d);
}

/** √(p/q) = √(pq)/q with the square part taken out. */
function squareRoot({ p, q }: Fraction): Quadratic | null {
  let rest = p * q;
  if (rest > LARGEST_RADICAND || rest < -LARGEST_RADICAND) return null;
  if (rest === 0n) return fromFraction(ZERO);
  let outside = 1n;
  for (let k = 2n; k * k <= (rest < 0n ? -rest : rest); k++) {
    while (rest % (k * k) === 0n) {
      rest /= k * k;
      outside *= k;
    }
  }
  const factor = fraction(outside, q);
  return rest === 1n ? fromFraction(factor) : { a: ZERO, b: factor, d: rest };
}

const HALF: Fraction = { p: 1n, q: 2n };
const ROOTS: Readonly<Record<string, Quadratic>> = {
  i: { a: ZERO, b: { p: 1n, q: 1n }, d: -1n },
  r4: { a: ZERO, b: { p: 1n, q: 1n }, d: -1n },
  r3: { a: { p: -1n, q: 2n }, b: HALF, d: -3n },
  r6: { a: HALF, b: HALF, d: -3n },
};

/** The term as an element of a quadratic field, or null when it is not seen to be one. */
export function quadraticOf(term: Term): Quadratic | null {
  switch (term.kind) {
    case 'rational':
      return fromFraction({ p: term.p, q: term.q });
    case 'symbol':
      return ROOTS[term.name] ?? null;
    case 'sum':
      return fold(term.terms, add);
    case 'product':
      return fold(term.factors, multiply);
    case 'power':
      return term.exponent.kind === 'rational' ? powerOf(quadraticOf(term.base), term.exponent) : null;
    case 'call': {
      const only = term.name === 'sqrt' ? term.groups[0]?.[0] : undefined;
      return only === undefined ? null : powerOf(quadraticOf(only), HALF);
    }
  }
}

function fold(terms: readonly Term[], combine: (x: Quadratic, y: Quadratic) => Quadratic | null): Quadratic | null {
  return terms.map(quadraticOf).reduce((x, y) => (x === null || y === null ? null : combine(x, y)));
}

function powerOf(base: Quadratic | null, { p, q }: Fraction): Quadratic | null {
  if (base === null || p > 64n || p < -64n || q > 2n) return null;
  let root: Quadratic | null = base;
  if (q === 2n) root = base.b.p === 0n ? squareRoot(base.a) : null;
  if (root !== null && p < 0n) root = invert(root);
  let result: Quadratic | null = fromFraction({ p: 1n, q: 1n });
  for (let k = p < 0n ? -p : p; k > 0n && result !== null; k--) result = root === null ? null : multiply(result, root);
  return result;
}

/** m and sign with x = sign·φ^−m, φ the golden ratio and 1 ≤ m ≤ 6, or null. */
export function goldenPower(x: Quadratic): { m: number; sign: 1 | -1 } | null {
  if (x.d !== 5n) return null;
  const inverse: Quadratic = { a: { p: -1n, q: 2n }, b: HALF, d: 5n };
  let power: Quadratic | null = inverse;
  for (let m = 1; m <= 6 && power !== null; m++) {
    for (const sign of [1, -1] as const) {
      const s = BigInt(sign);
      if (power.a.p * s === x.a.p && power.a.q === x.a.q && power.b.p * s === x.b.p && power.b.q === x.b.q) {
        return { m, sign };
      }
    }
    power = multiply(power, inverse);
  }
  return null;
}
