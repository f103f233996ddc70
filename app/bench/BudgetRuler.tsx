/** The digit budget as a ruler: the digits that the search may use, cut into one cell for each number, and those held out. */
import { budgetFor, digitsNeeded } from '../../src/search/estimate.ts';
import type { Reading } from './reading.ts';

const AMPLE = 4;
const TIGHT = 2;
const WIDTH = 1000;
const HEIGHT = 14;

export function BudgetRuler({ reading, constants }: { reading: Reading; constants: number }) {
  if (reading.kind !== 'value' || constants === 0) return null;
  const { trusted } = reading;
  const { digits, numbers, coefficientDigits } = budgetFor(trusted, constants);
  const each = Math.floor(coefficientDigits * 10) / 10;
  const level = each >= AMPLE ? 'ample' : each >= TIGHT ? 'tight' : 'short';
  const used = (WIDTH * digits) / trusted;
  const cell = used / numbers;
  return (
    <div className={`budget ${level}`} data-testid="budget">
      <p className="budget-sum">
        <b>Digit budget</b> {digits} digits ÷ {numbers} numbers = <strong>{each}</strong> digits a coefficient
      </p>
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} preserveAspectRatio="none" aria-hidden="true">
        <rect className="ruler-used" x="0" y="0" width={used} height={HEIGHT} />
        <rect className="ruler-held" x={used} y="0" width={WIDTH - used} height={HEIGHT} />
        {Array.from({ length: numbers }, (_, k) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: cells have no other identity
          <path key={k} d={`M${(k + 1) * cell} 0V${HEIGHT}`} className="ruler-cut" />
        ))}
      </svg>
      <p className="note">{wordOf(level, constants, trusted, digits)}</p>
    </div>
  );
}

function wordOf(level: 'ample' | 'tight' | 'short', constants: number, trusted: number, digits: number): string {
  const held = `${trusted - digits} digits are held out for the relation to predict.`;
  if (level === 'ample') return `Enough for the coefficients that usually occur; ${held}`;
  if (level === 'tight') return `Tight: only small coefficients can be told from chance; ${held}`;
  return `Too few digits for this basis: a hit would mean nothing. Coefficients of four digits need about ${digitsNeeded(constants, 4)} trusted digits; or take a smaller basis.`;
}
