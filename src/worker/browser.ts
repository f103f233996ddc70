/** The worker's shell in a browser. */
import { browserConstants } from './browser-constants.ts';
import { createHandler } from './handler.ts';
import type { FromWorker, ToWorker } from './messages.ts';

interface WorkerScope {
  postMessage(message: FromWorker): void;
  onmessage: ((event: { data: ToWorker }) => void) | null;
}

const scope = globalThis as unknown as WorkerScope;
const handle = createHandler((message) => scope.postMessage(message), browserConstants());
scope.onmessage = (event) => handle(event.data);
