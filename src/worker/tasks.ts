/** What each task does; importable without a worker. */
import type { ConstantCache } from '../constants/cache.ts';
import { evaluateMany, evaluateTerm, weightOf } from '../constants/evaluate.ts';
import { familyOf } from '../constants/registry.ts';
import { isOperation } from '../constants/structure.ts';
import type { Term } from '../constants/term.ts';
import { toLatex } from '../expression/print-latex.ts';
import { type Ball, fromInteger, fromRational, magnitude, sign, subtract, timesPowerOfTwo } from '../number/ball.ts';
import { isComplex, type Value } from '../number/complex.ts';
import { formatBall, parseDecimal } from '../number/decimal.ts';
import { InputError, PrecisionError } from '../number/errors.ts';
import { absolute, log10Of } from '../number/integer.ts';
import { whatNext } from '../search/advice.ts';
import { readTyped, resolveBasis } from '../search/basis.ts';
import { catalogue } from '../search/catalogue.ts';
import { checkRecord } from '../search/check.ts';
import { readValue } from '../search/intake.ts';
import { ladderBases } from '../search/ladder.ts';
import { consult } from '../search/ledger.ts';
import { layOut, type PlanSpec } from '../search/plan.ts';
import { constantBits, GUARD_BITS } from '../search/problem.ts';
import type { SearchRequest } from '../search/request.ts';
import { rewrite } from '../search/rewrite.ts';
import { runSearch } from '../search/run.ts';
import { type ConstantStore, membersOf } from './constant-store.ts';
import type { EngineTasks, TaskName } from './messages.ts';

export interface TaskContext<K extends TaskName> {
  readonly signal: AbortSignal;
  readonly onProgress: (progress: EngineTasks[K]['progress']) => void;
  readonly cache: ConstantCache;
  readonly store?: ConstantStore | undefined;
}

type Tasks = {
  readonly [K in TaskName]: (
    request: EngineTasks[K]['request'],
    context: TaskContext<K>,
  ) => Promise<EngineTasks[K]['response']>;
};

const MOST_DIGITS = 100_000;
const LOG2_10 = Math.log2(10);

/** Digits of a typed constant, correctly rounded to `digits` significant digits; the precision is raised until they are certain. */
export function evaluateToDigits(
  text: string,
  digits: number,
  context: {
    readonly signal?: AbortSignal;
    readonly cache?: ConstantCache;
    readonly onProgress?: (fraction: number) => void;
  } = {},
): EngineTasks['evaluate']['response'] {
  if (!Number.isInteger(digits) || digits < 1 || digits > MOST_DIGITS) {
    throw new InputError('bad-digits', `The number of digits must be a whole number from 1 to ${MOST_DIGITS}.`);
  }
  const term = readTyped(text);
  let bits = Math.ceil(digits * LOG2_10) + 32;
  for (let round = 0; ; round++) {
    const value = evaluateTerm(term, bits, context);
    try {
      const parts = partsOf(value, digits);
      return { ...parts, latex: toLatex(term), weight: weightOf(term), family: familyKey(term) };
    } catch (error) {
      if (!(error instanceof PrecisionError)) throw error;
      if (round >= 6)
        throw new InputError(
          'undecided',
          `${text} cannot be told from zero or from a rounding boundary at ${Math.floor(bits / LOG2_10)} digits; it may be exactly that.`,
        );
      const small = Math.max(0, -Math.max(...(isComplex(value) ? [value.re, value.im] : [value]).map(sizeBits)));
      bits += 64 * 2 ** round + Math.min(small, bits);
    }
  }
}

function familyKey(term: Term): string | null {
  const single = (term.kind === 'symbol' || term.kind === 'call') && !isOperation(term);
  return single ? familyOf(term).family.key : null;
}

function sizeBits(x: Ball): number {
  return Math.max(-1e6, magnitude(x));
}

