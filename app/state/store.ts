/** The page's one store, made without React. */
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { SearchProgress, SearchRecord } from '../../src/search/record.ts';
import { applyEverywhere, edit, type History, redo, startHistory, undo } from './history.ts';
import {
  addRecord,
  addValue,
  changeValue,
  type Project,
  removeBasisSet,
  removeValue,
  saveBasisSet,
  type ValueChange,
} from './project.ts';

export type SaveState =
  | { readonly kind: 'saved' }
  | { readonly kind: 'saving' }
  | { readonly kind: 'failed'; readonly reason: string }
  | { readonly kind: 'elsewhere' };

export interface Running {
  readonly progress: SearchProgress | null;
  /** 1 while part of the digits is held out; 2 when all are used, after the first pass found nothing. */
  readonly pass: 1 | 2;
  readonly controller: AbortController;
}

export interface BenchState {
  readonly history: History<Project>;
  /** Searches under way, by value. */
  readonly running: Readonly<Record<string, Running>>;
  /** One plain sentence about the last search of a value that could not be carried out. */
  readonly problems: Readonly<Record<string, string>>;
  readonly save: SaveState;
  /** What a screen reader hears. */
  readonly announcement: string;
}

export interface BenchActions {
  change(id: string, change: ValueChange): void;
  /** Adds a value and selects it. */
  add(text?: string): void;
  remove(id: string): void;
  select(id: string): void;
  rename(title: string): void;
  putNoteAway(): void;
  /** Shows a project that was stored elsewhere; searches under way go on. */
  adopt(project: Project): void;
  /** Goes on as a project of its own, so that it can be saved beside the one changed elsewhere. */
  keepAsCopy(): void;
  keepBasis(name: string, entries: readonly string[]): void;
  dropBasis(id: string): void;
  undo(): void;
  redo(): void;
  searchStarted(id: string, controller: AbortController): void;
  searchMoved(id: string, progress: SearchProgress): void;
  searchEnded(id: string, result: { record: SearchRecord } | { problem: string } | { cancelled: true }): void;
  setSave(save: SaveState): void;
  announce(text: string): void;
}

export type BenchStore = StoreApi<BenchState & BenchActions>;

function newId(): string {
  return crypto.randomUUID();
}

export function createBenchStore(project: Project): BenchStore {
  return createStore<BenchState & BenchActions>()((set, get) => {
    const apply = (key: string, next: (project: Project) => Project): void =>
      set(({ history }) => ({ history: edit(history, next(history.present), key, Date.now()) }));
    const without = <T>(table: Readonly<Record<string, T>>, id: string): Record<string, T> =>
      Object.fromEntries(Object.entries(table).filter(([key]) => key !== id));
    return {
      history: startHistory(project),
      running: {},
      problems: {},
      save: { kind: 'saved' },
      announcement: '',
      change: (id, change) => {
        apply(`${id}/${Object.keys(change).join()}`, (p) => changeValue(p, id, change));
        if (get().problems[id] !== undefined) set(({ problems }) => ({ problems: without(problems, id) }));
      },
      add: (text) => {
        apply(newId(), (p) => addValue(p, newId(), text));
        set({ announcement: 'Value added.' });
      },
      remove: (id) => {
        get().running[id]?.controller.abort();
        apply(newId(), (p) => removeValue(p, id, newId()));
        set({ announcement: 'Value removed. Undo brings it back.' });
      },
      select: (id) =>
        set(({ history }) => ({
          history: applyEverywhere(history, (p) => (p.values.some((v) => v.id === id) ? { ...p, selected: id } : p)),
        })),
      putNoteAway: () => apply('note', (p) => ({ ...p, note: '' })),
      adopt: (project) => set({ history: startHistory(project), save: { kind: 'saved' } }),
      keepAsCopy: () =>
        set(({ history }) => ({
          history: startHistory({ ...history.present, id: newId(), title: `${history.present.title} (copy)` }),
          save: { kind: 'saving' },
        })),
      rename: (title) => apply('title', (p) => ({ ...p, title })),
      keepBasis: (name, entries) => apply(newId(), (p) => saveBasisSet(p, newId(), name, entries)),
      dropBasis: (id) => apply(newId(), (p) => removeBasisSet(p, id)),
      undo: () => set(({ history }) => ({ history: undo(history), announcement: 'Undone.' })),
      redo: () => set(({ history }) => ({ history: redo(history), announcement: 'Redone.' })),
      searchStarted: (id, controller) =>
        set(({ running, problems }) => ({
          running: { ...running, [id]: { progress: null, pass: 1, controller } },
          problems: without(problems, id),
          announcement: 'Search started.',
        })),
      searchMoved: (id, progress) =>
        set(({ running }) => {
          const current = running[id];
          if (current === undefined) return {};
          const before = current.progress;
          const again =
            before?.stage === 'relation' && progress.stage === 'relation' && progress.fraction < before.fraction;
          return { running: { ...running, [id]: { ...current, progress, pass: again ? 2 : current.pass } } };
        }),
      searchEnded: (id, result) =>
        set(({ history, running, problems }) => {
          const rest = { running: without(running, id) };
          if ('cancelled' in result) return { ...rest, announcement: 'Search cancelled.' };
          if ('problem' in result)
            return { ...rest, problems: { ...problems, [id]: result.problem }, announcement: result.problem };
          return {
            ...rest,
            history: applyEverywhere(history, (p) => addRecord(p, id, result.record)),
            announcement: spoken(result.record),
          };
        }),
      setSave: (save) => set({ save }),
      announce: (announcement) => set({ announcement }),
    };
  });
}

/** The outcome in one spoken sentence. */
function spoken(record: SearchRecord): string {
  if (record.outcome === 'relation') return `Search finished. Relation found, verdict: ${record.verdict}.`;
  if (record.outcome === 'excluded') return `Search finished. No relation: excluded below ${record.normBound}.`;
  return `Search finished. ${record.diagnosis[0] ?? record.outcome}`;
}
