/** The fourth part: the verdict, the rule that decided it, and what speaks for and against. */
import type { Evidence, EvidenceItem } from '../../src/evidence/evidence.ts';
import { NOT_A_PROOF } from '../../src/evidence/verdict.ts';
import type { SearchRecord } from '../../src/search/record.ts';
import { searchEngine } from '../engine.ts';
import { AgreementPlot } from '../parts/AgreementPlot.tsx';
import { Formula } from '../parts/Formula.tsx';
import { Power } from '../parts/Power.tsx';
import { raisePowers } from '../parts/powers.ts';
import { Sheet } from '../parts/Sheet.tsx';
import { markOf, VerdictMark } from '../parts/VerdictMark.tsx';
import type { ValueEntry } from '../state/project.ts';
import { useBenchStore } from '../state/react.ts';
import { startSearch } from '../state/search.ts';

const SPEAKS = {
  for: { sign: '+', word: 'speaks for it' },
  against: { sign: '−', word: 'speaks against it' },
  neutral: { sign: '·', word: 'neutral' },
} as const;

export function EvidenceSheet({ record, value }: { record: SearchRecord; value: ValueEntry }) {
  const { evidence } = record;
  return (
    <Sheet step={4} title="Evidence" figures={figuresOf(record)}>
      <div className="verdict" id="verdict">
        <div className={`hallmark ${markOf(record)}`} data-testid="verdict">
          <VerdictMark mark={markOf(record)} />
          {record.outcome === 'excluded' && record.normBound !== null && (
            <span>
              below <Power log10={log10OfText(record.normBound)} />
            </span>
          )}
        </div>
        <Words record={record} />
      </div>
      {record.outcome === 'basis-dependent' && <Dependence record={record} value={value} />}
      {evidence !== null && (
        <div className="weighing">
          <EvidenceList items={evidence.items} />
          <AgreementPlot evidence={evidence} />
        </div>
      )}
    </Sheet>
  );
}

function figuresOf({ evidence }: SearchRecord): string[] {
  if (evidence === null) return [];
  return [
    `${whole(evidence.agreementDigits)} digits agree`,
    `${whole(evidence.surplusDigits)} to spare`,
    `${evidence.heldOut.predicted} predicted`,
  ];
}

function whole(digits: number): string {
  return Number.isFinite(digits) ? `${Math.floor(digits)}` : 'all';
}

/** log10 of a norm bound such as "1.8e9", whose exponent may lie beyond what a number holds. */
function log10OfText(text: string): number {
  const [lead = '1', exponent = '0'] = text.split('e');
  return Math.log10(Number(lead)) + Number(exponent);
}

function Words({ record }: { record: SearchRecord }) {
  const { evidence, outcome, diagnosis } = record;
  return (
    <div className="verdict-words">
      {diagnosis.map((sentence) => (
        <p key={sentence}>{raisePowers(sentence)}</p>
      ))}
      {evidence !== null && <Rule rule={evidence.rule} />}
      {outcome === 'relation' && <p className="fixed-sentence">{NOT_A_PROOF}</p>}
      {outcome === 'excluded' && <Excluded record={record} />}
    </div>
  );
}

function Rule({ rule }: { rule: Evidence['rule'] }) {
  return (
    <p>
      <span className="tag">Rule</span> {rule.text}{' '}
      <span className="note">
        It would take this to change it: {rule.wouldChange.slice(0, 1).toLowerCase()}
        {rule.wouldChange.slice(1)}
      </span>
    </p>
  );
}

/** What a negative states, in terms of coefficients. */
function Excluded({ record }: { record: SearchRecord }) {
  const { basis } = record.request;
  const numbers = Array.isArray(basis) ? basis.length + 1 : null;
  const log10 = record.normBound === null ? 0 : log10OfText(record.normBound);
  return (
    <p>
      This is a result: if the value is a rational combination of these constants all the same, then, over a common
      denominator,{' '}
      {numbers === null ? (
        'its integers are large'
      ) : (
        <>
          at least one of its {numbers} integers exceeds <Power log10={log10 - Math.log10(numbers) / 2} />
        </>
      )}
      . A larger basis or another factor may still hold it.
    </p>
  );
}

function EvidenceList({ items }: { items: readonly EvidenceItem[] }) {
  return (
    <ul className="evidence">
      {items.map((item) => (
        <li key={item.key} className={item.speaks}>
          <span className="speaks" aria-hidden="true">
            {SPEAKS[item.speaks].sign}
          </span>
          <div>
            <h3>
              {item.title} <span className="visually-hidden">({SPEAKS[item.speaks].word})</span>
            </h3>
            <p>{raisePowers(item.reason)}</p>
          </div>
        </li>
      ))}
    </ul>
  );
}

function Dependence({ record, value }: { record: SearchRecord; value: ValueEntry }) {
  const store = useBenchStore();
  const leaveOut = (constant: string): void => {
    const basis = value.basis.filter((text) => text !== constant);
    store.getState().change(value.id, { basis });
    startSearch(store, searchEngine, { ...value, basis });
  };
  const involved = record.relation.filter((r) => r.coefficient !== '0');
  return (
    <div className="dependence">
      <div className="expression">
        <Formula
          latex={`0 = ${record.expression?.latex ?? ''}`}
          text={`0 = ${record.expression?.text ?? ''}`}
          display
        />
      </div>
      <div className="row">
        {involved.map((r) => (
          <button type="button" key={r.constant} onClick={() => leaveOut(r.constant)}>
            Leave out {r.constant} and search again
          </button>
        ))}
      </div>
    </div>
  );
}
