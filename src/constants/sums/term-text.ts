/** Typed text and LaTeX of the arguments of a family; both parse back, or typeset, to the same term. */
import { isRational, type Term } from '../term.ts';

const SUM = 1;
const PRODUCT = 2;
const POWER = 3;
const ATOM = 4;

/** Typed text; parses back to the term. */
export function termText(term: Term): string {
  return text(term, 0);
}

function text(term: Term, least: number): string {
  const [written, level] = written0(term);
  return level < least ? `(${written})` : written;
}

function written0(term: Term): [string, number] {
  switch (term.kind) {
    case 'rational': {
      const plain = term.q === 1n ? `${term.p}` : `${term.p}/${term.q}`;
      return [plain, term.p < 0n ? SUM : term.q === 1n ? ATOM : PRODUCT];
    }
    case 'symbol':
      return [term.name, ATOM];
    case 'call':
      return [`${term.name}(${term.groups.map((group) => group.map(termText).join(',')).join(';')})`, ATOM];
    case 'sum':
      return [term.terms.map((t, k) => signed(text(t, k === 0 ? 0 : SUM), k)).join(''), SUM];
    case 'product': {
      const [first, ...rest] = term.factors;
      const minus = first !== undefined && isRational(first) && first.p === -1n && first.q === 1n && rest.length > 0;
      const factors = minus ? rest : term.factors;
      return [(minus ? '-' : '') + factors.map((f, k) => factorText(f, k)).join(''), minus ? SUM : PRODUCT];
    }
    case 'power':
      return [`${text(term.base, ATOM)}^${text(term.exponent, ATOM)}`, POWER];
  }
}

function signed(piece: string, index: number): string {
  return index === 0 || piece.startsWith('-') ? piece : `+${piece}`;
}

function factorText(factor: Term, index: number): string {
  const { kind } = factor;
  if (kind === 'power' && isRational(factor.exponent) && factor.exponent.p < 0n && index > 0) {
    const { p, q } = factor.exponent;
    const under: Term = p === -1n && q === 1n ? factor.base : { ...factor, exponent: { kind: 'rational', p: -p, q } };
    return `/${text(under, POWER)}`;
  }
  const shown = index === 0 && isRational(factor) ? termText(factor) : text(factor, POWER);
  return index === 0 ? shown : `*${shown}`;
}

/** LaTeX of rationals, roots, powers, sums and products; other calls by their names. */
export function termLatex(term: Term): string {
  switch (term.kind) {
    case 'rational': {
      if (term.q === 1n) return `${term.p}`;
      const sign = term.p < 0n ? '-' : '';
      return `${sign}\\tfrac{${term.p < 0n ? -term.p : term.p}}{${term.q}}`;
    }
    case 'symbol':
      if (term.name === 'pi') return '\\pi';
      return /^r\d+$/.test(term.name) ? `r_{${term.name.slice(1)}}` : term.name;
    case 'call': {
      const inner = term.groups.map((group) => group.map(termLatex).join(',')).join(';');
      if (term.name === 'sqrt') return `\\sqrt{${inner}}`;
      return term.name === 'log' ? `\\log(${inner})` : `\\mathrm{${term.name}}(${inner})`;
    }
    case 'sum':
      return term.terms.map((t, k) => signed(termLatex(t), k)).join('');
    case 'product':
      return term.factors
        .map((f) => (f.kind === 'sum' ? `(${termLatex(f)})` : termLatex(f)))
        .join('\\,')
        .replace(/^-1\\,/, '-');
    case 'power': {
      const base =
        term.base.kind === 'symbol' || term.base.kind === 'call' ? termLatex(term.base) : `(${termLatex(term.base)})`;
      const { exponent } = term;
      const half = isRational(exponent) && exponent.q === 2n && exponent.p === 1n;
      return half ? `\\sqrt{${termLatex(term.base)}}` : `${base}^{${termLatex(exponent)}}`;
    }
  }
}
