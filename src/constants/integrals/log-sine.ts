/**
 * Log-sine integrals Ls(n,θ) = −∫₀^θ log^{n−1}|2 sin(t/2)| dt and Ls(n,k,θ) = −∫₀^θ t^k log^{n−1−k}|2 sin(t/2)| dt for rational
 * multiples θ of π, 0 < θ ≤ 2π.
 *
 * With z = e^{it}: log(2 sin(t/2)) = log(1 − z) − i(t − π)/2, and log^r(1 − z) = (−1)^r r! Li_{1,…,1}(z); integration by parts against
 * t^q dt leaves Nielsen polylogarithms S_{p,r}, the words 0^p a^r with a = e^{−iθ}:
 *
 *   ∫₀^θ t^q log^r(1−e^{it}) dt = (−1)^r r! (−i)^{q+1} [Σ_{p=0}^q (−1)^p q!/(q−p)! (iθ)^{q−p} S_{p+1,r}(e^{iθ}) − (−1)^q q! S_{q+1,r}(1)]
 *
 * for r ≥ 1. They are evaluated together in one pass each for e^{iθ} and 1; the sum is ball arithmetic, repeated with more
 * bits until its radius is small enough.
 */
import {
  type Ball,
  fromInteger,
  overInteger,
  power,
  subtract as subtractReal,
  timesInteger,
} from '../../number/ball.ts';
import { add, isComplex, multiply, negate, subtract, toComplex, type Value } from '../../number/complex.ts';
import { InputError } from '../../number/errors.ts';
import type { EvaluationContext, Family } from '../family.ts';
import { evaluateRootWords, ringOf } from '../sums/root-words.ts';
import { letterOf } from '../sums/words.ts';
import { isRational, symbol, type Term } from '../term.ts';

export interface LogSineArgs {
  readonly n: number;
  readonly k: number;
  /** θ = π·p/q, in lowest terms. */
  readonly p: number;
  readonly q: number;
}

const MAX_WEIGHT = 20;
const EXAMPLE = 'Ls(3,2*pi/3) or Ls(4,1,pi/3)';

function parse(term: Parameters<Family['parse']>[0]): LogSineArgs | null {
  if (term.kind !== 'call' || term.name !== 'Ls') return null;
  const list = term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  const theta = list.at(-1);
  const [n, k = 0] = list.slice(0, -1).map((t) => (isRational(t) && t.q === 1n ? Number(t.p) : -1));
  if (theta === undefined || list.length < 2 || list.length > 3 || n === undefined || n < 1 || k < 0) {
    throw new InputError('wrong-arguments', `Ls takes n, optionally k, and the angle, as in ${EXAMPLE}.`);
  }
  if (n > MAX_WEIGHT) throw new InputError('too-heavy', `Ls is offered for n up to ${MAX_WEIGHT}.`);
  if (k > n - 1) throw new InputError('bad-index', 'In Ls(n,k,theta), k must be at most n-1.');
  const turns = multipleOfPi(theta);
  if (turns === null || turns.p <= 0n || turns.p > 2n * turns.q || turns.q > 12n) throw badAngle();
  const [p, q] = [Number(turns.p), Number(turns.q)];
  if (![1, 2, 3, 4, 6, 8, 12].includes(orderOf(p, q))) throw badAngle();
  return { n, k, p, q };
}

function badAngle(): InputError {
  return new InputError(
    'bad-angle',
    'The angle of Ls must be a multiple of pi/6 or pi/4 that is larger than 0 and at most 2*pi.',
  );
}

/** Order of the root of unity e^{iπp/q}. */
function orderOf(p: number, q: number): number {
  return p % 2 === 0 ? q : 2 * q;
}

function multipleOfPi(term: Term): { p: bigint; q: bigint } | null {
  if (term.kind === 'symbol') return term.name === 'pi' ? { p: 1n, q: 1n } : null;
  if (term.kind !== 'product' || term.factors.length !== 2) return null;
  const [first, second] = term.factors as [Term, Term];
  return isRational(first) && second.kind === 'symbol' && second.name === 'pi' ? { p: first.p, q: first.q } : null;
}

/** S_{p,r} at e^{iπ·turns} and at 1 for all 1 ≤ p, 1 ≤ r with p + r ≤ n, by key `p,r`. */
interface Nielsen {
  readonly there: ReadonlyMap<string, Value>;
  readonly one: ReadonlyMap<string, Value>;
}

function nielsen({ n, p, q }: LogSineArgs, bits: number, context: EvaluationContext): Nielsen {
  const order = orderOf(p, q);
  const ring = ringOf(order);
  // a = e^{−iπp/q} as a power of e^{2πi/ring}.
  const exponent = ((((-p * ring) / (2 * q)) % ring) + ring) % ring;
  const at = (letter: string): Map<string, Value> => {
    const keys: [number, number][] = [];
    for (let zeros = 1; zeros < n; zeros++) for (let r = 1; zeros + r <= n; r++) keys.push([zeros, r]);
    const words = keys.map(([zeros, r]) => '0'.repeat(zeros) + letter.repeat(r));
    const values = evaluateRootWords(words, letter === '1' ? 2 : ring, bits, context);
    return new Map(keys.map(([zeros, r], j) => [`${zeros},${r}`, values[j] as Value]));
  };
  return { there: at(letterOf(1 + exponent)), one: at('1') };
}

