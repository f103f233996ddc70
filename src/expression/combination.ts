/** Rational linear combinations in textbook form: 197/144 + pi^2/12 + 3*zeta(3)/4 − …, as text and as LaTeX. */
import { rationalLatex } from './print-latex.ts';

export interface CombinationEntry {
  readonly p: bigint;
  readonly q: bigint;
  /** Typed text and LaTeX of the constant; the constant 1 is written as its coefficient alone. */
  readonly text: string;
  readonly latex: string;
}

/** Entries with zero coefficient are left out; `0` when nothing is left. */
export function combination(entries: readonly CombinationEntry[]): { text: string; latex: string } {
  const present = entries.filter((entry) => entry.p !== 0n);
  if (present.length === 0) return { text: '0', latex: '0' };
  const texts = present.map(entryText);
  const latexes = present.map(entryLatex);
  const join = (parts: readonly string[]): string =>
    parts.map((part, k) => (k === 0 ? part : part.startsWith('-') ? ` - ${part.slice(1)}` : ` + ${part}`)).join('');
  return { text: join(texts), latex: join(latexes) };
}

function entryText({ p, q, text }: CombinationEntry): string {
  const size = p < 0n ? -p : p;
  const sign = p < 0n ? '-' : '';
  if (text === '1') return `${sign}${size}${q === 1n ? '' : `/${q}`}`;
  const body = /[+]| - /.test(text) || text.startsWith('-') ? `(${text})` : text;
  return `${sign}${size === 1n ? '' : `${size}*`}${body}${q === 1n ? '' : `/${q}`}`;
}

function entryLatex({ p, q, text, latex }: CombinationEntry): string {
  if (text === '1') return rationalLatex(p, q);
  const body = /[^{^_]\s[+-]\s/.test(latex) ? `\\left(${latex}\\right)` : latex;
  if (q === 1n && (p === 1n || p === -1n)) return `${p < 0n ? '-' : ''}${body}`;
  return `${rationalLatex(p, q)}\\,${body}`;
}
