/** The first part of the sheet: the digits, how many are trusted, and a factor to divide by. */
import { useId } from 'react';
import type { SearchRecord } from '../../src/search/record.ts';
import { DigitStrip, type Part } from '../parts/DigitStrip.tsx';
import type { ValueEntry } from '../state/project.ts';
import { useBench } from '../state/react.ts';
import type { Reading } from './reading.ts';

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
  const ids = { label: useId(), digits: useId(), trusted: useId(), divide: useId(), note: useId() };
  const wrong = reading.kind === 'wrong' ? reading : null;
  return (
    <section className="sheet" aria-labelledby="value-heading">
      <h2 id="value-heading">
        <span className="step">1</span> Value
      </h2>
      <div className="row">
        <div className="field grow">
          <label htmlFor={ids.label}>Name</label>
          <input
            id={ids.label}
            value={value.label}
            placeholder="for example: two-loop constant"
            maxLength={200}
            onChange={(e) => change(value.id, { label: e.target.value })}
          />
        </div>
        <div className="field">
          <label htmlFor={ids.trusted}>Trusted digits</label>
          <input
            id={ids.trusted}
            type="number"
            min={1}
            inputMode="numeric"
            className="short"
            value={value.trustedDigits ?? ''}
            placeholder={reading.kind === 'value' ? `${reading.trusted}` : 'all'}
            aria-invalid={wrong?.field === 'trusted'}
            aria-describedby={ids.note}
            onChange={(e) =>
              change(value.id, { trustedDigits: e.target.value === '' ? null : Math.trunc(Number(e.target.value)) })
            }
          />
        </div>
        <div className="field">
          <label htmlFor={ids.divide}>Divide by</label>
          <input
            id={ids.divide}
            className="medium mono"
            value={value.divideBy}
            placeholder="nothing"
            spellCheck={false}
            maxLength={500}
            onChange={(e) => change(value.id, { divideBy: e.target.value })}
          />
        </div>
      </div>
      <div className="field">
        <label htmlFor={ids.digits}>Digits</label>
        <textarea
          id={ids.digits}
          className="mono digits-in"
          rows={3}
          value={value.text}
          spellCheck={false}
          autoComplete="off"
          placeholder="Paste the number: 0.3284 7896 … — spaces, line breaks, exponents and uncertainties such as 0.12345(67) are understood"
          aria-invalid={wrong?.field === 'digits'}
          aria-describedby={ids.note}
          onChange={(e) => change(value.id, { text: e.target.value })}
        />
      </div>
      <p id={ids.note} className={wrong === null ? 'note' : 'note wrong'} role={wrong === null ? undefined : 'alert'}>
        {noteOf(reading)}
      </p>
      {reading.kind === 'value' && (
        <DigitStrip
          sign={reading.sign}
          digits={reading.digits}
          exponent={reading.exponent}
          runs={runsOf(reading, record)}
        />
      )}
    </section>
  );
}

function noteOf(reading: Reading): string {
  switch (reading.kind) {
    case 'empty':
      return 'Nothing leaves this machine: all reading and searching is done in this page.';
    case 'wrong':
      return reading.sentence;
    case 'value': {
      const count = `${reading.written.toLocaleString('en')} significant digits`;
      if (reading.trusted === reading.written) return `${count}, all trusted.`;
      return `${count}, ${reading.trusted.toLocaleString('en')} trusted${reading.fromUncertainty ? ' (from the stated uncertainty unless you say otherwise)' : ''}.`;
    }
  }
}

function runsOf(
  reading: Extract<Reading, { kind: 'value' }>,
  record: SearchRecord | null,
): { from: number; to: number; part: Part }[] {
  if (record?.evidence) return [...record.evidence.strip];
  return [
    { from: 0, to: reading.trusted, part: 'trusted' },
    { from: reading.trusted, to: reading.written, part: 'beyond' },
  ];
}
