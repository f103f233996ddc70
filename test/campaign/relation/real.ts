import { readFileSync } from 'node:fs';
import { evaluateTerm } from '../../../src/constants/evaluate.ts';
import { parseTerm } from '../../../src/expression/parse.ts';
import { type Ball, divide, multiply, power, widen } from '../../../src/number/ball.ts';
import { isComplex } from '../../../src/number/complex.ts';
import { parseDecimal, toBall } from '../../../src/number/decimal.ts';
import { absolute } from '../../../src/number/integer.ts';
import { startAlgebraic } from '../../../src/relation/algebraic.ts';
import { POSITIVE, startMultiplicative } from '../../../src/relation/multiplicative.ts';
import { primitive } from '../../../src/relation/significance.ts';
import { run } from '../../relation/planted.ts';
import { bifurcationPoint } from './logistic.ts';

interface Problem {
  readonly id: string;
  readonly form: string;
  readonly value?: string;
  readonly basis?: readonly string[];
  readonly relation?: Record<string, string>;
}

const METHODS = ['pslq', 'lattice'] as const;
const BITS = 1300;

function load<T>(name: string): T {
  return JSON.parse(readFileSync(`test/reference/${name}.json`, 'utf8')) as T;
}

/** A constant from our own catalogue, or else from the outside digits. */
class Constants {
  private readonly outside = new Map(
    load<{ constants: { id: string; digits: string }[] }>('constants').constants.map((c) => [c.id, c.digits]),
  );
  own = 0;
  foreign = 0;

  value(text: string): Ball {
    try {
      const value = evaluateTerm(parseTerm(text), BITS);
      if (isComplex(value)) throw new Error('complex');
      this.own++;
      return value;
    } catch {
      this.foreign++;
      return this.fromOutside(text);
    }
  }

  private fromOutside(text: string): Ball {
    const known = this.outside.get(text);
    if (known !== undefined) return toBall(parseDecimal(known), 990);
    const integer = /^\d+$/.test(text) ? BigInt(text) : undefined;
    if (integer !== undefined) return { mid: integer, rad: 0n, bits: 0 };
    const parts = topLevelParts(text);
    if (parts.length > 1) {
      return parts.slice(1).reduce<Ball>(
        (x, part, k) => {
          if (k % 2 === 0) return x;
          const factor = this.fromOutside(part);
          return parts[k] === '*' ? multiply(x, factor, BITS + 200) : divide(x, factor, BITS + 200);
        },
        this.fromOutside(parts[0] as string),
      );
    }
    const raised = /^(.*)\^(\d+)$/.exec(text);
    if (raised !== null) return power(this.fromOutside(raised[1] as string), Number(raised[2]), BITS + 200);
    throw new Error(`no digits for ${text}`);
  }
}

/** Factors and the signs * and / between them, outside brackets. */
function topLevelParts(text: string): string[] {
  const parts = [''];
  let depth = 0;
  for (const c of text) {
    depth += c === '(' ? 1 : c === ')' ? -1 : 0;
    if (depth === 0 && (c === '*' || c === '/')) parts.push(c, '');
    else parts[parts.length - 1] += c;
  }
  return parts;
}

/** Integer vector (−L, L·coefficients…) of the expression, with L the common denominator. */
function expectedOf(problem: Problem): bigint[] {
  const fractions = (problem.basis ?? []).map((b) => (problem.relation?.[b] ?? '0').split('/').map(BigInt));
  const denominators = fractions.map(([, q]) => q ?? 1n);
  const common = denominators.reduce((l, q) => (l * q) / gcd(l, q), 1n);
  return primitive([-common, ...fractions.map(([p], k) => ((p as bigint) * common) / (denominators[k] as bigint))]);
}

function gcd(a: bigint, b: bigint): bigint {
  return b === 0n ? a : gcd(b, a % b);
}

/** log x for x > 0, through the logarithm of the exact midpoint: |log(x) − log(mid)| ≤ rad/(mid − rad). */
function logarithm(x: Ball): Ball {
  const exact = evaluateTerm(parseTerm(`log(${x.mid}/${1n << BigInt(x.bits)})`), BITS) as Ball;
  const bits = exact.bits;
  return widen(exact, (x.rad << BigInt(bits)) / (x.mid - x.rad) + 1n);
}

