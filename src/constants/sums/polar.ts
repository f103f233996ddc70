/** Arguments that are a positive rational times a root of unity, exactly; and texts of arguments. */
import { isRational, type Term } from '../term.ts';
import { multiplyRoots, type Root, rootOfUnity } from './roots.ts';

/** modulus p/q > 0 times the root. */
export interface Polar {
  readonly p: bigint;
  readonly q: bigint;
  readonly root: Root;
}

/** The polar form of a term that spells a non-zero rational times a root of unity; null for any other term. */
export function polarOf(term: Term): Polar | null {
  const root = rootOfUnity(term);
  if (root !== null) return { p: 1n, q: 1n, root };
  switch (term.kind) {
    case 'rational': {
      if (term.p === 0n) return null;
      const negative = term.p < 0n;
      return {
        p: negative ? -term.p : term.p,
        q: term.q,
        root: { exponent: negative ? 1 : 0, order: negative ? 2 : 1 },
      };
    }
    case 'product': {
      let total: Polar = { p: 1n, q: 1n, root: { exponent: 0, order: 1 } };
      for (const factor of term.factors) {
        const polar = polarOf(factor);
        if (polar === null) return null;
        total = multiplyPolar(total, polar);
      }
      return total;
    }
    case 'power': {
      const base = polarOf(term.base);
      const { exponent } = term;
      if (base === null || !isRational(exponent) || exponent.q !== 1n) return null;
      const n = Number(exponent.p);
      if (Math.abs(n) > 64) return null;
      let total: Polar = { p: 1n, q: 1n, root: { exponent: 0, order: 1 } };
      const step = n < 0 ? invertPolar(base) : base;
      for (let k = 0; k < Math.abs(n); k++) total = multiplyPolar(total, step);
      return total;
    }
    default:
      return null;
  }
}

export function multiplyPolar(a: Polar, b: Polar): Polar {
  const p = a.p * b.p;
  const q = a.q * b.q;
  const common = divisor(p, q);
  return { p: p / common, q: q / common, root: multiplyRoots(a.root, b.root) };
}

export function invertPolar({ p, q, root }: Polar): Polar {
  return { p: q, q: p, root: { exponent: (root.order - root.exponent) % root.order, order: root.order } };
}

function divisor(a: bigint, b: bigint): bigint {
  return b === 0n ? a : divisor(b, a % b);
}

/** Whether the term is real for structural reasons; false means only that this is not seen at once. */
export function isPlainlyReal(term: Term): boolean {
  switch (term.kind) {
    case 'rational':
      return true;
    case 'symbol':
      return term.name === 'pi' || term.name === 'e';
    case 'sum':
      return term.terms.every(isPlainlyReal);
    case 'product': {
      const polar = polarOf(term);
      return polar === null ? term.factors.every(isPlainlyReal) : polar.root.order <= 2;
    }
    case 'power': {
      if (!isPlainlyReal(term.base) || !isRational(term.exponent)) return false;
      return term.exponent.q === 1n || (isRational(term.base) && term.base.p > 0n);
    }
    case 'call': {
      const [argument] = term.groups[0] ?? [];
      return (term.name === 'sqrt' || term.name === 'log') && argument?.kind === 'rational' && argument.p > 0n;
    }
  }
}
