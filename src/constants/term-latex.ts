/** Terms as LaTeX: elementary ones by themselves, as arguments of functions have them, or with the notation of families for atoms. */
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

/** LaTeX of a symbol or call in the notation of its family; undefined where the plain one serves. */
export type AtomLatex = (atom: Extract<Term, { kind: 'symbol' | 'call' }>) => string | undefined;

/** Functions whose power is set on the name, as in log²(2). */
const NAMED_POWER = /^\\(log|sin|cos|tan)(?=\()/;

/** LaTeX (math mode) of an elementary term. */
export function termLatex(term: Term): string {
  return latexWith(term, () => undefined);
}

/** As `termLatex`; `atom` may give symbols and calls a notation of their own. */
export function latexWith(term: Term, atom: AtomLatex): string {
  const own = term.kind === 'symbol' || term.kind === 'call' ? atom(term) : undefined;
  if (own !== undefined) return own;
  switch (term.kind) {
    case 'rational':
      return rationalLatex(term.p, term.q);
    case 'symbol':
      return SYMBOLS[term.name] ?? `\\mathrm{${term.name.replaceAll('_', '\\_')}}`;
    case 'call':
      return callLatex(term.name, term.groups.map((g) => g.map((t) => latexWith(t, atom)).join(',')).join(';'));
    case 'sum':
      return term.terms.map((t, j) => (j === 0 ? latexWith(t, atom) : withSign(latexWith(t, atom)))).join('');
    case 'product':
      return productLatex(term.factors, atom);
    case 'power':
      return powerLatex(term.base, term.exponent, atom);
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

function productLatex(factors: readonly Term[], atom: AtomLatex): string {
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
  const top = above.map((t) => (above.length > 1 ? asFactor(t, atom) : latexWith(t, atom))).join('\\,') || '1';
  if (below.length === 0)
    return `${minus}${above.length === 1 && minus !== '' ? asFactor(above[0] as Term, atom) : top}`;
  return `${minus}\\frac{${top}}{${below.map((t) => (below.length > 1 ? asFactor(t, atom) : latexWith(t, atom))).join('\\,')}}`;
}

function asFactor(term: Term, atom: AtomLatex): string {
  return term.kind === 'sum' ? `(${latexWith(term, atom)})` : latexWith(term, atom);
}

function powerLatex(base: Term, exponent: Term, atom: AtomLatex): string {
  if (exponent.kind === 'rational') {
    if (exponent.p === 1n && exponent.q === 2n) return `\\sqrt{${latexWith(base, atom)}}`;
    if (exponent.p === 1n) return `\\sqrt[${exponent.q}]{${latexWith(base, atom)}}`;
    if (exponent.p < 0n)
      return `\\frac{1}{${exponent.p === -1n && exponent.q === 1n ? latexWith(base, atom) : powerLatex(base, { ...exponent, p: -exponent.p }, atom)}}`;
  }
  const bare =
    base.kind === 'symbol' || base.kind === 'call' || (base.kind === 'rational' && base.p >= 0n && base.q === 1n);
  const below = bare ? latexWith(base, atom) : `\\left(${latexWith(base, atom)}\\right)`;
  const above =
    exponent.kind === 'rational'
      ? `${exponent.p}${exponent.q === 1n ? '' : `/${exponent.q}`}`
      : latexWith(exponent, atom);
  if (NAMED_POWER.test(below)) return below.replace(NAMED_POWER, `\\$1^{${above}}`);
  return /^\\?[A-Za-z]+$/.test(below) ? `${below}^{${above}}` : `{${below}}^{${above}}`;
}
