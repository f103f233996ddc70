/**
 * The multiplicative form: v = ±Π bₖ^(pₖ/qₖ), as a linear relation of the logarithms of absolute values. A relative error
 * of the value is an absolute error of its logarithm, so agreement is counted from digit one of the value itself.
 */

import { rational, type Term } from '../constants/term.ts';
import { termText } from '../constants/term-text.ts';
import { makePower, makeProduct } from '../expression/parse.ts';
import { toLatex } from '../expression/print-latex.ts';
import { type Ball, containsZero, sign } from '../number/ball.ts';
import { log } from '../number/elementary.ts';
import { InputError } from '../number/errors.ts';
import { absolute, gcd } from '../number/integer.ts';
import { type BasisElement, readTyped } from './basis.ts';
import { GUARD_BITS, LOG2_10, type Problem } from './problem.ts';
import type { RelationEntry, SearchRecord } from './record.ts';

/** The same problem in logarithms. Throws InputError for a complex value and for bases that are not positive, are 1, or are known by pasted digits only. */
export function multiplicativeProblem(linear: Problem): Problem {
  if (linear.columns !== 1) {
    throw new InputError(
      'complex-value',
      'The multiplicative form is for real values; give the modulus of a complex one.',
    );
  }
  const bits = Math.ceil(linear.value.written * LOG2_10) + GUARD_BITS;
  const constants = linear.constants.map(([x], k) => [logOf(x as Ball, linear.elements[k] as BasisElement, bits)]);
  const minus = sign(linear.believe(linear.value.trusted)[0] as Ball) === -1;
  return {
    ...linear,
    believe: (digits) => linear.believe(digits).map((x) => log({ ...x, mid: absolute(x.mid) }, bits)),
    constants,
    scaleLog10: 0,
    present: (integers) => presented(linear, minus, integers),
  };
}

function logOf(x: Ball, element: BasisElement, bits: number): Ball {
  if (!('term' in element.source)) {
    throw new InputError(
      'pasted-base',
      `${element.text} is known by pasted digits only, which the multiplicative form cannot use.`,
    );
  }
  if (sign(x) !== 1)
    throw new InputError(
      'not-positive',
      `${element.text} is not positive; the multiplicative form needs positive bases.`,
    );
  const value = log(x, bits);
  if (containsZero(value))
    throw new InputError('one-as-base', `${element.text} equals 1, which changes nothing in a product; leave it out.`);
  return value;
}

function presented(
  { elements, request }: Problem,
  minus: boolean,
  integers: readonly bigint[],
): Pick<SearchRecord, 'relation' | 'integers' | 'expression'> {
  const lead = integers[0] as bigint;
  const exponents = elements.map((_, k) => {
    const c = integers[k + 1] as bigint;
    if (lead === 0n) return { p: c, q: 1n };
    const divisor = gcd(c, lead);
    const turned = lead < 0n ? c : -c;
    return { p: turned / divisor, q: absolute(lead) / divisor };
  });
  const relation: RelationEntry[] = elements.map((element, k) => {
    const { p, q } = exponents[k] as { p: bigint; q: bigint };
    return {
      constant: element.text,
      latex: element.latex,
      weight: element.weight,
      coefficient: q === 1n || p === 0n ? `${p}` : `${p}/${q}`,
    };
  });
  const factors = elements.flatMap(({ source }, k): Term[] => {
    const { p, q } = exponents[k] as { p: bigint; q: bigint };
    return p === 0n || !('term' in source) ? [] : [makePower(source.term, rational(p, q))];
  });
  const prefactor = lead === 0n || request.divideBy === undefined ? [] : [readTyped(request.divideBy)];
  const product = makeProduct([...(minus && lead !== 0n ? [rational(-1n)] : []), ...prefactor, ...factors]);
  return { relation, integers: integers.map(String), expression: { text: termText(product), latex: toLatex(product) } };
}
