/**
 * Each family at 100, 1,000 and 5,000 digits against PARI/GP in the same run:
 * node .ci/run-ts.mjs test/bench/catalogue.ts [most digits = 5000] [pattern of names]
 *
 * CPU time on both sides, the least of three batches of at least 100 ms after a warming one; ours includes the collection of garbage on
 * other threads. π, γ and Catalan's constant are kept by PARI/GP once computed, so there it is timed at twenty growing precisions
 * around the one named. A ratio under 1 means faster than PARI/GP.
 */
import { spawnSync } from 'node:child_process';
import { evaluateMany } from '../../src/constants/evaluate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { fromRational } from '../../src/number/ball.ts';
import { exp, log } from '../../src/number/elementary.ts';
import { computePi } from '../../src/number/reduction.ts';

const most = Number(process.argv[2] ?? 5000);
const wanted = process.argv[3] ?? '';

interface Row {
  readonly name: string;
  /** Target of the ratio at 5,000 digits, where there is one. */
  readonly target?: number;
  /** Typed constants evaluated together. */
  readonly ours: readonly string[] | ((bits: number) => unknown);
  readonly pari: string;
  /** PARI/GP keeps the value: time its first call. */
  readonly once?: boolean;
  /** PARI/GP takes minutes beyond. */
  readonly pariDigits?: number;
}

const alternating = ['(-1)', '(-3)', '(-3,1)', '(-3,1,1)', '(-5)'].map((a) => `zeta${a}`);

