import { spawnSync } from 'node:child_process';
import type { Ball } from '../../../src/number/ball.ts';
import { type Prepared, prepare } from '../../../src/relation/prepare.ts';
import { run } from '../../relation/planted.ts';
import { randomFrom } from '../../support/random.ts';

interface Case {
  readonly prepared: Prepared;
  readonly bound: number;
  readonly text: string;
}

const DIMENSION_FOR_TRUTH = 9;
const PSLQ_LIMIT = 30;

export function randomCampaign(seed: string, count: number): string[] {
  const random = randomFrom(`${seed} random`);
  const failures: string[] = [];
  const cases: Case[] = [];
  const kinds = new Map<string, number>();
  let pslq = 0;
  let gap = 0;
  const begun = performance.now();
  for (let k = 0; k < count; k++) {
    const n = k % 3 === 0 ? 2 + (k % 8) : 2 + (k % 59);
    const m = k % 4 === 0 && n > 3 ? 2 : 1;
    const digits = random.integer(10, 40) + Math.ceil((n * random.integer(1, 6)) / m);
    const bits = Math.ceil(digits / Math.log10(2));
    const rows: Ball[][] = Array.from({ length: n }, () =>
      Array.from({ length: m }, () => ({
        mid: random.bits(bits) - (1n << BigInt(bits - 1)),
        rad: 1n + random.below(3n),
        bits,
      })),
    );
    const text = `random case ${k}: n ${n}, m ${m}, ${digits} digits`;
    const outcome = run({ rows, method: 'lattice' });
    kinds.set(outcome.kind, (kinds.get(outcome.kind) ?? 0) + 1);
    if (outcome.kind === 'relation') failures.push(`${text}: claimed ${outcome.coefficients.join()}`);
    if (n <= PSLQ_LIMIT) {
      pslq++;
      const second = run({ rows, method: 'pslq' });
      if (second.kind !== outcome.kind) failures.push(`${text}: pslq says ${second.kind}, lattice ${outcome.kind}`);
      gap = Math.max(gap, Math.abs(second.normBoundLog10 - outcome.normBoundLog10));
      if (n <= DIMENSION_FOR_TRUTH)
        cases.push({ prepared: prepare(rows), bound: second.normBoundLog10, text: `${text} (pslq)` });
    }
    if (n <= DIMENSION_FOR_TRUTH) cases.push({ prepared: prepare(rows), bound: outcome.normBoundLog10, text });
    if (k % 500 === 499)
      console.log(`  random ${k + 1}/${count}, ${((performance.now() - begun) / 1000).toFixed(0)} s`);
  }
  console.log(`random numbers: ${[...kinds].map(([kind, times]) => `${times} ${kind}`).join(', ')}`);
  console.log(`  PSLQ ran on ${pslq} of them; the two norm bounds differ by at most 10^${gap.toFixed(2)}`);
  return [...failures, ...againstTruth(cases)];
}

/**
 * The shortest vector that may be a relation, from PARI/GP's enumeration (qfminim after qflll), against the bound. Any such c has
 * ‖(ρc, c·X)‖² ≤ ‖c‖²·(ρ² + Σ‖eⱼ‖²), so all candidates with ‖c‖² ≤ B are among the vectors enumerated up to that.
 */
function againstTruth(cases: readonly Case[]): string[] {
  const script = [
    'default(parisize, 512000000);',
    'truth(X, E, s) = {my(n = matsize(X)[1], m = matsize(X)[2], best = 0, rho2, err2, G, T, H, B, V);',
    '  err2 = sum(i = 1, n, sum(j = 1, m, E[i,j]^2)); rho2 = err2;',
    '  G = rho2 * matid(n) + X * X~; T = qflllgram(G); H = T~ * G * T; B = s;',
    '  while(best == 0, V = qfminim(H, B * (rho2 + err2), 200000, 2)[3];',
    '    for(k = 1, #V, my(c = T * V[,k], ok = 1); for(j = 1, m, if(abs(sum(i = 1, n, c[i] * X[i,j])) > sum(i = 1, n, abs(c[i]) * E[i,j]), ok = 0));',
    '      my(q = sum(i = 1, n, c[i]^2)); if(ok && q <= B && (best == 0 || q < best), best = q));',
    '    if(#V >= 190000, return(-1)); B = 2 * B + 1); best};',
  ];
  const matrix = (rows: readonly (readonly bigint[])[]): string => `[${rows.map((row) => row.join(',')).join(';')}]`;
  for (const { prepared, bound } of cases) {
    const from =
      BigInt(Math.ceil(Math.min(1e15, 10 ** (2 * bound)))) *
      (bound > 7.5 ? 10n ** BigInt(Math.floor(2 * bound - 15)) : 1n);
    script.push(`print(truth(${matrix(prepared.integers)}, ${matrix(prepared.errors)}, ${from}))`);
  }
  const gp = spawnSync('gp', ['-q', '-f'], {
    input: `${script.slice(0, 1).join('')}\n${script.slice(1, 8).join('')}\n${script.slice(8).join('\n')}\n`,
    encoding: 'utf8',
    maxBuffer: 1 << 28,
  });
  if (gp.error !== undefined || gp.status !== 0) {
    console.log('  PARI/GP is not here: the bounds were not compared with the true shortest vectors');
    return [];
  }
  const answers = gp.stdout.trim().split('\n');
  const failures: string[] = [];
  let compared = 0;
  let sum = 0;

  cases.forEach(({ bound, text }, k) => {
    const square = Number(answers[k]);
    if (!(square > 0)) return;
    compared++;
    const truth = Math.log10(square) / 2;
    if (bound > truth + 1e-9) failures.push(`${text}: bound 10^${bound} above the shortest vector 10^${truth}`);
    sum += truth - bound;
  });
  if (compared < cases.length * 0.9)
    failures.push(`only ${compared} of ${cases.length} bounds could be compared: ${gp.stderr.slice(0, 200)}`);
  console.log(
    `  ${compared} bounds (n ≤ ${DIMENSION_FOR_TRUTH}) compared with the true shortest vector by enumeration: on average 10^${(sum / compared).toFixed(2)} below it`,
  );
  return failures;
}
