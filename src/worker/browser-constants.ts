/** Values of constants in IndexedDB, by canonical text, only ever extended. Values of another engine version are not looked at. */
import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import type { CachedConstant } from '../constants/cache.ts';
import { ENGINE_VERSION } from '../search/report.ts';
import type { ConstantStore } from './constant-store.ts';

interface Schema extends DBSchema {
  constants: { key: string; value: CachedConstant };
}

/** Values of fewer bits are quicker computed than fetched. */
export const LEAST_BITS = 600;

export function browserConstants(): ConstantStore {
  let writing: Promise<void> = Promise.resolve();
  let opening: Promise<IDBPDatabase<Schema> | undefined> | undefined;
  const open = (): Promise<IDBPDatabase<Schema> | undefined> => {
    opening ??= openDB<Schema>(`digit-assay-constants-${ENGINE_VERSION}`, 1, {
      upgrade(db) {
        db.createObjectStore('constants', { keyPath: 'text' });
      },
    }).catch(() => undefined);
    return opening;
  };
  return {
    async recall(texts) {
      try {
        const db = await open();
        if (db === undefined) return [];
        const { store } = db.transaction('constants');
        const found = await Promise.all(texts.map((text) => store.get(text)));
        return found.filter((entry) => entry !== undefined);
      } catch {
        return [];
      }
    },
    settled: () => writing,
    keep(entry) {
      if (entry.bits < LEAST_BITS) return;
      writing = writing
        .then(open)
        .then(async (db) => {
          if (db === undefined) return;
          const transaction = db.transaction('constants', 'readwrite');
          const before = await transaction.store.get(entry.text);
          if (before === undefined || before.bits < entry.bits) await transaction.store.put(entry);
          await transaction.done;
        })
        // A value that cannot be stored is only computed again another time.
        .catch(() => undefined);
    },
  };
}
