/** The catalogue of constants and spaces as plain data. */
import { families, familyOf } from '../constants/registry.ts';
import { toLatex } from '../expression/print-latex.ts';
import { InputError } from '../number/errors.ts';
import { reducibleSpaces } from '../spaces/reduction/reduce.ts';
import { spaces } from '../spaces/registry.ts';
import { readTyped } from './basis.ts';

export interface CatalogueConstant {
  readonly text: string;
  readonly latex: string;
  readonly weight: number | null;
}

export interface CatalogueFamily {
  readonly key: string;
  readonly title: string;
  /** Names in the grammar. */
  readonly names: readonly string[];
  /** LaTeX of the defining sum or integral. */
  readonly definition: string;
  readonly source: string;
  readonly constants: readonly CatalogueConstant[];
}

export interface CatalogueSpace {
  readonly key: string;
  readonly title: string;
  readonly alphabet: string;
  readonly maxWeight: number;
  readonly dimensionFormula: string;
  /** Dimension at weights 0 … maxWeight. */
  readonly dimensions: readonly number[];
  readonly status: string;
  readonly source: string;
  /** Whether constants can be rewritten into its elements exactly. */
  readonly reductions: boolean;
}

export interface Catalogue {
  readonly families: readonly CatalogueFamily[];
  readonly spaces: readonly CatalogueSpace[];
}

/** All families (or the one named) with definition, source and listed constants, and all spaces. Throws InputError for an unknown family. */
export function catalogue(familyKey?: string): Catalogue {
  const chosen = families.filter((f) => familyKey === undefined || f.key === familyKey);
  if (chosen.length === 0) {
    throw new InputError(
      'unknown-family',
      `There is no family “${familyKey}”; the families are ${families.map((f) => f.key).join(', ')}.`,
    );
  }
  return {
    families: chosen.map(({ key, title, names, definition, source, examples }) => ({
      key,
      title,
      names,
      definition,
      source,
      constants: examples.map(listed),
    })),
    spaces: spaces.map((space) => ({
      key: space.key,
      title: space.title,
      alphabet: space.alphabet,
      maxWeight: space.maxWeight,
      dimensionFormula: space.dimensionFormula,
      dimensions: Array.from({ length: space.maxWeight + 1 }, (_, w) => space.dimension(w)),
      status: space.status,
      source: space.source,
      reductions: reducibleSpaces.includes(space.key),
    })),
  };
}

function listed(text: string): CatalogueConstant {
  const term = readTyped(text);
  const atom = term.kind === 'symbol' || term.kind === 'call' ? familyOf(term) : null;
  return { text, latex: toLatex(term), weight: atom === null ? null : atom.family.weight(atom.args) };
}