const rows: readonly Row[] = [
  { name: 'pi', target: 4, ours: (bits) => computePi(bits), pari: 'Pi', once: true },
  { name: 'e', ours: ['e'], pari: 'exp(1)' },
  { name: 'euler_gamma', target: 1, ours: ['euler_gamma'], pari: 'Euler', once: true },
  { name: 'catalan', target: 1, ours: ['catalan'], pari: 'Catalan', once: true },
  { name: 'log(3) (logs of 2, 3, 5, 7 known)', target: 4, ours: ['log(3)'], pari: 'log(3)' },
  { name: 'log(97)', target: 4, ours: ['log(97)'], pari: 'log(97)' },
  { name: 'log of a real', target: 4, ours: (bits) => log(fromRational(10n, 9n, bits), bits), pari: 'log(10/9.)' },
  { name: 'exp of a real', target: 4, ours: (bits) => exp(fromRational(1n, 3n, bits), bits), pari: 'exp(1/3.)' },
  { name: 'sin(1)', ours: ['sin(1)'], pari: 'sin(1)' },
  { name: 'atan(1/5)', ours: ['atan(1/5)'], pari: 'atan(1/5)' },
  { name: 'sqrt(2)', ours: ['sqrt(2)'], pari: 'sqrt(2)' },
  { name: '2^(1/3)', ours: ['2^(1/3)'], pari: '2.^(1/3)' },
  { name: 'agm(1,sqrt(2))', target: 4, ours: ['agm(1,sqrt(2))'], pari: 'agm(1,sqrt(2))' },
  { name: 'K(1/2)', target: 4, ours: ['K(1/2)'], pari: 'ellK(1/2)' },
  { name: 'E(1/2)', target: 4, ours: ['E(1/2)'], pari: 'ellE(1/2)' },
  { name: 'Gamma(1/3)', target: 4, ours: ['Gamma(1/3)'], pari: 'gamma(1/3)' },
  { name: 'Gamma(2/7)', ours: ['Gamma(2/7)'], pari: 'gamma(2/7)' },
  { name: 'zeta(3)', target: 1, ours: ['zeta(3)'], pari: 'zeta(3)' },
  { name: 'zeta(5)', target: 1, ours: ['zeta(5)'], pari: 'zeta(5)' },
  {
    name: 'zeta(3),zeta(5),…,zeta(13)',
    target: 1,
    ours: [3, 5, 7, 9, 11, 13].map((s) => `zeta(${s})`),
    pari: '[zeta(3),zeta(5),zeta(7),zeta(9),zeta(11),zeta(13)]',
  },
  { name: 'beta(4)', target: 1, ours: ['beta(4)'], pari: '(zetahurwitz(4,1/4)-zetahurwitz(4,3/4))/4^4' },
  { name: 'L(-3,2)', target: 1, ours: ['L(-3,2)'], pari: '(zetahurwitz(2,1/3)-zetahurwitz(2,2/3))/9' },
  { name: 'L(12,3)', target: 1, ours: ['L(12,3)'], pari: 'lfun(12,3)', pariDigits: 1000 },
  { name: 'hurwitz(3,1/5)', target: 1, ours: ['hurwitz(3,1/5)'], pari: 'zetahurwitz(3,1/5)' },
  { name: 'polygamma(1,1/3)', target: 1, ours: ['polygamma(1,1/3)'], pari: 'zetahurwitz(2,1/3)' },
  { name: 'polygamma(0,1/5)', ours: ['polygamma(0,1/5)'], pari: 'psi(1/5)' },
  { name: 'Li(5,1/2)', target: 1, ours: ['Li(5,1/2)'], pari: 'polylog(5,1/2)' },
  { name: 'Li(3,2/3)', target: 1, ours: ['Li(3,2/3)'], pari: 'polylog(3,2/3)' },
  { name: 'Li(3,(sqrt(5)-1)/2)', target: 1, ours: ['Li(3,(sqrt(5)-1)/2)'], pari: 'polylog(3,(sqrt(5)-1)/2)' },
  { name: 'Li(3,sqrt(2)/2)', target: 1, ours: ['Li(3,sqrt(2)/2)'], pari: 'polylog(3,sqrt(2)/2)', pariDigits: 1000 },
  { name: 'Li(3,(1+sqrt(-3))/4)', target: 1, ours: ['Li(3,(1+sqrt(-3))/4)'], pari: 'polylog(3,(1+I*sqrt(3))/4)' },
  { name: 'Cl(4,pi/3)', target: 1, ours: ['Cl(4,pi/3)'], pari: 'imag(polylog(4,exp(I*Pi/3)))' },
  { name: 'Cl(2,pi/4)', target: 1, ours: ['Cl(2,pi/4)'], pari: 'imag(polylog(2,exp(I*Pi/4)))' },
  { name: 'Ti(2,1/2)', target: 1, ours: ['Ti(2,1/2)'], pari: 'imag(polylog(2,I/2))' },
  { name: 'zeta(5,3)', target: 0.3, ours: ['zeta(5,3)'], pari: 'zetamult([5,3])' },
  {
    name: 'alternating sums (5 words)',
    target: 0.3,
    ours: alternating,
    pari: '[polylogmult([1],[-1]),polylogmult([3],[-1]),polylogmult([3,1],[-1,1]),polylogmult([3,1,1],[-1,1,1]),polylogmult([5],[-1])]',
  },
  {
    name: 'MPL(3,1,2;r6,r6,1)',
    target: 0.3,
    ours: ['MPL(3,1,2;r6,r6,1)'],
    pari: 'polylogmult([3,1,2],[exp(I*Pi/3),exp(I*Pi/3),1])',
    pariDigits: 1000,
  },
  { name: 'binsum(4)', ours: ['binsum(4)'], pari: 'suminf(n=1,1./(n^4*binomial(2*n,n)))', pariDigits: 1000 },
];

