/** The catalogue of constants and spaces as plain data. */
import { families, familyOf } from '../constants/registry.ts';
import { InputError } from '../number/errors.ts';
import { readTyped } from '../search/basis.ts';
import { spaces } from '../spaces/registry.ts';

/** All families (or the one named) with definition, source and examples, and all spaces. Throws InputError for an unknown family. */
export function catalogue(familyKey?: string): unknown {
  const chosen = families.filter((f) => familyKey === undefined || f.key === familyKey);
  if (chosen.length === 0) {
    throw new InputError(
      'unknown-family',
      `There is no family “${familyKey}”; the families are ${families.map((f) => f.key).join(', ')}.`,
    );
  }
  return {
    families: chosen.map((family) => ({
      key: family.key,
      title: family.title,
      names: family.names,
      definition: family.definition,
      source: family.source,
      examples: family.examples.map((text) => ({ text, ...described(text) })),
    })),
    ...(familyKey === undefined
      ? {
          spaces: spaces.map(({ key, title, alphabet, maxWeight, dimensionFormula, status, source }) => ({
            key,
            title,
            alphabet,
            maxWeight,
            dimensionFormula,
            status,
            source,
          })),
        }
      : {}),
  };
}

function described(text: string): { latex: string; weight: number | null } | Record<string, never> {
  const term = readTyped(text);
  if (term.kind !== 'symbol' && term.kind !== 'call') return {};
  const { family, args } = familyOf(term);
  return { latex: family.latex(args), weight: family.weight(args) };
}
