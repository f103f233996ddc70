/**
 * Expansion of typed factors such as `exp(2*ep*euler_gamma)`, `Gamma(1-ep)^2*Gamma(1+ep)/Gamma(1-2*ep)` or `(4*pi)^ep` in
 * their variable, to any precision.
 */
import { evaluateTerm, type TermContext } from '../constants/evaluate.ts';
import { rational, type Term } from '../constants/term.ts';
import { makePower, makeProduct, makeSum } from '../expression/parse.ts';
import { accuracy } from '../number/ball.ts';
import { add, isComplex, multiply, negate, type Value } from '../number/complex.ts';
import { cos, sin } from '../number/complex-elementary.ts';
import { InputError, PrecisionError } from '../number/errors.ts';
import { gammaSeries } from './gamma.ts';
import {
  addSeries,
  coefficientOf,
  constant,
  endOf,
  expSeries,
  isExactZero,
  logSeries,
  multiplySeries,
  ONE,
  over,
  powerSeries,
  type Series,
  stripped,
  subtractSeries,
  times,
  truncated,
  variable,
  ZERO,
} from './laurent.ts';

/** Most coefficients of one expansion; beyond any series in use. */
export const MOST_TERMS = 200;
/** Extra terms tried for a factor whose leading terms cancel before it counts as zero. */
const EXTRA_TERMS = 24;
const LARGEST_POWER = 1000n;
/** Complaints that more terms may settle: what looked like zero begins further on. */
const HIDDEN: readonly string[] = ['gamma-pole', 'zero-series'];

/** Whether the variable occurs in a term. */
export function dependsOn(term: Term, name: string): boolean {
  switch (term.kind) {
    case 'rational':
      return false;
    case 'symbol':
      return term.name === name;
    case 'sum':
      return term.terms.some((t) => dependsOn(t, name));
    case 'product':
      return term.factors.some((t) => dependsOn(t, name));
    case 'power':
      return dependsOn(term.base, name) || dependsOn(term.exponent, name);
    case 'call':
      return term.groups.some((group) => group.some((t) => dependsOn(t, name)));
  }
}

/** The term with the variable replaced, rationals folded. */
export function substituted(term: Term, name: string, by: Term): Term {
  const inner = (t: Term): Term => substituted(t, name, by);
  switch (term.kind) {
    case 'rational':
      return term;
    case 'symbol':
      return term.name === name ? by : term;
    case 'sum':
      return makeSum(term.terms.map(inner));
    case 'product':
      return makeProduct(term.factors.map(inner));
    case 'power': {
      const [base, exponent] = [inner(term.base), inner(term.exponent)];
      const isZero = base.kind === 'rational' && base.p === 0n;
      if (isZero && exponent.kind === 'rational' && exponent.p < 0n) {
        throw new InputError('pole', 'The argument of a function here has a pole at zero, so it cannot be expanded.');
      }
      return isZero ? rational(0n) : makePower(base, exponent);
    }
    case 'call':
      return { kind: 'call', name: term.name, groups: term.groups.map((group) => group.map(inner)) };
  }
}

/**
 * The first `count` coefficients of a term from its leading power on, each with an absolute error of at most 2^−bits.
 * Throws InputError: unknown names, logarithms of the variable, essential singularities, a term that is zero.
 */
export function expandTerm(term: Term, name: string, count: number, bits: number, context: TermContext = {}): Series {
  if (!Number.isInteger(count) || count < 1 || count > MOST_TERMS) {
    throw new RangeError(`expandTerm: expected 1 … ${MOST_TERMS} coefficients, got ${count}`);
  }
  let end = count;
  let work = bits + 64;
  for (;;) {
    const missing = tryExpansion();
    if (typeof missing !== 'number') return missing;
    work += missing;
    if (work > 8 * bits + 20_000) {
      throw new InputError(
        'undecided',
        'A coefficient of this factor cannot be told from zero; the factor may be zero.',
      );
    }
  }

  function tryExpansion(): Series | number {
    try {
      const s = stripped(new Expander(name, end, work, context).expand(term));
      const known = s.coefficients.length;
      if (known < count || s.coefficients.every(isExactZero)) {
        end += Math.max(1, count - known);
        if (end > 2 * count + EXTRA_TERMS) {
          throw new InputError('zero-factor', 'This factor is zero as far as its expansion goes.');
        }
        return 0;
      }
      const kept = truncated(s, s.low + count);
      const worst = Math.min(...kept.coefficients.map(accuracyOf));
      return worst >= bits ? kept : bits - worst + 16;
    } catch (error) {
      if (error instanceof InputError && HIDDEN.includes(error.code) && end < count + EXTRA_TERMS) {
        end += 4;
        return 0;
      }
      if (!(error instanceof PrecisionError)) throw error;
      return Math.max(64, work >> 1);
    }
  }
}

