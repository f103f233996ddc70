/**
 * Bessel moments bessel(k,a,b) = ∫₀^∞ t^k I₀(t)^a K₀(t)^b dt with a < b.
 *
 * I₀^a K₀^b is the solution of L_{n+1} (bessel-operator.ts, n = a + b) that behaves as (−1)^b (log t + g)^b, g = γ − log 2, at t = 0;
 * so it is (−1)^b Σ_j C(b,j) g^{b−j} j! [ε^j] Σ_m c_m(ε) t^{2m+ε}, which is integrated term by term up to an integer T.
 *
 * **Tail.** I₀(t) ≤ e^t and K₀(t) ≤ √(π/2t) e^{−t} < e^{−t} for t ≥ 2, hence with c = b − a and cT ≥ 2k the rest of the integral is at
 * most 2 T^k e^{−cT}/c.
 *
 * **Series.** e_m = c_m T^{2m} is carried as b + 1 integers in units of 2^−W with one truncated division each. In the sum norm
 * of polynomials mod ε^{b+1} the polynomial p_j(s + ε) is at most P_j(s + 1), P_j having the absolute coefficients of p_j, and
 * 1/(s + ε)^{n+1} is at most (s − 1)^{−(n+1)}. So both |e_m| and its error obey x_m ≤ Σ_j R_{m,j} x_{m−j} (+ b + 1 units) with
 * R_{m,j} = P_j(2m−2j+1) T^{2j}/(2m−1)^{n+1}. `majorant` runs that recurrence in doubles with a separate exponent, each value
 * rounded up; it gives the number of terms (its Σ_j R is below 1/4 there, so the rest is at most twice the last J values together),
 * and the bits lost. The final combination is ball arithmetic.
 */
import { add, type Ball, fromInteger, multiply, power, subtract, timesInteger, widen } from '../../number/ball.ts';
import { isComplex } from '../../number/complex.ts';
import { InputError } from '../../number/errors.ts';
import type { EvaluationContext, Family } from '../family.ts';
import { call, rational, symbol, type Term } from '../term.ts';
import { besselOperator, taylorShift, truncatedProduct } from './bessel-operator.ts';

export interface BesselMomentArgs {
  readonly k: number;
  readonly a: number;
  readonly b: number;
}

const MAX_TOTAL = 12;
const MAX_POWER = 40;

function parse(term: Parameters<Family['parse']>[0]): BesselMomentArgs | null {
  if (term.kind !== 'call' || term.name !== 'bessel') return null;
  const list = term.groups.length === 1 ? (term.groups[0] ?? []) : [];
  const numbers = list.map((t) =>
    t.kind === 'rational' && t.q === 1n && t.p >= 0n && t.p <= 1000n ? Number(t.p) : -1,
  );
  const [k, a, b] = numbers;
  if (numbers.length !== 3 || k === undefined || a === undefined || b === undefined || numbers.includes(-1)) {
    throw new InputError('wrong-arguments', 'bessel takes three integers k, a, b of at least 0, as in bessel(1,1,4).');
  }
  if (a >= b)
    throw new InputError(
      'divergent',
      'bessel(k,a,b) is offered for a < b only, where the integrand falls exponentially.',
    );
  if (a + b > MAX_TOTAL || k > MAX_POWER) {
    throw new InputError(
      'too-heavy',
      `bessel(k,a,b) is offered for a + b up to ${MAX_TOTAL} and k up to ${MAX_POWER}.`,
    );
  }
  return { k, a, b };
}

/** Least integer T for which the tail is at most 2^−bits. */
function cutoff({ k, a, b }: BesselMomentArgs, bits: number): number {
  const c = b - a;
  let t = Math.max(2, Math.ceil((2 * k) / c));
  const log2Tail = (x: number): number => 1 + k * Math.log2(x) - (c * x) / Math.LN2 - Math.log2(c) + 0.001;
  t = Math.max(t, Math.floor(((bits - 8) * Math.LN2) / c));
  while (log2Tail(t) > -bits) t++;
  return t;
}

interface Majorant {
  /** Number of terms m = 0 … terms − 1. */
  readonly terms: number;
  /** log2 of a bound for Σ |e_m| over all m. */
  readonly log2Sum: number;
  /** log2 of a bound, in units, for the sum of all |errors| of the e_m, what lies past the last term included at 1 unit. */
  readonly log2Error: number;
}

