/**
 * Words with letters anywhere off the open segment (0, 1): double tails directly where the letters keep clear of [0, 1],
 * otherwise on pieces of the path, put together by path composition (for one cut this is the Hölder convolution of Borwein,
 * Bradley, Broadhurst and Lisoněk, Trans. AMS 353 (2001) 907).
 *
 * On the piece from p to q the letters become (a − p)/(q − p). With V_s the words on piece s and F_s(u) the word u on the
 * pieces 1 … s, F_s(u) = Σ_{u = u′u″} V_s(u′) F_{s−1}(u″): the letters nearest to 1 live on the later piece. All of it is
 * ball arithmetic, so the radius of the result is proven; the working precision grows until it is small enough.
 */
import { accuracy, type Ball, fromInteger } from '../../number/ball.ts';
import {
  add,
  type ComplexBall,
  divide,
  multiply,
  negate,
  subtract,
  toComplex,
  type Value,
} from '../../number/complex.ts';
import { InputError } from '../../number/errors.ts';
import type { EvaluationContext } from '../family.ts';
import { type Letters, log2Growth, type Rational, toNumber } from './general-size.ts';
import { generalAnswers } from './general-tails.ts';
import { planWords } from './plan.ts';
import { codeOf, letterOf, type Word } from './words.ts';

/** Growth log2 A up to which a piece is not cut further: the work is then at most about 1.7 times the result. */
const EASY_GROWTH = 0.8;
const MAX_PIECES = 60;

/**
 * The words (first letter ≠ 1, last ≠ 0) with an error of at most 2^−bits in each part. Throws InputError `on-path` when a
 * letter lies so near to the segment (0, 1) that it cannot be told from a point of it.
 */
export function evaluateWordsOnPath(
  words: readonly Word[],
  letters: Letters,
  bits: number,
  context: EvaluationContext,
): ComplexBall[] {
  if (words.length === 0) return [];
  const plan = planWords(words);
  const direct = log2Growth(plan, letters);
  if (direct <= EASY_GROWTH) return generalAnswers(plan, letters, bits, context);
  return evaluateInPieces(words, letters, bits, context);
}

/** As `evaluateWordsOnPath`, but always in pieces (two at least): an independent route for letters that need no cut. */
export function evaluateInPieces(
  words: readonly Word[],
  letters: Letters,
  bits: number,
  context: EvaluationContext,
): ComplexBall[] {
  const cuts = cutPath(letters);
  for (let extra = 16; ; extra *= 2) {
    const results = composed(words, letters, cuts, bits + extra, context);
    const reached = Math.min(...results.flatMap(({ re, im }) => [accuracy(re), accuracy(im)]));
    if (reached >= bits) return results;
  }
}

/** Points 0 = p₀ < p₁ < … = 1 over 2^`scale`. */
interface Cuts {
  readonly points: readonly bigint[];
  readonly scale: number;
}

function cutPath(letters: Letters): Cuts {
  const shapes = letters.values(80).map((letter) => {
    const { re, im } = toComplex(letter);
    return { re: toNumber(re), im: toNumber(im) };
  });
  const scale = 40;
  const whole = 1n << BigInt(scale);
  const points: bigint[] = [0n];
  const cut = (from: bigint, to: bigint): void => {
    if (isEasy(shapes, Number(from) / 2 ** scale, Number(to) / 2 ** scale)) {
      points.push(to);
      if (points.length <= MAX_PIECES) return;
    }
    if (points.length > MAX_PIECES || to - from < 4n) {
      throw new InputError('on-path', 'A letter of this function lies on the path of integration, or too near to it.');
    }
    const middle = (from + to) >> 1n;
    cut(from, middle);
    cut(middle, to);
  };
  cut(0n, whole >> 1n);
  cut(whole >> 1n, whole);
  return { points, scale };
}

/** Whether a piece is worth a pass of its own: a bound for the growth of any word over all letters, 0 and 1 included. */
function isEasy(shapes: readonly { re: number; im: number }[], from: number, to: number): boolean {
  const local = [...shapes, { re: 0, im: 0 }, { re: 1, im: 0 }].map(({ re, im }) => ({
    re: (re - from) / (to - from),
    im: im / (to - from),
  }));
  let alpha = 1;
  let beta = 1;
  for (const { re, im } of local) {
    // The end of the path that a letter 0 or 1 is may be left out: it is a letter 0 or 1 of the piece.
    if (im === 0 && (re === 0 || re === 1)) continue;
    if (im === 0 && re > 0 && re < 1) return false;
    alpha = Math.max(alpha, 1 / Math.hypot(1 - re, im));
    beta = Math.max(beta, 1 / Math.hypot(re, im));
    const distance = Math.hypot(re < 0 ? re : re > 1 ? re - 1 : 0, im);
    if (distance < 0.05) return false;
  }
  return Math.log2(alpha) + Math.log2(beta) <= EASY_GROWTH;
}

