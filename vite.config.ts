import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  root: 'app',
  publicDir: '../public',
  base: './',
  plugins: [react()],
  worker: { format: 'es' },
  build: { outDir: '../dist/app', emptyOutDir: true, target: 'es2023' },
  preview: { host: '127.0.0.1', port: 4173 },
  test: {
    root: '.',
    include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
    exclude: ['test/browser/**', 'test/campaign/**', 'test/bench/**'],
    testTimeout: 60_000,
    pool: 'threads',
    env: { TZ: 'UTC' },
  },
});
