/**
 * The exact form of a typed constant: what the parser makes, what families take as arguments, what the printers print.
 * Terms are plain data (they travel to workers) and carry no precision.
 */
export type Term =
  | { readonly kind: 'rational'; readonly p: bigint; readonly q: bigint }
  | { readonly kind: 'symbol'; readonly name: string }
  | { readonly kind: 'call'; readonly name: string; readonly groups: readonly (readonly Term[])[] }
  | { readonly kind: 'sum'; readonly terms: readonly Term[] }
  | { readonly kind: 'product'; readonly factors: readonly Term[] }
  | { readonly kind: 'power'; readonly base: Term; readonly exponent: Term };

export type CallTerm = Extract<Term, { kind: 'call' }>;
export type SymbolTerm = Extract<Term, { kind: 'symbol' }>;

/** p/q in lowest terms with q > 0. Throws RangeError for q = 0. */
export function rational(p: bigint, q = 1n): Term {
  if (q === 0n) throw new RangeError('rational: expected a non-zero denominator, got 0');
  let a = p < 0n ? -p : p;
  let b = q < 0n ? -q : q;
  while (b !== 0n) [a, b] = [b, a % b];
  const divisor = q < 0n ? -a : a;
  return { kind: 'rational', p: p / divisor, q: q / divisor };
}

export function symbol(name: string): SymbolTerm {
  return { kind: 'symbol', name };
}

/** A call with one group of arguments. */
export function call(name: string, ...args: Term[]): CallTerm {
  return { kind: 'call', name, groups: [args] };
}

export function isRational(term: Term): term is Extract<Term, { kind: 'rational' }> {
  return term.kind === 'rational';
}
