/** Is a new value one that the project already has? Compared up to a rational factor and up to one extra constant. */
import type { ConstantCache } from '../constants/cache.ts';
import { evaluateTerm } from '../constants/evaluate.ts';
import { vectorsLog10 } from '../evidence/counting.ts';
import { HOLDS_SURPLUS } from '../evidence/verdict.ts';
import { type Ball, fromInteger } from '../number/ball.ts';
import { isComplex } from '../number/complex.ts';
import { log10Of } from '../number/integer.ts';
import { readTyped } from './basis.ts';
import { believing, readValue } from './intake.ts';
import { pacer } from './pause.ts';
import { relateRows } from './relate.ts';
import type { SearchRequest } from './request.ts';

/** An earlier value, or an earlier finding by its typed expression. */
export interface LedgerEntry {
  readonly name: string;
  readonly value: Pick<SearchRequest, 'value' | 'trustedDigits'> | { readonly expression: string };
}

export interface LedgerHit {
  readonly name: string;
  /** new value = factor × entry (+ share × constant), exact rationals as text. */
  readonly factor: string;
  readonly extra: { readonly constant: string; readonly share: string } | null;
  /** Digits of agreement beyond chance, the number of comparisons taken off. */
  readonly surplusDigits: number;
}

/** Constants that a change of scheme or of normalisation commonly adds. */
export const EXTRA_CONSTANTS: readonly string[] = ['1', 'pi', 'pi^2', 'zeta(3)', 'log(2)', 'pi^2*log(2)', 'pi^4'];

export interface LedgerOptions {
  readonly cache?: ConstantCache | undefined;
  readonly signal?: AbortSignal | undefined;
  /** Default EXTRA_CONSTANTS. */
  readonly extras?: readonly string[];
}

/**
 * Entries that the new value is a multiple of, or a combination of with one constant; best surplus first, at least
 * HOLDS_SURPLUS. Real values only: a complex one, on either side, matches nothing. Throws InputError for a new value
 * that cannot be read; entries that cannot be are passed over.
 */
export async function consult(
  value: Pick<SearchRequest, 'value' | 'trustedDigits'>,
  entries: readonly LedgerEntry[],
  options: LedgerOptions = {},
): Promise<readonly LedgerHit[]> {
  const read = readValue(value);
  if (read.parts.length !== 1) return [];
  const [target] = believing(read, read.trusted) as [Ball];
  const extras = (options.extras ?? EXTRA_CONSTANTS).map((constant) => ({
    constant,
    ball: realValue(constant, target.bits, options),
  }));
  const comparisons = entries.length * (1 + extras.length);
  const pause = pacer(options.signal);
  const hits: LedgerHit[] = [];
  for (const { name, value: entry } of entries) {
    await pause();
    const earlier = entryBall(entry, target.bits, options);
    if (earlier === null) continue;
    const plain = await compare([target, earlier], read.trusted, comparisons, options);
    if (plain !== null) {
      hits.push({ name, factor: plain.solved[0] as string, extra: null, surplusDigits: plain.surplusDigits });
      continue;
    }
    for (const { constant, ball } of extras) {
      if (ball === null) continue;
      const found = await compare([target, earlier, ball], read.trusted, comparisons, options);
      if (found === null) continue;
      const [factor, share] = found.solved as [string, string];
      hits.push({ name, factor, extra: { constant, share }, surplusDigits: found.surplusDigits });
      break;
    }
  }
  return hits.sort((a, b) => b.surplusDigits - a.surplusDigits);
}

function realValue(text: string, bits: number, { cache, signal }: LedgerOptions): Ball | null {
  if (text === '1') return fromInteger(1n);
  const value = evaluateTerm(readTyped(text), bits + 64, { cache, signal });
  return isComplex(value) ? null : value;
}

function entryBall(entry: LedgerEntry['value'], bits: number, options: LedgerOptions): Ball | null {
  try {
    if ('expression' in entry) return realValue(entry.expression, bits, options);
    const read = readValue(entry);
    return read.parts.length === 1 ? (believing(read, read.trusted)[0] as Ball) : null;
  } catch (error) {
    if (options.signal?.aborted) throw error;
    return null;
  }
}

/** Coefficients solved for the first number when all of them take part; null for no relation, or one that could be chance. */
async function compare(
  numbers: readonly Ball[],
  digits: number,
  comparisons: number,
  options: LedgerOptions,
): Promise<{ solved: string[]; surplusDigits: number } | null> {
  const rows = numbers.map((x) => [x]);
  const outcome = await relateRows(rows, 'lattice', undefined, options, null);
  if (outcome.kind !== 'relation') return null;
  const { coefficients } = outcome;
  if (coefficients.some((c) => c === 0n)) return null;
  const norm = log10Of(coefficients.reduce((sum, c) => sum + c * c, 0n)) / 2;
  // The shorter of the two numbers decides how far they can agree.
  const right = Math.min(digits, ...numbers.map((x) => (x.rad === 0n ? digits : log10Of(x.mid) - log10Of(x.rad))));
  const surplusDigits = right - vectorsLog10(coefficients.length, norm) - Math.log10(comparisons);
  if (surplusDigits < HOLDS_SURPLUS) return null;
  const lead = coefficients[0] as bigint;
  return { solved: coefficients.slice(1).map((c) => quotient(-c, lead)), surplusDigits };
}

function quotient(p: bigint, q: bigint): string {
  let [a, b] = [p < 0n ? -p : p, q < 0n ? -q : q];
  while (b !== 0n) [a, b] = [b, a % b];
  const [top, bottom] = q < 0n ? [-p / a, -q / a] : [p / a, q / a];
  return bottom === 1n ? `${top}` : `${top}/${bottom}`;
}
