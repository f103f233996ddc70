// What every command of the project shares: install on a fresh clone, compile the kernels, run a step and report it.
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, statSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

export const root = fileURLToPath(new URL('..', import.meta.url));

/** Runs a command in the project's root with its output shown; returns its exit status. */
export function run(command, args, options = {}) {
  const done = spawnSync(command, args, { cwd: root, stdio: 'inherit', ...options });
  if (done.error) console.error(`${command}: ${done.error.message}`);
  return done.status ?? 1;
}

/** Runs a command and ends the process with its status when it fails. */
export function must(command, args, options) {
  const status = run(command, args, options);
  if (status !== 0) process.exit(status);
}

/** npm ci, when there is no installation or the lock file is newer than it. */
export function install() {
  const marker = `${root}node_modules/.package-lock.json`;
  const lock = `${root}package-lock.json`;
  if (existsSync(marker) && statSync(marker).mtimeMs >= statSync(lock).mtimeMs) return;
  console.log('Installing the pinned packages (npm ci) …');
  must('npm', ['ci', '--no-fund', '--no-audit']);
}

/** The WebAssembly kernels of the relation engine, from their source in the repository. */
export function compileKernels() {
  must(process.execPath, ['.ci/kernels.mjs']);
}

/** Debian's Chromium for the browser tests; installed with apt where that is possible. */
export function chromium() {
  const path = process.env.CHROMIUM_PATH ?? '/usr/bin/chromium';
  if (existsSync(path)) return path;
  console.log('Installing Chromium with apt for the browser tests …');
  if (run('apt-get', ['update', '-qq']) !== 0 || run('apt-get', ['install', '-y', '-qq', 'chromium']) !== 0) {
    console.error(`Browser tests need Chromium at ${path}; install it or set CHROMIUM_PATH.`);
  }
  return path;
}

export function readJson(path) {
  try {
    return JSON.parse(readFileSync(`${root}${path}`, 'utf8'));
  } catch {
    return undefined;
  }
}
