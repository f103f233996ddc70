/**
 * Nested sums, hyperlogarithms and integrals against PARI/GP at random arguments and precisions:
 * node .ci/run-ts.mjs test/campaign/sums.ts [seconds = 120] [most digits = 3000] [seed]
 *
 * PARI/GP works with at least 20 digits more; each of our balls must overlap its value widened by ten units of the last digit
 * asked for, and must be as small as promised. Where `gp` is missing nothing is compared, and that is said.
 */
import { spawnSync } from 'node:child_process';
import { evaluateTerm } from '../../src/constants/evaluate.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { type Ball, overlaps } from '../../src/number/ball.ts';
import { toComplex } from '../../src/number/complex.ts';

const seconds = Number(process.argv[2] ?? 120);
const mostDigits = Number(process.argv[3] ?? 3000);
let state = Number(process.argv[4] ?? 20261201);

function random(below: number): number {
  state = (state * 1103515245 + 12345) % 2147483648;
  return Math.floor((state / 2147483648) * below);
}
const pick = <T>(list: readonly T[]): T => list[random(list.length)] as T;

interface Case {
  readonly kind: string;
  readonly ours: string;
  readonly pari: string;
  /** PARI/GP's own method is too slow past this. */
  readonly digits: number;
  /**
   * Share of extra digits PARI/GP works with. At 8th and 12th roots its double tails lose up to half of the working digits
   * (Li_{4,2,1}(1, r12, r12^8) at 259 digits is right to 159, as its own values at higher precision say).
   */
  readonly extra?: number;
}

function nested(): Case {
  const order = pick([1, 2, 3, 4, 6, 8, 12]);
  for (;;) {
    const depth = 1 + random(3);
    const s = Array.from({ length: depth }, () => 1 + random(4));
    const e = s.map(() => random(order));
    if (s[0] === 1 && e[0] === 0) continue;
    const name = order <= 2 ? ['1', '-1'] : order === 4 ? ['1', 'i', '-1', '-i'] : null;
    const z = e.map((k) => (name === null ? `r${order}^${k}` : (name[k] as string)));
    const points = e.map((k) => `exp(2*I*Pi*${k}/${order})`);
    const exact = e.map((k) => (order === 1 || k === 0 ? '1' : '-1'));
    const digits = order <= 2 ? mostDigits : Math.min(mostDigits, 1000);
    return {
      kind: order === 1 ? 'multiple zeta values' : order === 2 ? 'alternating sums' : `sums at ${order}th roots`,
      ours: `MPL(${s};${z})`,
      pari: `polylogmult([${s}],[${order <= 2 ? exact : points}])`,
      digits,
      extra: order >= 8 ? 1.2 : 0,
    };
  }
}

/** H and G with letters that are rational multiples of roots of unity, as nested sums x_j = a_{j−1}/a_j. */
function hyperlogarithm(): Case {
  const harmonic = random(2) === 0;
  const x = harmonic ? `${1 + random(9)}/10` : '1';
  const others = ['2', '-3/2', '5/4', '-1', '3', '-7/2'];
  const letters = Array.from({ length: 1 + random(4) }, () =>
    random(2) === 0 ? '0' : harmonic ? pick(['1', '-1']) : pick(others),
  );
  letters.push(harmonic ? pick(['1', '-1']) : pick(others));
  const s: number[] = [];
  const z: string[] = [];
  let before = x;
  let zeros = 0;
  let negatives = 0;
  for (const letter of letters) {
    if (letter === '0') zeros++;
    else {
      s.push(zeros + 1);
      z.push(`(${before})/(${letter})`);
      before = letter;
      zeros = 0;
      if (!harmonic || letter === '-1') negatives++;
    }
  }
  const sign = negatives % 2 === 1 ? '-' : '';
  return {
    kind: harmonic ? 'harmonic polylogarithms' : 'multiple polylogarithms G',
    ours: `${harmonic ? 'H' : 'G'}(${letters};${x})`,
    pari: `${sign}polylogmult([${s}],[${z}])`,
    digits: Math.min(mostDigits, 500),
  };
}

function binomialSum(): Case {
  const k = 1 + random(6);
  const minus = random(2) === 1;
  return {
    kind: 'inverse central binomial sums',
    ours: `binsum(${minus ? -k : k})`,
    pari: `suminf(n=1,${minus ? '(-1)^n' : '1'}*1./(n^${k}*binomial(2*n,n)))`,
    digits: mostDigits,
  };
}

