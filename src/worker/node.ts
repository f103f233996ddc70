/** The worker's shell on Node. */
import { parentPort } from 'node:worker_threads';
import { createHandler } from './handler.ts';
import type { ToWorker } from './messages.ts';

const port = parentPort;
if (port === null) throw new Error('This file runs as a worker thread.');
const handle = createHandler((message) => port.postMessage(message));
port.on('message', (message: ToWorker) => handle(message));
