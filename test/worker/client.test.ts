import { describe, expect, it, vi } from 'vitest';
import { InputError } from '../../src/number/errors.ts';
import { createEngineClient, type PortEvents } from '../../src/worker/client.ts';
import { AbortError, fromErrorData, toErrorData, WorkerDied } from '../../src/worker/errors.ts';
import type { FromWorker, ToWorker } from '../../src/worker/messages.ts';

/** A worker whose answers the test gives by hand. */
function handWorked() {
  const sent: ToWorker[] = [];
  const ports: PortEvents[] = [];
  const terminated: number[] = [];
  const spawn = (events: PortEvents) => {
    const index = ports.push(events) - 1;
    return { post: (m: ToWorker) => void sent.push(m), terminate: () => void terminated.push(index) };
  };
  return {
    sent,
    ports,
    terminated,
    spawn,
    answer: (m: FromWorker, port = ports.length - 1) => ports[port]?.onMessage(m),
  };
}

const request = { text: 'pi', digits: 5 };
const response = { digits: '3.1416', imaginary: null, latex: '\\pi', weight: 1, family: 'pi' };

describe('the engine client', () => {
  it('passes responses and progress', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const onProgress = vi.fn();
    const promise = client.call('evaluate', request, { onProgress });
    worker.answer({ kind: 'progress', id: 1, progress: { fraction: 0.5 } });
    worker.answer({ kind: 'done', id: 1, response });
    await expect(promise).resolves.toEqual(response);
    expect(onProgress).toHaveBeenCalledWith({ fraction: 0.5 });
  });

  it('rebuilds errors with class, code and place', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const promise = client.call('evaluate', request);
    const at = { offset: 2, length: 1, line: 1, column: 3 };
    worker.answer({ kind: 'failed', id: 1, error: toErrorData(new InputError('empty', 'Nothing.', at)) });
    const error = await promise.catch((e: unknown) => e);
    expect(error).toBeInstanceOf(InputError);
    expect(error).toMatchObject({ code: 'empty', message: 'Nothing.', at });
    expect(fromErrorData(toErrorData(new RangeError('f: expected')))).toBeInstanceOf(RangeError);
  });

  it('rejects with AbortError when the worker answers a cancel', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const controller = new AbortController();
    const promise = client.call('evaluate', request, { signal: controller.signal });
    controller.abort();
    expect(worker.sent.at(-1)).toEqual({ kind: 'cancel', id: 1 });
    worker.answer({ kind: 'failed', id: 1, error: toErrorData(new AbortError('The task was cancelled.')) });
    await expect(promise).rejects.toBeInstanceOf(AbortError);
    expect(worker.terminated).toEqual([]);
  });

  it('ends a worker that does not hear a cancel, and starts another for the next task', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const controller = new AbortController();
    const first = client.call('evaluate', request, { signal: controller.signal });
    const second = client.call('evaluate', request);
    controller.abort();
    await expect(first).rejects.toBeInstanceOf(AbortError);
    expect(worker.terminated).toEqual([0]);
    worker.answer({ kind: 'done', id: 1, response }, 0);
    worker.answer({ kind: 'done', id: 2, response }, 1);
    await expect(second).resolves.toEqual(response);
  });

  it('never starts a task that was cancelled while it waited', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const controller = new AbortController();
    const first = client.call('evaluate', request);
    const second = client.call('evaluate', request, { signal: controller.signal });
    controller.abort();
    await expect(second).rejects.toBeInstanceOf(AbortError);
    worker.answer({ kind: 'done', id: 1, response });
    await first;
    expect(worker.sent).toHaveLength(1);
  });

  it('rejects with WorkerDied when the worker ends, and goes on with a new one', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const first = client.call('evaluate', request);
    worker.ports[0]?.onDeath('out of memory');
    await expect(first).rejects.toBeInstanceOf(WorkerDied);
    const second = client.call('evaluate', request);
    worker.answer({ kind: 'done', id: 2, response });
    await expect(second).resolves.toEqual(response);
    expect(worker.ports).toHaveLength(2);
  });

  it('settles everything on close, and refuses what comes after', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn);
    const all = [client.call('evaluate', request), client.call('evaluate', request)];
    client.close();
    for (const one of all) await expect(one).rejects.toBeInstanceOf(WorkerDied);
    await expect(client.call('evaluate', request)).rejects.toBeInstanceOf(WorkerDied);
  });

  it('runs two tasks at once on two workers', async () => {
    const worker = handWorked();
    const client = createEngineClient(worker.spawn, 2);
    const first = client.call('evaluate', request);
    const second = client.call('evaluate', request);
    expect(worker.ports).toHaveLength(2);
    worker.answer({ kind: 'done', id: 2, response }, 1);
    worker.answer({ kind: 'done', id: 1, response }, 0);
    await Promise.all([first, second]);
  });
});
