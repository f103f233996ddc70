/** Recomputes a record from itself alone and says what agrees. */
import { InputError } from '../number/errors.ts';
import type { SearchOptions } from './problem.ts';
import type { OutcomeKind, SearchRecord } from './record.ts';
import { emptyRecord } from './report.ts';
import type { SearchRequest } from './request.ts';
import { runSearch } from './run.ts';

export interface Finding {
  readonly what: string;
  readonly ok: boolean;
  readonly detail: string;
}

export interface CheckResult {
  readonly ok: boolean;
  readonly findings: readonly Finding[];
}

const OUTCOMES: readonly OutcomeKind[] = ['relation', 'excluded', 'basis-dependent', 'inconclusive', 'cancelled'];

/**
 * Runs the record's own request again (same method, same digits) and compares outcome, integers, coefficients,
 * expression, agreement, surplus, held-out digits, norm bound, verdict and evidence. Throws InputError for something
 * that is not a record of this format.
 */
export async function checkRecord(record: unknown, options: SearchOptions = {}): Promise<CheckResult> {
  const given = asRecord(record);
  const request: SearchRequest = { ...given.request, method: given.engine.method };
  const again = await runSearch(request, options);
  const findings = compared(given, again);
  return { ok: findings.every((f) => f.ok), findings };
}

function asRecord(value: unknown): SearchRecord {
  const fail = (why: string): never => {
    throw new InputError('not-a-record', `This is not a search record: ${why}.`);
  };
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return fail('it is not a JSON object');
  const record = value as Partial<SearchRecord>;
  if (record.format !== 'digit-assay/record') return fail('its format field is not “digit-assay/record”');
  if (record.version !== 1) return fail(`version ${String(record.version)} is not known here`);
  if (typeof record.request !== 'object' || record.request === null) return fail('it carries no request');
  if (!OUTCOMES.includes(record.outcome as OutcomeKind)) return fail('its outcome is none of the known ones');
  if (record.engine?.method !== 'pslq' && record.engine?.method !== 'lattice') return fail('it names no method');
  const shape = emptyRecord(record.request as SearchRequest, 'pslq');
  const missing = Object.keys(shape).filter((key) => !(key in record));
  if (missing.length > 0) return fail(`it lacks ${missing.join(', ')}`);
  return record as SearchRecord;
}

/** What is compared, in the words of the report. Timings and the engine's version may differ. */
const COMPARED: readonly (readonly [string, (r: SearchRecord) => unknown])[] = [
  ['outcome', (r) => r.outcome],
  ['integer relation', (r) => r.integers],
  ['coefficients', (r) => r.relation],
  ['expression', (r) => r.expression],
  ['agreement', (r) => r.agreementDigits],
  ['surplus', (r) => r.surplusDigits],
  ['held-out digits', (r) => r.heldOut],
  ['norm bound', (r) => r.normBound],
  ['verdict', (r) => r.verdict],
  ['diagnosis', (r) => r.diagnosis],
  ['evidence', (r) => r.evidence],
];

function compared(given: SearchRecord, again: SearchRecord): Finding[] {
  return COMPARED.map(([what, pick]) => {
    const stated = JSON.stringify(plain(pick(given)));
    const found = JSON.stringify(plain(pick(again)));
    const ok = stated === found;
    return {
      what,
      ok,
      detail: ok ? shorten(found) : `the record says ${shorten(stated)}, recomputed: ${shorten(found)}`,
    };
  });
}

/** As after a trip through JSON, with keys in order. */
function plain(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(plain);
  if (typeof value === 'number' && !Number.isFinite(value)) return null;
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).filter(([, v]) => v !== undefined);
  return Object.fromEntries(entries.sort(([a], [b]) => (a < b ? -1 : 1)).map(([k, v]) => [k, plain(v)]));
}

function shorten(text: string | undefined): string {
  if (text === undefined) return 'nothing';
  return text.length <= 120 ? text : `${text.slice(0, 117)}…`;
}
