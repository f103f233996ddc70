/** The second part: which constants may occur, and whether the digits can carry them. */
import { useEffect, useId, useState } from 'react';
import { budgetFor, digitsNeeded } from '../../src/search/estimate.ts';
import { spaceOf, spaces } from '../../src/spaces/registry.ts';
import type { BasisElementView } from '../../src/worker/messages.ts';
import { quickEngine } from '../engine.ts';
import { Formula } from '../parts/Formula.tsx';
import type { ValueEntry } from '../state/project.ts';
import { useBench, useProject } from '../state/react.ts';
import type { Reading } from './reading.ts';

/** Spaces offered as one click each; every other one is a choice away. */
const READY: readonly {
  readonly label: string;
  readonly space: string;
  readonly weight: number;
  readonly lower: boolean;
}[] = [
  { label: 'ζ, π, log 2, Liₙ(½) up to weight 3', space: 'polylog-half', weight: 3, lower: true },
  { label: 'ζ, π, log 2, Liₙ(½) up to weight 4', space: 'polylog-half', weight: 4, lower: true },
  { label: 'Multiple zeta values of weight 8', space: 'mzv', weight: 8, lower: false },
];

export function BasisSheet({ value, reading }: { value: ValueEntry; reading: Reading }) {
  const change = useBench((s) => s.change);
  const elements = useElements(value.basis);
  const setBasis = (basis: readonly string[]): void => change(value.id, { basis: [...new Set(basis)] });
  return (
    <section className="sheet" aria-labelledby="basis-heading">
      <h2 id="basis-heading">
        <span className="step">2</span> Basis{' '}
        <span className="count">{value.basis.length === 0 ? '' : `${value.basis.length} constants`}</span>
      </h2>
      <fieldset className="ready">
        <legend className="visually-hidden">Ready spaces</legend>
        {READY.map((ready) => (
          <button
            type="button"
            key={ready.label}
            onClick={() => setBasis(spaceOf(ready.space).basis(ready.weight, { lower: ready.lower }))}
          >
            {ready.label}
          </button>
        ))}
      </fieldset>
      <TypeConstant basis={value.basis} onAdd={(text) => setBasis([...value.basis, text])} />
      <div className="two">
        <SpacePicker onPick={setBasis} basis={value.basis} />
        <BasisSets basis={value.basis} onPick={setBasis} />
      </div>
      {value.basis.length > 0 && (
        <ul className="chips" aria-label="Constants of the basis">
          {value.basis.map((text, index) => (
            <li key={text} className="chip">
              <Formula latex={elements?.[index]?.latex ?? `\\mathtt{${text.replace(/[_^]/g, '\\$&')}}`} text={text} />
              <button
                type="button"
                className="remove"
                aria-label={`Remove ${text}`}
                title={`Remove ${text}${elements?.[index]?.weight == null ? '' : ` (weight ${elements[index]?.weight})`}`}
                onClick={() => setBasis(value.basis.filter((t) => t !== text))}
              >
                ×
              </button>
            </li>
          ))}
          <li>
            <button type="button" className="quiet" onClick={() => setBasis([])}>
              Clear all
            </button>
          </li>
        </ul>
      )}
      <BudgetLine reading={reading} constants={value.basis.length} />
    </section>
  );
}

function useElements(basis: readonly string[]): readonly BasisElementView[] | null {
  const [known, setKnown] = useState<{ key: string; elements: readonly BasisElementView[] } | null>(null);
  const key = basis.join('\n');
  useEffect(() => {
    if (key === '') return;
    const controller = new AbortController();
    quickEngine.call('basis', { basis: key.split('\n') }, { signal: controller.signal }).then(
      ({ elements }) => setKnown({ key, elements }),
      () => undefined,
    );
    return () => controller.abort();
  }, [key]);
  return known !== null && known.key === key ? known.elements : null;
}

function TypeConstant({ basis, onAdd }: { basis: readonly string[]; onAdd: (text: string) => void }) {
  const [text, setText] = useState('');
  const [complaint, setComplaint] = useState<string | null>(null);
  const ids = { input: useId(), note: useId() };
  const add = async (): Promise<void> => {
    try {
      const { elements } = await quickEngine.call('basis', { basis: [text] });
      const canonical = elements[0]?.text ?? text;
      if (basis.includes(canonical)) {
        setComplaint(`${canonical} is in the basis already.`);
        return;
      }
      onAdd(canonical);
      setText('');
      setComplaint(null);
    } catch (error) {
      setComplaint(error instanceof Error ? error.message : String(error));
    }
  };
  return (
    <form
      className="field"
      onSubmit={(event) => {
        event.preventDefault();
        add();
      }}
    >
      <label htmlFor={ids.input}>Add a constant</label>
      <div className="joined">
        <input
          id={ids.input}
          className="mono"
          value={text}
          spellCheck={false}
          autoComplete="off"
          placeholder="zeta(3), pi^2*log(2), Cl(2,pi/3), sqrt(3), zeta(-5,-1) …"
          aria-invalid={complaint !== null}
          aria-describedby={ids.note}
          onChange={(e) => {
            setText(e.target.value);
            setComplaint(null);
          }}
        />
        <button type="submit" disabled={text.trim() === ''}>
          Add
        </button>
      </div>
      <p id={ids.note} className="note wrong" role="alert">
        {complaint}
      </p>
    </form>
  );
}

