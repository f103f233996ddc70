/**
 * Double tails (see double-tails.ts) for words with letters anywhere in the complex plane off the segment [0, 1].
 *
 * Let d(a) be the distance of a from [0, 1], and D the largest product of max(1, 1/d(a)) over the letters a ≠ 0, 1 of a core.
 *
 * **Truncation.** (1−t₁)ⁿ t_kⁿ ≤ 4^−n, and |dt/(a−t)| ≤ dt/d(a) where dt is below both dt/t and dt/(1−t); what is left is at
 * most a convergent multiple zeta value, and these are at most ζ(2) < 2. So |J_n(w)| ≤ 2D·4^−n for every n, and with
 * N ≥ (W + 1 + log2 D)/2 the start from zero is wrong by at most one unit.
 *
 * **Rounding.** The factor αβ = 1/((1 − a)b) of the recursion is a complex number in fixed point and may exceed 1. Let A be the
 * largest of 1, all |αβ| and, for single letters, |β|. Errors divided by A^(N−n) obey the recursion of double-tails.ts:
 * three truncated complex divisions add at most 3√2, the product √2 for its own truncation and at most 1 for the error of the
 * factor, whose precision at step n is chosen from the bound on J_{n−1}; so ρ = 8 and
 *
 *   e(0) ≤ A^N (8N + 3) Σ_{j≤k} G^j/j!.
 *
 * The extra bits N·log2 A are the price of letters with |a(1 − a)| < 1. Letters with A ≥ 3.4 are refused here.
 */
import { type Ball, fromInteger, subtract, withBits } from '../../number/ball.ts';
import { type ComplexBall, divide, isComplex, multiply, toComplex, type Value } from '../../number/complex.ts';
import { absolute } from '../../number/integer.ts';
import type { EvaluationContext } from '../family.ts';
import { addMultiple, centralInverses, powersOf, pulse } from './double-tails.ts';
import { type GeneralSize, generalSize, type Letters, type Rational } from './general-size.ts';
import type { Plan } from './plan.ts';

interface Factor {
  readonly re: bigint;
  readonly im: bigint;
}

/** αβ and, for single letters, 2β: in fixed point, or exactly over a small common denominator. */
interface CoreFactors {
  readonly product: Factor;
  readonly single: Factor | null;
  /** 0n for fixed point. */
  readonly denominator: bigint;
}

/** J₀ of every core in units of 2^−work. */
export function generalTails(
  plan: Plan,
  letters: Letters,
  size: GeneralSize,
  context: EvaluationContext,
): { re: bigint[]; im: bigint[] } {
  const { cores, quotients } = plan;
  // At step n a factor with this many bits, less 2n, errs by at most 1/4 of 2^−(W − 2(n−1) + log2Bracket + 1).
  const top = size.work + size.log2Bracket + 8 + size.guard;
  const factors = factorsOf(plan, letters, top);
  const empty = centralInverses(size.steps, size.work);
  const re = cores.map(() => 0n);
  const im = cores.map(() => 0n);
  const shareRe = quotients.map(() => 0n);
  const shareIm = quotients.map(() => 0n);
  const isReal = factors.every(({ product, single }) => product.im === 0n && (single === null || single.im === 0n));
  let current = factors;
  let precision = top;
  for (let n = size.steps; n >= 1; n--) {
    if (n === size.steps || n % 16 === 0) {
      const drop = Math.min(2 * Math.max(0, n - 16), size.work);
      precision = top - drop;
      current = factors.map((factor) =>
        factor.denominator !== 0n
          ? factor
          : {
              product: truncated(factor.product, drop),
              single: factor.single === null ? null : truncated(factor.single, drop),
              denominator: 0n,
            },
      );
    }
    const shift = BigInt(precision);
    const powers = powersOf(n, plan.maxExponent);
    for (let q = 0; q < quotients.length; q++) {
      const { core, exponent } = quotients[q] as { core: number; exponent: number };
      const divisor = powers[exponent] as bigint;
      if (core < 0) shareRe[q] = (empty[n] as bigint) / divisor;
      else {
        shareRe[q] = (re[core] as bigint) / divisor;
        if (!isReal) shareIm[q] = (im[core] as bigint) / divisor;
      }
    }
    for (let c = 0; c < cores.length; c++) {
      let x = re[c] as bigint;
      let y = im[c] as bigint;
      const { product, single, denominator } = current[c] as CoreFactors;
      const references = (cores[c] as Plan['cores'][number]).references;
      if (single !== null) {
        const share = shareRe[(references[0] as { quotient: number }).quotient] as bigint;
        x -= share;
        if (isReal) {
          re[c] = scaled(x * product.re + share * single.re, shift, denominator);
          continue;
        }
        re[c] = scaled(x * product.re - y * product.im + share * single.re, shift, denominator);
        im[c] = scaled(x * product.im + y * product.re + share * single.im, shift, denominator);
        continue;
      }
      for (const { quotient, factor, conjugate } of references) {
        x = addMultiple(x, factor, shareRe[quotient] as bigint);
        if (!isReal) y = addMultiple(y, conjugate ? -factor : factor, shareIm[quotient] as bigint);
      }
      if (isReal) {
        re[c] = scaled(x * product.re, shift, denominator);
        continue;
      }
      re[c] = scaled(x * product.re - y * product.im, shift, denominator);
      im[c] = scaled(x * product.im + y * product.re, shift, denominator);
    }
    pulse(n, size.steps, context);
  }
  return { re, im };
}

