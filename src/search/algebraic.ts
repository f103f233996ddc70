/** The algebraic form: the minimal polynomial of the value, with its root told apart. */
import { assess } from '../evidence/assess.ts';
import { rationalLatex } from '../expression/print-latex.ts';
import { type Ball, fromInteger, magnitude, withBits } from '../number/ball.ts';
import { add, divide, isComplex, multiply, subtract, toComplex, type Value } from '../number/complex.ts';
import { formatMidpoint } from '../number/decimal.ts';
import { InputError } from '../number/errors.ts';
import { absolute, log10Of } from '../number/integer.ts';
import { type AlgebraicOutcome, startAlgebraic } from '../relation/algebraic.ts';
import { digitsUsed } from './estimate.ts';
import { believing, type ReadValue, readMaxNorm, readValue } from './intake.ts';
import { pacer } from './pause.ts';
import { LOG2_10, type SearchOptions } from './problem.ts';
import type { RelationEntry, SearchRecord } from './record.ts';
import type { Report } from './relate.ts';
import { emptyRecord, normText } from './report.ts';
import type { SearchRequest } from './request.ts';

const LARGEST_DEGREE = 200;
type Found = Extract<AlgebraicOutcome, { kind: 'algebraic' }>;

/** Runs a search for a minimal polynomial of degree up to `request.degree`. Rejects as `runSearch` does. */
export async function algebraicSearch(
  request: SearchRequest,
  options: SearchOptions,
  report: Report,
): Promise<SearchRecord> {
  const { degree, divideBy } = request;
  if (degree === undefined || !Number.isInteger(degree) || degree < 1 || degree > LARGEST_DEGREE) {
    throw new InputError('bad-degree', `The algebraic form needs a degree from 1 to ${LARGEST_DEGREE}.`);
  }
  if (divideBy !== undefined)
    throw new InputError('no-prefactor', 'The algebraic form takes no prefactor; divide the value itself first.');
  const value = readValue(request);
  const method = request.method ?? 'lattice';
  const start = performance.now();
  const outcome = await polynomialOf(request, value, degree, method, options, report);
  const relationMs = performance.now() - start;
  const base = { ...emptyRecord(request, method), timings: { constantsMs: 0, relationMs, evidenceMs: 0 } };
  if (outcome.kind === 'algebraic') return { ...base, ...recognised(value, degree, outcome) };
  const bound = outcome.normBoundLog10 > 0 ? normText(outcome.normBoundLog10) : null;
  if (outcome.kind === 'excluded') {
    return {
      ...base,
      outcome: 'excluded',
      verdict: 'excluded',
      normBound: bound,
      diagnosis: [
        `No polynomial of degree up to ${degree} with integer coefficients of norm below ${bound} has this value as a root, provided that the ${value.trusted} trusted digits are right.`,
      ],
    };
  }
  const reason =
    outcome.kind === 'contradicted'
      ? `A polynomial fits the digits that were searched but parts from the value at about digit ${Math.floor(outcome.agreementBits / LOG2_10) + 1}: it is chance, or the last digits are wrong.`
      : outcome.reason;
  return { ...base, normBound: bound, diagnosis: [reason] };
}

async function polynomialOf(
  request: SearchRequest,
  value: ReadValue,
  degree: number,
  method: 'pslq' | 'lattice',
  options: SearchOptions,
  report: Report,
): Promise<AlgebraicOutcome> {
  const run = startAlgebraic({
    value: asValue(believing(value, value.trusted)),
    degree,
    method,
    ...(request.maxNorm === undefined ? {} : { maxNormLog10: readMaxNorm(request.maxNorm) }),
  });
  const pause = pacer(options.signal);
  for (;;) {
    options.signal?.throwIfAborted();
    const outcome = run.step();
    report('relation', run.progress.fraction, run.progress.iterations, run.progress.normBoundLog10);
    if (outcome !== undefined) return outcome;
    await pause();
  }
}

function asValue(parts: readonly Ball[]): Value {
  return parts.length === 1 ? (parts[0] as Ball) : { re: parts[0] as Ball, im: parts[1] as Ball };
}

