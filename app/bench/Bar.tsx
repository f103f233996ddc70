/** The head of the page: name, project, state of saving, undo, theme, keys. */
import { useRef, useState } from 'react';
import { Mark } from '../parts/Mark.tsx';
import { usePlace } from '../place.ts';
import { useBench, useProject } from '../state/react.ts';
import type { SaveState } from '../state/store.ts';
import { applyTheme, storedTheme, type Theme } from '../state/theme.ts';
import { KEYS } from './keys.ts';

export function Bar() {
  const { title } = useProject();
  const rename = useBench((s) => s.rename);
  return (
    <header className="bar">
      <p className="brand">
        <Mark />
        <span>Digit Assay</span>
      </p>
      <Places />
      <input
        className="project-title"
        aria-label="Name of the project"
        value={title}
        maxLength={120}
        placeholder="Unnamed project"
        onChange={(e) => rename(e.target.value)}
      />
      <Saving />
      <div className="bar-tools">
        <UndoRedo />
        <ThemeSwitch />
        <KeyList />
      </div>
    </header>
  );
}

function Places() {
  const place = usePlace();
  return (
    <nav aria-label="Places" className="places">
      <a href="#sheet" aria-current={place === 'bench' ? 'page' : undefined}>
        Bench
      </a>
      <a href="#catalogue" aria-current={place === 'catalogue' ? 'page' : undefined}>
        Catalogue
      </a>
    </nav>
  );
}

function wordOf(save: SaveState): string {
  switch (save.kind) {
    case 'saved':
      return 'saved';
    case 'saving':
      return 'saving';
    case 'elsewhere':
      return 'not saved: changed in another tab';
    case 'failed':
      return `could not save: ${save.reason}`;
  }
}

function Saving() {
  const save = useBench((s) => s.save);
  return (
    <p className={`saving ${save.kind}`} data-testid="saving" title="Kept in this browser; nothing leaves this machine">
      {wordOf(save)}
    </p>
  );
}

function UndoRedo() {
  const canUndo = useBench((s) => s.history.past.length > 0);
  const canRedo = useBench((s) => s.history.future.length > 0);
  const undo = useBench((s) => s.undo);
  const redo = useBench((s) => s.redo);
  return (
    <>
      <button type="button" className="plain" onClick={undo} disabled={!canUndo}>
        Undo
      </button>
      <button type="button" className="plain" onClick={redo} disabled={!canRedo}>
        Redo
      </button>
    </>
  );
}

const THEMES: readonly { readonly key: Theme; readonly word: string }[] = [
  { key: 'system', word: 'Theme: system' },
  { key: 'light', word: 'Theme: light' },
  { key: 'dark', word: 'Theme: dark' },
];

function ThemeSwitch() {
  const [theme, setTheme] = useState(storedTheme);
  return (
    <select
      className="plain"
      aria-label="Theme"
      value={theme}
      onChange={(e) => {
        const next = e.target.value as Theme;
        setTheme(next);
        applyTheme(next);
      }}
    >
      {THEMES.map(({ key, word }) => (
        <option key={key} value={key}>
          {word}
        </option>
      ))}
    </select>
  );
}

function KeyList() {
  const dialog = useRef<HTMLDialogElement>(null);
  return (
    <>
      <button type="button" className="plain" onClick={() => dialog.current?.showModal()}>
        Keys
      </button>
      <dialog ref={dialog} aria-labelledby="keys-heading">
        <h2 id="keys-heading">Keys</h2>
        <dl className="keys">
          {KEYS.map(({ keys, does }) => (
            <div key={keys}>
              <dt>{keys}</dt>
              <dd>{does}</dd>
            </div>
          ))}
        </dl>
        <form method="dialog">
          <button type="submit">Close</button>
        </form>
      </dialog>
    </>
  );
}
