/** The digits of a value in blocks of ten and lines of a hundred, each digit marked by its part in the evidence. */
import { useMemo, useState } from 'react';
import type { DigitRun } from '../../src/evidence/evidence.ts';

export type Part = DigitRun['part'] | 'trusted';

const LINE = 100;
const BLOCK = 10;
/** Lines shown before the reader asks for more. */
const FIRST_LINES = 20;

const LEGEND: Readonly<Record<Part, string>> = {
  trusted: 'trusted',
  used: 'used by the search',
  predicted: 'held out and predicted',
  contradicted: 'contradicted',
  beyond: 'beyond trust',
};

interface Piece {
  readonly digits: string;
  readonly part: Part;
}

/** Cuts digits from..to into pieces of one part each. */
function pieces(
  digits: string,
  from: number,
  to: number,
  runs: readonly { from: number; to: number; part: Part }[],
): Piece[] {
  const found: Piece[] = [];
  for (const run of runs) {
    const start = Math.max(from, run.from);
    const end = Math.min(to, run.to);
    if (end > start) found.push({ digits: digits.slice(start, end), part: run.part });
  }
  return found;
}

export function DigitStrip({
  sign,
  digits,
  exponent,
  runs,
}: {
  sign: string;
  digits: string;
  exponent: number;
  runs: readonly { from: number; to: number; part: Part }[];
}) {
  const [all, setAll] = useState(false);
  const lines = Math.ceil(digits.length / LINE);
  const shown = all ? lines : Math.min(lines, FIRST_LINES);
  const parts = useMemo(() => [...new Set(runs.filter((r) => r.to > r.from).map((r) => r.part))], [runs]);
  return (
    <figure className="strip" aria-label={`Digits of the value: ${summary(digits, exponent, runs)}`}>
      <div className="strip-lines" aria-hidden="true">
        {Array.from({ length: shown }, (_, line) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: lines have no other identity than their number
          <div className="strip-line" key={line}>
            <span className="strip-number">{line * LINE + 1}</span>
            <span className="strip-blocks">
              {line === 0 && <span className="strip-sign">{sign === '' ? ' ' : '−'}</span>}
              {blocks(digits, line, runs)}
            </span>
          </div>
        ))}
      </div>
      {shown < lines && (
        <button type="button" className="quiet" onClick={() => setAll(true)}>
          Show all {digits.length.toLocaleString('en')} digits
        </button>
      )}
      <figcaption className="strip-legend">
        <span>
          first digit × 10<sup>{exponent < 0 ? `−${-exponent}` : exponent}</sup>
        </span>
        {parts.map((part) => (
          <span key={part} className="strip-key">
            <b className={`d ${part}`} aria-hidden="true">
              123
            </b>{' '}
            {LEGEND[part]}
          </span>
        ))}
      </figcaption>
    </figure>
  );
}

function blocks(digits: string, line: number, runs: readonly { from: number; to: number; part: Part }[]) {
  const start = line * LINE;
  const end = Math.min(digits.length, start + LINE);
  const found = [];
  for (let at = start; at < end; at += BLOCK) {
    const cut = pieces(digits, at, Math.min(at + BLOCK, end), runs);
    found.push(
      <span className="strip-block" key={at}>
        {cut.map((piece, k) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: pieces of a block have no other identity
          <span className={`d ${piece.part}`} key={k}>
            {piece.digits}
          </span>
        ))}
      </span>,
    );
  }
  return found;
}

function summary(digits: string, exponent: number, runs: readonly { from: number; to: number; part: Part }[]): string {
  const counts = runs.filter((r) => r.to > r.from).map((r) => `digits ${r.from + 1} to ${r.to} ${LEGEND[r.part]}`);
  return `${digits.length} significant digits beginning ${digits.slice(0, 6)}, decimal exponent ${exponent}; ${counts.join(', ')}`;
}
