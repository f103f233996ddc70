/** The first part of the sheet: the digits, how many are trusted, and a factor to divide by. */
import { useEffect, useId, useMemo, useState } from 'react';
import type { SearchRecord } from '../../src/search/record.ts';
import { quickEngine } from '../engine.ts';
import { DigitStrip, type PartRun } from '../parts/DigitStrip.tsx';
import { Formula } from '../parts/Formula.tsx';
import { Sheet } from '../parts/Sheet.tsx';
import { LONGEST_TEXT, type ValueEntry } from '../state/project.ts';
import { useBench } from '../state/react.ts';
import { sentenceOf } from '../state/search.ts';
import { DIGITS_FIELD } from './keys.ts';
import type { ReadDigits, Reading } from './reading.ts';

export function ValueSheet({
  value,
  reading,
  record,
}: {
  value: ValueEntry;
  reading: Reading;
  record: SearchRecord | null;
}) {
  const change = useBench((s) => s.change);
  const [open, setOpen] = useState(reading.kind !== 'value');
  const showField = open || reading.kind !== 'value';
  const id = useId();
  return (
    <Sheet step={1} title="Value" figures={figuresOf(reading)}>
      <input
        className="value-name"
        aria-label="Name of the value"
        value={value.label}
        placeholder="Name this value"
        maxLength={200}
        onChange={(e) => change(value.id, { label: e.target.value })}
      />
      {showField && <DigitsField value={value} reading={reading} noteId={id} />}
      <p id={id} className={reading.kind === 'wrong' ? 'note wrong' : 'visually-hidden'} role="alert">
        {reading.kind === 'wrong' ? reading.sentence : ''}
      </p>
      {reading.kind === 'value' && <Strip reading={reading} record={record} />}
      <div className="row fields">
        {reading.kind === 'value' && (
          <button type="button" aria-expanded={open} onClick={() => setOpen(!open)}>
            {open ? 'Fold the text away' : 'Edit digits'}
          </button>
        )}
        <Trusted value={value} reading={reading} />
        <DivideBy value={value} />
      </div>
    </Sheet>
  );
}

function DigitsField({ value, reading, noteId }: { value: ValueEntry; reading: Reading; noteId: string }) {
  const change = useBench((s) => s.change);
  const [refused, setRefused] = useState(false);
  return (
    <div className="field">
      <label htmlFor={DIGITS_FIELD}>Digits</label>
      <textarea
        id={DIGITS_FIELD}
        className="mono digits-in"
        rows={4}
        value={value.text}
        spellCheck={false}
        autoComplete="off"
        placeholder={'Paste a number here.\nGrouping, line breaks, exponents and 0.12345(67) are understood.'}
        aria-invalid={reading.kind === 'wrong' && reading.field === 'digits'}
        aria-describedby={noteId}
        onPaste={(e) => {
          // Refused before the browser lays out megabytes of text.
          const tooLong = e.clipboardData.getData('text/plain').length > LONGEST_TEXT;
          setRefused(tooLong);
          if (tooLong) e.preventDefault();
        }}
        onChange={(e) => {
          const tooLong = e.target.value.length > LONGEST_TEXT;
          setRefused(tooLong);
          if (!tooLong) change(value.id, { text: e.target.value });
        }}
      />
      {refused && (
        <p className="note wrong" role="alert">
          This is longer than 200,000 digits, the most that one number may have here; the field is as it was.
        </p>
      )}
    </div>
  );
}

function Strip({ reading, record }: { reading: ReadDigits; record: SearchRecord | null }) {
  const { trusted, written } = reading;
  const runs = useMemo((): readonly PartRun[] => {
    if (record?.evidence) return record.evidence.strip;
    return [
      { from: 0, to: trusted, part: 'trusted' },
      { from: trusted, to: written, part: 'beyond' },
    ];
  }, [record, trusted, written]);
  return <DigitStrip sign={reading.sign} digits={reading.digits} exponent={reading.exponent} runs={runs} />;
}

function Trusted({ value, reading }: { value: ValueEntry; reading: Reading }) {
  const change = useBench((s) => s.change);
  const id = useId();
  return (
    <div className="field">
      <label htmlFor={id}>Trusted digits</label>
      <input
        id={id}
        type="number"
        min={6}
        max={reading.kind === 'value' ? reading.written : undefined}
        inputMode="numeric"
        className="short mono"
        value={value.trustedDigits ?? ''}
        placeholder={reading.kind === 'value' ? `${reading.trusted}` : 'all'}
        aria-invalid={reading.kind === 'wrong' && reading.field === 'trusted'}
        onChange={(e) =>
          change(value.id, { trustedDigits: e.target.value === '' ? null : Math.trunc(Number(e.target.value)) })
        }
      />
    </div>
  );
}

function DivideBy({ value }: { value: ValueEntry }) {
  const change = useBench((s) => s.change);
  const ids = { field: useId(), note: useId() };
  const factor = useFactor(value.divideBy.trim());
  return (
    <div className="field">
      <label htmlFor={ids.field}>Divide by</label>
      <div className="row middle">
        <input
          id={ids.field}
          className="medium mono"
          value={value.divideBy}
          placeholder="no factor"
          spellCheck={false}
          autoComplete="off"
          maxLength={500}
          aria-invalid={factor.complaint !== ''}
          aria-describedby={ids.note}
          onChange={(e) => change(value.id, { divideBy: e.target.value })}
        />
        {factor.latex !== '' && <Formula latex={factor.latex} text={value.divideBy} />}
      </div>
      <p id={ids.note} className="note wrong" role="alert">
        {factor.complaint}
      </p>
    </div>
  );
}

/** The typed factor, checked as it is typed. */
function useFactor(text: string): { latex: string; complaint: string } {
  const [known, setKnown] = useState({ text: '', latex: '', complaint: '' });
  useEffect(() => {
    if (text === '') return;
    const controller = new AbortController();
    const timer = setTimeout(() => {
      quickEngine.call('basis', { basis: [text] }, { signal: controller.signal }).then(
        ({ elements }) => setKnown({ text, latex: elements[0]?.latex ?? '', complaint: '' }),
        (error) => controller.signal.aborted || setKnown({ text, latex: '', complaint: sentenceOf(error) }),
      );
    }, 250);
    return () => {
      clearTimeout(timer);
      controller.abort();
    };
  }, [text]);
  return known.text === text ? known : { latex: '', complaint: '' };
}

function figuresOf(reading: Reading): string[] {
  if (reading.kind !== 'value') return [];
  const { written, trusted, fromUncertainty } = reading;
  return [
    `${written.toLocaleString('en')} digits`,
    trusted === written ? 'all trusted' : `${trusted.toLocaleString('en')} trusted`,
    ...(fromUncertainty ? ['by the stated uncertainty'] : []),
  ];
}
