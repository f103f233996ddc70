/** The third part: start, watch, cancel. */
import type { SearchProgress } from '../../src/search/record.ts';
import type { ValueEntry } from '../state/project.ts';
import { useBench } from '../state/react.ts';
import type { Reading } from './reading.ts';

const STAGES = { constants: 'Computing constants', relation: 'Searching', evidence: 'Weighing the evidence' } as const;

export function SearchSheet({
  value,
  reading,
  onSearch,
}: {
  value: ValueEntry;
  reading: Reading;
  onSearch: () => void;
}) {
  const running = useBench((s) => s.running[value.id]);
  const problem = useBench((s) => s.problems[value.id]);
  const missing = missingWord(reading, value.basis.length);
  return (
    <section className="sheet" aria-labelledby="search-heading">
      <h2 id="search-heading">
        <span className="step">3</span> Search
      </h2>
      {running === undefined ? (
        <div className="row middle">
          <button
            type="button"
            className="primary"
            onClick={onSearch}
            disabled={missing !== null}
            aria-keyshortcuts="Control+Enter"
          >
            Search
          </button>
          <p className="note">
            {missing ??
              'Integer relations among the value and the basis, by PSLQ, confirmed by lattice reduction. Ctrl + Enter.'}
          </p>
        </div>
      ) : (
        <Progress progress={running.progress} onCancel={() => running.controller.abort()} />
      )}
      {problem !== undefined && (
        <p className="note wrong" role="alert">
          {problem}
        </p>
      )}
    </section>
  );
}

function missingWord(reading: Reading, constants: number): string | null {
  if (reading.kind === 'empty') return 'Paste a value first.';
  if (reading.kind === 'wrong') return 'The value cannot be read yet.';
  return constants === 0 ? 'Choose a space or add constants first.' : null;
}

function Progress({ progress, onCancel }: { progress: SearchProgress | null; onCancel: () => void }) {
  const fraction = progress?.fraction ?? 0;
  return (
    <div className="progress">
      <div className="row middle">
        <progress value={fraction} max={1} aria-label={progress === null ? 'Starting' : STAGES[progress.stage]} />
        <button type="button" onClick={onCancel}>
          Cancel
        </button>
      </div>
      <dl className="facts">
        <div>
          <dt>Stage</dt>
          <dd>{progress === null ? 'Starting' : STAGES[progress.stage]}</dd>
        </div>
        <div>
          <dt>Digits consumed</dt>
          <dd>{progress?.stage === 'relation' ? `${Math.round(fraction * 100)} %` : '–'}</dd>
        </div>
        <div>
          <dt>Norm bound so far</dt>
          <dd>
            {progress?.stage === 'relation' && progress.normBoundLog10 > 0
              ? `10^${progress.normBoundLog10.toFixed(1)}`
              : '–'}
          </dd>
        </div>
        <div>
          <dt>Elapsed</dt>
          <dd>{seconds(progress?.elapsedMs ?? 0)}</dd>
        </div>
        <div>
          <dt>Remaining</dt>
          <dd>{progress?.remainingMs == null ? '–' : `about ${seconds(progress.remainingMs)}`}</dd>
        </div>
      </dl>
    </div>
  );
}

function seconds(ms: number): string {
  return ms < 60_000
    ? `${(ms / 1000).toFixed(1)} s`
    : `${Math.floor(ms / 60_000)} min ${Math.round((ms % 60_000) / 1000)} s`;
}
