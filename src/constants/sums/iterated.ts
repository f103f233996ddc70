/**
 * Iterated integrals G(a₁,…,a_n; z) = ∫₀^z dt/(t − a₁) G(a₂,…,a_n; t) for exact arguments: sorts the letters, takes trailing
 * zeros out as powers of log z, and hands the rest to the cheapest pass that can carry it.
 */
import { containsZero, fromInteger } from '../../number/ball.ts';
import { add, divide, multiply, subtract, toComplex, type Value } from '../../number/complex.ts';
import { InputError } from '../../number/errors.ts';
import type { EvaluationContext } from '../family.ts';
import { call, isRational, type Term } from '../term.ts';
import { termText } from '../term-text.ts';
import type { Letters, Rational } from './general-size.ts';
import { evaluateWordsOnPath } from './path.ts';
import { invertPolar, multiplyPolar, type Polar, polarOf } from './polar.ts';
import { evaluateRootWords, ringOf } from './root-words.ts';
import { leastCommonMultiple } from './roots.ts';
import { letterOf, type Word } from './words.ts';

/** A letter divided by the end point: 0, 1, or anything else with its exact form where it has one. */
export interface PathLetter {
  readonly kind: 'zero' | 'one' | 'other';
  /** Equal letters have equal keys. */
  readonly key: string;
  readonly polar: Polar | null;
  readonly over: readonly [Term, Term];
}

/** An iterated integral with its letters, outermost first, its end point and the sign in front of its word. */
export interface IteratedIntegral {
  readonly letters: readonly PathLetter[];
  readonly end: Term;
  /** The forms dt/(t − a) and dt/(a − t) differ by a sign for each non-zero letter. */
  readonly sign: 1 | -1;
}

/** Throws InputError `on-path` for a letter that is exactly on the open path. */
export function pathLetter(letter: Term, end: Term): PathLetter {
  const over = [letter, end] as const;
  if (isRational(letter) && letter.p === 0n) return { kind: 'zero', key: '0', polar: null, over };
  const [a, z] = [polarOf(letter), polarOf(end)];
  if (a === null || z === null) {
    if (termText(letter) === termText(end)) return { kind: 'one', key: '1', polar: null, over };
    return { kind: 'other', key: `${termText(letter)} over ${termText(end)}`, polar: null, over };
  }
  const polar = multiplyPolar(a, invertPolar(z));
  const { p, q, root } = polar;
  if (root.order === 1 && p === q) return { kind: 'one', key: '1', polar, over };
  if (root.order === 1 && p < q) {
    throw new InputError('on-path', `The letter ${termText(letter)} lies on the path from 0 to ${termText(end)}.`);
  }
  return { kind: 'other', key: `${p}/${q}@${root.exponent}/${root.order}`, polar, over };
}

/** Throws InputError where the integral diverges at its end point. */
export function refuseDivergent({ letters }: IteratedIntegral, what: string): void {
  if (letters[0]?.kind === 'one') {
    throw new InputError('divergent', `${what} diverges: its first letter is the end point itself.`);
  }
}

/** The integrals with an error of at most 2^−bits in each part; those with the same letters share a pass. */
export function evaluateIntegrals(
  integrals: readonly IteratedIntegral[],
  bits: number,
  context: EvaluationContext,
): Value[] {
  const groups = new Map<string, number[]>();
  integrals.forEach(({ letters, end }, k) => {
    const keys = [...new Set(letters.map((letter) => letter.key))].sort();
    const key = `${termText(end)}|${keys.join(' ')}`;
    groups.set(key, [...(groups.get(key) ?? []), k]);
  });
  const results: Value[] = integrals.map(() => fromInteger(0n));
  for (const members of groups.values()) {
    const values = evaluateGroup(
      members.map((k) => integrals[k] as IteratedIntegral),
      bits,
      context,
    );
    members.forEach((k, j) => {
      results[k] = values[j] as Value;
    });
  }
  return results;
}

function evaluateGroup(integrals: readonly IteratedIntegral[], bits: number, context: EvaluationContext): Value[] {
  const table = new Map<string, PathLetter>();
  for (const { letters } of integrals) {
    for (const letter of letters) if (letter.kind === 'other') table.set(letter.key, letter);
  }
  const alphabet = chooseAlphabet([...table.values()]);
  const pieces = integrals.map(({ letters }) => {
    const word = letters
      .map((l) => (l.kind === 'zero' ? '0' : l.kind === 'one' ? '1' : alphabet.letter(l.key)))
      .join('');
    return withoutTrailingZeros(word);
  });
  const words = [...new Set(pieces.flatMap((powers) => powers.flatMap((part) => [...part.keys()])))].filter(
    (w) => w !== '',
  );
  const logPowers = Math.max(...pieces.map((powers) => powers.length - 1));
  const end = (integrals[0] as IteratedIntegral).end;
  for (let extra = 8; ; extra *= 2) {
    const guard = bits + extra;
    const values = new Map<Word, Value>([['', fromInteger(1n)]]);
    alphabet.evaluate(words, guard, context).forEach((value, k) => {
      values.set(words[k] as Word, value);
    });
    const log = logPowers > 0 ? context.argument(call('log', end), guard) : fromInteger(0n);
    const sums = pieces.map((powers, k) =>
      assemble(powers, values, log, (integrals[k] as IteratedIntegral).sign, guard),
    );
    if (sums.every((sum) => radiusWithin(sum, bits))) return sums;
  }
}

