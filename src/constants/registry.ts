/** The catalogue: all families, and which of them a typed symbol or call belongs to. */
import { InputError } from '../number/errors.ts';
import { circularFamilies } from './circular.ts';
import { elementaryFamilies } from './elementary.ts';
import { ellipticFamilies } from './elliptic.ts';
import type { Family } from './family.ts';
import { gammaFamily } from './gamma.ts';
import { hurwitzFamilies } from './hurwitz.ts';
import { characterFamilies } from './l-values.ts';
import { polylogFamily } from './polylog.ts';
import { OPERATIONS, ROOT_SYMBOLS } from './structure.ts';
import { sumFamilies } from './sums/index.ts';
import type { CallTerm, SymbolTerm } from './term.ts';

// biome-ignore lint/suspicious/noExplicitAny: a list of families with different argument types
type AnyFamily = Family<any>;

/** A family with its own form of the arguments of one constant. */
export interface Member {
  readonly family: AnyFamily;
  readonly args: unknown;
}

/** In the order in which families that share a name are asked. */
export const families: readonly AnyFamily[] = [
  ...elementaryFamilies,
  ...characterFamilies,
  ...hurwitzFamilies,
  polylogFamily,
  ...circularFamilies,
  gammaFamily,
  ...ellipticFamilies,
  ...sumFamilies,
];

const byName = new Map<string, AnyFamily[]>();

/** Families that claim a name, in order. */
function claimants(name: string): readonly AnyFamily[] {
  if (byName.size === 0) {
    for (const family of families) {
      for (const own of family.names) byName.set(own, [...(byName.get(own) ?? []), family]);
    }
  }
  return byName.get(name) ?? [];
}

/** The family and arguments of a symbol or call. Throws InputError: `unknown-constant` for a name that no family claims, and whatever the family says about wrong arguments. */
export function familyOf(term: CallTerm | SymbolTerm): Member {
  const candidates = claimants(term.name);
  if (candidates.length === 0) throw unknownConstant(term.name);
  for (const family of candidates) {
    const args = family.parse(term) as unknown;
    if (args !== null) return { family, args };
  }
  const example = candidates.flatMap((family) => family.examples)[0];
  const like = example === undefined ? '' : `, for example ${example}`;
  throw new InputError(
    'wrong-arguments',
    term.kind === 'symbol'
      ? `${term.name} needs arguments${like}.`
      : `${term.name} is not defined for these arguments${like}.`,
  );
}

function unknownConstant(name: string): InputError {
  const near = nearestName(name);
  const hint = near === undefined ? '' : ` Did you mean ${near}?`;
  return new InputError('unknown-constant', `There is no constant or function called “${name}”.${hint}`);
}

/** The known name within the fewest edits of what was typed, if at most a third of its letters (and at least one) need changing. */
function nearestName(name: string): string | undefined {
  const known = new Set([...families.flatMap((f) => f.names), ...OPERATIONS, ...Object.keys(ROOT_SYMBOLS)]);
  let best: { name: string; edits: number } | undefined;
  for (const candidate of known) {
    const edits = editDistance(name.toLowerCase(), candidate.toLowerCase());
    if (best === undefined || edits < best.edits) best = { name: candidate, edits };
  }
  return best !== undefined && best.edits < name.length && best.edits <= Math.max(1, Math.floor(name.length / 3))
    ? best.name
    : undefined;
}

function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const change = (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(change, (row[j] as number) + 1, (next[j - 1] as number) + 1));
    }
    row = next;
  }
  return row[b.length] as number;
}
