/**
 * The worker's side of the protocol. Tasks run one after another; a cancel reaches a running task through its signal
 * (long tasks give the event loop a turn) and a waiting one before it starts.
 */
import { ConstantCache } from '../constants/cache.ts';
import type { ConstantStore } from './constant-store.ts';
import { recallTerms } from './constant-store.ts';
import { AbortError, toErrorData } from './errors.ts';
import type { FromWorker, ToWorker } from './messages.ts';
import { tasks, termsOf } from './tasks.ts';

/** Returns the function that takes incoming messages; answers go through `send`. With a `store`, constants are computed once for all sessions. */
export function createHandler(send: (message: FromWorker) => void, store?: ConstantStore): (message: ToWorker) => void {
  const cache = new ConstantCache((entry) => store?.keep(entry));
  const controllers = new Map<number, AbortController>();
  let last: Promise<void> = Promise.resolve();

  const run = async (message: Extract<ToWorker, { kind: 'start' }>, signal: AbortSignal): Promise<void> => {
    const { id, task, request } = message;
    try {
      signal.throwIfAborted();
      const work = tasks[task] as (request: unknown, context: unknown) => Promise<unknown>;
      if (work === undefined) throw new RangeError(`createHandler: expected a task name, got ${task}`);
      if (store !== undefined) await recallTerms(termsOf(task, request), cache, store);
      signal.throwIfAborted();
      const response = await work(request, {
        signal,
        cache,
        store,
        onProgress: (progress: unknown) => send({ kind: 'progress', id, progress }),
      });
      send({ kind: 'done', id, response });
    } catch (error) {
      send({
        kind: 'failed',
        id,
        error: toErrorData(signal.aborted ? new AbortError('The task was cancelled.') : error),
      });
    } finally {
      controllers.delete(id);
    }
  };

  return (message) => {
    if (message.kind === 'cancel') {
      controllers.get(message.id)?.abort(new AbortError('The task was cancelled.'));
      return;
    }
    const controller = new AbortController();
    controllers.set(message.id, controller);
    last = last.then(() => run(message, controller.signal));
  };
}
