/** Starts the page: stored project or first visit, autosave, then the bench. */
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { Bench } from './bench/Bench.tsx';
import { closing } from './leave.ts';
import { type Autosave, autosave } from './state/autosave.ts';
import { StoreContext } from './state/react.ts';
import { sampleProject } from './state/sample.ts';
import { loadLatest, loadProject, openStorage, type Storage, saveProject } from './state/storage.ts';
import { type BenchStore, createBenchStore } from './state/store.ts';
import { openTabs } from './state/tabs.ts';
import './styles/index.css';

async function start(): Promise<void> {
  const fresh = sampleProject();
  let db: Storage | undefined;
  let store: BenchStore;
  let saving: Autosave | undefined;
  try {
    db = await openStorage();
    const opened = db;
    const found = await loadLatest(opened);
    const stored = typeof found === 'string' ? { project: fresh, revision: 0 } : found;
    store = createBenchStore(stored.project);
    const tabs = openTabs();
    saving = autosave(store, {
      save: (project, basedOn) => saveProject(opened, project, basedOn),
      revision: stored.revision,
      onSaved: (id, revision) => tabs.tell({ id, revision }),
    });
    tabs.follow(opened, store, saving);
    if (found === 'unread') {
      store.getState().announce('The stored project could not be read; it is kept, and a new one was started.');
    }
  } catch (error) {
    store = createBenchStore(fresh);
    const reason = error instanceof Error ? error.message : String(error);
    store.getState().setSave({ kind: 'failed', reason: `this browser offers no storage here (${reason})` });
  }
  saving?.flush();
  if (saving !== undefined) closing(saving.flush);
  const onTakeOther = async (): Promise<void> => {
    const stored = db && (await loadProject(db, store.getState().history.present.id));
    if (stored !== undefined) saving?.adopt(stored);
  };
  const root = document.getElementById('root');
  if (root === null) throw new Error('start: expected an element with the id root');
  createRoot(root).render(
    <StrictMode>
      <StoreContext value={store}>
        <Bench onTakeOther={onTakeOther} />
      </StoreContext>
    </StrictMode>,
  );
}

start();
