import { defineConfig } from '@playwright/test';

/** A port of this run's own, handed on to the test processes, so that two checkouts can be tested side by side. */
process.env.DIGIT_ASSAY_TEST_PORT ??= `${20_000 + (process.pid % 20_000)}`;
const port = Number(process.env.DIGIT_ASSAY_TEST_PORT);

export default defineConfig({
  testDir: '.',
  outputDir: '../../test-results/browser',
  timeout: 60_000,
  workers: 1,
  reporter: [['list'], ['json', { outputFile: '../../test-results/browser.json' }]],
  use: {
    baseURL: `http://127.0.0.1:${port}`,
    viewport: { width: 1440, height: 900 },
    permissions: ['clipboard-read', 'clipboard-write'],
    launchOptions: {
      executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
  webServer: {
    command: `npx vite preview --port ${port} --strictPort`,
    cwd: '../..',
    url: `http://127.0.0.1:${port}`,
    reuseExistingServer: false,
  },
});
