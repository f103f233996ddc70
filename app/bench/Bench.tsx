/** One value's sheet, read from top to bottom: value, basis, search, evidence, expression. */
import { useContext, useEffect, useMemo } from 'react';
import { searchEngine } from '../engine.ts';
import { currentRecord } from '../state/project.ts';
import { StoreContext, useBench, useSelected } from '../state/react.ts';
import { startSearch } from '../state/search.ts';
import { BasisSheet } from './BasisSheet.tsx';
import { ResultSheets } from './ResultSheets.tsx';
import { readEntry } from './reading.ts';
import { SearchSheet } from './SearchSheet.tsx';
import { ValueList } from './ValueList.tsx';
import { ValueSheet } from './ValueSheet.tsx';

export function Bench() {
  const store = useContext(StoreContext);
  const value = useSelected();
  const change = useBench((s) => s.change);
  const { text, trustedDigits } = value;
  const reading = useMemo(() => readEntry({ text, trustedDigits }), [text, trustedDigits]);
  const current = currentRecord(value);
  const latest = value.records[0] ?? null;
  const ready = reading.kind === 'value' && value.basis.length > 0;

  const search = (): void => {
    if (store !== null && ready) startSearch(store, searchEngine, value);
  };
  const dropAndSearch = (constant: string): void => {
    if (store === null) return;
    const basis = value.basis.filter((t) => t !== constant);
    change(value.id, { basis });
    startSearch(store, searchEngine, { ...value, basis });
  };

  useEffect(() => {
    const onKey = (event: KeyboardEvent): void => {
      if (event.key === 'Enter' && (event.ctrlKey || event.metaKey) && ready && store !== null) {
        event.preventDefault();
        startSearch(store, searchEngine, value);
      }
    };
    addEventListener('keydown', onKey);
    return () => removeEventListener('keydown', onKey);
  }, [ready, store, value]);

  return (
    <div className="bench">
      <ValueList />
      <main key={value.id}>
        <ValueSheet value={value} reading={reading} record={current} />
        <BasisSheet value={value} reading={reading} />
        <SearchSheet value={value} reading={reading} onSearch={search} />
        {latest !== null && <ResultSheets record={latest} stale={current === null} onDrop={dropAndSearch} />}
      </main>
    </div>
  );
}
