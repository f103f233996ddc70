/** The built command as a user runs it. */
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';

function run(args: readonly string[], input = ''): { code: number | null; out: string; err: string } {
  const done = spawnSync(process.execPath, ['dist/cli.js', ...args], { input, encoding: 'utf8', maxBuffer: 1 << 26 });
  return { code: done.status, out: done.stdout, err: done.stderr };
}

const { constants } = JSON.parse(readFileSync('test/reference/constants.json', 'utf8')) as {
  constants: { id: string; digits: string }[];
};

describe('digit-assay', () => {
  beforeAll(() => {
    if (!existsSync('dist/cli.js')) throw new Error('dist/cli.js is missing: run npm run build');
  });

  it('search finds the two-loop coefficient and check passes on its record', () => {
    const { problems } = JSON.parse(readFileSync('test/reference/problems-open.json', 'utf8'));
    const { value, basis } = problems.find((p: { id: string }) => p.id === 'qed-two-loop');
    const found = run(['search', '-'], JSON.stringify({ value, basis }));
    expect(found.code).toBe(0);
    const record = JSON.parse(found.out);
    expect(record.expression.text).toBe('197/144 + pi^2/12 + 3*zeta(3)/4 - pi^2*log(2)/2');
    const checked = run(['check', '-'], found.out);
    expect([checked.code, JSON.parse(checked.out).ok]).toEqual([0, true]);
    const spoiled = run(['check', '-'], found.out.replaceAll('197/144', '197/145'));
    expect(spoiled.code).toBe(1);
  });

  it('a negative answer exits 1', () => {
    const found = run(
      ['search', '-'],
      JSON.stringify({ value: '0.57721566490153286060651209008240243104215933593992', basis: ['1', 'pi'] }),
    );
    expect([found.code, JSON.parse(found.out).outcome]).toEqual([1, 'excluded']);
  });

  it('evaluate gives correctly rounded digits (reference tables)', () => {
    for (const id of ['zeta(3)', 'catalan', 'Cl(2,pi/3)']) {
      const digits = constants.find((c) => c.id === id)?.digits as string;
      const got = run(['evaluate', id, '--digits', '1000']);
      expect([got.code, got.out.trim()]).toEqual([0, digits]);
    }
  });

  it('evaluate rounds a complex constant as a whole, a vanishing part to 0', () => {
    // Li_2(i) = −π²/48 + iG (Lewin 1981).
    expect(run(['evaluate', 'Li(2,i)', '--digits', '20']).out.split('\n')).toEqual([
      '-0.20561675835602830456',
      '0.91596559417721901505',
      '',
    ]);
    expect(run(['evaluate', 'i*pi + 0*r6', '--digits', '10']).out.split('\n')).toEqual(['0', '3.141592654', '']);
    expect(run(['evaluate', 'r3 + 1/2', '--digits', '10']).out.split('\n')).toEqual(['0', '0.8660254038', '']);
  });

  it('constants lists families and spaces', () => {
    const all = JSON.parse(run(['constants']).out);
    expect(all.families.length).toBeGreaterThan(5);
    expect(all.spaces.map((s: { key: string }) => s.key)).toContain('alternating');
    expect(run(['constants', '--family', 'nowhere']).code).toBe(2);
  });

  it.each<[string, string[], string]>([
    ['no command', [], ''],
    ['an unknown command', ['recognise'], ''],
    ['a missing file', ['search', '/nowhere/request.json'], ''],
    ['broken JSON', ['search', '-'], '{"value": '],
    ['a value as a JSON number', ['search', '-'], '{"value": 0.5, "basis": ["1"]}'],
    ['an empty value', ['search', '-'], '{"value": "", "basis": ["1"]}'],
    ['two decimal points', ['search', '-'], '{"value": "1.2.3", "basis": ["1"]}'],
    ['NaN', ['search', '-'], '{"value": "NaN", "basis": ["1"]}'],
    ['an unknown constant', ['search', '-'], '{"value": "1.23456789", "basis": ["foo(3)"]}'],
    ['an unknown option', ['search', '--fast'], ''],
    ['a bad expression', ['evaluate', '2*'], ''],
    ['zero digits', ['evaluate', 'pi', '--digits', '0'], ''],
    ['something that is not a record', ['check', '-'], '{}'],
  ])('%s exits 2 with one line and no stack trace', (_, args, input) => {
    const { code, out, err } = run(args, input);
    expect([code, out]).toEqual([2, '']);
    expect(err).toMatch(/^digit-assay: [^\n]+\n$/);
    expect(err).not.toMatch(/internal error| {4}at /);
  });
});
