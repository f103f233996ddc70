/** The project in the browser's own database. */
import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { Project } from './project.ts';
import { readProject } from './schema.ts';

interface Row {
  readonly id: string;
  readonly revision: number;
  readonly project: unknown;
  readonly savedAt: string;
}

interface Schema extends DBSchema {
  projects: { key: string; value: Row };
}

export type Storage = IDBPDatabase<Schema>;

/** Another tab has saved a newer state than the one this tab started from. */
export class NewerElsewhere extends Error {
  override readonly name = 'NewerElsewhere';
}

export interface Stored {
  readonly project: Project;
  readonly revision: number;
}

const DATABASE = 'digit-assay';

export function openStorage(): Promise<Storage> {
  return openDB<Schema>(DATABASE, 1, {
    upgrade(db) {
      db.createObjectStore('projects', { keyPath: 'id' });
    },
  });
}

/** The most recently saved project; `unread` when there is none but something that cannot be read (it is left as it is). */
export async function loadLatest(db: Storage): Promise<Stored | 'none' | 'unread'> {
  const rows = (await db.getAll('projects')).sort((a, b) => (a.savedAt < b.savedAt ? 1 : -1));
  for (const row of rows) {
    const project = readProject(row.project);
    if (project !== undefined) return { project, revision: row.revision };
  }
  return rows.length === 0 ? 'none' : 'unread';
}

export async function loadProject(db: Storage, id: string): Promise<Stored | undefined> {
  const row = await db.get('projects', id);
  const project = readProject(row?.project);
  return row === undefined || project === undefined ? undefined : { project, revision: row.revision };
}

/**
 * Saves in one transaction and returns the new revision. Rejects with NewerElsewhere, and writes nothing, when the stored
 * revision is not the one that this state was built on.
 */
export async function saveProject(db: Storage, project: Project, basedOn: number): Promise<number> {
  const transaction = db.transaction('projects', 'readwrite', { durability: 'strict' });
  const stored = await transaction.store.get(project.id);
  if (stored !== undefined && stored.revision !== basedOn) {
    transaction.abort();
    await transaction.done.catch(() => undefined);
    throw new NewerElsewhere('Another tab has changed this project.');
  }
  const revision = basedOn + 1;
  await transaction.store.put({ id: project.id, revision, project, savedAt: new Date().toISOString() });
  await transaction.done;
  return revision;
}
