/** The bench: the project's values at the side, and the sheet of the one in hand. */
import { lazy, Suspense, useCallback, useEffect, useMemo, useRef } from 'react';
import { searchEngine } from '../engine.ts';
import { usePlace } from '../place.ts';
import { currentRecord, LONGEST_TEXT, labelOf } from '../state/project.ts';
import { useBench, useBenchStore, useProject, useSelected } from '../state/react.ts';
import { startSearch } from '../state/search.ts';
import { Bar } from './Bar.tsx';
import { BasisSheet } from './BasisSheet.tsx';
import { useKeys } from './keys.ts';
import { Notices } from './Notices.tsx';
import { ResultSheets } from './ResultSheets.tsx';
import { readEntry } from './reading.ts';
import { SearchSheet } from './SearchSheet.tsx';
import { ValueList } from './ValueList.tsx';
import { ValueSheet } from './ValueSheet.tsx';

const CataloguePage = lazy(() => import('../catalogue/CataloguePage.tsx').then((m) => ({ default: m.CataloguePage })));

export function Bench({ onTakeOther }: { onTakeOther: () => void }) {
  const store = useBenchStore();
  const announcement = useBench((s) => s.announcement);
  const project = useProject();
  const value = useSelected();
  const { text, trustedDigits } = value;
  const reading = useMemo(() => readEntry({ text, trustedDigits }), [text, trustedDigits]);
  const latest = value.records[0] ?? null;
  const record = currentRecord(value);
  const running = useBench((s) => s.running[value.id] !== undefined);
  const search = useCallback(() => {
    if (reading.kind === 'value' && value.basis.length > 0) startSearch(store, searchEngine, value);
  }, [store, reading, value]);
  useKeys(store, search);
  usePasteAnywhere();
  useResultInSight(running);
  const place = usePlace();
  const index = project.values.findIndex((v) => v.id === value.id);

  return (
    <>
      <a className="skip" href={place === 'catalogue' ? '#catalogue' : '#sheet'}>
        {place === 'catalogue' ? 'Skip to the catalogue' : 'Skip to the sheet'}
      </a>
      <Bar />
      {place === 'catalogue' ? (
        <Suspense fallback={<p className="note waiting">Opening the catalogue …</p>}>
          <CataloguePage />
        </Suspense>
      ) : (
        <div className="frame">
          <ValueList />
          <main id="sheet" tabIndex={-1}>
            <h1 className="visually-hidden">{labelOf(value, index)}</h1>
            <Notices onTakeOther={onTakeOther} />
            <ValueSheet key={value.id} value={value} reading={reading} record={record} />
            <BasisSheet value={value} reading={reading} />
            <SearchSheet value={value} reading={reading} onSearch={search} searched={record !== null} />
            {latest !== null && !running && <ResultSheets record={latest} stale={record === null} value={value} />}
          </main>
        </div>
      )}
      <div className="visually-hidden" role="status" aria-live="polite">
        {announcement}
      </div>
    </>
  );
}

/** A number pasted outside every field becomes a value: the empty one in hand, or a new one. */
function usePasteAnywhere(): void {
  const store = useBenchStore();
  useEffect(() => {
    const paste = (event: ClipboardEvent): void => {
      const target = event.target instanceof Element ? event.target : null;
      if (target?.closest('input, textarea, select, [contenteditable], dialog') !== null && target !== null) return;
      const text = event.clipboardData?.getData('text/plain').trim() ?? '';
      if (text === '' || text.length > LONGEST_TEXT || !/^[-+−]?[\d.]/.test(text)) return;
      event.preventDefault();
      const state = store.getState();
      const { values, selected } = state.history.present;
      const current = values.find((v) => v.id === selected);
      if (current !== undefined && current.text.trim() === '') state.change(current.id, { text });
      else state.add(text);
      document.getElementById('sheet')?.scrollIntoView();
    };
    document.addEventListener('paste', paste);
    return () => document.removeEventListener('paste', paste);
  }, [store]);
}

/** When a search of the value in hand ends, its verdict is brought into sight. */
function useResultInSight(running: boolean): void {
  const before = useRef(running);
  useEffect(() => {
    if (before.current && !running) {
      const smooth = !matchMedia('(prefers-reduced-motion: reduce)').matches;
      document.getElementById('verdict')?.scrollIntoView({ block: 'nearest', behavior: smooth ? 'smooth' : 'instant' });
    }
    before.current = running;
  }, [running]);
}
