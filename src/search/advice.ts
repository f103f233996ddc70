/** What to try after a search that found nothing: computed from its numbers, never a general hint. */
import { spaces } from '../spaces/registry.ts';
import { resolveBasis } from './basis.ts';
import { readValue } from './intake.ts';
import { carried, digitsToHold, largestBasis } from './plan-cost.ts';
import type { SearchRecord } from './record.ts';
import type { BasisSpec, SpaceSpec } from './request.ts';

export type Advice =
  | { readonly kind: 'more-digits'; readonly text: string; readonly digits: number }
  | { readonly kind: 'smaller-basis'; readonly text: string; readonly constants: number }
  | { readonly kind: 'space'; readonly text: string; readonly basis: SpaceSpec; readonly constants: number }
  | { readonly kind: 'drop-constant'; readonly text: string; readonly constant: string };

/** Coefficient digits of published results that a search should at least be able to meet. */
const USUAL = 2;
const MOST_SPACES = 6;
/** Spans what the multiple zeta values span, in another basis. */
const DOUBLE = 'mzv-hoffman';

/**
 * Next steps for a record without a relation that holds, the most promising first: digits needed for this basis, the
 * largest basis these digits allow, and spaces not yet in `tried` that the digits can carry. Empty when it holds.
 */
export function whatNext(record: SearchRecord, tried: readonly BasisSpec[] = []): readonly Advice[] {
  if (record.verdict === 'holds') return [];
  if (record.outcome === 'basis-dependent') {
    return record.relation
      .filter((entry) => entry.coefficient !== '0')
      .map(({ constant }) => ({
        kind: 'drop-constant',
        constant,
        text: `Leave out ${constant}: the others express it.`,
      }));
  }
  const { request } = record;
  if (request.basis === undefined || (request.form ?? 'linear') !== 'linear') return [];
  const value = readValue(request);
  const columns = value.parts.length;
  const constants = resolveBasis(request.basis).length;
  const searches = request.amongSearches ?? 1;
  const height = carried(value.trusted, constants, columns, searches);
  const short = height < USUAL;
  const digits = digitsToHold(constants, short ? USUAL : Math.ceil(height) + 1, columns, searches);
  const more: Advice = {
    kind: 'more-digits',
    digits,
    text: `With about ${digits} right digits (now ${value.trusted}) this basis of ${constants} would carry coefficients of ${short ? USUAL : Math.ceil(height) + 1} digits; these digits carry ${height.toFixed(1)}.`,
  };
  const most = largestBasis(value.trusted, USUAL, columns, searches);
  const smaller: Advice[] =
    most >= 1 && most < constants
      ? [
          {
            kind: 'smaller-basis',
            constants: most,
            text: `These digits carry at most ${most} constants with coefficients of ${USUAL} digits; this basis has ${constants}.`,
          },
        ]
      : [];
  const others = candidates([request.basis, ...tried], most, columns);
  return short ? [more, ...smaller, ...others] : [...others, more];
}

/** Whole spaces up to the weight looked at so far and one more, that fit into `most` constants, lowest weight and smallest first. */
function candidates(tried: readonly BasisSpec[], most: number, columns: number): Advice[] {
  const seen = tried.map((spec) => new Set(resolveBasis(spec).map((element) => element.text)));
  const weight = Math.max(1, ...tried.flatMap((spec) => resolveBasis(spec).map((element) => element.weight ?? 0)));
  const found: Extract<Advice, { kind: 'space' }>[] = [];
  for (const space of spaces) {
    for (const w of [weight, weight + 1]) {
      if (w > space.maxWeight || space.key === DOUBLE) continue;
      const parity = space.hasImaginary && columns === 1 ? { parity: 'real' as const } : {};
      const basis: SpaceSpec = { space: space.key, weight: w, lower: true, ...parity };
      const texts = resolveBasis(basis).map((element) => element.text);
      const known = seen.some((set) => texts.every((text) => set.has(text)));
      const same = found.some((other) => other.constants === texts.length && other.basis.weight === w);
      if (known || same || texts.length > most) continue;
      const text = `${space.title}, weights up to ${w}: ${texts.length} constants, which these digits carry.`;
      found.push({ kind: 'space', basis, constants: texts.length, text });
    }
  }
  return found.sort((a, b) => a.basis.weight - b.basis.weight || a.constants - b.constants).slice(0, MOST_SPACES);
}
