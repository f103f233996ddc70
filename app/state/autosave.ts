/** Keeps the stored project in step with the store, and says how that goes. */

import type { Project } from './project.ts';
import { NewerElsewhere } from './storage.ts';
import type { BenchStore } from './store.ts';

const WAIT_MILLISECONDS = 150;

/**
 * Saves after each change, one save at a time, the newest state last. `save` takes the project and the revision it builds
 * on and returns the new one. Returns a function that saves at once what is not saved yet.
 */
export function autosave(
  store: BenchStore,
  save: (project: Project, basedOn: number) => Promise<number>,
  revision: number,
): () => Promise<void> {
  let saved: Project | undefined = revision > 0 ? store.getState().history.present : undefined;
  let basedOn = revision;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let work: Promise<void> = Promise.resolve();

  const flush = (): Promise<void> => {
    clearTimeout(timer);
    work = work.then(async () => {
      const project = store.getState().history.present;
      if (project === saved || store.getState().save.kind === 'elsewhere') return;
      try {
        basedOn = await save(project, basedOn);
        saved = project;
        const latest = store.getState().history.present === project;
        store.getState().setSave(latest ? { kind: 'saved' } : { kind: 'saving' });
      } catch (error) {
        if (error instanceof NewerElsewhere) store.getState().setSave({ kind: 'elsewhere' });
        else store.getState().setSave({ kind: 'failed', reason: reasonOf(error) });
      }
    });
    return work;
  };

  store.subscribe((state, before) => {
    if (state.history.present === before.history.present || state.save.kind === 'elsewhere') return;
    if (state.save.kind !== 'saving') state.setSave({ kind: 'saving' });
    clearTimeout(timer);
    timer = setTimeout(flush, WAIT_MILLISECONDS);
  });
  return flush;
}

function reasonOf(error: unknown): string {
  const name = error instanceof Error ? error.name : '';
  if (name === 'QuotaExceededError')
    return 'the browser has no room left; the work on this page is kept until you close it';
  return error instanceof Error ? error.message : String(error);
}