function majorant(n: number, b: number, cut: number, work: number): Majorant {
  const operator = besselOperator(n).slice(1);
  const absolutes = operator.map((p) => p.map((c) => Math.abs(Number(c))));
  const window = operator.length;
  // Values x·2^shift, newest first; sizes start from 1, errors from 0.
  let sizes = [1, ...Array<number>(window - 1).fill(0)];
  let errors = Array<number>(window).fill(0);
  let sizeShift = 0;
  let errorShift = 0;
  let log2Sum = 0;
  let log2Error = Number.NEGATIVE_INFINITY;
  for (let m = 1; ; m++) {
    const rates = absolutes.map((p, at) => {
      const j = at + 1;
      if (j > m) return 0;
      const s = 2 * (m - j) + 1;
      const value = p.reduceRight((sum, c) => sum * s + c, 0);
      return Math.exp(Math.log(value) + 2 * j * Math.log(cut) - (n + 1) * Math.log(2 * m - 1)) * (1 + 1e-9);
    });
    const next = (values: readonly number[]): number =>
      rates.reduce((sum, r, at) => sum + r * (values[at] as number), 0);
    const size = next(sizes);
    const error = next(errors) + (b + 1) * 2 ** -errorShift;
    sizes = [size, ...sizes.slice(0, -1)];
    errors = [error, ...errors.slice(0, -1)];
    log2Sum = addLog2(log2Sum, Math.log2(size) + sizeShift);
    log2Error = addLog2(log2Error, Math.log2(error) + errorShift);
    [sizes, sizeShift] = rescale(sizes, sizeShift);
    [errors, errorShift] = rescale(errors, errorShift);
    if (m < window || rates.reduce((sum, r) => sum + r, 0) > 0.25) continue;
    const rest = Math.log2(sizes.reduce((sum, x) => sum + x, 0)) + sizeShift;
    if (rest + 1 < -work - 1) return { terms: m + 1, log2Sum: log2Sum + 0.1, log2Error: addLog2(log2Error, 0) + 0.1 };
  }
}

function addLog2(a: number, b: number): number {
  const high = Math.max(a, b);
  return high === Number.NEGATIVE_INFINITY ? high : high + Math.log2(2 ** (a - high) + 2 ** (b - high)) + 1e-12;
}

function rescale(values: number[], shift: number): [number[], number] {
  const top = Math.max(...values);
  if (top < 2 ** 200 && top > 2 ** -200) return [values, shift];
  const by = Math.floor(Math.log2(top));
  return [values.map((x) => x * 2 ** -by), shift + by];
}

/** Σ_m e_m(ε)/(k + 2m + 1 + ε) mod ε^{b+1} in units of 2^−work. */
function integratedSeries(
  { k, a, b }: BesselMomentArgs,
  cut: number,
  terms: number,
  work: number,
  context: EvaluationContext,
): bigint[] {
  const n = a + b;
  const size = b + 1;
  const operator = besselOperator(n);
  const square = BigInt(cut) ** 2n;
  let recent: bigint[][] = [[1n << BigInt(work), ...Array<bigint>(b).fill(0n)]];
  const total = Array<bigint>(size).fill(0n);
  collect(total, recent[0] as bigint[], BigInt(k + 1));
  const binomials = Array.from({ length: size }, (_, l) => (l % 2 === 0 ? 1n : -1n) * binomial(n + l, l));
  for (let m = 1; m < terms; m++) {
    const s = BigInt(2 * m);
    // (2m)^{n+1+b}/(2m + ε)^{n+1} mod ε^{b+1}, with integer coefficients.
    const inverse = binomials.map((c, l) => c * s ** BigInt(b - l));
    const sum = Array<bigint>(size).fill(0n);
    let scale = 1n;
    for (let j = 1; j < operator.length && j <= m; j++) {
      scale *= square;
      const shifted = taylorShift(operator[j] as bigint[], BigInt(2 * (m - j)), size);
      const factor = truncatedProduct(inverse, shifted, size);
      const e = recent[j - 1] as bigint[];
      for (let l = 0; l < size; l++) {
        const f = (factor[l] as bigint) * scale;
        if (f === 0n) continue;
        for (let i = 0; i + l < size; i++) sum[i + l] = (sum[i + l] as bigint) - f * (e[i] as bigint);
      }
    }
    const divisor = s ** BigInt(n + 1 + b);
    const e = sum.map((x) => x / divisor);
    recent = [e, ...recent.slice(0, operator.length - 2)];
    collect(total, e, BigInt(k + 2 * m + 1));
    if (m % 64 === 0) {
      context.signal?.throwIfAborted();
      context.onProgress?.(m / terms);
    }
  }
  return total;
}