/** CPU milliseconds of this process, all threads. */
function cpu(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** CPU milliseconds of one run: the least of three batches of at least 100 ms, after a warming one. */
function timeOurs(run: () => unknown): number {
  let count = 1;
  let sink = 0;
  const batch = (): number => {
    const from = cpu();
    for (let k = 0; k < count; k++) sink += run() === undefined ? 0 : 1;
    return cpu() - from;
  };
  for (let spent = batch(); spent < 100 && count < 16384; spent = batch()) count *= 2;
  const least = (count === 1 ? batch() : Math.min(batch(), batch(), batch())) / count;
  if (sink === 0) throw new Error('nothing was computed');
  return least;
}

function oursAt(row: Row, bits: number): number {
  if (typeof row.ours === 'function') {
    const { ours } = row;
    return timeOurs(() => ours(bits));
  }
  const terms = row.ours.map(parseTerm);
  return timeOurs(() => evaluateMany(terms, bits));
}

/** One process for all repeated expressions, one for each value that PARI/GP keeps; milliseconds by row and digits. */
function timePari(list: readonly { row: Row; digits: number }[]): (number | null)[] {
  const times: (number | null)[] = list.map(() => null);
  const repeated = list.flatMap(({ row, digits }, j) => {
    if (row.once === true) return [];
    return [
      `default(realprecision,${digits});f()=${row.pari}`,
      `f();{n=1;while(1,gettime();for(i=1,n,f());t=gettime();if(t>=100||n>=65536,break);n*=2);b=t/n;for(k=1,2,gettime();for(i=1,n,f());b=min(b,gettime()/n));print("${j}|",b*1000000\\1)}`,
    ];
  });
  const script = `default(parisizemax,"4G");\n${repeated.join('\n')}\nquit\n`;
  const run = spawnSync('gp', ['-q'], { input: script, encoding: 'utf8', maxBuffer: 1 << 26 });
  if (run.error !== undefined) return times;
  for (const line of run.stdout.split('\n')) {
    const [index = '', nanoseconds = ''] = line.split('|');
    if (/^\d+$/.test(index)) times[Number(index)] = Number(nanoseconds) / 1e6;
  }
  list.forEach(({ row, digits }, j) => {
    if (row.once !== true) return;
    // The precision grows by a word each time, so that the value is computed anew: the mean over twenty around `digits`.
    const first = Math.max(20, digits - 200);
    const once = `default(realprecision,${first});\n{gettime();for(k=1,20,localprec(${first}+20*k);${row.pari});print("${j}|",gettime()*50000)}\nquit\n`;
    const single = spawnSync('gp', ['-q'], { input: once, encoding: 'utf8' });
    times[j] = Number(/\|(\d+)/.exec(single.stdout)?.[1]) / 1e6;
  });
  return times;
}

const sizes = [100, 1000, 5000].filter((d) => d <= most);
const chosen = rows.filter((row) => new RegExp(wanted).test(row.name));
const plan = sizes.flatMap((digits) =>
  chosen.filter((row) => digits <= (row.pariDigits ?? most)).map((row) => ({ row, digits })),
);
const pariTimes = timePari(plan);
const show = (ms: number | null | undefined): string =>
  ms === null || ms === undefined ? '–' : ms < 10 ? ms.toPrecision(2) : ms.toFixed(0);

console.log(
  `${'milliseconds ours / PARI/GP (ratio)'.padEnd(38)}${sizes.map((d) => `${d} digits`.padEnd(26)).join('')}target`,
);
let missed = 0;
for (const row of chosen) {
  let line = row.name.padEnd(38);
  let ratio: number | null = null;
  for (const digits of sizes) {
    const ours = oursAt(row, Math.ceil(digits * Math.log2(10)) + 2);
    const pari = pariTimes[plan.findIndex((one) => one.row === row && one.digits === digits)];
    const known = pari !== null && pari !== undefined && pari > 0;
    if (known) ratio = ours / pari;
    line += `${show(ours)} / ${show(pari)}${known ? ` (${(ours / pari).toPrecision(2)})` : ''}`.padEnd(26);
  }
  const late = row.target !== undefined && ratio !== null && ratio > row.target;
  if (late) missed++;
  console.log(`${line}${row.target === undefined ? '' : `≤ ${row.target}${late ? ' MISSED' : ''}`}`);
}
console.log(`${missed} targets missed at the largest size compared`);
