/** Roots of unity as typed terms: `1`, `-1`, `i`, `r3` = e^{2πi/3} and so on, with powers and products. */
import type { Term } from '../term.ts';

/** e^{2πi·exponent/order}, 0 ≤ exponent < order. */
export interface Root {
  readonly exponent: number;
  readonly order: number;
}

const ORDERS: Readonly<Record<string, number>> = { i: 4, r3: 3, r4: 4, r6: 6, r8: 8, r12: 12 };

/** The root of unity that a term spells, or null when it spells something else. */
export function rootOfUnity(term: Term): Root | null {
  switch (term.kind) {
    case 'rational':
      if (term.q !== 1n || (term.p !== 1n && term.p !== -1n)) return null;
      return term.p === 1n ? { exponent: 0, order: 1 } : { exponent: 1, order: 2 };
    case 'symbol': {
      const order = ORDERS[term.name];
      return order === undefined ? null : { exponent: 1, order };
    }
    case 'power': {
      const base = rootOfUnity(term.base);
      const { exponent } = term;
      if (base === null || exponent.kind !== 'rational' || exponent.q !== 1n) return null;
      const order = BigInt(base.order);
      const turned = (((BigInt(base.exponent) * exponent.p) % order) + order) % order;
      return reduceRoot({ exponent: Number(turned), order: base.order });
    }
    case 'product': {
      const factors = term.factors.map(rootOfUnity);
      let total: Root = { exponent: 0, order: 1 };
      for (const factor of factors) {
        if (factor === null) return null;
        total = multiplyRoots(total, factor);
      }
      return total;
    }
    default:
      return null;
  }
}

export function multiplyRoots(a: Root, b: Root): Root {
  const order = leastCommonMultiple(a.order, b.order);
  const exponent = (a.exponent * (order / a.order) + b.exponent * (order / b.order)) % order;
  return reduceRoot({ exponent, order });
}

function reduceRoot({ exponent, order }: Root): Root {
  const common = greatestCommonDivisor(exponent, order);
  return { exponent: exponent / common, order: order / common };
}

export function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b);
}

export function leastCommonMultiple(a: number, b: number): number {
  return (a / greatestCommonDivisor(a, b)) * b;
}

/** Typed text of a reduced root. */
export function rootText({ exponent, order }: Root): string {
  if (order === 1) return '1';
  if (order === 2) return '-1';
  if (order === 4) return exponent === 1 ? 'i' : '-i';
  return exponent === 1 ? `r${order}` : `r${order}^${exponent}`;
}

export function rootLatex({ exponent, order }: Root): string {
  if (order <= 2) return order === 1 ? '1' : '-1';
  if (order === 4) return exponent === 1 ? 'i' : '-i';
  // e^{2πi·exponent/order} with the angle reduced to (−π, π].
  const turns = 2 * exponent > order ? exponent - order : exponent;
  const common = greatestCommonDivisor(2, order);
  const top = (2 / common) * turns;
  const size = Math.abs(top) === 1 ? '' : String(Math.abs(top));
  return `e^{${top < 0 ? '-' : ''}${size}i\\pi/${order / common}}`;
}
