/** Several tabs on one project: a tab without unsaved work follows what another one saves; one with unsaved work is told. */
import type { Autosave } from './autosave.ts';
import { loadProject, type Storage } from './storage.ts';
import type { BenchStore } from './store.ts';

const CHANNEL = 'digit-assay-saves';

interface Saved {
  readonly id: string;
  readonly revision: number;
}

export interface Tabs {
  tell(saved: Saved): void;
  follow(db: Storage, store: BenchStore, saving: Autosave): void;
}

export function openTabs(): Tabs {
  const channel = new BroadcastChannel(CHANNEL);
  return {
    tell: (saved) => channel.postMessage(saved),
    follow: (db, store, saving) => {
      channel.onmessage = async (event: MessageEvent<Saved>) => {
        const { present } = store.getState().history;
        if (event.data.id !== present.id) return;
        if (!saving.settled()) {
          store.getState().setSave({ kind: 'elsewhere' });
          return;
        }
        const stored = await loadProject(db, present.id);
        if (stored === undefined) return;
        if (!saving.settled()) store.getState().setSave({ kind: 'elsewhere' });
        else saving.adopt(stored);
      };
    },
  };
}
