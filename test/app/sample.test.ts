import { describe, expect, it } from 'vitest';
import { readEntry } from '../../app/bench/reading.ts';
import { raisePowers } from '../../app/parts/powers.ts';
import { sampleProject } from '../../app/state/sample.ts';
import { requestOf } from '../../app/state/search.ts';
import { runSearch } from '../../src/search/run.ts';

const values = sampleProject().values;
const value = (id: string) => {
  const found = values.find((v) => v.id === id);
  if (found === undefined) throw new Error(`no value ${id}`);
  return found;
};

describe('the project of a first visit', () => {
  it('can be read as it stands', () => {
    for (const v of values) expect(readEntry(v).kind).toBe('value');
  });
  it('holds one relation', async () => {
    expect(await runSearch(requestOf(value('heron')))).toMatchObject({ outcome: 'relation', verdict: 'holds' });
  });
  it('holds one negative', async () => {
    expect(await runSearch(requestOf(value('plover')))).toMatchObject({ outcome: 'excluded' });
  });
  it('holds one wrong tail', async () => {
    const record = await runSearch(requestOf(value('dunlin')));
    expect(record.verdict).toBe('holds');
    expect(record.diagnosis.join()).toMatch(/digits from 118 on look wrong/);
  });
});

describe('powers in sentences', () => {
  it('are raised', () => {
    expect(raisePowers('once in 10^112.9 searches')).toBe('once in 10¹¹² searches');
    expect(raisePowers('2^2·3^-10')).toBe('2²·3⁻¹⁰');
    expect(raisePowers('below 1.5e9, provided')).toBe('below 1.5 × 10⁹, provided');
    expect(raisePowers('pi^2')).toBe('pi^2');
  });
});