function SpacePicker({ basis, onPick }: { basis: readonly string[]; onPick: (basis: readonly string[]) => void }) {
  const [key, setKey] = useState('alternating');
  const [weight, setWeight] = useState(4);
  const [lower, setLower] = useState(true);
  const ids = { space: useId(), weight: useId(), lower: useId() };
  const space = spaceOf(key);
  const safe = Math.min(weight, space.maxWeight);
  const texts = space.basis(safe, { lower });
  return (
    <details className="drawer">
      <summary>Choose a space</summary>
      <div className="drawer-body">
        <div className="row">
          <div className="field grow">
            <label htmlFor={ids.space}>Space</label>
            <select id={ids.space} value={key} onChange={(e) => setKey(e.target.value)}>
              {spaces.map((s) => (
                <option key={s.key} value={s.key}>
                  {s.title}
                </option>
              ))}
            </select>
          </div>
          <div className="field">
            <label htmlFor={ids.weight}>Weight</label>
            <select id={ids.weight} value={safe} onChange={(e) => setWeight(Number(e.target.value))}>
              {Array.from({ length: space.maxWeight + 1 }, (_, w) => w).map((w) => (
                <option key={w} value={w}>
                  {w}
                </option>
              ))}
            </select>
          </div>
        </div>
        <label className="check" htmlFor={ids.lower}>
          <input id={ids.lower} type="checkbox" checked={lower} onChange={(e) => setLower(e.target.checked)} /> with all
          lower weights
        </label>
        <p className="note">
          {texts.length} elements; letters {space.alphabet}.{' '}
          {space.status === 'proven' ? 'Dimension proven.' : 'Spanning is proven, independence conjectured.'}
        </p>
        <div className="row">
          <button type="button" onClick={() => onPick(texts)}>
            Use this space
          </button>
          <button type="button" onClick={() => onPick([...basis, ...texts])}>
            Add to the basis
          </button>
        </div>
      </div>
    </details>
  );
}

function BasisSets({ basis, onPick }: { basis: readonly string[]; onPick: (basis: readonly string[]) => void }) {
  const { basisSets } = useProject();
  const keep = useBench((s) => s.keepBasis);
  const drop = useBench((s) => s.dropBasis);
  const announce = useBench((s) => s.announce);
  const [name, setName] = useState('');
  const id = useId();
  return (
    <details className="drawer">
      <summary>Basis sets{basisSets.length > 0 ? ` (${basisSets.length})` : ''}</summary>
      <div className="drawer-body">
        {basisSets.length === 0 && (
          <p className="note">A basis saved under a name can be used for other values of this project.</p>
        )}
        <ul className="sets">
          {basisSets.map((set) => (
            <li key={set.id}>
              <button type="button" onClick={() => onPick(set.entries)}>
                {set.name} <span className="count">{set.entries.length}</span>
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
        <form
          className="field"
          onSubmit={(event) => {
            event.preventDefault();
            if (name.trim() === '' || basis.length === 0) return;
            keep(name.trim(), basis);
            announce(`Basis set ${name.trim()} saved.`);
            setName('');
          }}
        >
          <label htmlFor={id}>Save the present basis as</label>
          <div className="joined">
            <input
              id={id}
              value={name}
              maxLength={80}
              onChange={(e) => setName(e.target.value)}
              placeholder="name of the basis set"
            />
            <button type="submit" disabled={name.trim() === '' || basis.length === 0}>
              Save
            </button>
          </div>
        </form>
      </div>
    </details>
  );
}

function BudgetLine({ reading, constants }: { reading: Reading; constants: number }) {
  if (reading.kind !== 'value' || constants === 0) return null;
  const budget = budgetFor(reading.trusted, constants);
  const each = Math.floor(budget.coefficientDigits * 10) / 10;
  const level = each >= 3 ? 'ample' : each >= 1.5 ? 'tight' : 'short';
  const words = {
    ample: 'Enough for the coefficients that usually occur.',
    tight: 'Tight: only small coefficients can be told from chance.',
    short: `Too few: a hit would mean nothing. Coefficients of three digits need about ${digitsNeeded(constants, 3)} trusted digits, or take a smaller basis.`,
  };
  return (
    <p className={`budget ${level}`}>
      <b>Digit budget</b>{' '}
      <span className="mono">
        {budget.digits} ÷ {budget.numbers} ≈ {each}
      </span>{' '}
      digits a coefficient: {reading.trusted} trusted digits, {budget.digits} for the search and{' '}
      {reading.trusted - budget.digits} held out, shared by {budget.numbers} numbers. {words[level]}
    </p>
  );
}
