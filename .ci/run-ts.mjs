// Bundles one TypeScript file for Node and runs it: node .ci/run-ts.mjs FILE.ts [arguments…]
import { spawnSync } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { basename, join, resolve } from 'node:path';
import { build } from 'vite';

const [file, ...rest] = process.argv.slice(2);
if (file === undefined) {
  console.error('usage: node .ci/run-ts.mjs FILE.ts [arguments…]');
  process.exit(2);
}
const name = `${basename(file, '.ts')}-${process.pid}`;
const outDir = resolve('node_modules/.cache/run-ts', name);
mkdirSync(outDir, { recursive: true });
await build({
  configFile: false,
  logLevel: 'warn',
  build: {
    ssr: resolve(file),
    outDir,
    target: 'node20',
    emptyOutDir: true,
    minify: false,
    rollupOptions: { output: { entryFileNames: 'main.mjs', format: 'es' } },
  },
});
const run = spawnSync(process.execPath, ['--max-old-space-size=8192', join(outDir, 'main.mjs'), ...rest], {
  stdio: 'inherit',
});
process.exit(run.status ?? 1);
