/** Terms as LaTeX, atoms by the notation of their family. */
import { familyOf } from '../constants/registry.ts';
import type { CallTerm, SymbolTerm, Term } from '../constants/term.ts';

/** LaTeX (math mode) of a term. Throws InputError for a name that no family knows. */
export function toLatex(term: Term): string {
  switch (term.kind) {
    case 'rational':
      return rationalLatex(term.p, term.q);
    case 'symbol':
    case 'call':
      return atomLatex(term);
    case 'sum':
      return term.terms.map((t, k) => (k === 0 ? toLatex(t) : signed(toLatex(t)))).join('');
    case 'product':
      return productLatex(term.factors);
    case 'power':
      return powerLatex(term.base, term.exponent);
  }
}

/** p/q as `\frac`, the sign in front. */
export function rationalLatex(p: bigint, q: bigint): string {
  const size = p < 0n ? -p : p;
  const sign = p < 0n ? '-' : '';
  return q === 1n ? `${sign}${size}` : `${sign}\\frac{${size}}{${q}}`;
}

function signed(latex: string): string {
  return latex.startsWith('-') ? ` - ${latex.slice(1)}` : ` + ${latex}`;
}

function atomLatex(term: CallTerm | SymbolTerm): string {
  if (term.kind === 'symbol' && term.name === 'i') return 'i';
  const only = term.kind === 'call' ? term.groups[0]?.[0] : undefined;
  if (only !== undefined) {
    if (term.name === 'sqrt') return `\\sqrt{${toLatex(only)}}`;
    if (term.name === 're') return `\\operatorname{Re}${bracketed(only)}`;
    if (term.name === 'im') return `\\operatorname{Im}${bracketed(only)}`;
    if (term.name === 'abs') return `\\left|${toLatex(only)}\\right|`;
  }
  const { family, args } = familyOf(term);
  return family.latex(args);
}

function bracketed(term: Term): string {
  return `\\left(${toLatex(term)}\\right)`;
}

function productLatex(factors: readonly Term[]): string {
  const [first, ...rest] = factors;
  if (first?.kind === 'rational') {
    const body = rest.map(factorLatex).join('\\,');
    if (first.q === 1n && (first.p === -1n || first.p === 1n)) return `${first.p < 0n ? '-' : ''}${body}`;
    return `${rationalLatex(first.p, first.q)}\\,${body}`;
  }
  return factors.map(factorLatex).join('\\,');
}

function factorLatex(term: Term): string {
  return term.kind === 'sum' ? bracketed(term) : toLatex(term);
}

/** Functions whose power is set on the name, as in `\log^2 2`. */
const NAMED_POWER = /^\\(log|sin|cos)(?![a-z])/;

function powerLatex(base: Term, exponent: Term): string {
  if (exponent.kind === 'rational' && exponent.p === 1n && exponent.q === 2n) return `\\sqrt{${toLatex(base)}}`;
  if (exponent.kind === 'rational' && exponent.q === 1n && exponent.p === -1n) return `\\frac{1}{${toLatex(base)}}`;
  const plain =
    base.kind === 'symbol' || base.kind === 'call' || (base.kind === 'rational' && base.q === 1n && base.p >= 0n);
  const body = plain ? toLatex(base) : bracketed(base);
  const power = exponent.kind === 'rational' && exponent.q !== 1n ? `${exponent.p}/${exponent.q}` : toLatex(exponent);
  if (NAMED_POWER.test(body)) return body.replace(NAMED_POWER, `\\$1^{${power}}`);
  return base.kind === 'symbol' && body.includes('\\sqrt') ? `\\left(${body}\\right)^{${power}}` : `${body}^{${power}}`;
}
