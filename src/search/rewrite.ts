/** A constant written exactly in the generating set of a space. */
import { combination } from '../expression/combination.ts';
import { toLatex } from '../expression/print-latex.ts';
import { InputError } from '../number/errors.ts';
import { makeReducer, type Reducer } from '../spaces/reduction/reduce.ts';
import { readTyped } from './basis.ts';

const reducers = new Map<string, Reducer>();

export interface Rewritten {
  readonly terms: readonly { readonly element: string; readonly coefficient: string }[];
  readonly text: string;
  readonly latex: string;
}

/** The typed constant in the elements of the space. Throws InputError when it is not known to lie in it. */
export function rewrite(text: string, space: string): Rewritten {
  const reducer = reducers.get(space) ?? makeReducer(space);
  reducers.set(space, reducer);
  const reduced = reducer.reduce(readTyped(text));
  if (reduced === null) {
    throw new InputError(
      'not-in-space',
      `${text} is not known to lie in this space, or its weight is beyond what is tabulated.`,
    );
  }
  const sum = combination(
    reduced.map(({ element, coefficient }) => ({
      p: coefficient.p,
      q: coefficient.q,
      text: element,
      latex: toLatex(readTyped(element)),
    })),
  );
  return {
    terms: reduced.map(({ element, coefficient: { p, q } }) => ({
      element,
      coefficient: q === 1n ? `${p}` : `${p}/${q}`,
    })),
    ...sum,
  };
}
