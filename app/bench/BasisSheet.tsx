/** The second part: which constants may occur, and whether the digits can carry them. */
import { useMemo } from 'react';
import { spaceOf } from '../../src/spaces/registry.ts';
import type { BasisElementView } from '../../src/worker/messages.ts';
import { Formula } from '../parts/Formula.tsx';
import { Sheet } from '../parts/Sheet.tsx';
import type { ValueEntry } from '../state/project.ts';
import { useBench } from '../state/react.ts';
import { BasisSets } from './BasisSets.tsx';
import { BudgetRuler } from './BudgetRuler.tsx';
import { useElements } from './elements.ts';
import type { Reading } from './reading.ts';
import { SpacePicker } from './SpacePicker.tsx';
import { TypeConstant } from './TypeConstant.tsx';

/** The space that is one click away, by the highest weight. */
const READY = 'polylog-half';
const READY_LATEX = '\\zeta,\\ \\pi,\\ \\log 2,\\ \\mathrm{Li}_n(\\tfrac12)';
const READY_WEIGHTS = [1, 2, 3, 4, 5];

/** Constants picked most often, beyond those of the ready space. */
const PICKS: readonly { readonly text: string; readonly latex: string }[] = [
  { text: '1', latex: '1' },
  { text: 'pi', latex: '\\pi' },
  { text: 'pi^2', latex: '\\pi^{2}' },
  { text: 'log(2)', latex: '\\log 2' },
  { text: 'zeta(3)', latex: '\\zeta(3)' },
  { text: 'zeta(5)', latex: '\\zeta(5)' },
  { text: 'catalan', latex: 'G' },
  { text: 'Cl(2,pi/3)', latex: '\\mathrm{Cl}_2(\\pi/3)' },
  { text: 'log(3)', latex: '\\log 3' },
  { text: 'sqrt(2)', latex: '\\sqrt{2}' },
  { text: 'sqrt(3)', latex: '\\sqrt{3}' },
  { text: 'euler_gamma', latex: '\\gamma' },
];

export function BasisSheet({ value, reading }: { value: ValueEntry; reading: Reading }) {
  const change = useBench((s) => s.change);
  const { basis } = value;
  const setBasis = (next: readonly string[]): void => change(value.id, { basis: [...new Set(next)] });
  const figures = basis.length === 0 ? [] : [`${basis.length} ${basis.length === 1 ? 'constant' : 'constants'}`];
  return (
    <Sheet step={2} title="Basis" figures={figures}>
      <ReadySpaces basis={basis} onPick={setBasis} />
      <Picks basis={basis} onPick={setBasis} />
      <TypeConstant basis={basis} onAdd={(text) => setBasis([...basis, text])} />
      <div className="drawers">
        <SpacePicker onPick={setBasis} basis={basis} />
        <BasisSets basis={basis} onPick={setBasis} />
      </div>
      {basis.length > 0 && <Chosen basis={basis} onChange={setBasis} />}
      <BudgetRuler reading={reading} constants={basis.length} />
    </Sheet>
  );
}

interface PickProps {
  readonly basis: readonly string[];
  readonly onPick: (basis: readonly string[]) => void;
}

function ReadySpaces({ basis, onPick }: PickProps) {
  const present = basis.join('\n');
  return (
    <fieldset className="ready" aria-label="ζ, π, log 2 and polylogarithms at one half, up to weight">
      <span className="ready-name" aria-hidden="true">
        <Formula latex={READY_LATEX} text="ζ, π, log 2, Li_n(½)" /> up to weight
      </span>
      {READY_WEIGHTS.map((weight) => {
        const texts = spaceOf(READY).basis(weight, { lower: true });
        return (
          <button
            type="button"
            key={weight}
            className="weight"
            aria-pressed={present === texts.join('\n')}
            title={`${texts.length} constants`}
            onClick={() => onPick(texts)}
          >
            {weight}
          </button>
        );
      })}
    </fieldset>
  );
}

function Picks({ basis, onPick }: PickProps) {
  return (
    <fieldset className="picks" aria-label="Single constants">
      {PICKS.map(({ text, latex }) => {
        const on = basis.includes(text);
        return (
          <button
            type="button"
            key={text}
            className="pick"
            aria-pressed={on}
            onClick={() => onPick(on ? basis.filter((t) => t !== text) : [...basis, text])}
          >
            <Formula latex={latex} text={text} />
          </button>
        );
      })}
    </fieldset>
  );
}

/** The basis in rows by weight. */
function Chosen({ basis, onChange }: { basis: readonly string[]; onChange: (basis: readonly string[]) => void }) {
  const elements = useElements(basis);
  const rows = useMemo(() => byWeight(basis, elements), [basis, elements]);
  return (
    <div className="chosen">
      <div className="chosen-rows">
        {rows.map(({ weight, members }) => (
          <div className="chosen-row" key={weight}>
            <span className="chosen-weight">{weight === '' ? '' : `weight ${weight}`}</span>
            <ul>
              {members.map(({ text, latex }) => (
                <li key={text} className="chip">
                  <Formula latex={latex} text={text} />
                  <button
                    type="button"
                    className="remove"
                    aria-label={`Leave out ${text}`}
                    title={`Leave out ${text}`}
                    onClick={() => onChange(basis.filter((t) => t !== text))}
                  >
                    ×
                  </button>
                </li>
              ))}
            </ul>
          </div>
        ))}
      </div>
      <button type="button" className="plain" onClick={() => onChange([])}>
        Clear the basis
      </button>
    </div>
  );
}

interface WeightRow {
  readonly weight: string;
  readonly members: { readonly text: string; readonly latex: string }[];
}

function byWeight(basis: readonly string[], elements: readonly BasisElementView[] | null): readonly WeightRow[] {
  const rows = new Map<string, WeightRow>();
  basis.forEach((text, k) => {
    const element = elements?.[k];
    const weight = element === undefined ? '' : (element.weight?.toString() ?? 'none');
    const row = rows.get(weight) ?? { weight, members: [] };
    row.members.push({ text, latex: element?.latex ?? `\\mathtt{${text.replace(/[_^]/g, '\\$&')}}` });
    rows.set(weight, row);
  });
  return [...rows.values()].sort((a, b) => order(a.weight) - order(b.weight));
}

function order(weight: string): number {
  return weight === 'none' ? Number.POSITIVE_INFINITY : Number(weight);
}
