/** Undo and redo over immutable states. */
export interface History<T> {
  readonly past: readonly T[];
  readonly present: T;
  readonly future: readonly T[];
  /** What the last edit was; edits of the same kind within a second become one step. */
  readonly lastEdit: { readonly key: string; readonly at: number } | null;
}

const MOST_STEPS = 200;
const ONE_STEP_MILLISECONDS = 1000;

export function startHistory<T>(present: T): History<T> {
  return { past: [], present, future: [], lastEdit: null };
}

/** A new state that can be undone. `key` names the field being edited, so that typing becomes one step. */
export function edit<T>(history: History<T>, present: T, key: string, now: number): History<T> {
  if (present === history.present) return history;
  const { lastEdit } = history;
  const joined = lastEdit !== null && lastEdit.key === key && now - lastEdit.at < ONE_STEP_MILLISECONDS;
  return {
    past: joined ? history.past : [...history.past, history.present].slice(-MOST_STEPS),
    present,
    future: [],
    lastEdit: { key, at: now },
  };
}

/** A change that is not an edit of the user's (a finished search, a selection): applied to every state, so that undo never loses it. */
export function applyEverywhere<T>(history: History<T>, change: (state: T) => T): History<T> {
  return {
    past: history.past.map(change),
    present: change(history.present),
    future: history.future.map(change),
    lastEdit: history.lastEdit,
  };
}

export function undo<T>(history: History<T>): History<T> {
  const previous = history.past.at(-1);
  if (previous === undefined) return history;
  return {
    past: history.past.slice(0, -1),
    present: previous,
    future: [history.present, ...history.future],
    lastEdit: null,
  };
}

export function redo<T>(history: History<T>): History<T> {
  const [next, ...future] = history.future;
  if (next === undefined) return history;
  return { past: [...history.past, history.present], present: next, future, lastEdit: null };
}