/** total += e/(c + ε): x_i = (e_i − x_{i−1})/c, each wrong by less than 2 units more than the e_i together. */
function collect(total: bigint[], e: readonly bigint[], c: bigint): void {
  let x = 0n;
  for (let i = 0; i < e.length; i++) {
    x = ((e[i] as bigint) - x) / c;
    total[i] = (total[i] as bigint) + x;
  }
}

function binomial(n: number, k: number): bigint {
  let value = 1n;
  for (let j = 1; j <= k; j++) value = (value * BigInt(n - k + j)) / BigInt(j);
  return value;
}

function evaluate(args: BesselMomentArgs, bits: number, context: EvaluationContext): Ball {
  const { k, a, b } = args;
  const cut = cutoff(args, bits + 3);
  const log2Cut = Math.log2(cut);
  // Weights of the coefficients of ε are at most b!·(|g| + log T + 1)^b, times T^{k+1}.
  const log2Weights = (k + 1) * log2Cut + b * Math.log2(Math.log(cut) + 2) + Math.log2(Number(factorial(b))) + 2;
  const first = majorant(a + b, b, cut, bits + log2Weights + 8);
  const work = Math.ceil(bits + log2Weights + first.log2Error + 16);
  const { terms, log2Sum, log2Error } = majorant(a + b, b, cut, work);
  const sums = integratedSeries(args, cut, terms, work, context);
  const error = 1n << BigInt(Math.ceil(addLog2(log2Error, Math.log2(2 * terms)) + 1));
  const fine = Math.ceil(work + log2Sum - first.log2Error + 32) + 32;
  const real = (term: Term): Ball => {
    const value = context.argument(term, fine);
    if (isComplex(value)) throw new TypeError('evaluate: expected a real argument');
    return value;
  };
  const g = subtract(real(symbol('euler_gamma')), real(call('log', rational(2n))));
  const log = real(call('log', rational(BigInt(cut))));
  let result: Ball = fromInteger(0n);
  for (let i = 0; i <= b; i++) {
    let weight: Ball = fromInteger(0n);
    for (let j = i; j <= b; j++) {
      // C(b,j) j!/(j−i)! g^{b−j} (log T)^{j−i}
      const count = (binomial(b, j) * factorial(j)) / factorial(j - i);
      const powers = multiply(power(g, b - j, fine), power(log, j - i, fine), fine);
      weight = add(weight, timesInteger(powers, count));
    }
    const sum = widen({ mid: sums[i] as bigint, rad: 0n, bits: work }, error);
    result = add(result, multiply(weight, sum, fine));
  }
  const sign = b % 2 === 0 ? 1n : -1n;
  const scaled = multiply(timesInteger(result, sign * BigInt(cut) ** BigInt(k + 1)), fromInteger(1n), bits + 4);
  return widen(scaled, 2n);
}

function factorial(n: number): bigint {
  return n <= 1 ? 1n : BigInt(n) * factorial(n - 1);
}

export const besselMoments: Family<BesselMomentArgs> = {
  key: 'bessel-moments',
  title: 'Bessel moments',
  names: ['bessel'],
  parse,
  weight: () => null,
  latex: ({ k, a, b }) => {
    const powers = [
      k > 0 ? `t${k > 1 ? `^{${k}}` : ''}\\,` : '',
      a > 0 ? `I_0${a > 1 ? `^{${a}}` : ''}(t)\\,` : '',
    ].join('');
    return `\\int_0^\\infty ${powers}K_0${b > 1 ? `^{${b}}` : ''}(t)\\,dt`;
  },
  text: ({ k, a, b }) => `bessel(${k},${a},${b})`,
  isReal: () => true,
  evaluate,
  definition: '\\mathrm{bessel}(k,a,b)=\\int_0^\\infty t^k\\,I_0(t)^a\\,K_0(t)^b\\,dt,\\quad a<b',
  source:
    'Bailey, Borwein, Broadhurst and Glasser, J. Phys. A 41 (2008) 205203. Operator: Borwein and Salvy, Exper. Math. 17 (2008) 223.',
  examples: ['bessel(0,0,3)', 'bessel(1,0,4)', 'bessel(1,1,4)', 'bessel(1,2,3)'],
};
