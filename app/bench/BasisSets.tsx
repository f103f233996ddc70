/** Bases saved under a name, for the other values of the project. */
import { useId, useState } from 'react';
import { useBench, useProject } from '../state/react.ts';

export function BasisSets({ basis, onPick }: { basis: readonly string[]; onPick: (basis: readonly string[]) => void }) {
  const { basisSets } = useProject();
  const keep = useBench((s) => s.keepBasis);
  const drop = useBench((s) => s.dropBasis);
  const announce = useBench((s) => s.announce);
  const [name, setName] = useState('');
  const id = useId();
  const trimmed = name.trim();
  return (
    <details className="drawer">
      <summary>Basis sets{basisSets.length > 0 ? ` (${basisSets.length})` : ''}</summary>
      <div className="drawer-body">
        {basisSets.length > 0 && (
          <ul className="sets">
            {basisSets.map((set) => (
              <li key={set.id}>
                <button type="button" onClick={() => onPick(set.entries)}>
                  {set.name} <span className="count">({set.entries.length})</span>
                </button>
                <button
                  type="button"
                  className="remove"
                  aria-label={`Delete basis set ${set.name}`}
                  onClick={() => drop(set.id)}
                >
                  ×
                </button>
              </li>
            ))}
          </ul>
        )}
        <form
          className="field"
          onSubmit={(event) => {
            event.preventDefault();
            if (trimmed === '' || basis.length === 0) return;
            keep(trimmed, basis);
            announce(`Basis set ${trimmed} saved.`);
            setName('');
          }}
        >
          <label htmlFor={id}>Save the present basis as</label>
          <div className="joined">
            <input id={id} value={name} maxLength={80} onChange={(e) => setName(e.target.value)} />
            <button type="submit" disabled={trimmed === '' || basis.length === 0}>
              Save
            </button>
          </div>
        </form>
      </div>
    </details>
  );
}
