/**
 * Pasted or dropped text to a list of values: plain lines, labelled lines, CSV and TSV, JSON. Every line comes back as it was
 * read or with the reason why it was refused. Works in chunks, so that a page stays responsive.
 */
import { InputError, spotIn } from '../number/errors.ts';
import { jsonEntries } from './json.ts';
import { type ReadValue, readValue } from './value.ts';

export type ImportedLine = { readonly line: number; readonly label: string | undefined } & (
  | ReadValue
  | { readonly kind: 'refused'; readonly code: string; readonly reason: string; readonly column: number }
);

/** Largest text read at once, in characters. */
const LARGEST_TEXT = 50_000_000;
/** A chunk ends after this many milliseconds, well below what a reader of the page would notice. */
const CHUNK_MILLISECONDS = 8;

/** All at once. */
export function importText(text: string): ImportedLine[] {
  return [...importInChunks(text)].flat();
}

/** Yields the lines chunk by chunk; each step takes about 8 ms, or as long as its longest single line. */
export function* importInChunks(text: string): Generator<readonly ImportedLine[], void, undefined> {
  if (text.length > LARGEST_TEXT) {
    throw new InputError(
      'too-long',
      `The text has ${text.length} characters; at most ${LARGEST_TEXT} are read at once.`,
    );
  }
  let chunk: ImportedLine[] = [];
  let start = performance.now();
  for (const entry of entries(text)) {
    chunk.push(readEntry(entry));
    if (performance.now() - start > CHUNK_MILLISECONDS) {
      yield chunk;
      chunk = [];
      start = performance.now();
    }
  }
  if (chunk.length > 0) yield chunk;
}

/** A value's text and where it starts. */
export interface Entry {
  readonly line: number;
  /** Columns in front of the value on its line. */
  readonly indent: number;
  readonly label: string | undefined;
  readonly value: string;
}

function entries(text: string): Iterable<Entry> {
  return /^\s*[[{]/.test(text) ? jsonEntries(text) : lineEntries(text);
}

function readEntry({ line, indent, label, value }: Entry): ImportedLine {
  try {
    return { line, label, ...readValue(value) };
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    const at = error.at ?? spotIn(value, 0);
    const where = { line: line + at.line - 1, column: at.column + (at.line === 1 ? indent : 0) };
    const reason = error.message.replace(/line \d+, column \d+/, `line ${where.line}, column ${where.column}`);
    return { kind: 'refused', label, line: where.line, column: where.column, code: error.code, reason };
  }
}

/** A line of digits alone goes on with the number before it, as programs wrap long ones. */
const CONTINUATION = /^[\s_]*\d[\d\s_]*\\?\s*$/;
const OPEN_NUMBER = /\.[\d\s_]{20,}\\?\s*$/;

function* lineEntries(text: string): Generator<Entry> {
  let pending: { line: number; parts: string[] } | undefined;
  let number = 0;
  let header = true;
  for (const raw of eachLine(text)) {
    number += 1;
    const previous = pending?.parts.at(-1);
    const wrapped = previous !== undefined && /\\\s*$/.test(previous);
    const goesOn =
      previous !== undefined &&
      CONTINUATION.test(raw) &&
      OPEN_NUMBER.test(`${pending?.parts.length === 1 ? previous : `.${previous}`}`);
    if (pending !== undefined && (wrapped || goesOn)) {
      pending.parts.push(raw);
      continue;
    }
    if (pending !== undefined) yield split(pending.parts.join('\n'), pending.line);
    pending = undefined;
    if (/^\s*(?:[#%]|\/\/|$)/.test(raw)) continue;
    const isHeader = header && /[,;\t]/.test(raw) && !/\d/.test(raw);
    header = false;
    if (!isHeader) pending = { line: number, parts: [raw] };
  }
  if (pending !== undefined) yield split(pending.parts.join('\n'), pending.line);
}

function* eachLine(text: string): Generator<string> {
  let start = 0;
  for (;;) {
    const end = text.indexOf('\n', start);
    if (end < 0) break;
    yield text.slice(start, end).replace(/\r$/, '');
    start = end + 1;
  }
  yield text.slice(start);
}

const LABELS: readonly RegExp[] = [
  // name = value, name: value
  /^\s*("[^"]*"|[^=:\d.+-][^=:]{0,200}?)\s*(?::=|=|:)\s*/u,
  // a name or quoted text, then a separator and a value
  /^\s*("[^"]*"|[\p{L}_][\p{L}\d_[\]{}.-]*)\s*[,;\t]\s*/u,
  /^\s*("[^"]*"|[\p{L}_][\p{L}\d_[\]{}]*)[ ]+(?=[-+−(]?[\d.])/u,
  // a running number, then a separator, then a number with a point
  /^\s*(\d{1,9})(?:\s*[,;\t]\s*|[ ]+)(?=[-+−]?\d*\.\d)/,
];

function split(text: string, line: number): Entry {
  for (const pattern of LABELS) {
    const match = pattern.exec(text);
    if (match !== null && match[0].length < text.length) {
      return tidy(
        text.slice(match[0].length),
        line,
        match[0].length,
        (match[1] as string).replace(/^"|"$/g, '').trim(),
      );
    }
  }
  return tidy(text, line, 0, undefined);
}

/** Quotes around the value, a separator at its end and one between two parts are not part of the digits. */
function tidy(text: string, line: number, indent: number, label: string | undefined): Entry {
  const quoted = /^\s*"([^"]*)"\s*[,;]?\s*$/.exec(text);
  let value = quoted === null ? text.replace(/[,;\s]+$/, '') : (quoted[1] as string);
  const parts = value.split(/\s*[,;\t]\s*/);
  if (parts.length === 2 && parts.every((p) => /^[-+−]?\d*\.\d[\d\s]*(?:[eEdD][-+]?\d+)?$/.test(p)))
    value = `(${parts.join(',')})`;
  return { line, indent: indent + (quoted === null ? 0 : text.indexOf('"') + 1), label, value };
}
