/**
 * Regenerates and verifies the data behind the exact reductions: node .ci/run-ts.mjs test/campaign/reductions.ts [write]
 *
 * For every convergent word of a weight the coaction gives the decomposition but for one rational number c; c is read off
 * from the value of the word at DIGITS digits and must be a fraction far smaller than those digits could hide. Each finished
 * reduction is then checked at CHECK_DIGITS digits, which the reading of c did not see. Without `write` the stored data
 * are compared instead of replaced.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { REAL_STEP, tailsSize } from '../../src/constants/sums/double-tails.ts';
import { planWords } from '../../src/constants/sums/plan.ts';
import { realTails } from '../../src/constants/sums/real-tails.ts';
import { rootSymmetry } from '../../src/constants/sums/words.ts';
import { bitLength, roundShift } from '../../src/number/integer.ts';
import { productsOf } from '../../src/spaces/products.ts';
import { alternatingSpace, multipleZetaSpace } from '../../src/spaces/real-sums.ts';
import type { Combination } from '../../src/spaces/reduction/combination.ts';
import { coordinates, imagedProducts, weightBasis } from '../../src/spaces/reduction/coordinates.ts';
import { Decomposer, primitiveWord } from '../../src/spaces/reduction/decompose.ts';
import { type Fraction, fraction, fractionText, ONE, ZERO } from '../../src/spaces/reduction/fraction.ts';
import { convergentWords, generatorWords, passWord } from '../../src/spaces/reduction/words.ts';
import type { Generator, Space } from '../../src/spaces/space.ts';

const DIGITS = 150;
const CHECK_DIGITS = 300;
const BITS = Math.ceil(CHECK_DIGITS * Math.log2(10));
const write = process.argv.includes('write');
let failures = 0;

/** I of each word in units of 2^−BITS, with an error of at most 1 unit. */
function valuesOf(words: readonly string[]): Map<string, bigint> {
  const passes = words.map(passWord);
  const plan = planWords(
    passes.map((pass) => pass.word),
    rootSymmetry(2),
  );
  const size = tailsSize(BITS + 1, plan.length, REAL_STEP);
  const values = realTails(plan, size, {
    argument: () => {
      throw new Error('unused');
    },
  });
  return new Map(
    words.map((word, k) => {
      const answer = plan.answers[k] as (typeof plan.answers)[number];
      const value = values[answer.core] as bigint;
      const sign = answer.sign * (passes[k] as { sign: number }).sign;
      return [word, roundShift(sign < 0 ? -value : value, size.work - BITS)];
    }),
  );
}

/** The fraction of least height within 2^−bits of x/2^bits, by continued fraction; throws when it is not far smaller than the digits allow. */
function recognise(x: bigint, bits: number, what: string): Fraction {
  const drop = 12;
  let [a, b] = [roundShift(x, drop), 1n << BigInt(bits - drop)];
  let [p0, q0, p1, q1] = [0n, 1n, 1n, 0n];
  const limit = 1n << BigInt(Math.floor((bits - drop) / 2) - 2);
  while (b !== 0n) {
    const quotient = a >= 0n ? a / b : -((-a + b - 1n) / b);
    const [p, q] = [quotient * p1 + p0, quotient * q1 + q0];
    if (q > limit) break;
    [p0, q0, p1, q1] = [p1, q1, p, q];
    [a, b] = [b, a - quotient * b];
  }
  const spare = bits - drop - bitLength(p1) - bitLength(q1);
  if (spare < bits / 3) throw new Error(`${what}: no small fraction (${p1}/${q1}, ${spare} of ${bits} bits to spare)`);
  return fraction(p1, q1);
}

