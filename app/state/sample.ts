/**
 * The project of a first visit. The Saltmarsh collaboration, its graphs and its results are invented; the digits were
 * computed with PARI/GP 2.15 from combinations chosen for this purpose, so that the bench has something real to find.
 */
import { spaceOf } from '../../src/spaces/registry.ts';
import { newValue, type Project, type ValueEntry } from './project.ts';

/** Constants of weight 0 to 4: found with one click. */
const HERON =
  '1.3434353866 0614721570 4964836040 3223703627 1447559288 0318535857 8479596323 6140102344 ' +
  '8235815053 1653179963 3164021784 8604013583 4803920351 7815250627 065295173';

/** Holds ζ(5) and Catalan's constant, which the offered basis lacks: an honest negative. */
const PLOVER =
  '0.5383996681 1158044736 7672181300 3558283363 5375876421 3716646986 0823087285 9498777591 ' +
  '5948275902 8985647597 0237720088 8267056922';

/** Right up to digit 117 of 140: a run that lost its last digits. */
const DUNLIN =
  '1.7923139162 4529590321 9260125734 1777239815 1367943369 9374874907 7206598823 0416013004 ' +
  '3057939253 6424962572 0318814060 9266199692 0246953090 233099347';

export function sampleProject(): Project {
  const basis = spaceOf('polylog-half').basis(4, { lower: true });
  const value = (id: string, label: string, text: string): ValueEntry => ({ ...newValue(id, basis), label, text });
  return {
    format: 'digit-assay/project',
    version: 1,
    id: 'sample',
    title: 'Saltmarsh collaboration',
    note: 'An invented example: three values of “tidal graphs”, their basis chosen. Search the first one, or paste a number of your own anywhere on this page.',
    values: [
      value('heron', 'Heron graph, finite part', HERON),
      value('plover', 'Plover graph, order 1/ε', PLOVER),
      value('dunlin', 'Dunlin graph, first run', DUNLIN),
    ],
    basisSets: [],
    selected: 'heron',
  };
}