/**
 * A complex number is rounded as a whole: its larger part to `digits` significant digits, the other to the same place,
 * where it may be 0.
 */
function partsOf(value: Value, digits: number): { digits: string; imaginary: string | null } {
  if (!isComplex(value)) return { digits: formatBall(value, digits), imaginary: null };
  const [re, im] = [value.re, value.im];
  const lead = sizeBits(re) >= sizeBits(im) ? re : im;
  const place = leadingPlace(lead, digits);
  const part = (x: Ball): string => (x === lead ? formatBall(x, digits) : formatToPlace(x, place));
  return { digits: part(re), imaginary: part(im) };
}

/** Exponent of the last of `digits` significant digits of x. */
function leadingPlace(x: Ball, digits: number): number {
  const decimal = parseDecimal(formatBall(x, digits));
  return absolute(decimal.coefficient).toString().length + decimal.exponent - digits;
}

/** x rounded to a multiple of 10^place; `0` when it rounds to that. Throws PrecisionError when the ball does not determine it. */
function formatToPlace(x: Ball, place: number): string {
  const halfUnit = place >= 0 ? fromInteger(10n ** BigInt(place)) : fromRational(1n, 10n ** BigInt(-place), x.bits + 8);
  const half = timesPowerOfTwo(halfUnit, -1);
  const size = { mid: absolute(x.mid), rad: x.rad, bits: x.bits };
  if (sign(subtract(half, size)) === 1) return '0';
  const known = Math.floor(log10Of(x.mid) - x.bits / LOG2_10 + 1e-9) + 1;
  return formatBall(x, Math.max(1, known - place));
}

export const tasks: Tasks = {
  search: (request, { signal, onProgress, cache }) => runSearch(request, { signal, onProgress, cache }),
  evaluate: async ({ text, digits }, { signal, onProgress, cache }) =>
    evaluateToDigits(text, digits, { signal, cache, onProgress: (fraction) => onProgress({ fraction }) }),
  basis: async ({ basis }) => ({
    elements: resolveBasis(basis).map(({ text, latex, weight, family }) => ({ text, latex, weight, family })),
  }),
  catalogue: async () => catalogue(),
  compute: async ({ search, part, parts }, { signal, onProgress, cache, store }) => {
    if (store === undefined) return { computed: 0 };
    const share = [...membersOf(termsOf('search', search)).values()].filter((_, k) => k % parts === part);
    // One guard more than the search asks for, so that products of these constants are served as well.
    const bits = constantBits(readValue(search)) + GUARD_BITS;
    evaluateMany(share, bits, { cache, signal, onProgress: (fraction) => onProgress({ fraction }) });
    await store.settled();
    return { computed: share.length };
  },
  rewrite: async ({ text, space }) => rewrite(text, space),
  plan: async (request) => {
    const spec: PlanSpec =
      'spec' in request
        ? request.spec
        : { kind: 'ladder', value: request.value, bases: ladderBases(request.maxWeight) };
    return { spec, steps: layOut(spec) };
  },
  advice: async ({ record, tried }) => ({ advice: whatNext(record, tried) }),
  ledger: async ({ value, entries }, { signal, cache }) => ({ hits: await consult(value, entries, { signal, cache }) }),
  check: ({ record }, { signal, onProgress, cache }) => checkRecord(record, { signal, onProgress, cache }),
};

/** The terms whose constants a task will need; empty for a request that is wrong (the task itself says how). */
export function termsOf(task: TaskName, request: unknown): Term[] {
  try {
    if (task === 'evaluate') return [readTyped((request as EngineTasks['evaluate']['request']).text)];
    if (task !== 'search') return [];
    const { basis, divideBy } = request as SearchRequest;
    const elements = basis === undefined ? [] : resolveBasis(basis);
    const terms = elements.flatMap(({ source }) => ('term' in source ? [source.term] : []));
    return divideBy === undefined ? terms : [...terms, readTyped(divideBy)];
  } catch {
    return [];
  }
}
