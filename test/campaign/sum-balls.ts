/**
 * Honesty of the radii: for random members of the families of sums and integrals at random precisions, the ball must contain
 * the value computed 200 bits higher and be as small as promised: node .ci/run-ts.mjs test/campaign/sum-balls.ts [pairs = 1000] [most bits = 3400]
 */
import { evaluateTerm } from '../../src/constants/evaluate.ts';
import { familyOf } from '../../src/constants/registry.ts';
import { sumFamilies } from '../../src/constants/sums/index.ts';
import type { CallTerm } from '../../src/constants/term.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { contains } from '../../src/number/ball.ts';
import { toComplex } from '../../src/number/complex.ts';

const pairs = Number(process.argv[2] ?? 1000);
const mostBits = Number(process.argv[3] ?? 3400);
let state = 20261202;
function random(below: number): number {
  state = (state * 1103515245 + 12345) % 2147483648;
  return Math.floor((state / 2147483648) * below);
}
const pick = <T>(list: readonly T[]): T => list[random(list.length)] as T;
const indices = (signed: boolean): string[] =>
  Array.from({ length: 1 + random(3) }, () => `${signed && random(2) === 0 ? '-' : ''}${1 + random(4)}`);

/** A random call of the family, or one of its examples; may be refused. */
function draw(key: string, examples: readonly string[]): string {
  switch (key) {
    case 'multiple-zeta':
      return `zeta(${indices(false)})`;
    case 'alternating-sums':
      return `zeta(${indices(true)})`;
    case 'root-polylogarithms': {
      const s = indices(false);
      const order = pick([3, 6, 8, 12]);
      return `MPL(${s};${s.map(() => `r${order}^${random(order)}`)})`;
    }
    case 'central-binomial-sums':
      return `binsum(${indices(true)})`;
    case 'harmonic-polylogarithms':
      return `H(${Array.from({ length: 1 + random(4) }, () => pick(['0', '1', '-1']))};${1 + random(19)}/20)`;
    case 'multiple-polylogarithms':
      return `G(${Array.from({ length: 1 + random(3) }, () => pick(['0', '1', '2', '-1/3', 'i', 'r6', '1+i/7', 'sqrt(3)']))};${pick(['1', '1/2', 'i/3', '1-i/2'])})`;
    default:
      return pick(examples);
  }
}

let done = 0;
let refused = 0;
let failures = 0;
const slow = new Set(['bessel-moments', 'multiple-polylogarithms', 'harmonic-polylogarithms']);
const tally = new Map<string, number>();
while (done < pairs) {
  const family = pick(sumFamilies);
  const text = draw(family.key, family.examples);
  const bits = 8 + random(slow.has(family.key) ? Math.floor(mostBits / 4) : mostBits);
  try {
    const term = parseTerm(text) as CallTerm;
    familyOf(term);
    const low = toComplex(evaluateTerm(term, bits));
    const high = toComplex(evaluateTerm(term, bits + 200));
    const good = [
      [low.re, high.re],
      [low.im, high.im],
    ].every(
      ([a, b]) =>
        a !== undefined &&
        b !== undefined &&
        contains(a, { ...b, rad: 0n }) &&
        a.rad << BigInt(bits) <= 1n << BigInt(a.bits),
    );
    if (!good) {
      failures++;
      console.log(`FAILED ${text} at ${bits} bits`);
    }
    done++;
    tally.set(family.key, (tally.get(family.key) ?? 0) + 1);
  } catch (error) {
    if (!(error instanceof Error) || error.name !== 'InputError') throw error;
    refused++;
  }
}
for (const [key, count] of [...tally].sort()) console.log(`${key.padEnd(28)} ${count}`);
console.log(`${done} pairs, ${failures} dishonest balls, ${refused} refused arguments`);
process.exit(failures === 0 ? 0 : 1);