function factorial(n: number): bigint {
  return n <= 1 ? 1n : BigInt(n) * factorial(n - 1);
}

function evaluate(args: LogSineArgs, bits: number, context: EvaluationContext): Ball {
  for (let extra = 32; ; extra *= 2) {
    const value = attempt(args, bits + extra, context);
    if (value.rad << BigInt(bits) <= 1n << BigInt(value.bits)) return value;
  }
}

function attempt(args: LogSineArgs, bits: number, context: EvaluationContext): Ball {
  const { n, k, p, q } = args;
  const m = n - 1 - k;
  const pi = context.argument(symbol('pi'), bits);
  if (isComplex(pi)) throw new TypeError('attempt: expected a real π');
  const theta = overInteger(timesInteger(pi, BigInt(p)), BigInt(q));
  const table = nielsen(args, bits, context);
  // (log(1−z) − i(t−π)/2)^m = Σ_r C(m,r) log^r(1−z) (−i/2)^{m−r} Σ_s C(m−r,s) t^s (−π)^{m−r−s}
  let total: Value = fromInteger(0n);
  for (let r = 0; r <= m; r++) {
    for (let s = 0; s <= m - r; s++) {
      const rest = m - r - s;
      const count = binomial(m, r) * binomial(m - r, s) * (rest % 2 === 0 ? 1n : -1n);
      const factor = timesInteger(power(pi, rest, bits), count);
      const moment = logMoment(r, k + s, theta, table, bits);
      const turned = timesPowerOfI(multiply(moment, factor, bits), 3 * (m - r));
      total = add(total, scaledDown(turned, m - r));
    }
  }
  return toComplex(negate(total)).re;
}

/** ∫₀^θ t^q log^r(1 − e^{it}) dt. */
function logMoment(r: number, q: number, theta: Ball, table: Nielsen, bits: number): Value {
  if (r === 0) return overInteger(power(theta, q + 1, bits), BigInt(q + 1));
  let sum: Value = fromInteger(0n);
  for (let p = 0; p <= q; p++) {
    const count = (factorial(q) / factorial(q - p)) * (p % 2 === 0 ? 1n : -1n);
    const factor = timesInteger(power(theta, q - p, bits), count);
    const value = multiply(table.there.get(`${p + 1},${r}`) as Value, factor, bits);
    sum = add(sum, timesPowerOfI(value, q - p));
  }
  const end = multiply(
    table.one.get(`${q + 1},${r}`) as Value,
    fromInteger(factorial(q) * (q % 2 === 0 ? 1n : -1n)),
    bits,
  );
  const bracket = subtract(sum, end);
  const scaled = multiply(bracket, fromInteger((r % 2 === 0 ? 1n : -1n) * factorial(r)), bits);
  return timesPowerOfI(scaled, 3 * (q + 1));
}

function timesPowerOfI(x: Value, n: number): Value {
  const turns = n % 4;
  if (turns === 0) return x;
  const { re, im } = toComplex(x);
  const minus = (b: Ball): Ball => subtractReal(fromInteger(0n), b);
  if (turns === 1) return { re: minus(im), im: re };
  return turns === 2 ? { re: minus(re), im: minus(im) } : { re: im, im: minus(re) };
}

function scaledDown(x: Value, halvings: number): Value {
  const half = (b: Ball): Ball => ({ ...b, bits: b.bits + halvings });
  return isComplex(x) ? { re: half(x.re), im: half(x.im) } : half(x);
}

function binomial(n: number, k: number): bigint {
  return factorial(n) / (factorial(k) * factorial(n - k));
}

const angleText = (p: number, q: number): string => `${p === 1 ? '' : `${p}*`}pi${q === 1 ? '' : `/${q}`}`;

export const logSineIntegrals: Family<LogSineArgs> = {
  key: 'log-sine-integrals',
  title: 'Log-sine integrals',
  names: ['Ls'],
  parse,
  weight: ({ n }) => n,
  latex: ({ n, k, p, q }) => {
    const top = `${p === 1 ? '' : p}\\pi`;
    const angle = q === 1 ? top : `\\tfrac{${top}}{${q}}`;
    return `\\mathrm{Ls}_{${n}}${k === 0 ? '' : `^{(${k})}`}\\left(${angle}\\right)`;
  },
  text: ({ n, k, p, q }) => `Ls(${n}${k === 0 ? '' : `,${k}`},${angleText(p, q)})`,
  isReal: () => true,
  evaluate,
  definition:
    '\\mathrm{Ls}_n^{(k)}(\\theta)=-\\int_0^\\theta t^k\\,\\log^{n-1-k}\\left|2\\sin\\tfrac t2\\right|dt,\\quad \\mathrm{Ls}_n=\\mathrm{Ls}_n^{(0)}',
  source:
    'Lewin, Polylogarithms and Associated Functions (1981); Davydychev and Kalmykov, Nucl. Phys. B 605 (2001) 266; Borwein and Straub, J. Approx. Theory 193 (2015) 74.',
  examples: ['Ls(2,pi/3)', 'Ls(3,2*pi/3)', 'Ls(4,pi/3)', 'Ls(4,1,pi/3)', 'Ls(3,pi)'],
};
