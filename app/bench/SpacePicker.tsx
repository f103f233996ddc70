/** Every space that the engine knows, by weight. */
import { useId, useState } from 'react';
import { spaceOf, spaces } from '../../src/spaces/registry.ts';

export function SpacePicker({
  basis,
  onPick,
}: {
  basis: readonly string[];
  onPick: (basis: readonly string[]) => void;
}) {
  const [key, setKey] = useState('mzv');
  const [wanted, setWeight] = useState(6);
  const [lower, setLower] = useState(false);
  const [parity, setParity] = useState<'real' | 'imaginary'>('real');
  const ids = { space: useId(), weight: useId(), parity: useId() };
  const space = spaceOf(key);
  const weight = Math.min(wanted, space.maxWeight);
  const texts = space.basis(weight, { lower, parity });
  return (
    <details className="drawer">
      <summary>Other spaces</summary>
      <div className="drawer-body">
        <div className="field">
          <label htmlFor={ids.space}>Space</label>
          <select id={ids.space} value={key} onChange={(e) => setKey(e.target.value)}>
            {spaces.map((s) => (
              <option key={s.key} value={s.key}>
                {s.title}
              </option>
            ))}
          </select>
        </div>
        <div className="row">
          <div className="field">
            <label htmlFor={ids.weight}>Weight</label>
            <select id={ids.weight} value={weight} onChange={(e) => setWeight(Number(e.target.value))}>
              {Array.from({ length: space.maxWeight }, (_, w) => w + 1).map((w) => (
                <option key={w} value={w}>
                  {w}
                </option>
              ))}
            </select>
          </div>
          {space.hasImaginary && (
            <div className="field">
              <label htmlFor={ids.parity}>Parts</label>
              <select
                id={ids.parity}
                value={parity}
                onChange={(e) => setParity(e.target.value === 'real' ? 'real' : 'imaginary')}
              >
                <option value="real">real</option>
                <option value="imaginary">imaginary</option>
              </select>
            </div>
          )}
          <label className="check">
            <input type="checkbox" checked={lower} onChange={(e) => setLower(e.target.checked)} /> and all lower weights
          </label>
        </div>
        <p className="note">
          {texts.length} {texts.length === 1 ? 'constant' : 'constants'}, alphabet {space.alphabet}.{' '}
          {space.status === 'proven'
            ? 'The dimension is proven.'
            : 'They span the space; that none depends on the others is conjectured.'}
        </p>
        <div className="row">
          <button type="button" onClick={() => onPick(texts)}>
            Use these
          </button>
          <button type="button" onClick={() => onPick([...basis, ...texts])}>
            Add these
          </button>
        </div>
      </div>
    </details>
  );
}
