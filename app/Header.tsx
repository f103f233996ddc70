/** Name of the product and of the project, save state, undo, theme. */
import { useEffect, useState } from 'react';
import { useBench, useProject } from './state/react.ts';

export function Header({ onReload }: { onReload: () => void }) {
  const { title } = useProject();
  const rename = useBench((s) => s.rename);
  const undo = useBench((s) => s.undo);
  const redo = useBench((s) => s.redo);
  const canUndo = useBench((s) => s.history.past.length > 0);
  const canRedo = useBench((s) => s.history.future.length > 0);
  useEffect(() => {
    const onKey = (event: KeyboardEvent): void => {
      if (!(event.ctrlKey || event.metaKey) || event.key.toLowerCase() !== 'z') return;
      event.preventDefault();
      if (event.shiftKey) redo();
      else undo();
    };
    addEventListener('keydown', onKey);
    return () => removeEventListener('keydown', onKey);
  }, [undo, redo]);
  return (
    <header>
      <h1>
        <img src="./icon.svg" alt="" width="28" height="28" /> Digit Assay
      </h1>
      <input
        className="title"
        aria-label="Name of the project"
        value={title}
        maxLength={120}
        onChange={(e) => rename(e.target.value)}
      />
      <SaveState onReload={onReload} />
      <div className="tools">
        <button type="button" onClick={undo} disabled={!canUndo} aria-keyshortcuts="Control+Z">
          Undo
        </button>
        <button type="button" onClick={redo} disabled={!canRedo} aria-keyshortcuts="Control+Shift+Z">
          Redo
        </button>
        <ThemeChoice />
      </div>
    </header>
  );
}

function SaveState({ onReload }: { onReload: () => void }) {
  const save = useBench((s) => s.save);
  if (save.kind === 'elsewhere') {
    return (
      <p className="save wrong" role="alert">
        This project was changed in another tab; nothing more is saved from here.{' '}
        <button type="button" onClick={onReload}>
          Load the newer state
        </button>
      </p>
    );
  }
  if (save.kind === 'failed') {
    return (
      <p className="save wrong" role="alert">
        Not saved: {save.reason}.
      </p>
    );
  }
  return <p className="save">{save.kind === 'saved' ? 'Saved in this browser' : 'Saving …'}</p>;
}

type Theme = 'system' | 'light' | 'dark';

function storedTheme(): Theme {
  const theme = document.documentElement.dataset.theme;
  return theme === 'light' || theme === 'dark' ? theme : 'system';
}

function ThemeChoice() {
  const [theme, setTheme] = useState<Theme>(storedTheme);
  const choose = (next: Theme): void => {
    setTheme(next);
    if (next === 'system') delete document.documentElement.dataset.theme;
    else document.documentElement.dataset.theme = next;
    try {
      localStorage.setItem('digit-assay-theme', next);
    } catch {
      // Without storage the choice lasts as long as the page.
    }
  };
  return (
    <select aria-label="Theme" value={theme} onChange={(e) => choose(e.target.value as Theme)}>
      <option value="system">As the system</option>
      <option value="light">Light</option>
      <option value="dark">Dark</option>
    </select>
  );
}