function integral(): Case {
  if (random(2) === 0) {
    const b = 1 + random(4);
    const a = random(b);
    const k = random(4);
    return {
      kind: 'Bessel moments',
      ours: `bessel(${k},${a},${b})`,
      pari: `intnum(t=[0,-1/2],[oo,${b - a}],if(t==0,0,t^${k}*besseli(0,t)^${a}*besselk(0,t)^${b}))`,
      digits: 40,
    };
  }
  const n = 2 + random(4);
  const k = random(n - 1);
  const angle = pick(['pi/3', '2*pi/3', 'pi/2', 'pi', '5*pi/6', 'pi/4']);
  return {
    kind: 'log-sine integrals',
    ours: `Ls(${n},${k},${angle})`,
    pari: `-intnum(t=[0,-1/2],${angle.replace('pi', 'Pi')},if(t==0,0,t^${k}*log(2*sin(t/2))^${n - 1 - k}))`,
    digits: 40,
  };
}

function pariValues(cases: readonly Case[]): ([string, string] | null)[] {
  const lines = cases.map(
    ({ pari, digits, extra = 0 }, k) =>
      `default(realprecision,${digits + 20 + Math.ceil(extra * digits)});x=${pari};print(${k}," ",Strprintf("%.${digits + 5}f",real(x))," ",Strprintf("%.${digits + 5}f",imag(x)))`,
  );
  const input = `default(parisizemax,4000000000);\n${lines.join('\n')}\n`;
  const run = spawnSync('gp', ['-q', '-f'], { input, encoding: 'utf8', maxBuffer: 1 << 28 });
  if (run.error !== undefined) throw run.error;
  return cases.map((one, k) => {
    const answer = new RegExp(`^${k} (-?\\d+\\.\\d+) (-?\\d+(?:\\.\\d+)?)$`, 'm').exec(run.stdout);
    if (answer === null) console.log(`no answer from PARI/GP to ${one.pari} at ${one.digits} digits`);
    return answer === null ? null : [answer[1] as string, answer[2] as string];
  });
}

/** A decimal text as a ball of ten units of decimal place `digits`. */
function decimal(text: string, digits: number, bits: number): Ball {
  const [whole = '', places = ''] = text.replace('-', '').split('.');
  const scale = 10n ** BigInt(places.length);
  const mid = (BigInt(whole + places) << BigInt(bits)) / scale;
  return { mid: text.startsWith('-') ? -mid : mid, rad: (10n << BigInt(bits)) / 10n ** BigInt(digits) + 1n, bits };
}

if (spawnSync('gp', ['--version']).error !== undefined) {
  console.log('gp is not installed here: nothing was compared');
  process.exit(0);
}
const began = performance.now();
let unanswered = 0;
const tally = new Map<string, { cases: number; digits: number; failures: number }>();
while (performance.now() - began < 1000 * seconds) {
  const cases = [nested, nested, nested, hyperlogarithm, binomialSum, integral].map((make) => {
    const made = make();
    return { ...made, digits: Math.min(made.digits, 30 + random(made.digits)) };
  });
  const values = pariValues(cases);
  cases.forEach((one, k) => {
    const entry = tally.get(one.kind) ?? { cases: 0, digits: 0, failures: 0 };
    tally.set(one.kind, entry);
    const theirs = values[k];
    if (theirs === null || theirs === undefined) {
      unanswered++;
      return;
    }
    const bits = Math.ceil(one.digits * Math.log2(10));
    const { re, im } = toComplex(evaluateTerm(parseTerm(one.ours), bits));
    const good = [re, im].every(
      (part, j) =>
        overlaps(part, decimal(theirs[j] as string, one.digits, bits + 20)) &&
        part.rad << BigInt(bits) <= 1n << BigInt(part.bits),
    );
    entry.cases++;
    entry.digits += one.digits;
    if (good) return;
    entry.failures++;
    console.log(`DIFFERENT ${one.ours} at ${one.digits} digits; PARI/GP: ${one.pari}`);
  });
}
let failures = 0;
if (unanswered > 0) console.log(`${unanswered} values were not answered by PARI/GP`);
for (const [kind, { cases, digits, failures: bad }] of [...tally].sort()) {
  failures += bad;
  console.log(
    `${kind.padEnd(32)} ${String(cases).padStart(5)} values ${String(digits).padStart(8)} digits compared, ${bad} different`,
  );
}
process.exit(failures === 0 ? 0 : 1);
