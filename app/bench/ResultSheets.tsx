/** The last parts: the verdict with its evidence, and the expression. */

import { factoredText } from '../../src/evidence/factors.ts';
import { NOT_A_PROOF } from '../../src/evidence/verdict.ts';
import type { RelationEntry, SearchRecord } from '../../src/search/record.ts';
import { AgreementPlot } from '../parts/AgreementPlot.tsx';
import { CopyButton } from '../parts/CopyButton.tsx';
import { Formula } from '../parts/Formula.tsx';
import { markOf, VerdictMark } from '../parts/VerdictMark.tsx';

const SPEAKS = {
  for: { sign: '+', word: 'speaks for' },
  against: { sign: '−', word: 'speaks against' },
  neutral: { sign: '·', word: 'neutral' },
} as const;

export function ResultSheets({
  record,
  stale,
  onDrop,
}: {
  record: SearchRecord;
  stale: boolean;
  onDrop: (constant: string) => void;
}) {
  return (
    <div className={stale ? 'stale' : undefined}>
      {stale && (
        <p className="stale-note">
          <VerdictMark mark="stale" /> What follows belongs to an earlier state of the value or basis. Search again to
          renew it.
        </p>
      )}
      <EvidenceSheet record={record} onDrop={onDrop} />
      {record.outcome === 'relation' && <ExpressionSheet record={record} />}
    </div>
  );
}

function EvidenceSheet({ record, onDrop }: { record: SearchRecord; onDrop: (constant: string) => void }) {
  const { evidence } = record;
  return (
    <section className="sheet" aria-labelledby="evidence-heading">
      <h2 id="evidence-heading">
        <span className="step">4</span> Evidence
      </h2>
      <div className="verdict">
        <VerdictMark
          mark={markOf(record)}
          detail={
            record.outcome === 'excluded' && record.normBound ? `below ${scientific(record.normBound)}` : undefined
          }
        />
        <p>
          {evidence === null ? null : <>{evidence.rule.text} </>}
          {record.diagnosis.join(' ')}
        </p>
        {record.outcome === 'relation' && (
          <p className="note">
            {NOT_A_PROOF} What would change this verdict: {lowered(evidence?.rule.wouldChange ?? '')}
          </p>
        )}
        {record.outcome === 'excluded' && (
          <p className="note">
            A negative is a result: it holds for this basis and these digits. Next: a larger basis, or another
            prefactor.
          </p>
        )}
      </div>
      {record.outcome === 'basis-dependent' && <Dependence record={record} onDrop={onDrop} />}
      {evidence !== null && (
        <>
          <dl className="facts">
            <Fact name="Agreement" value={`${Math.floor(evidence.agreementDigits)} digits`} />
            <Fact name="Surplus" value={`${Math.floor(evidence.surplusDigits)} digits`} />
            <Fact name="Predicted" value={`${evidence.heldOut.predicted} of ${evidence.heldOut.offered} held out`} />
            <Fact name="Norm" value={`10^${evidence.normLog10.toFixed(1)}`} />
          </dl>
          <div className="two wide">
            <ul className="evidence">
              {evidence.items.map((item) => (
                <li key={item.key} className={item.speaks}>
                  <span className="speaks" aria-hidden="true">
                    {SPEAKS[item.speaks].sign}
                  </span>
                  <div>
                    <b>{item.title}</b> <span className="visually-hidden">({SPEAKS[item.speaks].word})</span>
                    <p>{item.reason}</p>
                  </div>
                </li>
              ))}
            </ul>
            <AgreementPlot evidence={evidence} />
          </div>
        </>
      )}
    </section>
  );
}

function lowered(text: string): string {
  return text === '' ? '' : `${text.slice(0, 1).toLowerCase()}${text.slice(1)}`;
}

function scientific(text: string): string {
  const [lead, exponent] = text.split('e');
  if (exponent === undefined) return text;
  const raised = [...exponent].map((d) => '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(d)] ?? d).join('');
  return `${lead} · 10${raised}`;
}

function Fact({ name, value }: { name: string; value: string }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd>{value}</dd>
    </div>
  );
}

function Dependence({ record, onDrop }: { record: SearchRecord; onDrop: (constant: string) => void }) {
  const involved = record.relation.filter((r) => r.coefficient !== '0');
  return (
    <div className="dependence">
      <p className="expression">
        <Formula
          latex={`0 = ${record.expression?.latex ?? ''}`}
          text={`0 = ${record.expression?.text ?? ''}`}
          display
        />
      </p>
      <div className="row">
        {involved.map((r) => (
          <button type="button" key={r.constant} onClick={() => onDrop(r.constant)}>
            Drop {r.constant} and search again
          </button>
        ))}
      </div>
    </div>
  );
}

function ExpressionSheet({ record }: { record: SearchRecord }) {
  const expression = record.expression ?? { text: '', latex: '' };
  return (
    <section className="sheet" aria-labelledby="expression-heading">
      <h2 id="expression-heading">
        <span className="step">5</span> Expression
      </h2>
      <div className="expression" data-testid="expression">
        <Formula latex={expression.latex} text={expression.text} display />
      </div>
      <p className="mono typed">{expression.text}</p>
      <div className="row">
        <CopyButton label="Copy LaTeX" text={expression.latex} />
        <CopyButton label="Copy text" text={expression.text} />
        <CopyButton label="Copy record" text={JSON.stringify(record, null, 2)} />
      </div>
      <details className="drawer">
        <summary>Coefficients</summary>
        <div className="drawer-body scroll">
          <table>
            <thead>
              <tr>
                <th scope="col">Constant</th>
                <th scope="col">Weight</th>
                <th scope="col" className="number">
                  Coefficient
                </th>
                <th scope="col">Denominator</th>
              </tr>
            </thead>
            <tbody>
              {record.relation.map((entry) => (
                <CoefficientRow key={entry.constant} entry={entry} />
              ))}
            </tbody>
          </table>
        </div>
      </details>
    </section>
  );
}

function CoefficientRow({ entry }: { entry: RelationEntry }) {
  const [, denominator = '1'] = entry.coefficient.split('/');
  const unused = entry.coefficient === '0';
  return (
    <tr className={unused ? 'unused' : undefined}>
      <th scope="row">
        <Formula latex={entry.latex} text={entry.constant} />
      </th>
      <td>{entry.weight ?? '–'}</td>
      <td className="number mono">{entry.coefficient}</td>
      <td className="mono">{unused ? '' : factoredText(BigInt(denominator))}</td>
    </tr>
  );
}
