/** The project's values at the side of the sheet, each with the state of its search. */
import { markOf, VerdictMark } from '../parts/VerdictMark.tsx';
import { currentRecord, labelOf, type ValueEntry } from '../state/project.ts';
import { useBench, useProject } from '../state/react.ts';

export function ValueList() {
  const project = useProject();
  const add = useBench((s) => s.add);
  return (
    <nav className="values" aria-label="Values of this project">
      <ul>
        {project.values.map((value, index) => (
          <ValueItem
            key={value.id}
            value={value}
            label={labelOf(value, index)}
            selected={value.id === project.selected}
          />
        ))}
      </ul>
      <button type="button" onClick={add}>
        New value
      </button>
    </nav>
  );
}

function ValueItem({ value, label, selected }: { value: ValueEntry; label: string; selected: boolean }) {
  const select = useBench((s) => s.select);
  const remove = useBench((s) => s.remove);
  const running = useBench((s) => s.running[value.id] !== undefined);
  const record = currentRecord(value);
  const mark = running ? 'running' : record === null && value.records.length > 0 ? 'stale' : markOf(record);
  return (
    <li className={selected ? 'selected' : undefined}>
      <button
        type="button"
        className="pick"
        aria-current={selected ? 'true' : undefined}
        onClick={() => select(value.id)}
      >
        <span className="name">{label}</span>
        <VerdictMark mark={mark} />
        <span className="mono digits-short">{value.text.replace(/\s+/g, '').slice(0, 16) || 'no digits yet'}</span>
      </button>
      <button type="button" className="remove" aria-label={`Remove ${label}`} onClick={() => remove(value.id)}>
        ×
      </button>
    </li>
  );
}
