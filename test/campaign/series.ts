/**
 * Campaign of series and intake: node .ci/run-ts.mjs test/campaign/series.ts [--count 200] [--texts 50000] [--seed N]
 *
 * Random products of factors are expanded here and by PARI/GP (left out with a note where `gp` is absent); generated texts come
 * back to their digits, spoilt ones are refused.
 */
import { spawnSync } from 'node:child_process';
import { parseTerm } from '../../src/expression/parse.ts';
import { accuracy, type Ball, overlaps, widen } from '../../src/number/ball.ts';
import { exactBall, parseDecimal } from '../../src/number/decimal.ts';
import { expandTerm } from '../../src/series/expand.ts';
import { spoiltTexts, validTexts } from '../intake/properties.ts';

function option(name: string, fallback: number): number {
  const at = process.argv.indexOf(`--${name}`);
  return at < 0 ? fallback : Number(process.argv[at + 1]);
}

const seed = option('seed', Date.now() % 1_000_000);
const count = option('count', 200);
const texts = option('texts', 50_000);
console.log(`series campaign: seed ${seed}, ${count} factors, ${texts} texts`);

let state = seed >>> 0;
/** Mulberry32: an integer from 0 to n − 1. */
function pick(n: number): number {
  state = (state + 0x6d2b79f5) >>> 0;
  let t = state;
  t = Math.imul(t ^ (t >>> 15), t | 1);
  t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
  return ((t ^ (t >>> 14)) >>> 0) % n;
}

function factor(): string {
  const a = [1, -1, 2, -2, 3, -3][pick(6)] as number;
  const power = ['', '^2', '^3', '^(-1)', '^(-2)'][pick(5)] as string;
  const start = ['1', '2', '0', '-1', '-3', '1/2', '-3/2', '5/2', '1/3', '3/4'][pick(10)] as string;
  const kinds = [
    `Gamma(${start}+(${a})*x)${power}`,
    `exp(${a}*x*euler_gamma)`,
    `(${pick(4) + 1}+(${a})*x)${power}`,
    `${pick(5) + 2}^(${a}*x)`,
    `pi^(${a}*x)`,
    `sqrt(${pick(4) + 1}+(${a})*x)`,
    `cos(${a}*pi*x)`,
  ];
  return kinds[pick(kinds.length)] as string;
}

const TERMS = 6;
const expressions = Array.from({ length: count }, () => Array.from({ length: 1 + pick(4) }, factor).join('*'));
const failures: string[] = [];

function pari(list: readonly string[]): string[] | undefined {
  const translate = (t: string): string =>
    t
      .replace(/euler_gamma/g, 'Euler')
      .replace(/pi/g, 'Pi')
      .replace(/Gamma/g, 'gamma');
  const lines = list.map(
    (t) =>
      `iferr(s=${translate(t)}+O(x^18);v=valuation(s,x);L=vector(${TERMS},k,1.*polcoef(s,v+k-1));print(v);for(k=1,${TERMS},print(L[k])),E,for(k=0,${TERMS},print("error")))`,
  );
  const input = `default(realprecision,120);default(seriesprecision,24);default(format,"e.60");\n${lines.join('\n')}\n`;
  const run = spawnSync('gp', ['-q'], { input, encoding: 'utf8', maxBuffer: 1 << 28 });
  return run.error === undefined ? run.stdout.trim().split('\n') : undefined;
}

const printed = pari(expressions);
if (printed === undefined) console.log('PARI/GP is not installed: its comparison is left out');
else {
  let compared = 0;
  let leftOut = 0;
  expressions.forEach((text, n) => {
    const lines = printed.slice(n * (TERMS + 1), (n + 1) * (TERMS + 1));
    if (lines[0] === 'error') {
      leftOut += 1;
      return;
    }
    const s = expandTerm(parseTerm(text), 'x', TERMS, 300);
    if (s.low !== Number(lines[0])) failures.push(`${text}: order ${s.low}, PARI/GP ${lines[0]}`);
    s.coefficients.forEach((c, k) => {
      const d = parseDecimal((lines[k + 1] ?? '').replace(/ E/, 'E'));
      const outside = exactBall(d, 400);
      // 60 digits printed; where the coefficient is zero PARI/GP prints an error of about 10^−100
      const places = exactBall({ ...d, coefficient: 1n, exponent: Math.max(d.exponent + 1, -100) }, 400).mid + 2n;
      compared += 1;
      if (!overlaps(c as Ball, widen(outside, places))) failures.push(`${text}: order ${s.low + k}`);
      if (accuracy(c as Ball) < 300) failures.push(`${text}: accuracy`);
    });
  });
  console.log(
    `${expressions.length} factors, ${compared} coefficients compared with PARI/GP, which refused ${leftOut} factors`,
  );
}

for (const [name, run] of [
  ['valid texts', () => validTexts(texts, seed)],
  ['spoilt texts', () => spoiltTexts(texts, seed)],
] as const) {
  try {
    run();
    console.log(`${texts} ${name}: as they must be`);
  } catch (error) {
    failures.push(`${name}: ${(error as Error).message}`);
  }
}
for (const failure of failures) console.log(`FAILED: ${failure}`);
console.log(failures.length === 0 ? 'all as it must be' : `${failures.length} failures`);
process.exit(failures.length === 0 ? 0 : 1);
