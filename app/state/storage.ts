/** The project in the browser's own database. */
import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { Project } from './project.ts';

interface Schema extends DBSchema {
  projects: { key: string; value: { id: string; revision: number; project: Project; savedAt: string } };
}

/** Another tab has saved a newer state than the one this tab started from. */
export class NewerElsewhere extends Error {
  override readonly name = 'NewerElsewhere';
}

export interface Stored {
  readonly project: Project;
  readonly revision: number;
}

const DATABASE = 'digit-assay';

export function openStorage(): Promise<IDBPDatabase<Schema>> {
  return openDB<Schema>(DATABASE, 1, {
    upgrade(db) {
      db.createObjectStore('projects', { keyPath: 'id' });
    },
  });
}

/** The most recently saved project, or undefined on a first visit. */
export async function loadLatest(db: IDBPDatabase<Schema>): Promise<Stored | undefined> {
  const all = await db.getAll('projects');
  const [latest] = all.sort((a, b) => (a.savedAt < b.savedAt ? 1 : -1));
  return latest === undefined ? undefined : { project: latest.project, revision: latest.revision };
}

/**
 * Saves in one transaction and returns the new revision. Rejects with NewerElsewhere, and writes nothing, when the stored
 * revision is not the one that this state was built on.
 */
export async function saveProject(db: IDBPDatabase<Schema>, project: Project, basedOn: number): Promise<number> {
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
