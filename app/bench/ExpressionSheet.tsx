/** The fifth part: the expression, ready to be taken along, and its coefficients. */
import { factoredText } from '../../src/evidence/factors.ts';
import type { RelationEntry, SearchRecord } from '../../src/search/record.ts';
import { CopyButton } from '../parts/CopyButton.tsx';
import { Formula } from '../parts/Formula.tsx';
import { raisePowers } from '../parts/powers.ts';
import { Sheet } from '../parts/Sheet.tsx';

export function ExpressionSheet({ record }: { record: SearchRecord }) {
  const expression = record.expression ?? { text: '', latex: '' };
  const used = record.relation.filter((entry) => entry.coefficient !== '0').length;
  return (
    <Sheet step={5} title="Expression" figures={[`${used} of ${record.relation.length} constants used`]}>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reachable by keyboard */}
      <section className="expression" data-testid="expression" aria-label="Typeset expression" tabIndex={0}>
        <Formula latex={expression.latex} text={expression.text} display />
      </section>
      <div className="row">
        <CopyButton label="Copy LaTeX" text={expression.latex} primary />
        <CopyButton label="Copy text" text={expression.text} />
        <CopyButton label="Copy record" text={JSON.stringify(record, null, 2)} />
      </div>
      <p className="mono typed">{expression.text}</p>
      <Coefficients relation={record.relation} />
    </Sheet>
  );
}

function Coefficients({ relation }: { relation: readonly RelationEntry[] }) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reachable by keyboard
    <section className="table-frame" aria-label="Coefficients, scrollable" tabIndex={0}>
      <table>
        <caption>Coefficients</caption>
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
          {relation.map((entry) => (
            <CoefficientRow key={entry.constant} entry={entry} />
          ))}
        </tbody>
      </table>
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
      <td className="mono">{entry.weight ?? '–'}</td>
      <td className="number mono">{entry.coefficient.replace('-', '−')}</td>
      <td className="mono">
        {unused ? 'not used' : denominator === '1' ? '' : raisePowers(factoredText(BigInt(denominator)))}
      </td>
    </tr>
  );
}