function composed(
  words: readonly Word[],
  letters: Letters,
  { points, scale }: Cuts,
  bits: number,
  context: EvaluationContext,
): ComplexBall[] {
  const one: Value = fromInteger(1n);
  const pieces = points.length - 1;
  let before = new Map<Word, Value>([['', one]]);
  for (let s = 0; s < pieces; s++) {
    const piece = localPiece(letters, points[s] as bigint, points[s + 1] as bigint, scale);
    const wanted = new Set<Word>();
    for (const word of words) {
      const starts = s === pieces - 1 ? 1 : word.length;
      for (let j = 0; j < starts; j++) {
        for (let k = s === 0 ? word.length : j + 1; k <= word.length; k++) wanted.add(word.slice(j, k));
      }
    }
    const list = [...wanted];
    const plan = planWords(list.map(piece.translate));
    const values = generalAnswers(plan, piece.letters, bits, context);
    const onPiece = new Map<Word, Value>(
      list.map((word, k) => [word, piece.flips(word) ? negate(values[k] as Value) : (values[k] as Value)]),
    );
    onPiece.set('', one);
    const after = new Map<Word, Value>([['', one]]);
    for (const word of words) {
      const starts = s === pieces - 1 ? 1 : word.length;
      for (let j = 0; j < starts; j++) {
        const suffix = word.slice(j);
        if (!after.has(suffix)) after.set(suffix, joined(suffix, onPiece, before, s === 0, bits));
      }
    }
    before = after;
    context.signal?.throwIfAborted();
  }
  return words.map((word) => toComplex(before.get(word) as Value));
}

function joined(
  word: Word,
  onPiece: ReadonlyMap<Word, Value>,
  before: ReadonlyMap<Word, Value>,
  isFirst: boolean,
  bits: number,
): Value {
  let sum: Value = fromInteger(0n);
  for (let k = isFirst ? word.length : 0; k <= word.length; k++) {
    const later = onPiece.get(word.slice(0, k)) as Value;
    const earlier = before.get(word.slice(k)) as Value;
    sum = add(sum, k === 0 ? earlier : k === word.length ? later : multiply(later, earlier, bits));
  }
  return sum;
}

/**
 * The letters of a piece, and words in its own codes: the old letters 0 and 1 keep their meaning only at their own ends.
 * Since dt/t = −dt/(0 − t), a letter 0 that becomes a general one flips the sign.
 */
function localPiece(
  letters: Letters,
  from: bigint,
  to: bigint,
  scale: number,
): { letters: Letters; translate: (word: Word) => Word; flips: (word: Word) => boolean } {
  const whole = 1n << BigInt(scale);
  const length = to - from;
  const start: Ball = { mid: from, rad: 0n, bits: scale };
  const span: Ball = { mid: length, rad: 0n, bits: scale };
  const local = (a: Rational): Rational => ({ p: a.p * whole - from * a.q, q: a.q * length });
  const ends: readonly Rational[] = [local({ p: 0n, q: 1n }), local({ p: 1n, q: 1n })];
  const extra = (bits: number): Value[] => [0n, 1n].map((end) => divide(subtract(fromInteger(end), start), span, bits));
  return {
    letters: {
      values: (bits) => {
        const lost = scale + 8;
        return [...letters.values(bits + lost).map((a) => divide(subtract(a, start), span, bits + 4)), ...extra(bits)];
      },
      exact: [...letters.exact.map((a) => (a === null ? null : reduced(local(a)))), ...ends.map(reduced)],
    },
    translate: (word) =>
      [...word]
        .map((c) => {
          const code = codeOf(c);
          if (code >= 2) return c;
          if (code === 0) return from === 0n ? '0' : letterOf(2 + letters.exact.length);
          return to === whole ? '1' : letterOf(3 + letters.exact.length);
        })
        .join(''),
    flips: (word) => from !== 0n && [...word].filter((c) => c === '0').length % 2 === 1,
  };
}

function reduced({ p, q }: Rational): Rational {
  let a = p < 0n ? -p : p;
  let b = q;
  while (b !== 0n) [a, b] = [b, a % b];
  return a === 0n ? { p, q } : { p: p / a, q: q / a };
}
