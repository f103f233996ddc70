/** The third part: start, watch, cancel. */
import { digitsUsed } from '../../src/search/estimate.ts';
import type { SearchProgress } from '../../src/search/record.ts';
import { Power } from '../parts/Power.tsx';
import { Sheet } from '../parts/Sheet.tsx';
import type { ValueEntry } from '../state/project.ts';
import { useBench } from '../state/react.ts';
import type { Running } from '../state/store.ts';
import type { Reading } from './reading.ts';

const STAGES: readonly { readonly key: SearchProgress['stage']; readonly word: string }[] = [
  { key: 'constants', word: 'Constants' },
  { key: 'relation', word: 'Relation' },
  { key: 'evidence', word: 'Evidence' },
];

export function SearchSheet({
  value,
  reading,
  onSearch,
  searched,
}: {
  value: ValueEntry;
  reading: Reading;
  onSearch: () => void;
  /** Whether the present value and basis have been searched already. */
  searched: boolean;
}) {
  const running = useBench((s) => s.running[value.id]);
  const problem = useBench((s) => s.problems[value.id]);
  const missing = missingWord(reading, value.basis.length);
  return (
    <Sheet step={3} title="Search" kind="in-sight" figures={searched && running === undefined ? figuresOf(value) : []}>
      {running === undefined ? (
        <div className="row middle">
          <button
            type="button"
            className="primary"
            onClick={onSearch}
            disabled={missing !== null}
            aria-keyshortcuts="Control+Enter"
          >
            {searched ? 'Search again' : 'Search'}
          </button>
          <p className="note">
            {missing ??
              'Looks for integers that tie the value to the basis, by PSLQ, and asks lattice reduction for a second opinion.'}
          </p>
        </div>
      ) : (
        <Progress
          running={running}
          trusted={reading.kind === 'value' ? reading.trusted : 0}
          onCancel={() => running.controller.abort()}
        />
      )}
      {problem !== undefined && (
        <p className="note wrong" role="alert">
          {problem}
        </p>
      )}
    </Sheet>
  );
}

function figuresOf(value: ValueEntry): string[] {
  const timings = value.records[0]?.timings;
  if (timings === undefined) return [];
  const total = timings.constantsMs + timings.relationMs + timings.evidenceMs;
  return [`took ${seconds(total)}`];
}

function missingWord(reading: Reading, constants: number): string | null {
  if (reading.kind === 'empty') return 'Paste a value first.';
  if (reading.kind === 'wrong') return 'The value cannot be read yet; see above.';
  return constants === 0 ? 'Choose a basis first.' : null;
}

function Progress({
  running: { progress, pass },
  trusted,
  onCancel,
}: {
  running: Running;
  trusted: number;
  onCancel: () => void;
}) {
  const at = STAGES.findIndex((s) => s.key === progress?.stage);
  const fraction = progress?.fraction ?? 0;
  const offered = pass === 1 ? digitsUsed(trusted) : trusted;
  return (
    <div className="progress">
      <div className="row middle">
        <ol className="stages" aria-label="Stages of the search">
          {STAGES.map((stage, k) => (
            <li key={stage.key} aria-current={k === at ? 'step' : undefined}>
              <span>{stage.word}</span>
              <progress value={k < at ? 1 : k === at ? fraction : 0} max={1} aria-label={stage.word} />
            </li>
          ))}
        </ol>
        <button type="button" onClick={onCancel} aria-keyshortcuts="Escape">
          Cancel
        </button>
      </div>
      <dl className="facts">
        <Fact name={pass === 1 ? 'Digits consumed' : 'Digits consumed, again with all'}>
          {at < 1 ? '0' : at === 1 ? Math.round(fraction * offered) : offered} of {offered}
        </Fact>
        <Fact name="Any relation is longer than">
          {progress !== null && progress.normBoundLog10 > 0 ? <Power log10={progress.normBoundLog10} /> : '–'}
        </Fact>
        <Fact name="Elapsed">{seconds(progress?.elapsedMs ?? 0)}</Fact>
        <Fact name="This stage still needs">
          {progress?.remainingMs == null ? '–' : `about ${seconds(progress.remainingMs)}`}
        </Fact>
      </dl>
    </div>
  );
}

function Fact({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}

function seconds(ms: number): string {
  if (ms < 60_000) return `${(ms / 1000).toFixed(ms < 9950 ? 1 : 0)} s`;
  return `${Math.floor(ms / 60_000)} min ${Math.round((ms % 60_000) / 1000)} s`;
}
