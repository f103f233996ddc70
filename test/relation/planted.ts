/** Test data: random numbers, some with a planted relation. */
import type { Ball } from '../../src/number/ball.ts';
import type { RelationOutcome, RelationRequest } from '../../src/relation/contract.ts';
import { startRelation } from '../../src/relation/relation.ts';
import type { Random } from '../support/random.ts';

/** n independent numbers in [1, 2) × sizes, known to `bits` bits after the point. */
export function randomNumbers(random: Random, n: number, bits: number): Ball[] {
  return Array.from({ length: n }, () => ({ mid: (1n << BigInt(bits)) | random.bits(bits), rad: 1n, bits }));
}

/** n numbers with one relation whose coefficients are uniform in ±10^digits (last one not 0). The last number is solved for. */
export function planted(
  random: Random,
  n: number,
  coefficientDigits: number,
  bits: number,
): { numbers: Ball[]; relation: bigint[] } {
  const limit = 10n ** BigInt(coefficientDigits);
  const relation = Array.from({ length: n }, () => random.below(2n * limit + 1n) - limit);
  while (relation[n - 1] === 0n) relation[n - 1] = random.below(2n * limit + 1n) - limit;
  const guard = 64 + 4 * coefficientDigits;
  const numbers = randomNumbers(random, n - 1, bits + guard);
  const sum = numbers.reduce((s, x, i) => s + x.mid * (relation[i] as bigint), 0n);
  numbers.push({ mid: -sum / (relation[n - 1] as bigint), rad: 1n, bits: bits + guard });
  const cut = numbers.map((x) => ({ mid: x.mid >> BigInt(guard), rad: 1n, bits }));
  return { numbers: cut, relation };
}

export function run(request: RelationRequest): RelationOutcome {
  const search = startRelation(request);
  for (;;) {
    const outcome = search.step();
    if (outcome !== undefined) return outcome;
  }
}