function radiusWithin(value: Value, bits: number): boolean {
  const { re, im } = toComplex(value);
  return [re, im].every((x) => x.rad << BigInt(bits) <= 1n << BigInt(x.bits));
}

type Part = ReadonlyMap<Word, Rational>;

function assemble(
  powers: readonly Part[],
  values: ReadonlyMap<Word, Value>,
  log: Value,
  sign: 1 | -1,
  bits: number,
): Value {
  let total: Value = fromInteger(0n);
  let power: Value = fromInteger(BigInt(sign));
  for (const part of powers) {
    let sum: Value = fromInteger(0n);
    for (const [word, { p, q }] of part) {
      const scaled = multiply(values.get(word) as Value, fromInteger(p), bits);
      sum = add(sum, q === 1n ? scaled : divide(scaled, fromInteger(q), bits));
    }
    total = add(total, multiply(power, sum, bits));
    power = multiply(power, log, bits);
  }
  return total;
}

/** Coefficients of (log z)^0, (log z)^1, … as combinations of words that do not end in 0. */
function withoutTrailingZeros(word: Word): Map<Word, Rational>[] {
  const zeros = /0*$/.exec(word)?.[0].length ?? 0;
  if (zeros === 0) return [new Map([[word, { p: 1n, q: 1n }]])];
  const body = word.slice(0, word.length - zeros);
  const powers: Map<Word, Rational>[] = [];
  const collect = (shift: number, terms: readonly Map<Word, Rational>[], p: bigint): void => {
    terms.forEach((part, k) => {
      while (powers.length <= k + shift) powers.push(new Map());
      for (const [w, c] of part) {
        const target = powers[k + shift] as Map<Word, Rational>;
        const old = target.get(w) ?? { p: 0n, q: 1n };
        const q = BigInt(zeros);
        target.set(w, { p: old.p * c.q * q + c.p * p * old.q, q: old.q * c.q * q });
      }
    });
  };
  // u0^k = (1/k)[log z · u0^{k−1} − Σ of u0^{k−1} with one more 0 before a letter of u].
  collect(1, withoutTrailingZeros(word.slice(0, -1)), 1n);
  for (let at = 0; at < body.length; at++) {
    collect(0, withoutTrailingZeros(`${body.slice(0, at)}0${body.slice(at)}${'0'.repeat(zeros - 1)}`), -1n);
  }
  return powers;
}

interface Alphabet {
  letter(key: string): string;
  evaluate(words: readonly Word[], bits: number, context: EvaluationContext): Value[];
}

const ROOT_ORDERS: readonly number[] = [1, 2, 3, 4, 6, 8, 12];

/** Letters that are all roots of unity of a supported order go to the exact rings; all others to the general pass. */
function chooseAlphabet(letters: readonly PathLetter[]): Alphabet {
  const order = letters.reduce((m, { polar }) => (polar === null ? 0 : leastCommonMultiple(m, polar.root.order)), 1);
  const onCircle = letters.every(({ polar }) => polar !== null && polar.p === polar.q);
  if (onCircle && ROOT_ORDERS.includes(order)) {
    const ring = ringOf(order);
    const codes = new Map(
      letters.map(({ key, polar }) => {
        const { exponent, order: own } = (polar as Polar).root;
        return [key, 1 + exponent * (ring / own)];
      }),
    );
    return {
      letter: (key) => letterOf(codes.get(key) as number),
      evaluate: (words, bits, context) => evaluateRootWords(words, ring, bits, context),
    };
  }
  const codes = new Map(letters.map(({ key }, k) => [key, k + 2]));
  return {
    letter: (key) => letterOf(codes.get(key) as number),
    evaluate: (words, bits, context) => {
      refuseUndecided(letters, context);
      return evaluateWordsOnPath(words, generalLetters(letters, context), bits, context);
    },
  };
}

/** A letter without exact form that may be 0 or the end point itself cannot be used. */
function refuseUndecided(letters: readonly PathLetter[], context: EvaluationContext): void {
  for (const { polar, over } of letters) {
    if (polar !== null) continue;
    const [letter, end] = over.map((term) => context.argument(term, 160)) as [Value, Value];
    for (const difference of [letter, subtract(letter, end)]) {
      const { re, im } = toComplex(difference);
      if (!containsZero(re) || !containsZero(im)) continue;
      const what = difference === letter ? '0' : 'the end point';
      throw new InputError(
        'undecided',
        `The letter ${termText(over[0])} cannot be told from ${what}; type it as such if it is.`,
      );
    }
  }
}

function generalLetters(letters: readonly PathLetter[], context: EvaluationContext): Letters {
  const exact = letters.map(({ polar }) => {
    if (polar === null || polar.root.order > 2) return null;
    return { p: polar.root.order === 2 ? -polar.p : polar.p, q: polar.q };
  });
  return {
    exact,
    values: (bits) =>
      letters.map((letter, k) => {
        const rational = exact[k];
        if (rational !== null && rational !== undefined) {
          return divide(fromInteger(rational.p), fromInteger(rational.q), bits + 2);
        }
        return quotient(letter.over, bits, context);
      }),
  };
}

/** letter/end to 2^−bits: the precision of both grows until it is. */
function quotient([letter, end]: readonly [Term, Term], bits: number, context: EvaluationContext): Value {
  for (let extra = 32; ; extra *= 2) {
    const ratio = divide(context.argument(letter, bits + extra), context.argument(end, bits + extra), bits + 8);
    if (radiusWithin(ratio, bits)) return ratio;
  }
}
