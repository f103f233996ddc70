/** The last two parts: evidence, and expression. */
import type { SearchRecord } from '../../src/search/record.ts';
import { VerdictMark } from '../parts/VerdictMark.tsx';
import type { ValueEntry } from '../state/project.ts';
import { EvidenceSheet } from './EvidenceSheet.tsx';
import { ExpressionSheet } from './ExpressionSheet.tsx';

export function ResultSheets({ record, stale, value }: { record: SearchRecord; stale: boolean; value: ValueEntry }) {
  return (
    <div className={stale ? 'result stale' : 'result'}>
      {stale && (
        <p className="notice">
          <VerdictMark mark="stale" /> What follows belongs to an earlier state of the value or its basis.
        </p>
      )}
      <EvidenceSheet record={record} value={value} />
      {record.outcome === 'relation' && <ExpressionSheet record={record} />}
    </div>
  );
}
