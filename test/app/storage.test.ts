import 'fake-indexeddb/auto';
import { IDBFactory } from 'fake-indexeddb';
import { beforeEach, describe, expect, it } from 'vitest';
import { autosave } from '../../app/state/autosave.ts';
import { sampleProject } from '../../app/state/sample.ts';
import { readProject } from '../../app/state/schema.ts';
import { loadLatest, loadProject, NewerElsewhere, openStorage, saveProject } from '../../app/state/storage.ts';
import { createBenchStore } from '../../app/state/store.ts';
import { openTabs } from '../../app/state/tabs.ts';

beforeEach(() => {
  globalThis.indexedDB = new IDBFactory();
});

const wait = (ms: number) => new Promise((done) => setTimeout(done, ms));

describe('storage', () => {
  it('gives back what was saved, the latest project first', async () => {
    const db = await openStorage();
    expect(await loadLatest(db)).toBe('none');
    await saveProject(db, { ...sampleProject(), id: 'old', title: 'old' }, 0);
    await wait(5);
    await saveProject(db, sampleProject(), 0);
    expect(await loadLatest(db)).toEqual({ project: sampleProject(), revision: 1 });
    expect(await loadProject(db, 'old')).toMatchObject({ project: { title: 'old' } });
  });

  it('refuses to write over a newer state, and leaves that state as it is', async () => {
    const db = await openStorage();
    await saveProject(db, sampleProject(), 0);
    await saveProject(db, { ...sampleProject(), title: 'newer' }, 1);
    await expect(saveProject(db, { ...sampleProject(), title: 'older' }, 1)).rejects.toBeInstanceOf(NewerElsewhere);
    expect(await loadLatest(db)).toMatchObject({ project: { title: 'newer' }, revision: 2 });
  });

  it('leaves a project of another version alone and says so', async () => {
    const db = await openStorage();
    const foreign = { ...sampleProject(), version: 99 };
    await db.put('projects', { id: 'x', revision: 4, project: foreign, savedAt: '2000' });
    expect(await loadLatest(db)).toBe('unread');
    expect(await db.get('projects', 'x')).toMatchObject({ project: foreign });
  });
});

describe('the stored shape', () => {
  it('is read back whole', () =>
    expect(readProject(JSON.parse(JSON.stringify(sampleProject())))).toEqual(sampleProject()));
  for (const [what, change] of Object.entries({
    'without values': { values: [] },
    'with a number for digits': { values: [{ ...sampleProject().values[0], text: 3.14 }] },
    'of another format': { format: 'other' },
  }))
    it(`is refused ${what}`, () => expect(readProject({ ...sampleProject(), ...change })).toBeUndefined());
});

describe('autosave', () => {
  it('stores each edit, the newest state last, and says saved only then', async () => {
    const db = await openStorage();
    const store = createBenchStore(sampleProject());
    const saving = autosave(store, { save: (p, r) => saveProject(db, p, r), revision: 0 });
    await saving.flush();
    for (let k = 0; k < 20; k++) store.getState().rename(`title ${k}`);
    expect(store.getState().save.kind).toBe('saving');
    expect(saving.settled()).toBe(false);
    await wait(300);
    expect(store.getState().save.kind).toBe('saved');
    expect(await loadLatest(db)).toMatchObject({ project: { title: 'title 19' } });
  });

  it('keeps the work and gives the reason when the browser has no room', async () => {
    const store = createBenchStore(sampleProject());
    let full = true;
    const saving = autosave(store, {
      save: async (_p, revision) => {
        if (full) throw new DOMException('full', 'QuotaExceededError');
        return revision + 1;
      },
      revision: 1,
    });
    store.getState().rename('kept');
    await saving.flush();
    expect(store.getState().save).toMatchObject({ kind: 'failed', reason: expect.stringMatching(/no room/) });
    expect(store.getState().history.present.title).toBe('kept');
    full = false;
    store.getState().rename('kept and saved');
    await saving.flush();
    expect(store.getState().save.kind).toBe('saved');
  });

  it('a tab with unsaved work is told of another one’s save, and can go on as a copy', async () => {
    const db = await openStorage();
    await saveProject(db, sampleProject(), 0);
    const store = createBenchStore(sampleProject());
    const saving = autosave(store, { save: (p, r) => saveProject(db, p, r), revision: 1 });
    await saveProject(db, { ...sampleProject(), title: 'other tab' }, 1);
    store.getState().rename('this tab');
    await saving.flush();
    expect(store.getState().save.kind).toBe('elsewhere');
    expect(await loadProject(db, 'sample')).toMatchObject({ project: { title: 'other tab' } });
    store.getState().keepAsCopy();
    await saving.flush();
    expect(store.getState().save.kind).toBe('saved');
    const copy = await loadProject(db, store.getState().history.present.id);
    expect(copy).toMatchObject({ project: { title: 'this tab (copy)' } });
    expect(await loadProject(db, 'sample')).toMatchObject({ project: { title: 'other tab' } });
  });

  it('a tab without unsaved work follows, and its next edit is saved on top', async () => {
    const db = await openStorage();
    const open = (title: string, revision: number) => {
      const store = createBenchStore({ ...sampleProject(), title });
      const tabs = openTabs();
      const saving = autosave(store, {
        save: (p, r) => saveProject(db, p, r),
        revision,
        onSaved: (id, r) => tabs.tell({ id, revision: r }),
      });
      tabs.follow(db, store, saving);
      return { store, saving };
    };
    await saveProject(db, sampleProject(), 0);
    const a = open('start', 1);
    const b = open('start', 1);
    a.store.getState().rename('from a');
    await a.saving.flush();
    await wait(60);
    expect(b.store.getState().history.present.title).toBe('from a');
    b.store.getState().rename('from b');
    await b.saving.flush();
    await wait(60);
    expect(b.store.getState().save.kind).toBe('saved');
    expect(a.store.getState().history.present.title).toBe('from b');
  });
});
