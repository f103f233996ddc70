/** Every constant that the engine lists: found by name, symbol, weight, family or first digits; defined, typeset, to any digits. */
import { useEffect, useId, useMemo, useState } from 'react';
import type { Catalogue } from '../../src/search/catalogue.ts';
import { quickEngine } from '../engine.ts';
import { Formula } from '../parts/Formula.tsx';
import { ConstantCard } from './ConstantCard.tsx';
import { asDigits, type Entry, entriesOf, matching } from './entries.ts';
import { SpacesTable } from './SpacesTable.tsx';

/** Digits shown in the list, and compared when first digits are typed. */
const LISTED_DIGITS = 24;

export function CataloguePage() {
  const [catalogue, setCatalogue] = useState<Catalogue | null>(null);
  const [typed, setTyped] = useState('');
  const [family, setFamily] = useState('');
  const [chosen, setChosen] = useState('zeta(3)');
  const digits = useDigits(catalogue);
  const entries = useMemo(() => (catalogue === null ? [] : entriesOf(catalogue)), [catalogue]);
  const shown = useMemo(() => matching(entries, typed, family, digits), [entries, typed, family, digits]);
  const ids = { search: useId(), family: useId() };
  useEffect(() => {
    const controller = new AbortController();
    quickEngine.call('catalogue', {}, { signal: controller.signal }).then(setCatalogue, () => undefined);
    return () => controller.abort();
  }, []);
  const searching = asDigits(typed) !== null;
  const reading = digits.size < entries.length;

  return (
    <main id="catalogue" className="catalogue" tabIndex={-1}>
      <h1>Catalogue of constants</h1>
      <div className="row">
        <div className="field grow">
          <label htmlFor={ids.search}>Name, symbol, weight, family, or first digits</label>
          <input
            id={ids.search}
            type="search"
            value={typed}
            spellCheck={false}
            autoComplete="off"
            placeholder="clausen   weight 3   Li   1.20205"
            onChange={(e) => setTyped(e.target.value)}
          />
        </div>
        <div className="field">
          <label htmlFor={ids.family}>Family</label>
          <select id={ids.family} value={family} onChange={(e) => setFamily(e.target.value)}>
            <option value="">All families</option>
            {catalogue?.families.map((f) => (
              <option key={f.key} value={f.key}>
                {f.title}
              </option>
            ))}
          </select>
        </div>
      </div>
      <p className="note" role="status">
        {entries.length === 0
          ? 'Reading the catalogue …'
          : `${shown.length} of ${entries.length} listed constants${searching && reading ? ` (computing digits: ${digits.size} of ${entries.length})` : ''}. Any other member of a family can be typed.`}
      </p>
      <div className="catalogue-two">
        <ConstantList entries={shown} digits={digits} chosen={chosen} onChoose={setChosen} />
        <ConstantCard text={chosen} catalogue={catalogue} onType={setChosen} />
      </div>
      {catalogue !== null && <SpacesTable spaces={catalogue.spaces} />}
    </main>
  );
}

/** First digits of all listed constants, computed one after another while the page is open. */
function useDigits(catalogue: Catalogue | null): ReadonlyMap<string, string> {
  const [digits, setDigits] = useState<ReadonlyMap<string, string>>(new Map());
  useEffect(() => {
    if (catalogue === null) return;
    const controller = new AbortController();
    const run = async (): Promise<void> => {
      const found = new Map<string, string>();
      for (const { text } of entriesOf(catalogue)) {
        try {
          const value = await quickEngine.call(
            'evaluate',
            { text, digits: LISTED_DIGITS },
            { signal: controller.signal },
          );
          found.set(text, value.imaginary === null ? value.digits : `${value.digits} + ${value.imaginary} i`);
        } catch {
          if (controller.signal.aborted) return;
          found.set(text, '');
        }
        if (found.size % 8 === 0) setDigits(new Map(found));
      }
      setDigits(new Map(found));
    };
    run();
    return () => controller.abort();
  }, [catalogue]);
  return digits;
}

function ConstantList({
  entries,
  digits,
  chosen,
  onChoose,
}: {
  entries: readonly Entry[];
  digits: ReadonlyMap<string, string>;
  chosen: string;
  onChoose: (text: string) => void;
}) {
  if (entries.length === 0) {
    return (
      <p className="note">
        Nothing listed fits. Type the constant itself on the right: the grammar knows far more members than are listed.
      </p>
    );
  }
  return (
    <ul className="constants" aria-label="Constants">
      {entries.map((entry) => (
        <li key={entry.text}>
          <button
            type="button"
            aria-current={entry.text === chosen ? 'true' : undefined}
            onClick={() => onChoose(entry.text)}
          >
            <span className="symbol">
              <Formula latex={entry.latex} text={entry.text} />
            </span>
            <span className="mono typed-name">{entry.text}</span>
            <span className="note">{entry.weight === null ? '' : `weight ${entry.weight}`}</span>
            <span className="mono first-digits">{digits.get(entry.text) ?? ''}</span>
          </button>
        </li>
      ))}
    </ul>
  );
}
