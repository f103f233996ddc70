/**
 * Common normalisations of ε-series compared: in which of them do the low orders become simplest?
 *
 * γ, and the ζ(2) of the Γ functions, come from the measure of the loop integrals; a factor that takes them out leaves the
 * first orders rational (relative to the leading one) for many integrals. Which orders are rational is measured by
 * continued fractions: p/q counts when it needs at most half of the known digits.
 */
import type { TermContext } from '../constants/evaluate.ts';
import { parseTerm } from '../expression/parse.ts';
import type { Ball } from '../number/ball.ts';
import { divide, isComplex, type Value } from '../number/complex.ts';
import { InputError, PrecisionError } from '../number/errors.ts';
import { absolute, bitLength } from '../number/integer.ts';
import { isExactZero, type Series } from './laurent.ts';
import { multiplyBy, readSeries, type SeriesText } from './steps.ts';

export interface Normalisation {
  /** Typed factor that the series is multiplied by; `1` for the series as it is. */
  readonly factor: string;
  readonly title: string;
}

export interface NormalisationReport extends Normalisation {
  /** For each coefficient: its ratio to the leading one as `p/q` when that is rational, else null. */
  readonly ratios: readonly (string | null)[];
  /** How many coefficients in a row, from the leading one on, are rational in this sense. */
  readonly rationalOrders: number;
}

/** The usual factors for `loops` loops in the named variable. */
export function commonNormalisations(variable: string, loops: number): readonly Normalisation[] {
  if (!Number.isInteger(loops) || loops < 1 || loops > 12) {
    throw new InputError('bad-loops', 'The number of loops must be a whole number from 1 to 12.');
  }
  const power = loops === 1 ? '' : `^${loops}`;
  const v = variable;
  return [
    { factor: '1', title: 'as given' },
    { factor: `exp(${loops}*${v}*euler_gamma)`, title: 'e^{Lεγ}' },
    { factor: `exp(-${loops}*${v}*euler_gamma)`, title: 'e^{−Lεγ}' },
    { factor: `1/Gamma(1+${v})${power}`, title: 'Γ(1+ε)^{−L}' },
    { factor: `Gamma(1+${v})${power}`, title: 'Γ(1+ε)^{L}' },
    { factor: `Gamma(1-${v})${power}`, title: 'Γ(1−ε)^{L}' },
    { factor: `1/Gamma(1-${v})${power}`, title: 'Γ(1−ε)^{−L}' },
    {
      factor: `(Gamma(1-2*${v})/(Gamma(1-${v})^2*Gamma(1+${v})))${power}`,
      title: '[Γ(1−2ε)/(Γ(1−ε)²Γ(1+ε))]^{L}',
    },
    {
      factor: `(Gamma(1-${v})^2*Gamma(1+${v})/Gamma(1-2*${v}))${power}`,
      title: '[Γ(1−ε)²Γ(1+ε)/Γ(1−2ε)]^{L}',
    },
  ];
}

/** All candidates, simplest first; ties keep the order in which they were given. */
export function compareNormalisations(
  text: SeriesText,
  candidates: readonly Normalisation[],
  context: TermContext = {},
): NormalisationReport[] {
  const series = readSeries(text);
  const reports = candidates.map((candidate) => {
    const term = parseTerm(candidate.factor);
    const s = term.kind === 'rational' && term.p === term.q ? series : multiplyBy(series, term, text.variable, context);
    const ratios = ratiosOf(s);
    const first = ratios.indexOf(null);
    return { ...candidate, ratios, rationalOrders: first < 0 ? ratios.length : first };
  });
  return reports
    .map((report, index) => ({ report, index }))
    .sort((a, b) => b.report.rationalOrders - a.report.rationalOrders || a.index - b.index)
    .map(({ report }) => report);
}

function ratiosOf(s: Series): (string | null)[] {
  const at = s.coefficients.findIndex((c) => !isExactZero(c));
  const lead = s.coefficients[at];
  if (lead === undefined) return s.coefficients.map(() => '0');
  return s.coefficients.slice(at).map((c) => {
    try {
      return rationalIn(divide(c, lead, bitsOf(c) + 32));
    } catch (error) {
      if (error instanceof PrecisionError) return null;
      throw error;
    }
  });
}

function bitsOf(x: Value): number {
  return isComplex(x) ? Math.max(x.re.bits, x.im.bits) : x.bits;
}

/**
 * The simplest fraction in the ball (of the real part, when the imaginary part may be zero), or null where it needs more
 * than half of the known bits, so that a real number passes by chance with odds of about 2^−(known bits)/2.
 */
export function rationalIn(x: Value): string | null {
  if (isComplex(x)) {
    if (absolute(x.im.mid) > x.im.rad) return null;
    return rationalIn(x.re);
  }
  const known = x.bits - bitLength(x.rad);
  if (known < 20) return null;
  const found = simplestIn(x);
  if (found === null) return null;
  const { p, q } = found;
  if (bitLength(absolute(p)) + bitLength(q) > Math.max(2, known / 2)) return null;
  return q === 1n ? `${p}` : `${p}/${q}`;
}

/** The fraction with the least denominator in [mid − rad, mid + rad]·2^−bits (Stern–Brocot descent by continued fractions). */
function simplestIn(x: Ball): { p: bigint; q: bigint } | null {
  if (absolute(x.mid) <= x.rad) return { p: 0n, q: 1n };
  const sign = x.mid < 0n ? -1n : 1n;
  let [a, b] = [absolute(x.mid) - x.rad, 1n << BigInt(x.bits)];
  let [c, d] = [absolute(x.mid) + x.rad, 1n << BigInt(x.bits)];
  let [p0, q0, p1, q1] = [0n, 1n, 1n, 0n];
  for (let step = 0; step < 4 * x.bits + 64; step++) {
    const low = a / b;
    if (low * b === a || low < c / d) {
      const whole = low * b === a ? low : low + 1n;
      return { p: sign * (whole * p1 + p0), q: whole * q1 + q0 };
    }
    [p0, q0, p1, q1] = [p1, q1, low * p1 + p0, low * q1 + q0];
    // both ends have the same whole part: go on with the reciprocals of the fractional parts, ends exchanged
    [a, b, c, d] = [d, c - low * d, b, a - low * b];
  }
  return null;
}