function run(space: Space, least: 1 | 3, letters: readonly string[], maxWeight: number, file: string): void {
  const table = new Map<string, Fraction>();
  const decomposer = new Decomposer((word) => {
    const known = table.get(word);
    if (known === undefined) throw new Error(`c(${word}) is not known yet`);
    return known;
  });
  const generatorValues = new Map<string, bigint>();
  const images = new Map<string, Combination>();
  const imageOf = (generator: Generator): Combination => images.get(generator.text) as Combination;
  const lines: string[] = [];
  for (let weight = 1; weight <= maxWeight; weight++) {
    const began = performance.now();
    const words = convergentWords(weight, letters);
    const values = valuesOf(words);
    if (weight === 2) generatorValues.set('pi', -6n * (values.get('10') as bigint));
    // The generators define φ: what D_r says, and nothing in the primitive direction but for log 2, ζ(odd) and π².
    for (const generator of space.generators.filter((g) => g.weight === weight)) {
      if (generator.text === 'pi') {
        images.set('pi', new Map([['p', ONE]]));
        continue;
      }
      const combination = generatorWords(generator.text);
      let value = 0n;
      const known = new Map<string, Fraction>();
      for (const [word, factor] of combination) {
        value += factor.p * (values.get(word) as bigint);
        for (const [f, x] of decomposer.knownPart(word)) {
          const old = known.get(f) ?? ZERO;
          known.set(f, fraction(old.p * x.q * factor.q + x.p * factor.p * old.q, old.q * x.q * factor.q));
        }
      }
      const classical = generator.text === 'log(2)' || /^zeta\(\d+\)$/.test(generator.text);
      if (classical) known.set(primitiveWord(weight), ONE);
      generatorValues.set(generator.text, value);
      images.set(generator.text, known);
    }
    const basis = weightBasis(weight, least, imagedProducts(weight, space.generators, imageOf));
    const productValues = productsOf(space.generators, weight).map(({ powers }) =>
      powers.reduce((x, { generator, count }) => {
        let result = x;
        for (let k = 0; k < count; k++)
          result = roundShift(result * (generatorValues.get(generator.text) as bigint), BITS);
        return result;
      }, 1n << BigInt(BITS)),
    );
    const primitive = coordinates(new Map([[primitiveWord(weight), ONE]]), basis);
    const evaluate = (x: readonly Fraction[]): bigint =>
      x.reduce((sum, c, i) => sum + (c.p * (productValues[i] as bigint)) / c.q, 0n);
    const unit = evaluate(primitive);
    const bits = Math.ceil(DIGITS * Math.log2(10));
    let worst = 0;
    for (const word of words) {
      const rest = coordinates(decomposer.knownPart(word), basis);
      const missing = ((((values.get(word) as bigint) - evaluate(rest)) << BigInt(BITS)) / unit) >> BigInt(BITS - bits);
      const c = recognise(missing, bits, `${space.key} ${word}`);
      table.set(word, c);
      const full = coordinates(decomposer.image(word), basis);
      const gap = (values.get(word) as bigint) - evaluate(full);
      const size = full.reduce((most, x) => Math.max(most, bitLength(x.p)), 0);
      if (bitLength(gap) > size + 24) {
        failures++;
        console.log(`FAILED ${word}: gap of ${bitLength(gap)} bits`);
      }
      worst = Math.max(worst, size);
    }
    const line = words.map((word) => fractionText(table.get(word) as Fraction)).join(' ');
    lines.push(line);
    const seconds = ((performance.now() - began) / 1000).toFixed(1);
    console.log(
      `${space.key} weight ${weight}: ${words.length} words, dimension ${basis.elements.length}, coefficients to ${Math.ceil(worst * 0.30103)} digits, checked at ${CHECK_DIGITS} digits, ${seconds} s`,
    );
  }
  store(file, lines);
}

function store(file: string, lines: readonly string[]): void {
  const text = `${JSON.stringify({ note: 'Made and verified by test/campaign/reductions.ts: c of the convergent words of each weight, see src/spaces/reduction.', weights: lines }, null, 1)}\n`;
  if (write) {
    writeFileSync(file, text);
    console.log(`wrote ${file} (${text.length} bytes)`);
  } else if (readFileSync(file, 'utf8') === text) console.log(`${file}: the stored data are the same`);
  else {
    failures++;
    console.log(`FAILED ${file}: the stored data differ`);
  }
}

run(multipleZetaSpace, 3, ['0', '1'], 12, 'src/spaces/data/mzv.json');
run(alternatingSpace, 1, ['0', '1', 'm'], 8, 'src/spaces/data/alternating.json');
console.log(failures === 0 ? 'all reductions verified' : `${failures} failed`);
process.exit(failures === 0 ? 0 : 1);
