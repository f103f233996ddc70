/** The page's (or the Node parent's) side: a promise a task, which always settles. */
import { AbortError, fromErrorData, WorkerDied } from './errors.ts';
import type { EngineTasks, FromWorker, TaskName, ToWorker } from './messages.ts';

/** A worker as both platforms can offer it. */
export interface Port {
  post(message: ToWorker): void;
  terminate(): void;
}

export interface PortEvents {
  onMessage(message: FromWorker): void;
  /** The worker failed to load, threw outside a task, or ended. */
  onDeath(reason: string): void;
}

export type Spawn = (events: PortEvents) => Port;

export interface CallOptions<K extends TaskName> {
  readonly signal?: AbortSignal;
  readonly onProgress?: (progress: EngineTasks[K]['progress']) => void;
}

export interface EngineClient {
  /** Settles with the response, or rejects: InputError and RangeError as thrown, AbortError after a cancel, WorkerDied. */
  call<K extends TaskName>(
    task: K,
    request: EngineTasks[K]['request'],
    options?: CallOptions<K>,
  ): Promise<EngineTasks[K]['response']>;
  /** Ends the workers; what is still running rejects with WorkerDied. */
  close(): void;
}

/** After a cancel a worker has this long to answer; then it is ended and started afresh. */
const CANCEL_MILLISECONDS = 80;

interface Pending {
  readonly id: number;
  readonly message: Extract<ToWorker, { kind: 'start' }>;
  readonly resolve: (response: unknown) => void;
  readonly reject: (error: Error) => void;
  readonly onProgress: ((progress: unknown) => void) | undefined;
}

/** One worker and the task it has in hand. */
class Lane {
  private readonly spawn: Spawn;
  private port: Port | undefined;
  private current: Pending | undefined;
  private readonly whenFree: () => void;

  constructor(spawn: Spawn, whenFree: () => void) {
    this.spawn = spawn;
    this.whenFree = whenFree;
  }

  get busy(): boolean {
    return this.current !== undefined;
  }

  start(task: Pending): void {
    this.current = task;
    this.port ??= this.open();
    this.port.post(task.message);
  }

  /** Cancels the task in hand if it is this one. */
  cancel(id: number): boolean {
    if (this.current?.id !== id) return false;
    this.port?.post({ kind: 'cancel', id });
    setTimeout(() => {
      if (this.current?.id !== id) return;
      this.drop();
      this.settle((pending) => pending.reject(new AbortError('The task was cancelled.')));
    }, CANCEL_MILLISECONDS);
    return true;
  }

  close(reason: string): void {
    this.drop();
    this.settle((pending) => pending.reject(new WorkerDied(reason)));
  }

  private drop(): void {
    this.port?.terminate();
    this.port = undefined;
  }

  private open(): Port {
    const port = this.spawn({
      onMessage: (message) => {
        if (this.port === port) this.receive(message);
      },
      onDeath: (reason) => {
        if (this.port === port) this.close(reason);
      },
    });
    return port;
  }

  private receive(message: FromWorker): void {
    if (message.id !== this.current?.id) return;
    if (message.kind === 'progress') this.current.onProgress?.(message.progress);
    else if (message.kind === 'done') this.settle((pending) => pending.resolve(message.response));
    else this.settle((pending) => pending.reject(fromErrorData(message.error)));
  }

  private settle(how: (pending: Pending) => void): void {
    const pending = this.current;
    this.current = undefined;
    if (pending !== undefined) how(pending);
    this.whenFree();
  }
}

/** A client over `size` workers, each started when it is first needed. Tasks wait their turn in the order of the calls. */
export function createEngineClient(spawn: Spawn, size = 1): EngineClient {
  const waiting: Pending[] = [];
  let nextId = 1;
  let closed = false;
  const dispatch = (): void => {
    for (const lane of lanes) {
      if (closed || lane.busy) continue;
      const task = waiting.shift();
      if (task === undefined) return;
      lane.start(task);
    }
  };
  const lanes: readonly Lane[] = Array.from({ length: size }, () => new Lane(spawn, dispatch));

  const cancel = (id: number): void => {
    const index = waiting.findIndex((task) => task.id === id);
    if (index >= 0) {
      const [task] = waiting.splice(index, 1);
      task?.reject(new AbortError('The task was cancelled.'));
      return;
    }
    lanes.some((lane) => lane.cancel(id));
  };

  return {
    call(task, request, options = {}) {
      const id = nextId++;
      const { signal, onProgress } = options;
      return new Promise((resolve, reject) => {
        if (closed) {
          reject(new WorkerDied('The engine has been closed.'));
          return;
        }
        if (signal?.aborted) {
          reject(new AbortError('The task was cancelled.'));
          return;
        }
        const listener = (): void => cancel(id);
        signal?.addEventListener('abort', listener, { once: true });
        const settled = (): void => signal?.removeEventListener('abort', listener);
        waiting.push({
          id,
          message: { kind: 'start', id, task, request },
          resolve: (response) => {
            settled();
            resolve(response as never);
          },
          reject: (error) => {
            settled();
            reject(error);
          },
          onProgress: onProgress as ((progress: unknown) => void) | undefined,
        });
        dispatch();
      });
    },
    close() {
      closed = true;
      for (const task of waiting.splice(0)) task.reject(new WorkerDied('The engine has been closed.'));
      for (const lane of lanes) lane.close('The engine has been closed.');
    },
  };
}