function scaled(x: bigint, shift: bigint, denominator: bigint): bigint {
  return denominator === 0n ? x >> shift : x / denominator;
}

function truncated(factor: Factor, drop: number): Factor {
  const shift = BigInt(drop);
  return { re: factor.re >> shift, im: factor.im >> shift };
}

/** αβ of every core and 2β of every single letter, with `bits` fraction bits and an error of at most two units in each part. */
function factorsOf(plan: Plan, letters: Letters, bits: number): CoreFactors[] {
  const one = fromInteger(1n);
  const table = letters.values(bits + 24);
  const letter = (code: number): Value => (code < 2 ? fromInteger(BigInt(code)) : (table[code - 2] as Value));
  const known = new Map<string, Factor>();
  const fixed = (key: string, make: () => Value): Factor => {
    const old = known.get(key);
    if (old !== undefined) return old;
    const { re, im } = toComplex(make());
    const made = { re: fixedPoint(re, bits), im: fixedPoint(im, bits) };
    known.set(key, made);
    return made;
  };
  return plan.cores.map(({ word, first, last }) => {
    const exact = exactFactors(word, first, last, letters);
    if (exact !== null) return exact;
    const beta = (): Value => (last === 1 ? one : divide(one, letter(last), bits + 20));
    const product = fixed(`${first},${last}`, () => {
      if (first === 0) return beta();
      return divide(beta(), subtractFromOne(letter(first)), bits + 12);
    });
    const single = word.length === 1 ? fixed(`2/${last}`, () => multiply(fromInteger(2n), beta(), bits + 12)) : null;
    return { product, single, denominator: 0n };
  });
}

const SMALL = 1n << 62n;

/** Both factors over one denominator, where the letters are rational and the fractions fit in a machine word. */
function exactFactors(word: string, first: number, last: number, letters: Letters): CoreFactors | null {
  const exact = (code: number): Rational | null =>
    code < 2 ? { p: BigInt(code), q: 1n } : (letters.exact[code - 2] ?? null);
  const a = exact(first);
  const b = exact(last);
  if (a === null || b === null) return null;
  const alpha = first === 0 ? { p: 1n, q: 1n } : { p: a.q, q: a.q - a.p };
  const top = alpha.p * b.q;
  const denominator = alpha.q * b.p;
  const doubled = 2n * b.q * alpha.q;
  if (absolute(top) >= SMALL || absolute(denominator) >= SMALL || absolute(doubled) >= SMALL) return null;
  const single = word.length === 1 ? { re: doubled, im: 0n } : null;
  return { product: { re: top, im: 0n }, single, denominator };
}

function subtractFromOne(x: Value): Value {
  const one = fromInteger(1n);
  if (!isComplex(x)) return subtract(one, x);
  const { re, im }: ComplexBall = x;
  return { re: subtract(one, re), im: { mid: -im.mid, rad: im.rad, bits: im.bits } };
}

function fixedPoint(x: Ball, bits: number): bigint {
  const ball = withBits(x, bits);
  if (ball.rad > 2n) throw new RangeError('fixedPoint: expected letters precise enough for two units');
  return ball.mid;
}

/** J₀ of the words asked for, for general letters; see general-tails.ts. */
export function generalAnswers(plan: Plan, letters: Letters, bits: number, context: EvaluationContext): ComplexBall[] {
  const size = generalSize(plan, letters, bits + 2);
  const { re, im } = generalTails(plan, letters, size, context);
  return plan.answers.map(({ core, sign, conjugate }) => {
    const part = (mid: bigint, flip: boolean): Ball =>
      withBits({ mid: flip ? -mid : mid, rad: size.radius, bits: size.work }, bits + 2);
    return {
      re: part(re[core] as bigint, sign < 0),
      im: part(im[core] as bigint, sign < 0 !== conjugate),
    };
  });
}
