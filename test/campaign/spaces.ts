/**
 * Numeric check of every space: node .ci/run-ts.mjs test/campaign/spaces.ts [key…]
 *
 * For each weight and parity (1) the products of generators are offered to the relation engine, which must exclude relations
 * of small norm; (2) random sums of the space are offered together with them, and a relation that involves the sum must come
 * back, and hold at CHECK_DIGITS digits that the search did not see. Generators are evaluated as nested sums, so that one
 * pass serves them all. The real spaces are also settled exactly by test/campaign/reductions.ts.
 */

import { evaluateTerm } from '../../src/constants/evaluate.ts';
import type { EvaluationContext } from '../../src/constants/family.ts';
import { evaluateRootSums, type RootSum } from '../../src/constants/sums/root-words.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { add, type Ball, containsZero, fromInteger, multiply, timesInteger, withBits } from '../../src/number/ball.ts';
import { toComplex } from '../../src/number/complex.ts';
import type { RelationOutcome } from '../../src/relation/contract.ts';
import { startRelation } from '../../src/relation/relation.ts';
import { productsOf } from '../../src/spaces/products.ts';
import { spaces } from '../../src/spaces/registry.ts';
import type { Parity, Space } from '../../src/spaces/space.ts';

const DIGITS_PER_ELEMENT = 20;
const CHECK_DIGITS = 60;
const context: EvaluationContext = { argument: (term, bits) => evaluateTerm(term, bits) };
let failures = 0;

/** Orders whose sums span the space, largest weight searched here, and whether only letters 0, 1 and r6 occur. */
const PLANS: Readonly<Record<string, { order: number; weight: number; unramified?: true }>> = {
  mzv: { order: 1, weight: 12 },
  alternating: { order: 2, weight: 8 },
  'fourth-roots': { order: 4, weight: 6 },
  'sixth-roots-unramified': { order: 6, weight: 8, unramified: true },
  'sixth-roots': { order: 6, weight: 4 },
};

let state = 20261201;
function random(below: number): number {
  state = (state * 1103515245 + 12345) % 2147483648;
  return Math.floor((state / 2147483648) * below);
}

/** A random convergent sum of this weight. */
function randomSum(weight: number, order: number, unramified: boolean): RootSum {
  for (;;) {
    const letters = Array.from({ length: weight }, () =>
      random(2) === 0 ? -1 : unramified ? random(2) : random(order),
    );
    if (letters[0] === 0 || letters.at(-1) === -1) continue;
    const indices: number[] = [];
    const exponents: number[] = [];
    let before = 0;
    let zeros = 0;
    for (const letter of letters) {
      if (letter < 0) zeros++;
      else {
        indices.push(zeros + 1);
        exponents.push((before + order - letter) % order);
        before = letter;
        zeros = 0;
      }
    }
    return { indices, exponents, order };
  }
}

function generatorValue(text: string, bits: number): Ball {
  const nested = text
    .replace(/^Li\((\d+),(.*)\)$/, 'MPL($1;$2)')
    .replace(/^im\(Li\((\d+),(.*)\)\)$/, 'im(MPL($1;$2))')
    .replace(/^Cl\((\d+),pi\/3\)$/, 'im(MPL($1;r6))');
  const value = evaluateTerm(parseTerm(nested), bits);
  return toComplex(value).re;
}

function decide(rows: Ball[], bits: number): RelationOutcome {
  const run = startRelation({ rows: rows.map((x) => [withBits(x, bits)]), method: 'lattice' });
  for (;;) {
    const outcome = run.step();
    if (outcome !== undefined) return outcome;
  }
}

function check(space: Space, weight: number, parity: Parity): void {
  const plan = PLANS[space.key];
  if (plan === undefined) return;
  const products = productsOf(space.generators, weight).filter((p) => p.parity === parity);
  if (products.length === 0) return;
  const began = performance.now();
  const search = Math.ceil((products.length + 2) * DIGITS_PER_ELEMENT * Math.log2(10));
  const bits = search + Math.ceil(CHECK_DIGITS * Math.log2(10));
  const values = new Map<string, Ball>();
  const basis = products.map(({ powers }) =>
    powers.reduce<Ball>((x, { generator, count }) => {
      const value = values.get(generator.text) ?? generatorValue(generator.text, bits + 64);
      values.set(generator.text, value);
      const steps = count * (generator.step ?? 1);
      return Array.from({ length: steps }).reduce<Ball>((y) => multiply(y, value, bits + 60), x);
    }, fromInteger(1n)),
  );
  const independent = products.length === 1 ? undefined : decide(basis, search);
  const excluded = independent === undefined || independent.kind !== 'relation';
  const bound =
    independent === undefined ? '' : `, no relation of norm below 10^${independent.normBoundLog10.toFixed(1)}`;
  let reduced = 0;
  const tries = 4;
  for (let k = 0; k < tries; k++) {
    const sum = randomSum(weight, plan.order, plan.unramified === true);
    const [raw] = evaluateRootSums([sum], bits + 64, context);
    if (raw === undefined) throw new Error('one value expected');
    const value = toComplex(raw)[parity === 'real' ? 're' : 'im'];
    // A part that vanishes is reduced already.
    if (containsZero(value)) {
      reduced++;
      continue;
    }
    const outcome = decide([value, ...basis], search);
    const holds =
      outcome.kind === 'relation' &&
      outcome.coefficients[0] !== 0n &&
      containsZero(
        [value, ...basis].reduce(
          (total, x, j) => add(total, timesInteger(x, outcome.coefficients[j] as bigint)),
          fromInteger(0n),
        ),
      );
    if (holds) reduced++;
    else console.log(`  not reduced: ${JSON.stringify(sum)} ${parity}: ${outcome.kind}`);
  }
  const ok = excluded && reduced === tries;
  if (!ok) failures++;
  const seconds = ((performance.now() - began) / 1000).toFixed(1);
  console.log(
    `${ok ? 'ok    ' : 'FAILED'} ${space.key} weight ${weight} ${parity}: ${products.length} elements${bound}; ${reduced} of ${tries} random sums reduced; ${seconds} s`,
  );
}

const wanted = process.argv.slice(2);
for (const space of spaces) {
  const plan = PLANS[space.key];
  if (plan === undefined || (wanted.length > 0 && !wanted.includes(space.key))) continue;
  for (let weight = 1; weight <= Math.min(plan.weight, space.maxWeight); weight++) {
    for (const parity of space.hasImaginary ? (['real', 'imaginary'] as const) : (['real'] as const)) {
      check(space, weight, parity);
    }
  }
}
console.log(failures === 0 ? 'all spaces hold' : `${failures} failed`);
process.exit(failures === 0 ? 0 : 1);
