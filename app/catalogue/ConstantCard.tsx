/** One constant: definition, value to the digits asked for, the same in another space. */
import { useEffect, useId, useState } from 'react';
import type { Catalogue } from '../../src/search/catalogue.ts';
import { AbortError } from '../../src/worker/errors.ts';
import type { EngineTasks } from '../../src/worker/messages.ts';
import { quickEngine } from '../engine.ts';
import { CopyButton } from '../parts/CopyButton.tsx';
import { Formula } from '../parts/Formula.tsx';
import { useBench, useSelected } from '../state/react.ts';
import { sentenceOf } from '../state/search.ts';

type Value = EngineTasks['evaluate']['response'];
const MOST_DIGITS = 20_000;

export function ConstantCard({
  text,
  catalogue,
  onType,
}: {
  text: string;
  catalogue: Catalogue | null;
  onType: (text: string) => void;
}) {
  const [digits, setDigits] = useState(50);
  const { value, complaint, busy, cancel } = useValue(text, digits);
  const ids = { text: useId(), digits: useId(), note: useId() };
  const family = catalogue?.families.find((f) => f.key === value?.family);
  return (
    <section className="card" aria-label="One constant">
      <div className="field">
        <label htmlFor={ids.text}>Constant</label>
        <input
          id={ids.text}
          className="mono"
          value={text}
          spellCheck={false}
          autoComplete="off"
          autoCapitalize="off"
          aria-invalid={complaint !== ''}
          aria-describedby={ids.note}
          onChange={(e) => onType(e.target.value)}
        />
      </div>
      <p id={ids.note} className="note wrong" role="alert">
        {complaint}
      </p>
      {value !== null && (
        <p className="card-symbol">
          <Formula latex={value.latex} text={text} display />
        </p>
      )}
      <p className="note">
        {value === null ? '' : value.weight === null ? 'No agreed weight.' : `Weight ${value.weight}.`}
      </p>
      {family !== undefined && (
        <dl className="about">
          <dt>{family.title}</dt>
          <dd>
            <Formula latex={family.definition} text={family.definition} display />
          </dd>
          <dt>Source</dt>
          <dd>{family.source}</dd>
        </dl>
      )}
      <div className="row middle">
        <label htmlFor={ids.digits}>Digits</label>
        <input
          id={ids.digits}
          type="number"
          className="short"
          min={1}
          max={MOST_DIGITS}
          value={digits}
          onChange={(e) => setDigits(Math.min(MOST_DIGITS, Math.max(1, Math.trunc(Number(e.target.value)) || 1)))}
        />
        {value !== null && (
          <CopyButton
            label="Copy digits"
            text={value.imaginary === null ? value.digits : `(${value.digits}, ${value.imaginary})`}
          />
        )}
        {busy && (
          <button type="button" onClick={cancel}>
            Cancel
          </button>
        )}
        <AddToBasis text={text} known={value !== null} />
      </div>
      {value !== null && <Digits value={value} />}
      {value !== null && catalogue !== null && <Rewrite text={text} catalogue={catalogue} />}
    </section>
  );
}

/** The value, a moment after typing stops; the last one typed wins. */
function useValue(
  text: string,
  digits: number,
): { value: Value | null; complaint: string; busy: boolean; cancel: () => void } {
  const [state, setState] = useState<{ value: Value | null; complaint: string; busy: boolean }>({
    value: null,
    complaint: '',
    busy: false,
  });
  const [controller, setController] = useState<AbortController | null>(null);
  useEffect(() => {
    const own = new AbortController();
    setController(own);
    const timer = setTimeout(() => {
      setState((s) => ({ ...s, busy: true }));
      quickEngine.call('evaluate', { text, digits }, { signal: own.signal }).then(
        (value) => setState({ value, complaint: '', busy: false }),
        (error) => {
          if (!(error instanceof AbortError)) setState({ value: null, complaint: sentenceOf(error), busy: false });
        },
      );
    }, 250);
    return () => {
      clearTimeout(timer);
      own.abort();
    };
  }, [text, digits]);
  const cancel = (): void => {
    controller?.abort();
    setState((s) => ({
      ...s,
      busy: false,
      complaint: 'Cancelled; the digits shown are those of the earlier request.',
    }));
  };
  return { ...state, cancel };
}

function AddToBasis({ text, known }: { text: string; known: boolean }) {
  const value = useSelected();
  const change = useBench((s) => s.change);
  const announce = useBench((s) => s.announce);
  const there = value.basis.includes(text.trim());
  return (
    <button
      type="button"
      disabled={!known || there}
      onClick={() => {
        change(value.id, { basis: [...value.basis, text.trim()] });
        announce(`${text.trim()} added to the basis.`);
      }}
    >
      {there ? 'In the basis' : 'Add to the basis'}
    </button>
  );
}

function Digits({ value }: { value: Value }) {
  return (
    <>
      <p className="mono card-digits">{grouped(value.digits)}</p>
      {value.imaginary !== null && (
        <p className="mono card-digits">
          <span className="note">imaginary part</span> {grouped(value.imaginary)}
        </p>
      )}
    </>
  );
}

/** Blocks of ten after the point. */
function grouped(digits: string): string {
  const [whole = '', rest] = digits.split('.');
  if (rest === undefined) return digits;
  const [fraction = '', exponent] = rest.split('e');
  return `${whole}.${fraction.replace(/(\d{10})(?=\d)/g, '$1 ')}${exponent === undefined ? '' : ` × 10^${exponent}`}`;
}

function Rewrite({ text, catalogue }: { text: string; catalogue: Catalogue }) {
  const [space, setSpace] = useState('');
  const [found, setFound] = useState<
    { key: string; latex: string; text: string } | { key: string; complaint: string } | null
  >(null);
  const id = useId();
  const key = `${space}|${text}`;
  useEffect(() => {
    if (space === '') return;
    const controller = new AbortController();
    quickEngine.call('rewrite', { text, space }, { signal: controller.signal }).then(
      (r) => setFound({ key: `${space}|${text}`, latex: r.latex, text: r.text }),
      (error) => {
        if (!(error instanceof AbortError)) setFound({ key: `${space}|${text}`, complaint: sentenceOf(error) });
      },
    );
    return () => controller.abort();
  }, [text, space]);
  const current = space !== '' && found?.key === key ? found : null;
  return (
    <div className="rewrite">
      <div className="row middle">
        <label htmlFor={id}>Write in the space</label>
        <select id={id} value={space} onChange={(e) => setSpace(e.target.value)}>
          <option value="">choose</option>
          {catalogue.spaces
            .filter((s) => s.reductions)
            .map((s) => (
              <option key={s.key} value={s.key}>
                {s.title}
              </option>
            ))}
        </select>
        {current !== null && 'latex' in current && <CopyButton label="Copy LaTeX" text={current.latex} />}
      </div>
      {current !== null && 'latex' in current && (
        <p className="card-symbol">
          <Formula latex={current.latex} text={current.text} display />
        </p>
      )}
      <p className="note wrong" role="alert">
        {current !== null && 'complaint' in current ? current.complaint : ''}
      </p>
    </div>
  );
}
