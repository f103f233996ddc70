/** The project's values, each with the state of its search. */
import { useEffect } from 'react';
import type { SearchRecord } from '../../src/search/record.ts';
import { type MarkKey, markOf, VerdictMark } from '../parts/VerdictMark.tsx';
import { currentRecord, labelOf, type ValueEntry } from '../state/project.ts';
import { useBench, useBenchStore, useProject } from '../state/react.ts';
import { addAndFocus } from './keys.ts';

export function ValueList() {
  const project = useProject();
  const store = useBenchStore();
  const { select, remove } = store.getState();
  const { selected } = project;
  useEffect(() => {
    document.getElementById(`value-${selected}`)?.scrollIntoView({ block: 'nearest', inline: 'nearest' });
  }, [selected]);
  return (
    <nav className="values" aria-label="Values of the project">
      <h2>Values</h2>
      <ol>
        {project.values.map((value, index) => {
          const label = labelOf(value, index);
          const current = value.id === project.selected;
          return (
            <li key={value.id} className={current ? 'current' : undefined}>
              <button
                type="button"
                className="value-button"
                id={`value-${value.id}`}
                aria-current={current ? 'true' : undefined}
                onClick={() => select(value.id)}
              >
                <span className="value-label">{label}</span>
                <span className="value-digits" aria-hidden="true">
                  {glimpse(value.text)}
                </span>
                <State value={value} />
              </button>
              <button
                type="button"
                className="remove"
                aria-label={`Remove ${label}`}
                onClick={() => {
                  remove(value.id);
                  const { selected } = store.getState().history.present;
                  requestAnimationFrame(() => document.getElementById(`value-${selected}`)?.focus());
                }}
              >
                ×
              </button>
            </li>
          );
        })}
      </ol>
      <button type="button" className="add-value" onClick={() => addAndFocus(store)} aria-keyshortcuts="Alt+N">
        New value
      </button>
    </nav>
  );
}

function State({ value }: { value: ValueEntry }) {
  const running = useBench((s) => s.running[value.id] !== undefined);
  if (running) return <VerdictMark mark="running" />;
  const record = currentRecord(value);
  const mark: MarkKey = record === null && value.records.length > 0 ? 'stale' : markOf(record);
  return <VerdictMark mark={mark} detail={detailOf(record)} />;
}

function detailOf(record: SearchRecord | null): string | undefined {
  return record?.evidence ? `· ${Math.floor(record.evidence.agreementDigits)} digits agree` : undefined;
}

function glimpse(text: string): string {
  const bare = text.slice(0, 60).replace(/\s+/g, '');
  if (bare === '') return 'no digits yet';
  return bare.length > 18 ? `${bare.slice(0, 17)}…` : bare;
}
