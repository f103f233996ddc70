import { spawnSync } from 'node:child_process';
import { copyFileSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';

/** Each row: a folder of src/ and an import that its place in the order of dependencies forbids. Common practice: a rule is proved by a planted violation. */
const forbidden: readonly (readonly [string, string])[] = [
  ['number', '../constants/term.ts'],
  ['constants', '../expression/parse.ts'],
  ['spaces', '../search/run.ts'],
  ['expression', '../relation/relation.ts'],
  ['relation', '../constants/term.ts'],
  ['evidence', '../search/run.ts'],
  ['series', '../search/run.ts'],
  ['search', '../worker/messages.ts'],
  ['project', '../cli/main.ts'],
  ['worker', '../cli/main.ts'],
  ['search', '../../app/main.tsx'],
  ['relation', 'react'],
  ['relation', 'node:fs'],
];

/** Plants one source file a row in a scratch tree under the project's own lint rules; returns the paths that the import rule refused. */
function refused(rows: readonly (readonly [string, string])[]): Set<string> {
  const scratch = mkdtempSync(join(tmpdir(), 'layers-'));
  try {
    copyFileSync('.biome.json', join(scratch, '.biome.json'));
    rows.forEach(([folder, target], index) => {
      mkdirSync(join(scratch, 'src', folder), { recursive: true });
      const source = `import { x } from '${target}';\n\nexport const y = x;\n`;
      writeFileSync(join(scratch, 'src', folder, `planted${index}.ts`), source);
    });
    const biome = join(process.cwd(), 'node_modules', '.bin', 'biome');
    const args = ['lint', '--config-path=.biome.json', '--reporter=json', '--max-diagnostics=none', 'src'];
    const done = spawnSync(biome, args, { cwd: scratch, encoding: 'utf8' });
    const report: { diagnostics: { category: string; location: { path: string | { file: string } } }[] } = JSON.parse(
      done.stdout,
    );
    const hits = report.diagnostics.filter((d) => d.category === 'lint/style/noRestrictedImports');
    return new Set(hits.map((d) => (typeof d.location.path === 'string' ? d.location.path : d.location.path.file)));
  } finally {
    rmSync(scratch, { recursive: true });
  }
}

describe('dependencies point one way', () => {
  it('every planted violation is refused', () => {
    const hits = refused(forbidden);
    for (const [index, [folder, target]] of forbidden.entries()) {
      expect(hits, `src/${folder} importing ${target}`).toContain(`src/${folder}/planted${index}.ts`);
    }
  });

  it('an allowed import passes', () => {
    expect(refused([['constants', '../number/ball.ts']]).size).toBe(0);
  });

  it('src/ compiles without the DOM', () => {
    const done = spawnSync('npx', ['tsc', '-p', 'src/tsconfig.json', '--showConfig'], { encoding: 'utf8' });
    expect(JSON.parse(done.stdout).compilerOptions.lib).toEqual(['es2023']);
  });
});
