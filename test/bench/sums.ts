/**
 * Times of nested sums, and their ratio to PARI/GP in the same run where `gp` is installed:
 * node .ci/run-ts.mjs test/bench/sums.ts [digits…] [part of a row's name…]
 */
import { spawnSync } from 'node:child_process';
import type { EvaluationContext } from '../../src/constants/family.ts';
import { sumFamilies } from '../../src/constants/sums/index.ts';
import type { Term } from '../../src/constants/term.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { spaceOf } from '../../src/spaces/registry.ts';

const context: EvaluationContext = {
  argument: () => {
    throw new Error('no argument is evaluated here');
  },
};

interface Row {
  readonly name: string;
  readonly texts: readonly string[];
  /** PARI/GP code that computes the same; w = e^{iπ/3}. */
  readonly pari: string;
}

/** The generators of a space as nested sums of the same weight. */
const sumWords = (key: string): string[] =>
  spaceOf(key)
    .generators.map((g) => /^(?:re|im)\((MPL\(.*\))\)$/.exec(g.text)?.[1] ?? g.text)
    .map((text) =>
      text
        .replace(/^log\(2\)$/, 'zeta(-1)')
        .replace(/^zeta\((\d+)\)$/, 'zeta(-$1)')
        .replace(/^Li\(4,1\/2\)$/, 'zeta(-3,1)')
        .replace(/^Li\(5,1\/2\)$/, 'zeta(-3,1,1)')
        .replace(/^Li\(6,1\/2\)$/, 'zeta(-3,1,1,1)')
        .replace(/^Li\(7,1\/2\)$/, 'zeta(-3,1,1,1,1)')
        .replace(/^Li\(8,1\/2\)$/, 'zeta(-3,1,1,1,1,1)'),
    )
    .filter((text) => /^(zeta|MPL)/.test(text));

const asPari = (text: string): string => {
  const zeta = /^zeta\((.*)\)$/.exec(text);
  if (zeta !== null) {
    const s = (zeta[1] as string).split(',').map(Number);
    return `polylogmult([${s.map(Math.abs)}],[${s.map((x) => Math.sign(x))}])`;
  }
  const [, s, z] = /^MPL\((.*);(.*)\)$/.exec(text) as unknown as [string, string, string];
  const points = z
    .replaceAll('r12', 'exp(I*Pi/6)')
    .replaceAll('r8', 'exp(I*Pi/4)')
    .replaceAll('r3', 'w^2')
    .replaceAll('r6', 'w')
    .replaceAll(/\bi\b/g, 'I');
  return `polylogmult([${s}],[${points}])`;
};

const one = (text: string, pari = asPari(text)): Row => ({ name: text, texts: [text], pari });
const many = (name: string, texts: readonly string[]): Row => ({
  name: `${name} (${texts.length} words)`,
  texts,
  pari: texts.map(asPari).join(';'),
});

const rows: readonly Row[] = [
  one('zeta(5,3)', 'zetamult([5,3])'),
  one('zeta(6,4,1,1)', 'zetamult([6,4,1,1])'),
  one('zeta(-5,-3)'),
  one('zeta(-5,1,1)'),
  one('MPL(3,1,2;r6,r6,1)'),
  one('MPL(3,1;i,1)'),
  one('MPL(2,1;r8,1)'),
  one('MPL(2,1;r12,1)'),
  one('binsum(4)', 'suminf(n=1,1./(n^4*binomial(2*n,n)))'),
  many('alternating generators to weight 8', sumWords('alternating')),
  many('4th-root generators to weight 6', sumWords('fourth-roots')),
  many('6th-root unramified generators to weight 8', sumWords('sixth-roots-unramified')),
];

/** Best of up to 20 runs, at least 2. */
function ours(texts: readonly string[], bits: number): number {
  const groups = new Map<(typeof sumFamilies)[number], unknown[]>();
  for (const text of texts) {
    const term = parseTerm(text) as Extract<Term, { kind: 'call' }>;
    const found = sumFamilies.find((f) => f.names.includes(term.name) && f.parse(term) !== null);
    if (found === undefined) throw new Error(`nobody claims ${text}`);
    groups.set(found, [...(groups.get(found) ?? []), found.parse(term)]);
  }
  let best = Number.POSITIVE_INFINITY;
  let spent = 0;
  for (let turn = 0; turn < 20 && (turn < 2 || spent < 400); turn++) {
    const began = performance.now();
    for (const [family, args] of groups) family.evaluateMany?.(args, bits, context);
    const took = performance.now() - began;
    best = Math.min(best, took);
    spent += took;
  }
  return best;
}

/** Best of up to 20 rounds, at least 2; short ones repeated until the clock can tell them. */
function pariTime(code: string, digits: number): number | null {
  const script = `default(parisizemax,4000000000);\ndefault(realprecision,${digits});w=exp(I*Pi/3);f()=${code};\nbest=10.^9;spent=0;for(k=1,20,if(k<=2||spent<400,r=1;d=0;while(d<20&&r<=64,t=getwalltime();for(j=1,r,f());d=getwalltime()-t;q=d*1./r;r=2*r);best=min(best,q);spent+=d));printf("%.3f\\n",best)\n`;
  const run = spawnSync('gp', ['-q', '-f'], { input: script, encoding: 'utf8' });
  const line = run.stdout?.trim().split('\n').at(-1) ?? '';
  return run.status === 0 && line !== '' ? Number(line) : null;
}

const wanted = process.argv
  .slice(2)
  .map(Number)
  .filter((d) => d > 0);
const parts = process.argv.slice(2).filter((argument) => !(Number(argument) > 0));
for (const digits of wanted.length > 0 ? wanted : [100, 1000]) {
  console.log(`\n${`${digits} digits`.padEnd(52)}   ours ms   PARI/GP ms   ratio`);
  for (const { name, texts, pari } of rows) {
    if (parts.length > 0 && !parts.some((part) => name.includes(part))) continue;
    const mine = ours(texts, Math.ceil(digits * Math.log2(10)));
    const theirs = pariTime(pari, digits);
    const ratio = theirs === null ? '' : (mine / theirs).toFixed(2);
    const shown = theirs === null ? '-' : theirs.toFixed(1);
    console.log(`${name.padEnd(52)} ${mine.toFixed(1).padStart(9)} ${shown.padStart(12)} ${ratio.padStart(7)}`);
  }
}
