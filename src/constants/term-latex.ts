/** Elementary terms as LaTeX, for the arguments of functions. */
import type { Term } from './term.ts';

const SYMBOLS: Readonly<Record<string, string>> = {
  pi: '\\pi',
  e: 'e',
  i: 'i',
  r3: 'e^{2i\\pi/3}',
  r4: 'i',
  r6: 'e^{i\\pi/3}',
  r8: 'e^{i\\pi/4}',
  r12: 'e^{i\\pi/6}',
};
const FUNCTIONS: Readonly<Record<string, string>> = {
  re: '\\operatorname{Re}',
  im: '\\operatorname{Im}',
  asinh: '\\operatorname{arsinh}',
  acosh: '\\operatorname{arcosh}',
  atanh: '\\operatorname{artanh}',
  asin: '\\arcsin',
  acos: '\\arccos',
  atan: '\\arctan',
};

export function rationalLatex(p: bigint, q: bigint): string {
  if (q === 1n) return `${p}`;
  return `${p < 0n ? '-' : ''}\\tfrac{${p < 0n ? -p : p}}{${q}}`;
}

export function termLatex(term: Term): string {
  switch (term.kind) {
    case 'rational':
      return rationalLatex(term.p, term.q);
    case 'symbol':
      return SYMBOLS[term.name] ?? `\\mathrm{${term.name.replaceAll('_', '\\_')}}`;
    case 'call':
      return callLatex(term.name, term.groups.map((g) => g.map(termLatex).join(',')).join(';'));
    case 'sum':
      return term.terms.map((t, j) => (j === 0 ? termLatex(t) : withSign(termLatex(t)))).join('');
    case 'product':
      return productLatex(term.factors);
    case 'power':
      return powerLatex(term.base, term.exponent);
  }
}

function withSign(text: string): string {
  return text.startsWith('-') ? text : `+${text}`;
}

function callLatex(name: string, inner: string): string {
  if (name === 'sqrt') return `\\sqrt{${inner}}`;
  if (name === 'abs') return `\\left|${inner}\\right|`;
  if (name === 'conj') return `\\overline{${inner}}`;
  return `${FUNCTIONS[name] ?? (/^(log|exp|sin|cos|tan|sinh|cosh|tanh)$/.test(name) ? `\\${name}` : `\\operatorname{${name}}`)}(${inner})`;
}

function productLatex(factors: readonly Term[]): string {
  const above: Term[] = [];
  const below: Term[] = [];
  let minus = '';
  for (const factor of factors) {
    if (factor.kind === 'rational') {
      if (factor.p < 0n) minus = '-';
      const size = factor.p < 0n ? -factor.p : factor.p;
      if (size !== 1n) above.push({ kind: 'rational', p: size, q: 1n });
      if (factor.q !== 1n) below.push({ kind: 'rational', p: factor.q, q: 1n });
    } else if (factor.kind === 'power' && factor.exponent.kind === 'rational' && factor.exponent.p < 0n) {
      const { p, q } = factor.exponent;
      below.push(p === -1n && q === 1n ? factor.base : { ...factor, exponent: { kind: 'rational', p: -p, q } });
    } else above.push(factor);
  }
  const top = above.map((t) => (above.length > 1 ? asFactor(t) : termLatex(t))).join('\\,') || '1';
  if (below.length === 0) return `${minus}${above.length === 1 && minus !== '' ? asFactor(above[0] as Term) : top}`;
  return `${minus}\\frac{${top}}{${below.map((t) => (below.length > 1 ? asFactor(t) : termLatex(t))).join('\\,')}}`;
}

function asFactor(term: Term): string {
  return term.kind === 'sum' ? `(${termLatex(term)})` : termLatex(term);
}

function powerLatex(base: Term, exponent: Term): string {
  if (exponent.kind === 'rational') {
    if (exponent.p === 1n && exponent.q === 2n) return `\\sqrt{${termLatex(base)}}`;
    if (exponent.p === 1n) return `\\sqrt[${exponent.q}]{${termLatex(base)}}`;
    if (exponent.p < 0n)
      return `\\frac{1}{${exponent.p === -1n && exponent.q === 1n ? termLatex(base) : powerLatex(base, { ...exponent, p: -exponent.p })}}`;
  }
  const bare =
    base.kind === 'symbol' || base.kind === 'call' || (base.kind === 'rational' && base.p >= 0n && base.q === 1n);
  const below = bare ? termLatex(base) : `\\left(${termLatex(base)}\\right)`;
  const above =
    exponent.kind === 'rational' ? `${exponent.p}${exponent.q === 1n ? '' : `/${exponent.q}`}` : termLatex(exponent);
  return `{${below}}^{${above}}`;
}
