/** Terms as canonical typed text, which parses back to the same term. */
import type { Term } from './term.ts';

/** Canonical text of a term: no spaces except around + and − of a sum. */
export function termText(term: Term): string {
  switch (term.kind) {
    case 'rational':
      return term.q === 1n ? `${term.p}` : `${term.p}/${term.q}`;
    case 'symbol':
      return term.name;
    case 'call':
      return `${term.name}(${term.groups.map((group) => group.map(termText).join(',')).join(';')})`;
    case 'sum':
      return term.terms.map((t, index) => (index === 0 ? termText(t) : joined(t))).join('');
    case 'product':
      return productText(term.factors);
    case 'power':
      return `${asBase(term.base)}^${asExponent(term.exponent)}`;
  }
}

function joined(term: Term): string {
  const text = termText(term);
  return text.startsWith('-') ? ` - ${text.slice(1)}` : ` + ${text}`;
}

function productText(factors: readonly Term[]): string {
  const [first, ...rest] = factors;
  if (first === undefined) return '1';
  const leading = first.kind === 'rational' ? first : undefined;
  const body = leading === undefined ? factors : rest;
  const above: string[] = [];
  const below: string[] = [];
  if (leading !== undefined && leading.p !== 1n && leading.p !== -1n)
    above.push(`${leading.p < 0n ? -leading.p : leading.p}`);
  if (leading !== undefined && leading.q !== 1n) below.push(`${leading.q}`);
  for (const factor of body) {
    const inverse = inverted(factor);
    if (inverse === undefined) above.push(asFactor(factor));
    else below.push(asFactor(inverse));
  }
  const minus = leading !== undefined && leading.p < 0n ? '-' : '';
  return `${minus}${above.length === 0 ? '1' : above.join('*')}${below.map((b) => `/${b}`).join('')}`;
}

/** 1/factor where the factor is a power with a negative integer exponent. */
function inverted(factor: Term): Term | undefined {
  if (factor.kind !== 'power' || factor.exponent.kind !== 'rational') return undefined;
  const { p, q } = factor.exponent;
  if (q !== 1n || p >= 0n) return undefined;
  return p === -1n ? factor.base : { kind: 'power', base: factor.base, exponent: { kind: 'rational', p: -p, q } };
}

function asFactor(term: Term): string {
  return term.kind === 'sum' || term.kind === 'product' || (term.kind === 'rational' && (term.p < 0n || term.q !== 1n))
    ? `(${termText(term)})`
    : termText(term);
}

function asBase(term: Term): string {
  const bare =
    term.kind === 'symbol' || term.kind === 'call' || (term.kind === 'rational' && term.q === 1n && term.p >= 0n);
  return bare ? termText(term) : `(${termText(term)})`;
}

function asExponent(term: Term): string {
  const bare = term.kind === 'symbol' || term.kind === 'call' || (term.kind === 'rational' && term.q === 1n);
  return bare ? termText(term) : `(${termText(term)})`;
}