function accuracyOf(x: Value): number {
  return isComplex(x) ? Math.min(accuracy(x.re), accuracy(x.im)) : accuracy(x);
}

class Expander {
  private readonly name: string;
  /** Regular parts are carried below x^end. */
  private readonly end: number;
  private readonly bits: number;
  private readonly context: TermContext;

  constructor(name: string, end: number, bits: number, context: TermContext) {
    this.name = name;
    this.end = end;
    this.bits = bits;
    this.context = context;
  }

  expand(term: Term): Series {
    if (!dependsOn(term, this.name)) return constant(this.value(term), this.end);
    switch (term.kind) {
      case 'symbol':
        return variable(this.end + 1);
      case 'sum':
        return term.terms.map((t) => this.expand(t)).reduce(addSeries);
      case 'product':
        return term.factors
          .map((t) => this.expand(t))
          .reduce((a, b) => multiplySeries(stripped(a), stripped(b), this.bits));
      case 'power':
        return this.power(term.base, term.exponent);
      case 'call':
        return this.call(term.name, term.groups);
      case 'rational':
        return constant(this.value(term), this.end);
    }
  }

  private value(term: Term): Value {
    return term.kind === 'rational' && term.p === term.q ? ONE : evaluateTerm(term, this.bits, this.context);
  }

  private power(base: Term, exponent: Term): Series {
    if (exponent.kind === 'rational' && exponent.q === 1n) {
      if (exponent.p > LARGEST_POWER || exponent.p < -LARGEST_POWER) {
        throw new InputError('too-large', `A power of a series may have an exponent of at most ${LARGEST_POWER}.`);
      }
      return powerSeries(this.expand(base), Number(exponent.p), this.bits);
    }
    const log = logSeries(this.expand(base), this.bits);
    return expSeries(multiplySeries(this.shifted(this.expand(exponent)), log, this.bits), this.bits);
  }

  /** The same series written from x^0 on, so that products keep all powers below `end`. */
  private shifted(s: Series): Series {
    if (s.low <= 0) return s;
    return { low: 0, coefficients: Array.from({ length: endOf(s) }, (_, k) => coefficientOf(s, k)) };
  }

  private call(name: string, groups: readonly (readonly Term[])[]): Series {
    const argument = groups[0]?.[0];
    if (argument === undefined || groups.length > 1 || (groups[0]?.length ?? 0) > 1) return this.unknown(name);
    switch (name) {
      case 'exp':
        return expSeries(this.expand(argument), this.bits);
      case 'log':
        return logSeries(this.expand(argument), this.bits);
      case 'sqrt':
        return this.power(argument, rational(1n, 2n));
      case 'Gamma':
        return this.gamma(argument);
      case 'sin':
      case 'cos':
        return this.circular(name, argument);
      default:
        return this.unknown(name);
    }
  }

  private unknown(name: string): never {
    throw new InputError(
      'no-expansion',
      `${name}( ) with ${this.name} inside cannot be expanded; Gamma, exp, log, sqrt, sin, cos and powers can.`,
    );
  }

  private gamma(argument: Term): Series {
    const at = substituted(argument, this.name, rational(0n));
    if (at.kind !== 'rational') {
      throw new InputError(
        'gamma-argument',
        'Gamma can be expanded around rational numbers only, as in Gamma(1/2+ep).',
      );
    }
    const delta = this.shifted(subtractSeries(this.expand(argument), constant(this.value(at), this.end)));
    // The constant term is zero exactly; the difference of two balls would forget that.
    const exact = { low: 0, coefficients: delta.coefficients.map((c, k) => (k === 0 ? ZERO : c)) };
    return gammaSeries(at, exact, this.bits, (t) => this.value(t));
  }

  /** sin and cos of c + r as sin c·cos r ± cos c·sin r, where (cos r)' = −r'·sin r. */
  private circular(name: 'sin' | 'cos', argument: Term): Series {
    const f = this.shifted(this.expand(argument));
    if (stripped(f).low < 0)
      throw new InputError('pole', `${name} of a series with negative powers has no Laurent expansion.`);
    const c = f.coefficients[0] ?? ZERO;
    const zero = isExactZero(c);
    const s: Value[] = [zero ? ZERO : sin(c, this.bits)];
    const k: Value[] = [zero ? ONE : cos(c, this.bits)];
    for (let n = 1; n < f.coefficients.length; n++) {
      const turn = (other: readonly Value[]): Value => {
        let sum: Value = ZERO;
        for (let j = 1; j <= n; j++) {
          sum = add(sum, multiply(times(f.coefficients[j] as Value, j), other[n - j] as Value, this.bits));
        }
        return over(sum, n, this.bits);
      };
      const [nextSin, nextCos] = [turn(k), negate(turn(s))];
      s.push(nextSin);
      k.push(nextCos);
    }
    return { low: 0, coefficients: name === 'sin' ? s : k };
  }
}
