/** Going on after a dependent basis: a constant that the others express is left out. */
import { InputError } from '../number/errors.ts';
import type { SearchRecord } from './record.ts';
import type { BasisEntry, SearchRequest } from './request.ts';

const nameOf = (entry: BasisEntry): string => (typeof entry === 'string' ? entry : entry.name);

/**
 * The request of a `basis-dependent` record without one constant of the relation that it names: `drop`, or else the last
 * one, since bases are written with the more familiar constants first. The space spanned is the same whichever goes.
 * Throws InputError when `drop` takes no part in the relation, RangeError for a record of another outcome.
 */
export function withoutConstant(record: SearchRecord, drop?: string): { request: SearchRequest; dropped: string } {
  if (record.outcome !== 'basis-dependent')
    throw new RangeError(`withoutConstant: expected a dependent basis, got ${record.outcome}`);
  const involved = record.relation.filter((entry) => entry.coefficient !== '0').map((entry) => entry.constant);
  const dropped = drop ?? (involved.at(-1) as string);
  if (!involved.includes(dropped))
    throw new InputError('not-involved', `${dropped} takes no part in the relation among the constants.`);
  const { basis } = record.request;
  const given = Array.isArray(basis) ? (basis as readonly BasisEntry[]) : [];
  const pasted = new Map(given.filter((e) => typeof e !== 'string').map((e) => [nameOf(e), e]));
  const kept = record.relation.map((entry) => entry.constant).filter((text) => text !== dropped);
  return { request: { ...record.request, basis: kept.map((text) => pasted.get(text) ?? text) }, dropped };
}

/** Runs a search, leaving out constants for as long as the basis is dependent; the basis of the record is what is left. */
export async function dropDependent(
  request: SearchRequest,
  execute: (request: SearchRequest) => Promise<SearchRecord>,
): Promise<SearchRecord> {
  let record = await execute(request);
  while (record.outcome === 'basis-dependent' && record.relation.length > 1) {
    record = await execute(withoutConstant(record).request);
  }
  return record;
}
