/** Runs the search of one value and keeps the store informed. */
import { InputError } from '../../src/number/errors.ts';
import type { SearchRequest } from '../../src/search/request.ts';
import type { EngineClient } from '../../src/worker/client.ts';
import { AbortError } from '../../src/worker/errors.ts';
import { searchInParallel } from '../../src/worker/parallel.ts';
import type { ValueEntry } from './project.ts';
import type { BenchStore } from './store.ts';

/** Workers that a search may use. */
export const SEARCH_WORKERS = 2;

/** The request that a value's sheet stands for. */
export function requestOf(value: ValueEntry): SearchRequest {
  const divideBy = value.divideBy.trim();
  return {
    value: value.text,
    basis: value.basis,
    ...(value.trustedDigits === null ? {} : { trustedDigits: value.trustedDigits }),
    ...(divideBy === '' ? {} : { divideBy }),
  };
}

export async function startSearch(store: BenchStore, engine: EngineClient, value: ValueEntry): Promise<void> {
  const { id } = value;
  if (store.getState().running[id] !== undefined) return;
  const controller = new AbortController();
  const actions = store.getState();
  actions.searchStarted(id, controller);
  try {
    const record = await searchInParallel(engine, SEARCH_WORKERS, requestOf(value), {
      signal: controller.signal,
      onProgress: (progress) => actions.searchMoved(id, progress),
    });
    actions.searchEnded(id, { record });
  } catch (error) {
    if (error instanceof AbortError) actions.searchEnded(id, { cancelled: true });
    else actions.searchEnded(id, { problem: sentenceOf(error) });
  }
}

/** One plain sentence: the user's mistake as the engine words it, anything else as our own failure. */
export function sentenceOf(error: unknown): string {
  if (error instanceof InputError) return error.message;
  const reason = error instanceof Error ? error.message : String(error);
  return `The engine stopped (${reason.replace(/\.$/, '')}); your values are kept, and searching again starts it afresh.`;
}
