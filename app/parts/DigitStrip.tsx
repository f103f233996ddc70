/** The digits of a value in blocks of ten, numbered by hundreds, each digit marked by its part in the evidence. */
import { type ReactNode, useEffect, useMemo, useRef, useState } from 'react';
import type { DigitRun } from '../../src/evidence/evidence.ts';

export type Part = DigitRun['part'] | 'trusted';

export interface PartRun {
  readonly from: number;
  readonly to: number;
  readonly part: Part;
}

const HUNDRED = 100;
const BLOCK = 10;
/** More hundreds than this scroll in a window of their own, and only those in sight are drawn. */
const MOST_OPEN = 12;
const SPARE = 3;

const LEGEND: Readonly<Record<Part, string>> = {
  trusted: 'trusted',
  used: 'used by the search',
  predicted: 'held out, predicted',
  contradicted: 'contradicted',
  beyond: 'beyond trust',
};

export interface StripProps {
  readonly sign: string;
  readonly digits: string;
  readonly exponent: number;
  readonly runs: readonly PartRun[];
}

export function DigitStrip(props: StripProps) {
  const { digits, exponent, runs } = props;
  const hundreds = Math.ceil(digits.length / HUNDRED);
  const parts = useMemo(() => [...new Set(runs.filter((r) => r.to > r.from).map((r) => r.part))], [runs]);
  const pointInside = exponent >= -1 && exponent < digits.length;
  return (
    <figure className="strip">
      <p className="visually-hidden">{summary(props)}</p>
      {hundreds > MOST_OPEN ? (
        <LongStrip {...props} hundreds={hundreds} />
      ) : (
        <div className="strip-hundreds" aria-hidden="true">
          {Array.from({ length: hundreds }, (_, line) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: hundreds have no other identity than their number
            <Hundred key={line} line={line} {...props} />
          ))}
        </div>
      )}
      <figcaption className="strip-legend">
        {parts.map((part) => (
          <span key={part} className="strip-key">
            <b className={`d ${part}`} aria-hidden="true">
              0123
            </b>
            {LEGEND[part]}
          </span>
        ))}
        {!pointInside && (
          <span>
            first digit × 10<sup>{exponent < 0 ? `−${-exponent}` : exponent}</sup>
          </span>
        )}
      </figcaption>
    </figure>
  );
}

/** Draws the hundreds in sight; their height is measured from one that is drawn. */
function LongStrip({ hundreds, ...props }: StripProps & { hundreds: number }) {
  const frame = useRef<HTMLDivElement>(null);
  const [view, setView] = useState({ top: 0, height: 420, row: 64 });
  useEffect(() => {
    const element = frame.current;
    if (element === null) return;
    const measure = (): void => {
      const rows = element.querySelectorAll('.hundred');
      // The last hundred may be cut short; the first drawn one never is.
      const row = rows[0]?.getBoundingClientRect().height ?? 0;
      setView((v) => ({ top: element.scrollTop, height: element.clientHeight, row: row > 0 ? row : v.row }));
    };
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    element.addEventListener('scroll', measure, { passive: true });
    return () => {
      observer.disconnect();
      element.removeEventListener('scroll', measure);
    };
  }, []);
  const first = Math.max(0, Math.min(hundreds - 1, Math.floor(view.top / view.row) - SPARE));
  const last = Math.min(hundreds, Math.ceil((view.top + view.height) / view.row) + SPARE);
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a scrolling region must be reachable by keyboard
    <section className="strip-window" ref={frame} tabIndex={0} aria-label="Digits, scrollable">
      <div style={{ height: hundreds * view.row, position: 'relative' }} aria-hidden="true">
        <div className="strip-hundreds" style={{ transform: `translateY(${first * view.row}px)` }}>
          {Array.from({ length: last - first }, (_, k) => (
            // biome-ignore lint/suspicious/noArrayIndexKey: hundreds have no other identity than their number
            <Hundred key={first + k} line={first + k} {...props} />
          ))}
        </div>
      </div>
    </section>
  );
}

function Hundred({ line, sign, digits, exponent, runs }: StripProps & { line: number }) {
  const start = line * HUNDRED;
  const end = Math.min(digits.length, start + HUNDRED);
  const blocks: ReactNode[] = [];
  for (let at = start; at < end; at += BLOCK) {
    blocks.push(
      <span className="block" key={at}>
        {pieces(digits, at, Math.min(at + BLOCK, end), exponent + 1, runs)}
      </span>,
    );
  }
  return (
    <div className="hundred">
      <span className="hundred-number">{start === 0 ? '' : start}</span>
      <span className="hundred-sign">
        {line === 0 ? `${sign === '' ? '' : '−'}${exponent === -1 ? '0.' : ''}` : ''}
      </span>
      <span className="blocks">{blocks}</span>
    </div>
  );
}

/** Cuts digits from..to into pieces of one part each, with the decimal point where it falls among them. */
function pieces(digits: string, from: number, to: number, point: number, runs: readonly PartRun[]): ReactNode[] {
  const found: ReactNode[] = [];
  for (const run of runs) {
    const start = Math.max(from, run.from);
    const end = Math.min(to, run.to);
    if (end <= start) continue;
    const cut = point > start && point <= end ? point : end;
    found.push(
      <span className={`d ${run.part}`} key={start}>
        {digits.slice(start, cut)}
        {point === cut && cut < digits.length && <i className="point">.</i>}
        {digits.slice(cut, end)}
      </span>,
    );
  }
  return found;
}

function summary({ sign, digits, exponent, runs }: StripProps): string {
  const counts = runs.filter((r) => r.to > r.from).map((r) => `digits ${r.from + 1} to ${r.to} ${LEGEND[r.part]}`);
  return `${sign === '' ? '' : 'Negative; '}${digits.length} significant digits beginning ${digits.slice(0, 6)}, decimal exponent ${exponent}; ${counts.join(', ')}.`;
}
