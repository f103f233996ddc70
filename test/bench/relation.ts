/**
 * The lattice method against PARI/GP's lindep (a general-purpose library; Debian's pari-gp) on the same numbers, in one run on
 * one core:
 *
 *   npm run bench:relation -- [--full] [--quick] [--seed TEXT]
 *
 * Planted relations (n numbers / coefficients of d digits / D digits), then the degree-120 polynomial of a bifurcation point of
 * the logistic map from 10,000 digits, then the growth in n and in D as fitted exponents. PARI is left out where it
 * would take more than a minute unless --full is given; --quick leaves out PARI above n = 51 and the growth.
 */
import { spawnSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { cpus } from 'node:os';
import { fileURLToPath } from 'node:url';
import { type Random, randomFrom } from '../support/random.ts';
import { bifurcationCase, type Case, plantedCase } from './relation-cases.ts';
import {
  alone,
  type Browser,
  hasPari,
  inFreshProcess,
  isExpected,
  median,
  openBrowser,
  timeInNode,
  timeInPari,
  timeOnce,
} from './relation-timing.ts';

const ROWS: readonly (readonly [number, number, number])[] = [
  [11, 4, 60],
  [21, 5, 130],
  [33, 6, 250],
  [51, 8, 480],
  [65, 10, 800],
  [81, 12, 1200],
  [100, 20, 2300],
  [121, 25, 3400],
];
/** Above this n PARI takes more than a minute. */
const PARI_UP_TO = 100;
const BIFURCATION_DIGITS = 10_000;

const HEAD = 'n/d/D|first|cpu|median|best|step|Chromium|best|step|/Node|PARI cpu|cpu/PARI|MB|found'.split('|');
const WIDTHS = [12, 6, 7, 7, 7, 5, 9, 7, 5, 6, 9, 9, 4, 6];

const argument = (name: string): string | undefined => {
  const at = process.argv.indexOf(name);
  return at < 0 ? undefined : (process.argv[at + 1] ?? '');
};
const full = process.argv.includes('--full');
const quick = process.argv.includes('--quick');

if (process.argv.includes('--alone')) alone(argument('--alone') as string);
else await main();

async function main(): Promise<void> {
  // Every process started from here on inherits the affinity.
  const pinned = spawnSync('taskset', ['-cp', '0', String(process.pid)]).status === 0;
  const seed = argument('--seed') ?? randomBytes(16).toString('hex');
  const random = randomFrom(seed);
  const machine = cpus()[0]?.model ?? 'unknown processor';
  console.log(`seed ${seed}; ${machine}, Node ${process.version}, ${pinned ? 'one core' : 'cores not restricted'}`);
  const pari = hasPari();
  if (!pari) console.log('PARI/GP is not installed: its columns are left out (Debian: apt install pari-gp)');
  const browser = await openBrowser();
  console.log(
    [
      'Milliseconds. first: one call in a fresh process, which came to need MB of memory in all. cpu: median processor time of all',
      'threads of Node, warm; median, best: wall clock; step: the longest step. /Node: best to best. PARI: lindep, processor time.',
      line(HEAD),
    ].join('\n'),
  );
  for (const [n, d, D] of ROWS) await row(plantedCase(random, n, d, D), browser, pari);
  await row(bifurcationCase(BIFURCATION_DIGITS), browser, pari);
  await browser?.close();
  if (!quick) growth(random);
}

async function row(item: Case, browser: Browser | undefined, hasGp: boolean): Promise<void> {
  const fresh = inFreshProcess(fileURLToPath(import.meta.url), item);
  const node = timeInNode(item);
  const chromium = await browser?.time(item);
  const pari = hasGp && (full || (item.n <= PARI_UP_TO && !(quick && item.n > 51))) ? timeInPari(item) : undefined;
  const found = [fresh, node, chromium, pari].every((one) => one?.found ?? true);
  console.log(
    line([
      item.name,
      show(fresh.milliseconds),
      ...[node.cpu, node.median, node.best, node.longestStep].map(show),
      ...[chromium?.median, chromium?.best, chromium?.longestStep].map(show),
      chromium === undefined ? '-' : (chromium.best / node.best).toFixed(2),
      show(pari?.cpu),
      pari === undefined ? '-' : ratio(node.cpu / pari.cpu),
      fresh.megabytes.toFixed(0),
      found ? 'yes' : 'NO',
    ]),
  );
}

function line(cells: readonly string[]): string {
  return cells.map((cell, i) => cell.padStart(WIDTHS[i] as number)).join(' ');
}

function show(milliseconds: number | undefined): string {
  if (milliseconds === undefined) return '-';
  return milliseconds < 100 ? milliseconds.toFixed(1) : milliseconds.toFixed(0);
}

function ratio(value: number): string {
  return value >= 1 ? value.toFixed(2) : `1/${(1 / value).toFixed(value > 0.1 ? 1 : 0)}`;
}

/** Exponents of least-squares lines through log time, along n at fixed D and along D at fixed n. */
function growth(random: Random): void {
  const along = (points: readonly (readonly [number, number])[]): (readonly [number, number, number])[] =>
    points.map(([n, digits]) => {
      const item = plantedCase(random, n, Math.floor((0.9 * digits) / n - n * Math.log10(1.02)), digits);
      const all = Array.from({ length: 5 }, () => timeOnce(item));
      if (!all.every((once) => isExpected(item, once.candidate))) console.log(`${item.name}: NOT FOUND`);
      return [n, digits, median(all.map((once) => once.cpu))];
    });
  const report = (name: string, axis: 0 | 1, rows: readonly (readonly [number, number, number])[]): void => {
    const points = rows.map((one) => `${one[axis]}: ${show(one[2])}`).join(', ');
    const exponent = slope(rows.map((one) => [Math.log(one[axis]), Math.log(one[2])]));
    console.log(
      `growth with coefficients as large as the digits allow, ${name}^${exponent.toFixed(2)} (ms at ${points})`,
    );
  };
  report('D = 1500: time ~ n', 0, along([30, 40, 60, 80, 100].map((n) => [n, 1500])));
  report('n = 50: time ~ D', 1, along([500, 1000, 2000, 4000, 8000].map((digits) => [50, digits])));
}

function slope(points: readonly (readonly [number, number])[]): number {
  const mean = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0) / values.length;
  const [mx, my] = [mean(points.map(([x]) => x)), mean(points.map(([, y]) => y))];
  const top = points.reduce((sum, [x, y]) => sum + (x - mx) * (y - my), 0);
  return top / points.reduce((sum, [x]) => sum + (x - mx) ** 2, 0);
}
