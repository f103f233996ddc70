/** The batch command as a user runs it, interrupted and split. */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const folder = mkdtempSync(join(tmpdir(), 'batch-'));
const requests = join(folder, 'requests.jsonl');
const lines = [
  '{"value":"1.2020569031595942853997381615114499907649862923405","basis":["zeta(3)"]}',
  '{"value":"abc","basis":["zeta(3)"]}',
  '',
  '{"value":"0.57721566490153286060651209008240243104215933593992","basis":["1","pi"]}',
  '{"value":"1.6449340668482264364724151666460251892189499012068","basis":["pi^2"],"label":"ζ(2)"}',
];

function run(...args: string[]): { code: number | null; out: string; err: string } {
  const done = spawnSync(process.execPath, ['dist/cli.js', 'batch', ...args], { encoding: 'utf8' });
  return { code: done.status, out: done.stdout, err: done.stderr };
}

const answers = (file: string) =>
  readFileSync(file, 'utf8')
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as { line: number; verdict?: string; error?: { code: string } })
    .sort((a, b) => a.line - b.line);

describe('digit-assay batch', () => {
  beforeAll(() => {
    if (!existsSync('dist/cli.js')) throw new Error('dist/cli.js is missing: run npm run build');
    writeFileSync(requests, lines.join('\n'));
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  it('answers every line, refuses to overwrite, and goes on after an interruption', () => {
    const out = join(folder, 'all.jsonl');
    const first = run(requests, '--out', out, '--workers', '2');
    expect([first.code, JSON.parse(first.out)]).toEqual([
      2,
      { requests: 4, earlier: 0, holds: 2, tentative: 0, negative: 1, failed: 1 },
    ]);
    expect(first.err).toMatch(/^digit-assay: 1 of 4 requests have no record; [^\n]*\n$/);
    const whole = answers(out);
    expect(whole.map((a) => [a.line, a.verdict ?? a.error?.code])).toEqual([
      [1, 'holds'],
      [2, 'letter'],
      [4, 'excluded'],
      [5, 'holds'],
    ]);
    expect(run(requests, '--out', out)).toMatchObject({ code: 2, out: '' });
    // Half of the second line was written when the machine went down.
    const written = readFileSync(out, 'utf8').split('\n');
    writeFileSync(out, `${written[0]}\n${(written[1] as string).slice(0, 20)}`);
    expect(JSON.parse(run(requests, '--out', out, '--resume').out)).toMatchObject({ requests: 4, earlier: 1 });
    const strip = (list: typeof whole): unknown[] => list.map((a) => ({ ...a, timings: null }));
    expect(strip(answers(out))).toEqual(strip(whole));
  }, 60_000);

  it('shards share the requests out, and their answers belong to them', () => {
    const files = [1, 2].map((part) => join(folder, `shard${part}.jsonl`));
    for (const [k, file] of files.entries()) run(requests, '--out', file, '--shard', `${k + 1}/2`);
    const got = files.flatMap(answers).map((a) => a.line);
    expect(got.sort()).toEqual([1, 2, 4, 5]);
    const mixed = run(requests, '--out', files[0] as string, '--shard', '2/2', '--resume');
    expect([mixed.code, mixed.err.includes('another request')]).toEqual([2, true]);
  }, 60_000);

  it.each([
    ['no output', [requests]],
    ['a shard beyond the number of shards', [requests, '--out', join(folder, 'x'), '--shard', '3/2']],
    ['no number of workers', [requests, '--out', join(folder, 'x'), '--workers', 'many']],
    ['an output that cannot be written', [requests, '--out', join(folder, 'nowhere', 'x')]],
    ['no such requests', [join(folder, 'none'), '--out', join(folder, 'x')]],
  ])('%s: one line, exit 2', (_, args) => {
    const done = run(...args);
    expect([done.code, done.out]).toEqual([2, '']);
    expect(done.err).toMatch(/^digit-assay: (?!internal)[^\n]+\.\n$/);
  });
});
