import { describe, expect, it } from 'vitest';
import type { CachedConstant } from '../../src/constants/cache.ts';
import { createHandler } from '../../src/worker/handler.ts';
import type { FromWorker } from '../../src/worker/messages.ts';

/** Runs one task through the handler. */
function ask(
  handle: ReturnType<typeof createHandler>,
  answers: FromWorker[],
  id: number,
  task: string,
  request: unknown,
): Promise<FromWorker> {
  handle({ kind: 'start', id, task: task as never, request });
  return new Promise((resolve) => {
    const look = (): void => {
      const found = answers.find((m) => m.id === id && m.kind !== 'progress');
      if (found === undefined) setTimeout(look, 2);
      else resolve(found);
    };
    look();
  });
}

describe('the worker’s handler', () => {
  it('computes a constant once: a second worker takes it from the store, and asks for more bits only', async () => {
    const kept = new Map<string, CachedConstant>();
    const store = {
      recall: async (texts: readonly string[]) => texts.flatMap((t) => kept.get(t) ?? []),
      keep: (entry: CachedConstant) => void kept.set(entry.text, entry),
      settled: async () => undefined,
    };
    const first: FromWorker[] = [];
    const one = createHandler((m) => first.push(m), store);
    const answer = await ask(one, first, 1, 'evaluate', { text: 'zeta(5)*2', digits: 300 });
    expect(answer).toMatchObject({ kind: 'done', response: { weight: 5 } });
    const bits = kept.get('zeta(5)')?.bits as number;
    expect(bits).toBeGreaterThan(990);
    // A planted wrong entry shows that the store is what is used.
    kept.set('zeta(5)', { text: 'zeta(5)', bits: 5000, value: { mid: 3n << 4999n, rad: 0n, bits: 5000 } });
    const second: FromWorker[] = [];
    const two = createHandler((m) => second.push(m), store);
    expect(await ask(two, second, 1, 'evaluate', { text: 'zeta(5)', digits: 10 })).toMatchObject({
      response: { digits: '1.500000000' },
    });
  });

  it('two workers share the constants of one search, and the search then computes none', async () => {
    const kept = new Map<string, CachedConstant>();
    const computedBy: string[][] = [[], [], []];
    const storeOf = (worker: number) => ({
      recall: async (texts: readonly string[]) => texts.flatMap((t) => kept.get(t) ?? []),
      keep: (entry: CachedConstant) => {
        computedBy[worker]?.push(entry.text);
        kept.set(entry.text, entry);
      },
      settled: async () => undefined,
    });
    const digits =
      '0.13434353866061472157049648360403223703627144755928803185358578479596323614010234482358150531653179963316';
    const search = { value: digits, basis: { space: 'alternating', weight: 6, lower: true } };
    for (const part of [0, 1]) {
      const answers: FromWorker[] = [];
      const handle = createHandler((m) => answers.push(m), storeOf(part));
      expect(await ask(handle, answers, 1, 'compute', { search, part, parts: 2 })).toMatchObject({ kind: 'done' });
    }
    const shares = computedBy.map((list) => new Set(list));
    expect(shares[0]?.size).toBeGreaterThan(2);
    expect(Math.abs((shares[0]?.size ?? 0) - (shares[1]?.size ?? 0))).toBeLessThan(4);
    const answers: FromWorker[] = [];
    const handle = createHandler((m) => answers.push(m), storeOf(2));
    expect(await ask(handle, answers, 1, 'search', search)).toMatchObject({ kind: 'done' });
    expect(computedBy[2]).toEqual([]);
  });

  it('says what is wrong, and takes the next task', async () => {
    const answers: FromWorker[] = [];
    const handle = createHandler((m) => answers.push(m));
    const bad = await ask(handle, answers, 1, 'evaluate', { text: '2*', digits: 10 });
    expect(bad).toMatchObject({ kind: 'failed', error: { name: 'InputError', code: 'unexpected' } });
    expect(await ask(handle, answers, 2, 'evaluate', { text: 'pi', digits: 10 })).toMatchObject({
      response: { digits: '3.141592654' },
    });
    expect(await ask(handle, answers, 3, 'nonsense', {})).toMatchObject({ kind: 'failed' });
  });

  it('a cancel reaches a waiting task and a running search', async () => {
    const answers: FromWorker[] = [];
    const handle = createHandler((m) => answers.push(m));
    const digits = Array.from({ length: 700 }, (_, k) => (k * k * 7 + (k % 13) * 3) % 10).join('');
    const running = ask(handle, answers, 1, 'search', {
      value: `0.${digits}`,
      basis: { space: 'alternating', weight: 5, lower: true },
    });
    const waiting = ask(handle, answers, 2, 'evaluate', { text: 'pi', digits: 10 });
    handle({ kind: 'cancel', id: 2 });
    setTimeout(() => handle({ kind: 'cancel', id: 1 }), 150);
    expect(await running).toMatchObject({ kind: 'failed', error: { name: 'AbortError' } });
    expect(await waiting).toMatchObject({ kind: 'failed', error: { name: 'AbortError' } });
  });

  it('lists the catalogue and rewrites constants into a space', async () => {
    const answers: FromWorker[] = [];
    const handle = createHandler((m) => answers.push(m));
    const listed = await ask(handle, answers, 1, 'catalogue', {});
    expect(listed.kind).toBe('done');
    // zeta(2,1) = zeta(3): Euler 1775.
    expect(await ask(handle, answers, 2, 'rewrite', { text: 'zeta(2,1)', space: 'mzv' })).toMatchObject({
      response: { text: 'zeta(3)' },
    });
    expect(await ask(handle, answers, 3, 'rewrite', { text: 'catalan', space: 'mzv' })).toMatchObject({
      kind: 'failed',
      error: { code: 'not-in-space' },
    });
  });
});
