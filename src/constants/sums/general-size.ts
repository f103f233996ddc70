/** How general letters bear on a double-tails pass: growth of errors, number of steps, radius. The bounds are proven in general-tails.ts. */
import type { Ball } from '../../number/ball.ts';
import { toComplex, type Value } from '../../number/complex.ts';
import { roundShift } from '../../number/integer.ts';
import { tailsRadius } from './double-tails.ts';
import type { Plan } from './plan.ts';
import { codeOf } from './words.ts';

/** The letters with codes 2, 3, … */
export interface Letters {
  /** All of them to an absolute error of 2^−bits. */
  values(bits: number): readonly Value[];
  /** Those that are rational, exactly; null for the others. Products with small fractions are much cheaper. */
  readonly exact: readonly (Rational | null)[];
}

export interface Rational {
  readonly p: bigint;
  readonly q: bigint;
}

export interface GeneralSize {
  readonly work: number;
  readonly steps: number;
  /** Proven bound of the modulus of the error of every answer, in units of 2^−work. */
  readonly radius: bigint;
  /** log2 of a bound for |J_{n−1}|·4^(n−1)/|αβ|, which sets the precision of the factors. */
  readonly log2Bracket: number;
  readonly guard: number;
}

const STEP = 8;
const MAX_LOG2_GROWTH = 1.77;

interface LetterShape {
  readonly re: number;
  readonly im: number;
}

/** The growth log2 A of a plan with these letters; Infinity when a letter lies on or next to the segment [0, 1]. */
export function log2Growth(plan: Plan, letters: Letters): number {
  return growthOf(plan, shapesOf(letters)).log2A;
}

function shapesOf(letters: Letters): LetterShape[] {
  return letters.values(80).map((letter) => {
    const { re, im } = toComplex(letter);
    return { re: toNumber(re), im: toNumber(im) };
  });
}

/** The midpoint as a double; right to about 2^−50 for |x| < 2^900. */
export function toNumber(x: Ball): number {
  return Number(roundShift(x.mid, x.bits - 100)) / 2 ** 100;
}

/** A little above the double error of every quantity here. */
const SLACK = 1e-9;

function growthOf(plan: Plan, shapes: readonly LetterShape[]): { log2A: number; log2D: number; log2Least: number } {
  const shape = (code: number): LetterShape =>
    code === 0 ? { re: 0, im: 0 } : code === 1 ? { re: 1, im: 0 } : (shapes[code - 2] as LetterShape);
  const distance = ({ re, im }: LetterShape): number => Math.hypot(re < 0 ? re : re > 1 ? re - 1 : 0, im) - SLACK;
  let log2A = 0;
  let log2D = 0;
  let log2Least = 0;
  for (const { word, first, last } of plan.cores) {
    const a = shape(first);
    const b = shape(last);
    const log2Alpha = first === 0 ? 0 : -Math.log2(Math.hypot(1 - a.re, a.im) - SLACK);
    const log2Beta = last === 1 ? 0 : -Math.log2(Math.hypot(b.re, b.im) - SLACK);
    const product = log2Alpha + log2Beta;
    log2A = Math.max(log2A, product, word.length === 1 ? log2Beta : 0);
    log2Least = Math.min(log2Least, product);
    let size = 0;
    for (const c of word) {
      const code = codeOf(c);
      if (code < 2) continue;
      const d = distance(shape(code));
      size += d > 0 ? Math.max(0, -Math.log2(d)) : Number.POSITIVE_INFINITY;
    }
    log2D = Math.max(log2D, size);
  }
  const bad = !Number.isFinite(log2D) || Number.isNaN(log2A);
  return { log2A: bad ? Number.POSITIVE_INFINITY : log2A, log2D, log2Least };
}

/** Throws RangeError when the letters make the method useless (`log2Growth` tells beforehand). */
export function generalSize(plan: Plan, letters: Letters, bits: number): GeneralSize {
  const { log2A, log2D, log2Least } = growthOf(plan, shapesOf(letters));
  if (log2A > MAX_LOG2_GROWTH)
    throw new RangeError(`generalSize: expected letters away from [0, 1], got growth 2^${log2A}`);
  for (let guard = 16; ; guard += 4) {
    const work = bits + guard;
    const steps = Math.ceil((work + 1 + log2D) / 2);
    const log2Radius = tailsRadius(steps, plan.length, STEP) + steps * (log2A + SLACK);
    if (log2Radius > guard) {
      guard += Math.max(0, Math.floor((log2Radius - guard) / 8) * 4);
      continue;
    }
    const log2Bracket = Math.ceil(1 + log2D - log2Least + SLACK);
    return { work, steps, radius: 1n << BigInt(Math.ceil(log2Radius)), log2Bracket, guard };
  }
}
