/** The catalogue as the page searches it. */
import type { Catalogue } from '../../src/search/catalogue.ts';

export interface Entry {
  readonly text: string;
  readonly latex: string;
  readonly weight: number | null;
  readonly familyKey: string;
  readonly family: string;
  /** What a search by words looks in: typed text, family, function names, LaTeX; lower case. */
  readonly words: string;
}

export function entriesOf(catalogue: Catalogue): readonly Entry[] {
  return catalogue.families.flatMap((family) =>
    family.constants.map(({ text, latex, weight }) => ({
      text,
      latex,
      weight,
      familyKey: family.key,
      family: family.title,
      words: `${text} ${family.title} ${family.names.join(' ')} ${latex}`.toLowerCase(),
    })),
  );
}

/** Whether what is typed is meant as the first digits of a constant: digits and a point, at least three digits. */
export function asDigits(typed: string): string | null {
  const plain = typed.replace(/[\s_]/g, '').replace(/…$/, '');
  return /^-?\d*\.\d{2,}$/.test(plain) && /\d.*\d.*\d/.test(plain) ? plain : null;
}

/** Whether the digits of a constant begin as typed; the sign may be left out. */
export function beginsWith(digits: string, typed: string): boolean {
  const norm = (text: string): string => text.replace(/^-/, '').replace(/^0?\./, '0.');
  return norm(digits).startsWith(norm(typed));
}

/** Entries that fit: by digits where digits are typed (and known), by all words otherwise. */
export function matching(
  entries: readonly Entry[],
  typed: string,
  family: string,
  digits: ReadonlyMap<string, string>,
): readonly Entry[] {
  const wanted = asDigits(typed);
  const weight = /\bweight\s*(\d+)\b/i.exec(typed);
  const words = typed
    .replace(weight?.[0] ?? '', '')
    .toLowerCase()
    .split(/\s+/)
    .filter(Boolean);
  return entries.filter((entry) => {
    if (family !== '' && entry.familyKey !== family) return false;
    if (weight !== null && entry.weight !== Number(weight[1])) return false;
    if (wanted === null) return words.every((word) => entry.words.includes(word));
    const known = digits.get(entry.text);
    return known !== undefined && beginsWith(known, wanted);
  });
}
