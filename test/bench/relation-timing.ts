/** How the relation benchmark times one case: in this process, in a fresh one, in a browser worker, and by PARI/GP. */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import type { Page } from '@playwright/test';
import { startLattice } from '../../src/relation/lattice/index.ts';
import type { Case } from './relation-cases.ts';

const CHROMIUM = process.env.CHROMIUM_PATH ?? '/usr/bin/chromium';
const CHROMIUM_ARGUMENTS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

/** Milliseconds. */
export interface Timing {
  /** Median processor time of all threads; NaN where it cannot be had. */
  readonly cpu: number;
  readonly median: number;
  readonly best: number;
  readonly longestStep: number;
  readonly found: boolean;
}

export interface Once {
  readonly milliseconds: number;
  readonly cpu: number;
  readonly longestStep: number;
  readonly candidate: readonly bigint[] | null;
}

export interface Browser {
  time(item: Case): Promise<Timing>;
  close(): Promise<void>;
}

export function median(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[values.length >> 1] ?? Number.NaN;
}

export function isExpected({ expected }: Case, candidate: readonly bigint[] | null | undefined): boolean {
  if (!candidate) return false;
  const { relation, first } = expected;
  if (relation === undefined) return candidate[0] === first || -(candidate[0] as bigint) === first;
  // Proportional: the planted one may have a content.
  const at = candidate.findIndex((c) => c !== 0n);
  const [p, q] = [relation[at] as bigint, candidate[at] as bigint];
  return p !== 0n && relation.every((c, i) => c * q === (candidate[i] as bigint) * p);
}

function runsFor(item: Case): number {
  return item.n < 40 ? 41 : item.n < 70 ? 15 : item.n < 110 ? 7 : 3;
}

export function timeOnce(item: Case): Once {
  const integers = item.integers.map((x) => [x]);
  const cpuBefore = process.cpuUsage();
  const begin = performance.now();
  const run = startLattice({ integers });
  let longestStep = 0;
  for (;;) {
    const before = performance.now();
    const result = run.step();
    longestStep = Math.max(longestStep, performance.now() - before);
    if (result === undefined) continue;
    const milliseconds = performance.now() - begin;
    const { user, system } = process.cpuUsage(cpuBefore);
    return { milliseconds, cpu: (user + system) / 1000, longestStep, candidate: result.candidate };
  }
}

export function timeInNode(item: Case): Timing {
  const all = Array.from({ length: runsFor(item) }, () => timeOnce(item));
  return {
    cpu: median(all.map((once) => once.cpu)),
    median: median(all.map((once) => once.milliseconds)),
    best: Math.min(...all.map((once) => once.milliseconds)),
    longestStep: Math.max(...all.slice(1).map((once) => once.longestStep)),
    found: all.every((once) => isExpected(item, once.candidate)),
  };
}

/** The first call in a process of its own, and the memory that process came to need. */
export function inFreshProcess(
  script: string,
  item: Case,
): { milliseconds: number; megabytes: number; found: boolean } {
  const file = join(mkdtempSync(join(tmpdir(), 'relation-')), 'numbers.txt');
  writeFileSync(file, item.integers.map(hex).join('\n'));
  const child = spawnSync(process.execPath, [script, '--alone', file], { encoding: 'utf8' });
  rmSync(file);
  const { milliseconds, megabytes, candidate } = JSON.parse(child.stdout);
  return { milliseconds, megabytes, found: isExpected(item, candidate?.map(BigInt)) };
}

/** What the fresh process does: times the numbers in the file, and prints JSON. */
export function alone(file: string): void {
  const integers = readFileSync(file, 'utf8')
    .split('\n')
    .map((text) => (text.startsWith('-') ? -BigInt(`0x${text.slice(1)}`) : BigInt(`0x${text}`)));
  const { milliseconds, candidate } = timeOnce({ name: '', integers, expected: {}, n: integers.length, digits: 0 });
  const megabytes = process.resourceUsage().maxRSS / 1024;
  console.log(JSON.stringify({ milliseconds, megabytes, candidate: candidate?.map(String) }));
}

function hex(x: bigint): string {
  return x.toString(16);
}

