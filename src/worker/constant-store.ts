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
}

/** Fills the cache with what the store knows of the atoms of these terms. */
export async function recallTerms(terms: readonly Term[], cache: ConstantCache, store: ConstantStore): Promise<void> {
  const texts = new Set<string>();
  for (const atom of terms.flatMap(atomsOf)) {
    const { family, args } = familyOf(atom);
    texts.add(family.text(args));
  }
  for (const entry of await store.recall([...texts])) cache.load(entry);
}
