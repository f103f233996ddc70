/** The engine in web workers: a pool for searches, one for quick questions, so that checking an entry never waits for a search. */
import { createEngineClient, type EngineClient, type Spawn } from '../src/worker/client.ts';
import type { FromWorker } from '../src/worker/messages.ts';
import { SEARCH_WORKERS } from './state/search.ts';

const spawn: Spawn = (events) => {
  const worker = new Worker(new URL('../src/worker/browser.ts', import.meta.url), { type: 'module' });
  worker.onmessage = (event: MessageEvent<FromWorker>) => events.onMessage(event.data);
  worker.onerror = (event) => {
    event.preventDefault();
    events.onDeath(event.message || 'the engine could not be started');
  };
  return { post: (message) => worker.postMessage(message), terminate: () => worker.terminate() };
};

export const searchEngine: EngineClient = createEngineClient(spawn, SEARCH_WORKERS);
export const quickEngine: EngineClient = createEngineClient(spawn);