/** Chromium with one worker that runs the engine as Vite bundles it; undefined, with a note, when Chromium is missing. */
export async function openBrowser(): Promise<Browser | undefined> {
  if (!existsSync(CHROMIUM)) {
    console.log(`Chromium is not at ${CHROMIUM}: its columns are left out`);
    return undefined;
  }
  const code = await bundledWorker();
  const { chromium } = await import('@playwright/test');
  const browser = await chromium.launch({ executablePath: CHROMIUM, args: CHROMIUM_ARGUMENTS });
  // A worker needs an origin: the page and its script come from a server of this process.
  const server = createServer((request, response) => {
    const script = request.url === '/worker.js';
    response.setHeader('content-type', script ? 'text/javascript' : 'text/html');
    response.end(script ? code : '<!doctype html><title>bench</title>');
  });
  await new Promise<void>((ready) => server.listen(0, '127.0.0.1', ready));
  const page = await browser.newPage();
  page.setDefaultTimeout(600_000);
  await page.goto(`http://127.0.0.1:${(server.address() as AddressInfo).port}/`);
  await page.evaluate(() => {
    (globalThis as unknown as { bench: Worker }).bench = new Worker('/worker.js', { type: 'module' });
  });
  return {
    time: (item) => timeInPage(page, item),
    async close() {
      await browser.close();
      server.close();
    },
  };
}

async function bundledWorker(): Promise<string> {
  const { build } = await import('vite');
  const built = await build({
    configFile: false,
    logLevel: 'error',
    build: {
      write: false,
      target: 'es2023',
      lib: { entry: resolve('test/bench/relation-worker.ts'), formats: ['es'], fileName: 'worker' },
    },
  });
  const bundle = (Array.isArray(built) ? built[0] : built) as { output: { code: string }[] };
  return bundle.output[0]?.code as string;
}

async function timeInPage(page: Page, item: Case): Promise<Timing> {
  const { milliseconds, longestStep, candidate } = await page.evaluate(
    (question) =>
      new Promise<{ milliseconds: number[]; longestStep: number; candidate?: string[] }>((settle, fail) => {
        const { bench } = globalThis as unknown as { bench: Worker };
        bench.onmessage = (event) => settle(event.data);
        bench.onerror = (event) => fail(new Error(event.message));
        bench.postMessage(question);
      }),
    { numbers: item.integers.map(hex), runs: runsFor(item) },
  );
  return {
    cpu: Number.NaN,
    median: median(milliseconds),
    best: Math.min(...milliseconds),
    longestStep,
    found: isExpected(item, candidate?.map(BigInt)),
  };
}

export function hasPari(): boolean {
  return spawnSync('gp', ['--version']).status === 0;
}

/** Median milliseconds of processor time of lindep on the same numbers as t_REAL of the case's digits. */
export function timeInPari(item: Case): { readonly cpu: number; readonly found: boolean } {
  const runs = item.n < 40 ? 15 : item.n < 60 ? 5 : 1;
  // gettime resolves a millisecond: small cases are repeated inside one measurement.
  const inner = item.n < 15 ? 50 : item.n < 25 ? 10 : 1;
  const scale = item.integers.reduce((top, x) => Math.max(top, x.toString().length), 0);
  // Left to choose its accuracy itself, lindep takes too little for these and answers wrong: it is told all the digits.
  const script = [
    'default(parisizemax, "2G");',
    `default(realprecision, ${item.digits});`,
    `v = [${item.integers.join(',')}] / (10^${scale} * 1.);`,
    `for(k = 1, ${runs}, gettime(); for(j = 1, ${inner}, c = lindep(v, ${item.digits})); print(gettime() / ${inner}.));`,
    'print(Vec(c))',
  ].join('\n');
  const run = spawnSync('gp', ['-q', '-f'], { input: script, encoding: 'utf8', maxBuffer: 1 << 26 });
  const lines = run.stdout.split('\n').filter((text) => text.trim() !== '');
  const candidate = (lines.pop() ?? '').match(/-?\d+/g)?.map(BigInt);
  if (lines.length === 0) console.error(run.stderr.slice(0, 300));
  return { cpu: median(lines.map(Number)), found: isExpected(item, candidate) };
}
