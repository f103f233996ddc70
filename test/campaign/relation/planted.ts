import type { Ball } from '../../../src/number/ball.ts';
import { prepare } from '../../../src/relation/prepare.ts';
import { log10Norm, primitive, surplusDigits } from '../../../src/relation/significance.ts';
import { planted, run } from '../../relation/planted.ts';
import { randomFrom } from '../../support/random.ts';

/**
 * Digits at which about one vector as short as the relation vanishes by chance as well as the relation does. No method can tell the
 * relation from chance with fewer. About n times the digits of the coefficients.
 */
function informationLimit(numbers: readonly Ball[], relation: readonly bigint[]): number {
  const digits = (numbers[0] as Ball).bits * Math.log10(2);
  return digits - surplusDigits(prepare(numbers.map((x) => [x])), relation);
}

/**
 * Coefficients have at least 0.09·n + 60/n digits. With less, 1.1 times the limit leaves either fewer digits to spare than the five that
 * a claim takes, or a gap narrower than the 1.02^n that reduction of this quality separates.
 */
function coefficientDigits(n: number, extra: number): number {
  return Math.ceil(0.09 * n + 60 / n) + extra;
}

const PSLQ_LIMIT = 40;

export function plantedCampaign(seed: string, count: number): string[] {
  const random = randomFrom(`${seed} planted`);
  const failures: string[] = [];
  const bands = [1.02, 1.05, 1.1, 1.2, 1.5, 3.001];
  const tally = bands.slice(1).map((to, k) => ({ from: bands[k] as number, to, tried: 0, found: 0 }));
  const pslq = { tried: 0, found: 0, differ: 0 };
  let slowest = { ms: 0, text: '' };
  const begun = performance.now();
  for (let k = 0; k < count; k++) {
    const n = 2 + (k % 99);
    const digits = coefficientDigits(n, random.integer(0, 5));
    // The relation is drawn before the numbers: the same seed gives the same relation at any number of bits.
    const again = (bits: number): ReturnType<typeof planted> =>
      planted(randomFrom(`${seed} planted ${k}`), n, digits, bits);
    const factor = k % 3 === 0 ? 1.02 + 0.18 * random.unit() : 1.02 + 1.98 * random.unit() ** 2;
    const trial = again(Math.ceil((n + 4) * (digits + 4) * Math.log2(10)));
    const bits = Math.ceil(factor * informationLimit(trial.numbers, trial.relation) * Math.log2(10));
    const { numbers, relation } = again(bits);
    const rows = numbers.map((x) => [x]);
    const expected = primitive(relation).join();
    const started = performance.now();
    const outcome = run({ rows, method: 'lattice' });
    const ms = performance.now() - started;
    const text = `n ${n}, ${digits}-digit coefficients, ${(bits * Math.log10(2)).toFixed(0)} digits, factor ${factor.toFixed(3)}`;
    if (ms > slowest.ms) slowest = { ms, text };
    const found = outcome.kind === 'relation' && outcome.coefficients.join() === expected;
    const band = tally.find((b) => factor < b.to);
    if (band !== undefined) {
      band.tried++;
      if (found) band.found++;
    }
    if (!found && factor >= 1.1)
      failures.push(
        `lattice did not find: ${text}, said ${JSON.stringify(outcome, (_, v) => (typeof v === 'bigint' ? String(v) : v))}`,
      );
    if (outcome.kind === 'relation' && !found) failures.push(`lattice claimed another relation: ${text}`);
    if (outcome.normBoundLog10 > log10Norm(relation) + 1e-9)
      failures.push(`lattice: bound above the planted relation: ${text}`);
    if (n > PSLQ_LIMIT && k % 10 !== 0) continue;
    if (n > 60) continue;
    pslq.tried++;
    const second = run({ rows, method: 'pslq' });
    if (second.normBoundLog10 > log10Norm(relation) + 1e-9)
      failures.push(`pslq: bound above the planted relation: ${text}`);
    const secondFound = second.kind === 'relation' && second.coefficients.join() === expected;
    if (secondFound) pslq.found++;
    if (!secondFound && factor >= 1.1) failures.push(`pslq did not find: ${text}, said ${second.kind}`);
    if (second.kind === 'relation' && outcome.kind === 'relation' && !secondFound)
      failures.push(`methods differ: ${text}`);
    if (second.kind !== outcome.kind) pslq.differ++;
    if (k % 200 === 199)
      console.log(`  planted ${k + 1}/${count}, ${((performance.now() - begun) / 1000).toFixed(0)} s`);
  }
  console.log(`planted relations, n = 2 … 100, lattice method:`);
  for (const b of tally)
    console.log(`  digits ${b.from} … ${b.to.toFixed(2)} times the information limit: ${b.found} of ${b.tried} found`);
  console.log(
    `  PSLQ ran on ${pslq.tried} of them (n ≤ 60), found ${pslq.found}; one method found what the other left open ${pslq.differ} times (below 1.1 times the limit)`,
  );
  console.log(`  slowest: ${slowest.ms.toFixed(0)} ms (${slowest.text})`);
  return failures;
}
