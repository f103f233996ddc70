/** Terms as LaTeX, atoms in the notation of their family. */
import { familyOf } from '../constants/registry.ts';
import { isOperation } from '../constants/structure.ts';
import type { Term } from '../constants/term.ts';
import { latexWith } from '../constants/term-latex.ts';

/** LaTeX (math mode) of a term. Throws InputError for a name that no family knows. */
export function toLatex(term: Term): string {
  return latexWith(term, (atom) => {
    if (isOperation(atom)) return undefined;
    const { family, args } = familyOf(atom);
    return family.latex(args);
  });
}

/** p/q as `\\frac`, the sign in front. */
export function rationalLatex(p: bigint, q: bigint): string {
  const size = p < 0n ? -p : p;
  const sign = p < 0n ? '-' : '';
  return q === 1n ? `${sign}${size}` : `${sign}\\frac{${size}}{${q}}`;
}
