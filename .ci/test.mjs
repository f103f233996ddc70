// npm test: install, then every test (unit and browser). The last line counts them: "N passed, N failed".
import { mkdirSync, rmSync } from 'node:fs';
import { chromium, compileKernels, install, must, readJson, root, run } from './steps.mjs';

install();
compileKernels();
rmSync(`${root}test-results`, { recursive: true, force: true });
mkdirSync(`${root}test-results`, { recursive: true });
const browserPath = chromium();
must(process.execPath, ['.ci/build.mjs']);

const unitStatus = run('npx', [
  'vitest',
  'run',
  '--reporter=default',
  '--reporter=json',
  '--outputFile.json=test-results/unit.json',
]);
const browserStatus = run('npx', ['playwright', 'test', '-c', 'test/browser/playwright.config.ts'], {
  env: { ...process.env, CHROMIUM_PATH: browserPath },
});

const unit = readJson('test-results/unit.json');
const browser = readJson('test-results/browser.json');
const passed = (unit?.numPassedTests ?? 0) + (browser?.stats?.expected ?? 0);
const failed = (unit?.numFailedTests ?? 0) + (browser?.stats?.unexpected ?? 0) + (browser?.stats?.flaky ?? 0);
if (unit === undefined) console.error('The unit tests left no report.');
if (browser === undefined) console.error('The browser tests left no report.');
console.log(`${passed} passed, ${failed} failed`);
process.exitCode = unitStatus === 0 && browserStatus === 0 && unit && browser && failed === 0 ? 0 : 1;
