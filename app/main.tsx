/** Starts the page: stored project (or the sample on a first visit), store, autosave. */
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { Bench } from './bench/Bench.tsx';
import { Header } from './Header.tsx';
import { autosave } from './state/autosave.ts';
import { StoreContext, useBench } from './state/react.ts';
import { sampleProject } from './state/sample.ts';
import { loadLatest, openStorage, saveProject } from './state/storage.ts';
import { createBenchStore } from './state/store.ts';
import './styles.css';

function Announcer() {
  const announcement = useBench((s) => s.announcement);
  return (
    <p className="visually-hidden" role="status" aria-live="polite">
      {announcement}
    </p>
  );
}

async function start(): Promise<void> {
  const element = document.getElementById('root');
  if (element === null) return;
  const storage = await openStorage().catch(() => undefined);
  const stored = storage === undefined ? undefined : await loadLatest(storage).catch(() => undefined);
  const store = createBenchStore(stored?.project ?? sampleProject());
  if (storage === undefined) {
    store.getState().setSave({ kind: 'failed', reason: 'this browser keeps no data for the page' });
  } else {
    const flush = autosave(store, (project, basedOn) => saveProject(storage, project, basedOn), stored?.revision ?? 0);
    addEventListener('visibilitychange', () => {
      if (document.visibilityState === 'hidden') flush();
    });
    addEventListener('beforeunload', (event) => {
      const unsaved = store.getState().save.kind === 'saving';
      const busy = Object.keys(store.getState().running).length > 0;
      if (unsaved) flush();
      if (busy) event.preventDefault();
    });
  }
  createRoot(element).render(
    <StrictMode>
      <StoreContext value={store}>
        <Header onReload={() => location.reload()} />
        <Bench />
        <Announcer />
      </StoreContext>
    </StrictMode>,
  );
}

start();