function recognised(value: ReadValue, degree: number, found: Found): Partial<SearchRecord> {
  const written = believing(value, value.written);
  const root = rootNear(found.polynomial, asValue(written));
  const { re, im } = toComplex(root);
  const used = Math.min(value.trusted, Math.max(digitsUsed(value.trusted), Math.ceil(found.searchBits / LOG2_10)));
  const coefficients = Array.from({ length: degree + 1 }, (_, k) => found.polynomial[k] ?? 0n);
  const { evidence, verdict, diagnosis } = assess({
    value: written,
    expression: written.length === 1 ? [re] : [re, im],
    scaleLog10: Math.max(...written.map((x) => log10Of(x.mid) - x.bits / LOG2_10)),
    budget: { numbers: degree + 1, digits: used, coefficientDigits: (used * written.length) / (degree + 1) },
    digits: { written: value.written, trusted: value.trusted, used },
    integers: [...coefficients].reverse(),
    weights: coefficients.slice(1).map(() => 0),
    confidenceLog10: found.confidenceLog10,
    stability: [],
    secondMethod: null,
    searchesLog10: 0,
  });
  const relation: RelationEntry[] = coefficients.map((c, k) => ({
    constant: k === 0 ? '1' : k === 1 ? 'x' : `x^${k}`,
    latex: k === 0 ? '1' : k === 1 ? 'x' : `x^{${k}}`,
    weight: 0,
    coefficient: c.toString(),
  }));
  return {
    outcome: 'relation',
    relation,
    integers: coefficients.map(String),
    expression: expressionOf(found, root),
    agreementDigits: Math.floor(evidence.agreementDigits * 10) / 10,
    surplusDigits: Math.floor(evidence.surplusDigits * 10) / 10,
    heldOut: { used: evidence.heldOut.used, predicted: evidence.heldOut.predicted },
    normBound: found.normBoundLog10 > 0 ? normText(found.normBoundLog10) : null,
    verdict,
    diagnosis: [
      ...diagnosis,
      found.irreducible
        ? 'The polynomial is irreducible (proved).'
        : 'Whether the polynomial is irreducible was not decided.',
      placeOf(found),
    ],
    evidence,
  };
}

function placeOf({ root }: Found): string {
  if (root === undefined) return 'The digits do not tell the root from the other roots of this polynomial.';
  if (root.realIndex === undefined) return 'The root is told apart from all others.';
  return `The value is real root ${root.realIndex} of ${root.realRoots} in rising order.`;
}

/** `3/2` for degree 1, else the equation. */
function expressionOf({ polynomial }: Found, root: Value): { text: string; latex: string } {
  if (polynomial.length === 2) {
    const [c0, c1] = polynomial as readonly [bigint, bigint];
    return { text: c1 === 1n ? `${-c0}` : `${-c0}/${c1}`, latex: rationalLatex(-c0, c1) };
  }
  const terms = polynomial
    .map((c, k) => ({ c, k }))
    .filter(({ c }) => c !== 0n)
    .reverse();
  const join = (power: (k: number) => string, times: string): string =>
    terms
      .map(({ c, k }, index) => {
        const size = absolute(c);
        const body = k === 0 ? `${size}` : `${size === 1n ? '' : `${size}${times}`}${power(k)}`;
        return index === 0 ? `${c < 0n ? '-' : ''}${body}` : `${c < 0n ? ' - ' : ' + '}${body}`;
      })
      .join('');
  const near = isComplex(root)
    ? `${formatMidpoint(root.re, 6)} + ${formatMidpoint(root.im, 6)}*i`
    : formatMidpoint(root, 8);
  return {
    text: `root of ${join((k) => (k === 1 ? 'x' : `x^${k}`), '*')} near ${near}`,
    latex: `${join((k) => (k === 1 ? 'x' : `x^{${k}}`), '\\,')} = 0,\\quad x \\approx ${near.replace('*i', '\\,i')}`,
  };
}

/**
 * The root next to x: Newton's steps on the midpoint, then the disc |z − root| ≤ d·|p(z)/p′(z)|, which always holds a
 * root (Henrici, Applied and Computational Complex Analysis I, 6.4).
 */
function rootNear(polynomial: readonly bigint[], x: Value): Value {
  const d = polynomial.length - 1;
  const parts = isComplex(x) ? [x.re, x.im] : [x];
  const size = Math.max(0, ...parts.map((p) => magnitude(p)));
  const bits = 2 * Math.max(...parts.map((p) => p.bits)) + d * size + 64;
  const exact = (v: Value): Value =>
    isComplex(v) ? { re: { ...v.re, rad: 0n }, im: { ...v.im, rad: 0n } } : { ...v, rad: 0n };
  let z = exact(x);
  let step: Value = fromInteger(0n);
  for (let round = 0; round < 4; round++) {
    let p: Value = fromInteger(0n);
    let slope: Value = fromInteger(0n);
    for (let k = d; k >= 0; k--) {
      slope = add(multiply(slope, z, bits), p);
      p = add(multiply(p, z, bits), fromInteger(polynomial[k] as bigint));
    }
    step = divide(p, slope, bits);
    if (round < 3) z = exact(trim(subtract(z, step), bits));
  }
  const width = [toComplex(step).re, toComplex(step).im].reduce(
    (sum, s) => sum + absolute(withBits(s, bits).mid) + withBits(s, bits).rad,
    0n,
  );
  const rad = width * BigInt(d) + 1n;
  const widen = (b: Ball): Ball => {
    const y = withBits(b, bits);
    return { ...y, rad: y.rad + rad };
  };
  return isComplex(z) ? { re: widen(z.re), im: widen(z.im) } : widen(z);
}

function trim(x: Value, bits: number): Value {
  return isComplex(x) ? { re: withBits(x.re, bits), im: withBits(x.im, bits) } : withBits(x, bits);
}
