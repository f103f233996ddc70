/** All spaces, and how to find one. */
import { InputError } from '../number/errors.ts';
import { alternatingSpace, hoffmanSpace, multipleZetaSpace, polylogHalfSpace } from './real-sums.ts';
import { fourthRootSpace, fullSixthRootSpace, unramifiedSixthRootSpace } from './root-sums.ts';
import type { Space } from './space.ts';

export const spaces: readonly Space[] = [
  polylogHalfSpace,
  multipleZetaSpace,
  hoffmanSpace,
  alternatingSpace,
  fourthRootSpace,
  unramifiedSixthRootSpace,
  fullSixthRootSpace,
];

/** The space with this key. Throws InputError `unknown-space`. */
export function spaceOf(key: string): Space {
  const space = spaces.find((candidate) => candidate.key === key);
  if (space === undefined) {
    const keys = spaces.map((candidate) => candidate.key).join(', ');
    throw new InputError('unknown-space', `There is no space named "${key}"; the spaces are ${keys}.`);
  }
  return space;
}