export function realCampaign(): string[] {
  const failures: string[] = [];
  const constants = new Constants();
  const problems = load<{ problems: Problem[] }>('problems-open').problems;
  for (const problem of problems) {
    if (problem.value === undefined) continue;
    const decimal = parseDecimal(problem.value);
    const value = toBall(decimal, Math.min(298, decimal.significantDigits - 2));
    for (const method of METHODS) {
      const started = performance.now();
      let said = '';
      try {
        if (problem.form === 'linear') {
          const rows = [value, ...(problem.basis ?? []).map((b) => constants.value(b))].map((x) => [x]);
          const outcome = run({ rows, method });
          said = outcome.kind === 'relation' ? outcome.coefficients.join() : outcome.kind;
          if (said !== expectedOf(problem).join())
            failures.push(`${problem.id} (${method}): ${said}, expected ${expectedOf(problem).join()}`);
        } else if (problem.form === 'multiplicative') {
          const numbers = [value, ...(problem.basis ?? []).map((b) => constants.value(b))].map((x) => ({
            modulus: logarithm(x),
            turn: POSITIVE,
          }));
          const search = startMultiplicative({ numbers, method });
          let outcome = search.step();
          while (outcome === undefined) outcome = search.step();
          said =
            outcome.kind === 'relation'
              ? `${outcome.coefficients.join()} root ${outcome.root?.p}/${outcome.root?.q}`
              : outcome.kind;
          if (said !== `${expectedOf(problem).join()} root 0/1`) failures.push(`${problem.id} (${method}): ${said}`);
        } else if (problem.form === 'algebraic') {
          for (const digits of [200, 250]) {
            const search = startAlgebraic({ value: toBall(decimal, digits), degree: 30, method });
            let outcome = search.step();
            while (outcome === undefined) outcome = search.step();
            said =
              outcome.kind === 'algebraic'
                ? `degree ${outcome.polynomial.length - 1}, irreducible ${outcome.irreducible}, constant ${outcome.polynomial[0]}`
                : outcome.kind;
            if (said !== 'degree 30, irreducible true, constant 697')
              failures.push(`${problem.id} (${method}, ${digits} digits): ${said}`);
          }
        }
      } catch (error) {
        failures.push(`${problem.id} (${method}): ${error}`);
        said = String(error);
      }
      console.log(`  ${problem.id} (${method}): ${said.slice(0, 90)}, ${(performance.now() - started).toFixed(0)} ms`);
    }
  }
  console.log(`  constants: ${constants.own} from the catalogue, ${constants.foreign} from outside digits`);
  return [...failures, ...logisticCampaign()];
}

/**
 * The bifurcation of the period-4 cycle: a root of a polynomial of degree 12, given in Bailey and Broadhurst, Math. Comp. 70 (2001) 1719
 * (coefficients from memory).
 */
function logisticCampaign(): string[] {
  const published = [4913n, 0n, 2108n, -604n, -977n, 8n, 44n, 392n, -193n, -40n, 48n, -12n, 1n];
  const failures: string[] = [];
  const value = bifurcationPoint(4, 3.54409035955, 400);
  for (const method of METHODS) {
    for (const degree of [12, 14]) {
      const search = startAlgebraic({ value, degree, method });
      let outcome = search.step();
      while (outcome === undefined) outcome = search.step();
      const ok = outcome.kind === 'algebraic' && outcome.irreducible && outcome.polynomial.join() === published.join();
      if (!ok)
        failures.push(
          `logistic map, period 4 (${method}, degree ${degree}): ${outcome.kind === 'algebraic' ? outcome.polynomial.join() : outcome.kind}`,
        );
    }
  }
  console.log(
    `  logistic map, period 4: r = ${approximately(value)}, degree-12 polynomial ${failures.length === 0 ? 'found by both methods, also when degree 14 is allowed' : 'NOT as published'}`,
  );
  return [...failures, ...periodEight()];
}

/** For the period-8 cycle, −r·(r − 2) has degree 120 and constant term 257^30 (same paper, from memory). */
function periodEight(): string[] {
  const r = bifurcationPoint(8, 3.564407266095, 10_000);
  const value = { mid: -(r.mid * (r.mid - (2n << BigInt(r.bits)))) >> BigInt(r.bits), rad: 8n * r.rad, bits: r.bits };
  const started = performance.now();
  const search = startAlgebraic({ value, degree: 120, method: 'lattice', searchShares: [0.95] });
  let outcome = search.step();
  while (outcome === undefined) outcome = search.step();
  const ms = (performance.now() - started).toFixed(0);
  const ok =
    outcome.kind === 'algebraic' &&
    outcome.irreducible &&
    outcome.polynomial.length === 121 &&
    outcome.polynomial[0] === 257n ** 30n &&
    outcome.polynomial[120] === 1n;
  const verdict = ok ? 'irreducible of degree 120, monic, constant 257^30' : 'NOT as published';
  console.log(`  logistic map, period 8, 10,000 digits: ${outcome.kind}, ${ms} ms, ${verdict}`);
  return ok ? [] : [`logistic map, period 8: ${outcome.kind}`];
}

function approximately(x: Ball): number {
  return Number(absolute(x.mid) >> BigInt(x.bits - 50)) / 2 ** 50;
}
