/** The odds stated with a surplus against what chance gives, by trying every integer vector of small norm. */
import { vectorsLog10 } from '../../../src/evidence/counting.ts';
import { randomFrom } from '../../support/random.ts';
import type { Settings } from './settings.ts';

const NUMBERS = 4;
const NORM = 14;
/** Constants of the order of one, in doubles: agreements of interest are below 10 digits. */
const CONSTANTS = [1, Math.PI ** 2 / 8, 1.2020569031595942];

/**
 * For random values v: the best agreement of v with −Σ cᵢ·bᵢ / c₀ over all vectors of norm ≤ 14 with c₀ ≠ 0, less the
 * logarithm of the number of vectors. A surplus of s must not occur more often than once in 10^s, and not so much
 * less often that the odds mean nothing.
 */
export async function odds({ scale, seed }: Settings): Promise<boolean> {
  const stream = randomFrom(`${seed} odds`);
  const values = Math.round(20_000 * scale);
  const vectors = vectorsLog10(NUMBERS, Math.log10(NORM));
  const sums = combinations();
  const surpluses: number[] = [];
  for (let k = 0; k < values; k++) {
    const v = 0.1 + 0.9 * stream.unit();
    surpluses.push(bestAgreement(v, sums) - vectors);
  }
  let sound = true;
  for (const s of [0.5, 1, 1.5, 2, 2.5, 3]) {
    const expected = values * 10 ** -s;
    const seen = surpluses.filter((x) => x >= s).length;
    console.log(`  surplus ≥ ${s}: ${seen} of ${values}; the odds stated: ${expected.toFixed(1)}`);
    // Three standard deviations of a count.
    if (seen > expected + 3 * Math.sqrt(expected)) sound = false;
  }
  return sound;
}

interface Sums {
  readonly lead: number;
  /** Sorted. */
  readonly sums: Float64Array;
}

/** Σ cᵢ·bᵢ for every (c₁, c₂, c₃), by c₀ = 1 … NORM. */
function combinations(): readonly Sums[] {
  return Array.from({ length: NORM }, (_, k) => {
    const lead = k + 1;
    const room = NORM ** 2 - lead ** 2;
    const reach = Math.floor(Math.sqrt(room));
    const sums: number[] = [];
    for (let a = -reach; a <= reach; a++)
      for (let b = -reach; b <= reach; b++)
        for (let c = -reach; c <= reach; c++) {
          if (a * a + b * b + c * c > room) continue;
          sums.push(a * (CONSTANTS[0] as number) + b * (CONSTANTS[1] as number) + c * (CONSTANTS[2] as number));
        }
    return { lead, sums: Float64Array.from(sums).sort() };
  });
}

function bestAgreement(v: number, all: readonly Sums[]): number {
  let best = Number.POSITIVE_INFINITY;
  for (const { lead, sums } of all) {
    let [low, high] = [0, sums.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((sums[middle] as number) < lead * v) low = middle + 1;
      else high = middle;
    }
    for (const i of [low - 1, low]) {
      const sum = sums[i];
      if (sum !== undefined) best = Math.min(best, Math.abs(sum / lead - v) / v);
    }
  }
  return -Math.log10(best);
}
