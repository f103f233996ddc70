import fc from 'fast-check';
import { importText } from '../../src/intake/import.ts';
import { type Sample, samples, spoilt } from './generate.ts';

/** What is wrong with the reading of a sample; empty when all is right. */
function complaint(sample: Sample): string {
  const lines = importText(sample.text);
  const [only] = lines;
  if (lines.length !== 1 || only === undefined) return `read as ${lines.length} lines`;
  if (only.kind === 'refused') return `refused: ${only.reason}`;
  if (only.kind !== sample.kind) return `read as ${only.kind}`;
  if (only.label !== sample.label) return `label ${only.label}`;
  const digits =
    only.kind === 'real'
      ? [only.value]
      : only.kind === 'complex'
        ? [only.value.re, only.value.im]
        : only.value.coefficients.map(String);

  return digits.length === sample.digits.length && digits.every((d, k) => d === sample.digits[k])
    ? ''
    : `digits ${digits.join(' ')}`;
}

/** Valid texts come back to the exact digits. */
export function validTexts(numRuns: number, seed: number): void {
  fc.assert(
    fc.property(samples, (sample) => {
      const wrong = complaint(sample);
      if (wrong !== '') throw new Error(`${JSON.stringify(sample.text)}: ${wrong}`);
    }),
    { numRuns, seed },
  );
}

/** Spoilt texts are refused with line and column. */
export function spoiltTexts(numRuns: number, seed: number): void {
  fc.assert(
    fc.property(spoilt, fc.integer({ min: 0, max: 3 }), ({ text }, above) => {
      const lines = importText(`${'1.5\n'.repeat(above)}${text}`);
      const bad = lines.filter((l) => l.kind === 'refused');
      if (bad.length !== 1) throw new Error(`${JSON.stringify(text)}: read as ${JSON.stringify(lines)}`);
      const [only] = bad;
      if (only?.kind !== 'refused' || only.line !== above + 1 || only.column < 1 || only.column > text.length + 1) {
        throw new Error(`${JSON.stringify(text)}: ${JSON.stringify(only)}`);
      }
    }),
    { numRuns, seed },
  );
}
