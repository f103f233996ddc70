/** What a project holds, as plain immutable data, and every edit of it as a pure function. */
import type { SearchRecord } from '../../src/search/record.ts';

export interface ValueEntry {
  readonly id: string;
  readonly label: string;
  /** The digits as the user gave them; never altered. */
  readonly text: string;
  /** Null: all digits written (or what a stated uncertainty leaves). */
  readonly trustedDigits: number | null;
  /** Typed factor that the value is divided by; empty for none. */
  readonly divideBy: string;
  /** Typed constants, in order. */
  readonly basis: readonly string[];
  /** Newest first. */
  readonly records: readonly SearchRecord[];
}

export interface BasisSet {
  readonly id: string;
  readonly name: string;
  readonly entries: readonly string[];
}

export interface Project {
  readonly format: 'digit-assay/project';
  readonly version: 1;
  readonly id: string;
  readonly title: string;
  /** A sentence shown above the sheet until it is put away; empty for none. */
  readonly note: string;
  readonly values: readonly ValueEntry[];
  readonly basisSets: readonly BasisSet[];
  readonly selected: string;
}

/** Records kept for one value. */
const MOST_RECORDS = 20;

export type ValueChange = Partial<Pick<ValueEntry, 'label' | 'text' | 'trustedDigits' | 'divideBy' | 'basis'>>;

export function newValue(id: string, basis: readonly string[] = [], text = ''): ValueEntry {
  return { id, label: '', text, trustedDigits: null, divideBy: '', basis, records: [] };
}

export function changeValue(project: Project, id: string, change: ValueChange): Project {
  return { ...project, values: project.values.map((v) => (v.id === id ? { ...v, ...change } : v)) };
}

/** Adds a value that starts with the basis of the selected one, and selects it. */
export function addValue(project: Project, id: string, text = ''): Project {
  const basis = project.values.find((v) => v.id === project.selected)?.basis ?? [];
  return { ...project, values: [...project.values, newValue(id, basis, text)], selected: id };
}

/** Removes a value; the last one is replaced by an empty one, so that there is always one to work on. */
export function removeValue(project: Project, id: string, freshId: string): Project {
  const index = project.values.findIndex((v) => v.id === id);
  const left = project.values.filter((v) => v.id !== id);
  const values = left.length > 0 ? left : [newValue(freshId)];
  const neighbour = values[Math.min(Math.max(index, 0), values.length - 1)] as ValueEntry;
  return { ...project, values, selected: project.selected === id ? neighbour.id : project.selected };
}

export function addRecord(project: Project, id: string, record: SearchRecord): Project {
  return {
    ...project,
    values: project.values.map((v) =>
      v.id === id ? { ...v, records: [record, ...v.records].slice(0, MOST_RECORDS) } : v,
    ),
  };
}

/** Saves entries under a name; an existing set of that name is replaced. */
export function saveBasisSet(project: Project, id: string, name: string, entries: readonly string[]): Project {
  const others = project.basisSets.filter((s) => s.name !== name);
  return { ...project, basisSets: [...others, { id, name, entries }] };
}

export function removeBasisSet(project: Project, id: string): Project {
  return { ...project, basisSets: project.basisSets.filter((s) => s.id !== id) };
}

export function labelOf(value: ValueEntry, index: number): string {
  return value.label.trim() === '' ? `Value ${index + 1}` : value.label;
}

/** The newest record, if the value and basis are still those it was made from. */
export function currentRecord(value: ValueEntry): SearchRecord | null {
  const [record] = value.records;
  if (record === undefined) return null;
  const { request } = record;
  const fresh =
    request.value === value.text &&
    (request.trustedDigits ?? null) === value.trustedDigits &&
    (request.divideBy ?? '') === value.divideBy.trim() &&
    JSON.stringify(request.basis) === JSON.stringify(value.basis);
  return fresh ? record : null;
}

/** Longest text that a value may hold, in characters: more than any readable number has, and a page must not freeze. */
export const LONGEST_TEXT = 800_000;
