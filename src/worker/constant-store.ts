/** Where values of constants outlive the worker. */
import type { CachedConstant, ConstantCache } from '../constants/cache.ts';
import { atomsOf } from '../constants/evaluate.ts';
import { familyOf } from '../constants/registry.ts';
import type { Term } from '../constants/term.ts';

export interface ConstantStore {
  /** The stored entries among these canonical texts. Never rejects: a store that cannot be read knows nothing. */
  recall(texts: readonly string[]): Promise<readonly CachedConstant[]>;
  /** Keeps the entry if it is longer than the stored one; in its own time. */
  keep(entry: CachedConstant): void;
  /** Resolves once everything kept so far is stored. */
  settled(): Promise<void>;
}

/** Fills the cache with what the store knows of the atoms of these terms. */
export async function recallTerms(terms: readonly Term[], cache: ConstantCache, store: ConstantStore): Promise<void> {
  for (const entry of await store.recall([...membersOf(terms).keys()])) cache.load(entry);
}

/** The constants that terms are built of, by canonical text, grouped by family in the order of the terms. */
export function membersOf(terms: readonly Term[]): Map<string, Term> {
  const byFamily = new Map<string, Map<string, Term>>();
  for (const atom of terms.flatMap(atomsOf)) {
    const { family, args } = familyOf(atom);
    const group = byFamily.get(family.key) ?? new Map<string, Term>();
    group.set(family.text(args), atom);
    byFamily.set(family.key, group);
  }
  return new Map([...byFamily.values()].flatMap((group) => [...group]));
}
