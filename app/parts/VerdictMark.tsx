/** The verdict as a word with a shape of its own, so that colour is never needed to tell verdicts apart. */
import type { SearchRecord } from '../../src/search/record.ts';

export type MarkKey =
  | 'holds'
  | 'tentative'
  | 'spurious'
  | 'excluded'
  | 'basis-dependent'
  | 'inconclusive'
  | 'running'
  | 'open'
  | 'stale';

const WORDS: Readonly<Record<MarkKey, string>> = {
  holds: 'Holds',
  tentative: 'Tentative',
  spurious: 'Spurious',
  excluded: 'Excluded',
  'basis-dependent': 'Basis dependent',
  inconclusive: 'Inconclusive',
  running: 'Searching',
  open: 'Not searched',
  stale: 'Changed since search',
};

export function markOf(record: SearchRecord | null): MarkKey {
  if (record === null) return 'open';
  if (record.outcome === 'relation') return record.verdict ?? 'tentative';
  return record.outcome === 'cancelled' ? 'open' : record.outcome;
}

function Shape({ mark }: { mark: MarkKey }) {
  switch (mark) {
    case 'holds':
      return (
        <>
          <circle cx="8" cy="8" r="7" fill="currentColor" />
          <path d="M4.5 8.2l2.4 2.4 4.6-5" fill="none" stroke="var(--sheet)" strokeWidth="1.8" />
        </>
      );
    case 'tentative':
      return (
        <>
          <circle cx="8" cy="8" r="6.2" fill="none" stroke="currentColor" strokeWidth="1.6" />
          <path d="M8 1.8a6.2 6.2 0 0 1 0 12.4z" fill="currentColor" />
        </>
      );
    case 'spurious':
      return <path d="M3 3l10 10M13 3L3 13" stroke="currentColor" strokeWidth="2.2" fill="none" />;
    case 'excluded':
      return (
        <>
          <rect x="2" y="2" width="12" height="12" fill="none" stroke="currentColor" strokeWidth="1.6" />
          <path d="M2 14L14 2" stroke="currentColor" strokeWidth="1.6" />
        </>
      );
    case 'basis-dependent':
      return <path d="M2 5h12M2 8h12M2 11h12" stroke="currentColor" strokeWidth="1.8" fill="none" />;
    case 'inconclusive':
      return <path d="M8 1.8L14.2 8 8 14.2 1.8 8z" fill="none" stroke="currentColor" strokeWidth="1.6" />;
    case 'running':
      return <path d="M8 2a6 6 0 1 1-6 6" fill="none" stroke="currentColor" strokeWidth="2" className="turning" />;
    default:
      return (
        <circle cx="8" cy="8" r="5.5" fill="none" stroke="currentColor" strokeWidth="1.4" strokeDasharray="2.2 2" />
      );
  }
}

export function VerdictMark({
  mark,
  words = true,
  detail,
}: {
  mark: MarkKey;
  words?: boolean;
  detail?: string | undefined;
}) {
  return (
    <span className={`mark ${mark}`}>
      <svg width="16" height="16" viewBox="0 0 16 16" aria-hidden="true">
        <Shape mark={mark} />
      </svg>
      <span className={words ? '' : 'visually-hidden'}>
        {WORDS[mark]}
        {detail === undefined ? '' : ` ${detail}`}
      </span>
    </span>
  );
}
