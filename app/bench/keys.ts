/** The keys of the bench, and what they do. */
import { useEffect } from 'react';
import type { BenchStore } from '../state/store.ts';

export const KEYS: readonly { readonly keys: string; readonly does: string }[] = [
  { keys: 'Ctrl + Enter', does: 'Search the value in hand' },
  { keys: 'Esc', does: 'Cancel its search' },
  { keys: 'Ctrl + V', does: 'Outside a field: paste a number as a value' },
  { keys: 'Alt + N', does: 'New value' },
  { keys: 'Alt + ↑, Alt + ↓', does: 'Previous, next value' },
  { keys: 'Ctrl + Z, Ctrl + Shift + Z', does: 'Outside a field: undo, redo' },
];

export const DIGITS_FIELD = 'digits-field';

/** Adds an empty value and puts the cursor where its digits go. */
export function addAndFocus(store: BenchStore): void {
  store.getState().add();
  requestAnimationFrame(() => document.getElementById(DIGITS_FIELD)?.focus());
}

function step(store: BenchStore, by: 1 | -1): void {
  const { present } = store.getState().history;
  const next = present.values[present.values.findIndex((v) => v.id === present.selected) + by];
  if (next !== undefined) store.getState().select(next.id);
}

export function useKeys(store: BenchStore, search: () => void): void {
  useEffect(() => {
    const press = (event: KeyboardEvent): void => {
      if (event.defaultPrevented || document.querySelector('dialog[open]') !== null) return;
      const command = event.ctrlKey || event.metaKey;
      const typing = event.target instanceof HTMLElement && event.target.matches('input, textarea, select');
      const key = event.key.toLowerCase();
      const { selected } = store.getState().history.present;
      const act = command
        ? {
            enter: search,
            z: typing ? undefined : event.shiftKey ? store.getState().redo : store.getState().undo,
            y: typing ? undefined : store.getState().redo,
          }[key]
        : event.altKey
          ? { n: () => addAndFocus(store), arrowup: () => step(store, -1), arrowdown: () => step(store, 1) }[key]
          : {
              escape:
                store.getState().running[selected] && (() => store.getState().running[selected]?.controller.abort()),
            }[key];
      if (act === undefined) return;
      event.preventDefault();
      act();
    };
    document.addEventListener('keydown', press);
    return () => document.removeEventListener('keydown', press);
  }, [store, search]);
}
