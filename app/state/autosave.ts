/** Keeps the stored project in step with the store, and says how that goes. */

import type { Project } from './project.ts';
import { NewerElsewhere, type Stored } from './storage.ts';
import type { BenchStore } from './store.ts';

const WAIT_MILLISECONDS = 150;

export interface Autosave {
  /** Saves at once what is not saved yet. */
  flush(): Promise<void>;
  /** Whether everything on the page is stored. */
  settled(): boolean;
  /** Goes on from a state that is stored already. */
  adopt(stored: Stored): void;
}

export interface AutosaveOptions {
  /** Takes the project and the revision it builds on and returns the new one. */
  readonly save: (project: Project, basedOn: number) => Promise<number>;
  /** Revision of the store's present project; 0 when it was never stored. */
  readonly revision: number;
  readonly onSaved?: (id: string, revision: number) => void;
}

/** Saves after each change, one save at a time, the newest state last. */
export function autosave(store: BenchStore, { save, revision, onSaved }: AutosaveOptions): Autosave {
  const present = (): Project => store.getState().history.present;
  let saved: Project | undefined = revision > 0 ? present() : undefined;
  let basedOn = revision;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let work: Promise<void> = Promise.resolve();

  const saveNow = async (): Promise<void> => {
    const project = present();
    if (project === saved || store.getState().save.kind === 'elsewhere') return;
    if (saved !== undefined && project.id !== saved.id) basedOn = 0;
    try {
      basedOn = await save(project, basedOn);
      saved = project;
      store.getState().setSave({ kind: present() === project ? 'saved' : 'saving' });
      onSaved?.(project.id, basedOn);
    } catch (error) {
      if (error instanceof NewerElsewhere) store.getState().setSave({ kind: 'elsewhere' });
      else store.getState().setSave({ kind: 'failed', reason: reasonOf(error) });
    }
  };
  const flush = (): Promise<void> => {
    clearTimeout(timer);
    work = work.then(saveNow);
    return work;
  };

  store.subscribe((state, before) => {
    if (state.history.present === before.history.present || state.history.present === saved) return;
    if (state.save.kind === 'elsewhere') return;
    if (state.save.kind !== 'saving') state.setSave({ kind: 'saving' });
    clearTimeout(timer);
    timer = setTimeout(flush, WAIT_MILLISECONDS);
  });
  return {
    flush,
    settled: () => present() === saved,
    adopt: (stored) => {
      saved = stored.project;
      basedOn = stored.revision;
      store.getState().adopt(stored.project);
    },
  };
}

function reasonOf(error: unknown): string {
  const name = error instanceof Error ? error.name : '';
  if (name === 'QuotaExceededError')
    return 'the browser has no room left; the work on this page is kept until you close it';
  return error instanceof Error ? error.message : String(error);
}
