/** Values with a wrong tail, and bases with a relation inside. */
import { vectorsLog10 } from '../../../src/evidence/counting.ts';
import { TAIL_SURPLUS } from '../../../src/evidence/verdict.ts';
import { log10Of } from '../../../src/number/integer.ts';
import { runSearch } from '../../../src/search/run.ts';
import { type Random, randomFrom } from '../../support/random.ts';
import { cache, draw, isPlanted, plant, randomDigits, type Settings } from './settings.ts';

/** Digits beyond what the coefficients encode and the surplus that the rule asks for, within which a wrong digit may hide. */
const MARGIN = 15;

/** Planted values, random from some digit beyond the budget on: recognised, and the first wrong digit named within 2. */
export async function corrupted({ scale, seed }: Settings): Promise<boolean> {
  const stream = randomFrom(`${seed} corrupted`);
  const trials = Math.round(1000 * scale);
  let [made, recognised, named] = [0, 0, 0];
  while (made < trials) {
    const basis = draw(stream, stream.integer(2, 12));
    const height = 3 * stream.unit();
    const digits = stream.integer(80, 160);
    const plan = plant(stream, basis, height, digits);
    if (plan === null) continue;
    const norm = log10Of(plan.integers.reduce((sum, c) => sum + c * c, 0n)) / 2;
    const first = Math.ceil(vectorsLog10(plan.integers.length, norm)) + TAIL_SURPLUS + MARGIN;
    // Two digits before the end a wrong one cannot be told from rounding.
    if (first > digits - 2) continue;
    made += 1;
    const position = stream.integer(first, digits - 2);
    const value = spoil(stream, plan.value, position);
    const record = await runSearch({ value, basis, method: 'lattice' }, { cache });
    const found = isPlanted(record.integers, plan) && record.verdict === 'holds';
    const stated = /from (\d+) on look wrong/.exec(record.diagnosis.join(' '))?.[1];
    const right = stated !== undefined && Math.abs(Number(stated) - position) <= 2;
    if (found) recognised += 1;
    if (found && right) named += 1;
    if (!found || !right)
      console.log(
        `  ${found ? 'misnamed' : 'missed'}: ${basis.length} constants, height 10^${height.toFixed(1)}, ${digits} digits, wrong from ${position}; ${record.outcome}, ${record.diagnosis[0]}`,
      );
  }
  console.log(
    `  ${made} values wrong from a digit ≥ ${TAIL_SURPLUS + MARGIN} beyond the information in the coefficients: ${recognised} recognised, ${named} with the first wrong digit within 2`,
  );
  return recognised >= 0.95 * made && named >= 0.95 * made;
}

/** The digit at `position` (counted from 1 at the first significant one) changed, and random ones behind it. */
function spoil(random: Random, value: string, position: number): string {
  const letters = [...value];
  let seen = 0;
  for (const [i, letter] of letters.entries()) {
    if (!/[0-9]/.test(letter) || (seen === 0 && letter === '0')) continue;
    seen += 1;
    if (seen === position) letters[i] = String((Number(letter) + random.integer(1, 9)) % 10);
    if (seen > position) letters[i] = String(random.integer(0, 9));
  }
  return letters.join('');
}

/** A constant that others express, in several disguises. */
const DEPENDENT: readonly (readonly string[])[] = [
  ['zeta(2)', 'pi^2'],
  ['zeta(4)', 'pi^4'],
  ['log(6)', 'log(2)', 'log(3)'],
  ['log(10)', 'log(2)', 'log(5)'],
  ['sqrt(8)', 'sqrt(2)'],
  ['Li(2,1/2)', 'pi^2', 'log(2)^2'],
  ['Li(3,1/2)', 'zeta(3)', 'pi^2*log(2)', 'log(2)^3'],
  ['zeta(2,1)', 'zeta(3)'],
  ['zeta(3,1)', 'pi^4'],
  ['atan(1/2)', 'atan(1/3)', 'pi'],
];

/** Random and planted values in a basis with a relation: it must be named, and it must be the one hidden there. */
export async function dependent({ scale, seed }: Settings): Promise<boolean> {
  const stream = randomFrom(`${seed} dependent`);
  const trials = Math.round(500 * scale);
  let named = 0;
  for (let k = 0; k < trials; k++) {
    const hidden = DEPENDENT[stream.integer(0, DEPENDENT.length - 1)] as readonly string[];
    const around = draw(stream, stream.integer(1, 12)).filter((text) => !hidden.includes(text));
    const basis = [...around, ...hidden].sort(() => stream.unit() - 0.5);
    const digits = stream.integer(4 * basis.length + 20, 4 * basis.length + 80);
    const value =
      k % 2 === 0
        ? randomDigits(stream, digits)
        : (plant(stream, basis, 1, digits)?.value ?? randomDigits(stream, digits));
    const record = await runSearch({ value, basis, method: k % 4 < 2 ? 'lattice' : 'pslq' }, { cache });
    const involved = record.relation
      .filter((r) => r.coefficient !== '0')
      .map((r) => basis[record.relation.indexOf(r)] as string);
    const right = record.outcome === 'basis-dependent' && [...involved].sort().join() === [...hidden].sort().join();
    if (right) named += 1;
    else
      console.log(
        `  not named: ${hidden.join(', ')} among ${basis.join(', ')} at ${digits} digits; ${record.outcome} ${involved.join(', ')}`,
      );
  }
  console.log(`  ${trials} dependent bases: ${named} named`);
  return named === trials;
}
