/** Values without a relation, and values with one. */
import { vectorsLog10 } from '../../../src/evidence/counting.ts';
import { log10Of } from '../../../src/number/integer.ts';
import { runSearch } from '../../../src/search/run.ts';
import { randomFrom } from '../../support/random.ts';
import { cache, draw, isPlanted, plant, randomDigits, type Settings } from './settings.ts';

/** Random digits: none may hold, fewer than one in 10,000 be tentative; how often a surplus of s digits occurs. */
export async function random({ scale, seed }: Settings): Promise<boolean> {
  const stream = randomFrom(`${seed} random`);
  const searches = Math.round(10_000 * scale);
  const verdicts = new Map<string, number>();
  const surpluses: number[] = [];
  for (let k = 0; k < searches; k++) {
    const basis = draw(stream, stream.integer(2, 40));
    const digits = stream.integer(20, 120);
    const value = randomDigits(stream, digits);
    const record = await runSearch({ value, basis, method: k % 2 === 0 ? 'pslq' : 'lattice' }, { cache });
    const key = record.outcome === 'relation' ? (record.verdict as string) : record.outcome;
    verdicts.set(key, (verdicts.get(key) ?? 0) + 1);
    if (record.surplusDigits !== null) surpluses.push(record.surplusDigits);
    if (key === 'holds' || key === 'tentative') console.log(`  ${key}: ${value} in ${basis.join(', ')}`);
  }
  console.log(`  ${searches} random values: ${table(verdicts)}`);
  for (const s of [1, 2, 3, 4, 6]) {
    const above = surpluses.filter((x) => x >= s).length;
    console.log(`  surplus of ${s} or more: ${above}, the odds stated allow ${(searches * 10 ** -s).toFixed(2)}`);
  }
  // One in 10,000, and none in a shorter campaign.
  return (verdicts.get('holds') ?? 0) === 0 && (verdicts.get('tentative') ?? 0) <= Math.floor(searches / 10_000);
}

/** Planted relations with heights 1 … 10^12 and digits from 0.9 to 2 times the budget. */
export async function planted({ scale, seed }: Settings): Promise<boolean> {
  const stream = randomFrom(`${seed} planted`);
  const trials = Math.round(5000 * scale);
  const counts = new Map<string, number>();
  const count = (key: string): void => void counts.set(key, (counts.get(key) ?? 0) + 1);
  let wrong = 0;
  for (let k = 0; k < trials; k++) {
    const basis = draw(stream, stream.integer(2, 40));
    const height = 12 * stream.unit();
    const share = 0.9 + 1.1 * stream.unit();
    const budget = (basis.length + 1) * Math.max(height, 0.5);
    const digits = Math.max(20, Math.round(share * budget));
    const made = plant(stream, basis, height, digits);
    if (made === null) continue;
    const record = await runSearch({ value: made.value, basis, method: 'lattice' }, { cache });
    const norm = log10Of(made.integers.reduce((sum, c) => sum + c * c, 0n)) / 2;
    const surplus = digits - vectorsLog10(made.integers.length, norm);
    const found = record.outcome === 'relation' && isPlanted(record.integers, made);
    const holds = found && record.verdict === 'holds';
    const belied = record.outcome === 'excluded' && Math.log10(Number(record.normBound)) > norm;
    const other = record.outcome === 'relation' && !found && record.verdict !== 'spurious';
    const band = surplus >= 20 ? '≥ 20' : surplus >= 12 ? '12–20' : surplus >= 6 ? '6–12' : '< 6';
    count(`${band} surplus: ${holds ? 'holds' : found ? `found, ${record.verdict}` : record.outcome}`);
    if ((surplus >= 20 && !holds) || belied || other) {
      wrong += 1;
      const why = belied ? 'wrongly excluded' : other ? 'another relation' : 'missed';
      console.log(
        `  ${why}: surplus ${surplus.toFixed(1)}, ${record.outcome} ${record.verdict}, ${basis.length} constants, height 10^${height.toFixed(1)}, ${digits} digits; ${record.evidence?.rule.key ?? record.diagnosis[0]}`,
      );
    }
  }
  console.log(`  ${trials} planted relations: ${wrong} wrong\n    ${table(counts).replaceAll('; ', '\n    ')}`);
  return wrong === 0;
}

function table(counts: ReadonlyMap<string, number>): string {
  return [...counts]
    .sort()
    .map(([key, n]) => `${key} ${n}`)
    .join('; ');
}
