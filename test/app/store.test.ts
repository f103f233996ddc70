import { describe, expect, it } from 'vitest';
import { currentRecord } from '../../app/state/project.ts';
import { sampleProject } from '../../app/state/sample.ts';
import { requestOf, sentenceOf, startSearch } from '../../app/state/search.ts';
import { createBenchStore } from '../../app/state/store.ts';
import { InputError } from '../../src/number/errors.ts';
import { runSearch } from '../../src/search/run.ts';
import type { EngineClient } from '../../src/worker/client.ts';
import { AbortError } from '../../src/worker/errors.ts';

const present = (store: ReturnType<typeof createBenchStore>) => store.getState().history.present;
const first = (store: ReturnType<typeof createBenchStore>) => {
  const [value] = present(store).values;
  if (value === undefined) throw new Error('the sample has no value');
  return value;
};
/** The engine's own search, called in place. */
const engine = {
  call: (_task: 'search', request: Parameters<typeof runSearch>[0], options: object) => runSearch(request, options),
} as unknown as EngineClient;

describe('the bench store', () => {
  it('undoes a removal with its records', () => {
    const store = createBenchStore(sampleProject());
    const { id } = first(store);
    store.getState().remove(id);
    expect(present(store).values.map((v) => v.id)).not.toContain(id);
    store.getState().undo();
    expect(present(store)).toEqual(sampleProject());
  });

  it('always leaves a value to work on', () => {
    const store = createBenchStore(sampleProject());
    for (let k = 0; k < 5; k++) store.getState().remove(present(store).selected);
    expect(present(store).values).toHaveLength(1);
    expect(first(store).id).toBe(present(store).selected);
  });

  it('keeps the record of a search, shows it as stale after an edit, and as current after undo', async () => {
    const store = createBenchStore(sampleProject());
    await startSearch(store, engine, first(store));
    expect(currentRecord(first(store))?.verdict).toBe('holds');
    store.getState().change(first(store).id, { trustedDigits: 80 });
    expect(currentRecord(first(store))).toBeNull();
    expect(first(store).records).toHaveLength(1);
    store.getState().undo();
    expect(currentRecord(first(store))?.verdict).toBe('holds');
  });

  it('says in one sentence why a search could not be carried out, until the value is edited', async () => {
    const store = createBenchStore(sampleProject());
    const { id } = first(store);
    store.getState().change(id, { basis: ['zetta(3)'] });
    await startSearch(store, engine, first(store));
    expect(store.getState().problems[id]).toMatch(/zetta/);
    expect(store.getState().running[id]).toBeUndefined();
    store.getState().change(id, { basis: ['zeta(3)'] });
    expect(store.getState().problems[id]).toBeUndefined();
  });

  it('a cancelled search leaves no record and no complaint', async () => {
    const store = createBenchStore(sampleProject());
    const { id } = first(store);
    const hanging = {
      call: (_t: string, _r: unknown, { signal }: { signal: AbortSignal }) =>
        new Promise((_, reject) => signal.addEventListener('abort', () => reject(new AbortError('cancelled')))),
    } as unknown as EngineClient;
    const done = startSearch(store, hanging, first(store));
    store.getState().running[id]?.controller.abort();
    await done;
    expect(store.getState().running[id]).toBeUndefined();
    expect(store.getState().problems[id]).toBeUndefined();
    expect(first(store).records).toHaveLength(0);
  });

  it('asks only for what the value says', () => {
    const store = createBenchStore(sampleProject());
    expect(Object.keys(requestOf(first(store)))).toEqual(['value', 'basis']);
    store.getState().change(first(store).id, { divideBy: ' sqrt(3) ', trustedDigits: 40 });
    expect(requestOf(first(store))).toMatchObject({ divideBy: 'sqrt(3)', trustedDigits: 40 });
  });

  it('words the user’s mistakes as the engine does and its own failures as such', () => {
    expect(sentenceOf(new InputError('x', 'Plain words.'))).toBe('Plain words.');
    expect(sentenceOf(new RangeError('f: expected 1, got 2'))).toMatch(/engine stopped.*values are kept/);
  });
});
