import type { Ball } from '../../../src/number/ball.ts';
import { InputError } from '../../../src/number/errors.ts';
import type { RelationOutcome } from '../../../src/relation/contract.ts';
import { log10Norm, primitive } from '../../../src/relation/significance.ts';
import { run } from '../../relation/planted.ts';
import { type Random, randomFrom } from '../../support/random.ts';

interface Mixed {
  readonly rows: Ball[][];
  readonly relation: bigint[] | undefined;
  readonly text: string;
}

const GUARD = 1500;

/**
 * Whatever may come: 1 to 3 columns, sizes that differ by up to 10^120, coefficients of 0 to 12 digits side by side, exact numbers among
 * inexact ones, with or without a planted relation.
 */
function mixedCase(random: Random, k: number): Mixed {
  const n = random.integer(2, 14);
  const m = random.integer(1, 3);
  const bits = random.integer(60, 900);
  const gap = k % 3 === 0 ? random.integer(0, 400) : 0;
  const withOne = k % 4 === 0;
  const fine = Array.from({ length: n }, (_, i) => {
    const down = BigInt(gap > 0 ? random.integer(0, gap) : 0);
    return Array.from({ length: m }, (_, j) => {
      if (i === 0 && withOne) return j === 0 ? 1n << BigInt(bits + GUARD) : 0n;
      return (random.bits(bits + GUARD) - (1n << BigInt(bits + GUARD - 1))) >> down;
    });
  });
  const relation = Array.from({ length: n }, () => {
    const size = 10n ** BigInt(random.integer(0, 12));
    return random.integer(0, 3) === 0 ? 0n : random.below(2n * size + 1n) - size;
  });
  const last = random.integer(0, 1) === 0 ? 1n : 17n;
  relation[n - 1] = last;
  const planted = random.integer(0, 1) === 1 && n > m + 1;
  if (planted) {
    const sum = (j: number): bigint =>
      fine.slice(0, -1).reduce((s, row, i) => s + (relation[i] as bigint) * (row[j] as bigint), 0n);
    fine[n - 1] = (fine[0] as bigint[]).map((_, j) => -sum(j) / last);
  }
  const exact = (x: bigint): Ball => ({ mid: x === 0n ? 0n : 1n, rad: 0n, bits: 0 });
  const rows = fine.map((row, i) =>
    row.map((x) =>
      i === 0 && withOne ? exact(x) : { mid: x >> BigInt(GUARD), rad: BigInt(random.integer(1, 4)), bits },
    ),
  );
  const text = `mixed case ${k}: n ${n}, m ${m}, ${bits} bits, sizes over ${gap} bits${withOne ? ', with 1' : ''}`;
  return { rows, relation: planted ? primitive(relation) : undefined, text };
}

/** What a method made of a case; 'zero' is the immediate relation of a number that is nothing within its uncertainty. */
function said(mixed: Mixed, method: 'pslq' | 'lattice', failures: string[]): string {
  let outcome: RelationOutcome;
  const begun = performance.now();
  try {
    outcome = run({ rows: mixed.rows, method });
  } catch (error) {
    if (error instanceof InputError) return 'refused';
    throw error;
  }
  if (performance.now() - begun > 20_000) failures.push(`${mixed.text} (${method}): took longer than 20 s`);
  const { relation } = mixed;
  if (relation !== undefined && outcome.normBoundLog10 > log10Norm(relation) + 1e-9) {
    failures.push(`${mixed.text} (${method}): bound above the planted relation`);
  }
  if (outcome.kind !== 'relation') return outcome.kind;
  if (relation !== undefined && outcome.coefficients.join() === relation.join()) return 'planted';
  if (log10Norm(outcome.coefficients) === 0) return 'zero';
  if (relation === undefined) failures.push(`${mixed.text} (${method}): claimed ${outcome.coefficients.join()}`);
  return 'another relation';
}

export function mixedCampaign(seed: string, count: number): string[] {
  const random = randomFrom(`${seed} mixed`);
  const failures: string[] = [];
  const tally = new Map<string, number>();
  for (let k = 0; k < count; k++) {
    const mixed = mixedCase(random, k);
    const both = [said(mixed, 'pslq', failures), said(mixed, 'lattice', failures)];
    const key = `${mixed.relation === undefined ? 'no relation' : 'planted    '}: pslq ${both[0]}, lattice ${both[1]}`;
    tally.set(key, (tally.get(key) ?? 0) + 1);
  }
  console.log('mixed input (sizes, columns, exact numbers):');
  for (const [key, times] of [...tally].sort()) console.log(`  ${String(times).padStart(5)} ${key}`);
  return failures;
}
