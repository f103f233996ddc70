// npm run build [app|cli]: the app into dist/app and the headless command into dist/cli.js; one of them when named.
import { chmodSync } from 'node:fs';
import { compileKernels, install, root } from './steps.mjs';

install();
compileKernels();
const { build } = await import('vite');
const only = process.argv[2];
if (only !== 'cli') await build({ configFile: `${root}vite.config.ts`, logLevel: 'warn' });
if (only !== 'app') {
  await build({
    configFile: false,
    root,
    logLevel: 'warn',
    publicDir: false,
    ssr: { noExternal: ['decimal.js', 'valibot'] },
    build: {
      ssr: true,
      outDir: 'dist',
      emptyOutDir: false,
      target: 'node20',
      rollupOptions: {
        input: { cli: 'src/cli/main.ts', 'engine-thread': 'src/worker/node.ts' },
        output: { entryFileNames: '[name].js', chunkFileNames: 'chunks/[name]-[hash].js', format: 'es' },
      },
    },
  });
  chmodSync(`${root}dist/cli.js`, 0o755);
}
console.log(`Built ${only === undefined ? 'dist/app and dist/cli.js' : only}`);
