/**
 * The catalogue against outside programs, identities, and itself at higher precision:
 * node .ci/run-ts.mjs test/campaign/catalogue.ts [draws per family = 20] [most digits = 3000] [seed]
 *
 * A ball must come within 10^−digits (relative to max(1, |x|)) plus its own radius of what PARI/GP and mpmath find with at least 40
 * more digits; where they are not installed that part is skipped, and said. Identities must give a ball around zero with the radius asked
 * for. 1,000 random pairs of constant and precision must contain the value computed 200 bits higher.
 */
import { accuracyOf } from '../../src/constants/accurate.ts';
import { evaluateTerm } from '../../src/constants/evaluate.ts';
import { families } from '../../src/constants/registry.ts';
import { parseTerm } from '../../src/expression/parse.ts';
import { type Ball, contains, containsZero } from '../../src/number/ball.ts';
import { toComplex, type Value } from '../../src/number/complex.ts';
import { absolute } from '../../src/number/integer.ts';
import { type Random, randomFrom } from '../support/random.ts';
import { type Draw, sources } from './catalogue/draws.ts';
import { identities } from './catalogue/identities.ts';
import { type Answer, askMpmath, askPari, type Decimal, type Question } from './catalogue/outside.ts';

const draws = Number(process.argv[2] ?? 20);
const mostDigits = Number(process.argv[3] ?? 3000);
const seed = process.argv[4] ?? 'catalogue';
const SECONDS = 600;

let wrong = 0;

function complain(message: string): void {
  wrong++;
  console.log(`WRONG: ${message}`);
}

/** Log-uniform between 15 and `most`. */
function randomDigits(random: Random, most: number): number {
  return Math.round(15 * (most / 15) ** random.unit());
}

const bitsOf = (digits: number): number => Math.ceil(digits * Math.log2(10)) + 2;

/** Whether ball and decimal agree to `digits` digits, relative to max(1, |x|). */
function agrees(x: Ball, d: Decimal, digits: number): boolean {
  const scale = 10n ** BigInt(d.places);
  const distance = absolute(x.mid * scale - (d.mantissa << BigInt(x.bits)));
  const size = absolute(d.mantissa) > scale ? absolute(d.mantissa) : scale;
  return (distance - x.rad * scale) * 10n ** BigInt(digits) <= size << BigInt(x.bits);
}

interface Case extends Draw {
  readonly digits: number;
}

type Ask = (questions: readonly Question[], seconds: number) => (Answer | null)[] | null;

function compare(name: string, family: string, cases: readonly Case[], questions: readonly Question[], ask: Ask): void {
  if (questions.length === 0) return;
  const answers = ask(questions, SECONDS);
  if (answers === null) {
    console.log(`${family}: ${name} is not installed, skipped`);
    return;
  }
  let digits = 0;
  let compared = 0;
  cases.forEach((one, j) => {
    const answer = answers[j];
    if (answer === null || answer === undefined) return;
    let value: Value;
    try {
      value = evaluateTerm(parseTerm(one.text), bitsOf(one.digits));
    } catch (error) {
      complain(`${one.text} at ${one.digits} digits: ${error instanceof Error ? error.message : error}`);
      return;
    }
    const { re, im } = toComplex(value);
    if (accuracyOf(value) < bitsOf(one.digits)) complain(`${one.text}: radius too large at ${one.digits} digits`);
    if (!agrees(re, answer.re, one.digits) || !agrees(im, answer.im, one.digits)) {
      complain(`${one.text} at ${one.digits} digits against ${name}`);
    }
    digits += one.digits;
    compared++;
  });
  console.log(`${family.padEnd(40)} ${name.padEnd(8)} ${compared}/${cases.length} values, ${digits} digits`);
  if (compared === 0) complain(`${family}: ${name} answered nothing`);
  total += digits;
}

let total = 0;

function againstOutside(): void {
  for (const source of sources) {
    const random = randomFrom(`${seed} ${source.family}`);
    const all = Array.from({ length: draws }, () => ({ family: source.family, ...source.draw(random) }));
    for (const [name, ask, most, word] of [
      ['PARI/GP', askPari, source.pariDigits, 'pari'],
      ['mpmath', askMpmath, source.mpmathDigits, 'mpmath'],
    ] as const) {
      const cases = all.flatMap((one): Case[] => {
        if (most === 0 || one[word] === undefined) return [];
        return [{ ...one, digits: Math.min(mostDigits, randomDigits(random, most)) }];
      });
      const questions = cases.map((one) => ({ expression: one[word] as string, digits: one.digits }));
      compare(name, source.family, cases, questions, ask);
    }
  }
}

function identitiesHold(): void {
  let checked = 0;
  for (const identity of identities) {
    const random = randomFrom(`${seed} ${identity.name}`);
    for (let k = 0; k < draws; k++) {
      const text = identity.draw(random);
      const digits = randomDigits(random, Math.min(mostDigits, 1000));
      const value = evaluateTerm(parseTerm(text), bitsOf(digits));
      const { re, im } = toComplex(value);
      if (!containsZero(re) || !containsZero(im)) complain(`${identity.name}: ${text} at ${digits} digits`);
      total += digits;
      checked++;
    }
  }
  console.log(`identities: ${checked} of ${identities.length} kinds hold`);
}

/** Random members for the honesty check: what the families list, and what the sources draw. */
function honest(): void {
  const random = randomFrom(`${seed} honesty`);
  const listed = families.flatMap((f) => f.examples);
  const slow = /^(bessel|Ls)\(/;
  let pairs = 0;
  while (pairs < 1000) {
    const source = sources[random.integer(0, sources.length - 1)];
    const drawn = source === undefined ? '' : source.draw(random).text;
    const text = random.integer(0, 2) === 0 ? (listed[random.integer(0, listed.length - 1)] as string) : drawn;
    const bits = random.integer(10, slow.test(text) ? 120 : 1500);
    const term = parseTerm(text);
    let value: Value;
    try {
      value = evaluateTerm(term, bits);
    } catch (error) {
      complain(`${text} at ${bits} bits: ${error instanceof Error ? error.message : error}`);
      pairs++;
      continue;
    }
    const [a, b] = [toComplex(value), toComplex(evaluateTerm(term, bits + 200))];
    if (!contains(a.re, b.re) || !contains(a.im, b.im)) complain(`${text} at ${bits} bits does not contain itself`);
    pairs++;
  }
  console.log(`honesty: ${pairs} pairs contain the value computed 200 bits higher`);
}

const start = performance.now();
identitiesHold();
againstOutside();
honest();
console.log(`${total} digits compared, ${wrong} wrong, ${((performance.now() - start) / 1000).toFixed(0)} s`);
process.exit(wrong === 0 ? 0 : 1);
