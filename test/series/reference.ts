import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { SeriesText } from '../../src/series/steps.ts';

interface Problem {
  readonly id: string;
  readonly values?: readonly string[];
}

/**
 * A series of problems-open.json (Taylor coefficients computed with PARI/GP), in `ep`. Its 299 digits are cut off and not
 * rounded, so that 298 of them are right to half a unit.
 */
export function referenceSeries(id: string): SeriesText {
  const path = join(import.meta.dirname, '../reference/problems-open.json');
  const { problems } = JSON.parse(readFileSync(path, 'utf8')) as { problems: Problem[] };
  const values = problems.find((p) => p.id === id)?.values;
  if (values === undefined) throw new Error(`no series ${id}`);
  return { variable: 'ep', low: 0, coefficients: values, trustedDigits: values.map(() => 298) };
}
