/** Reads a stored project. Records are kept as they are: the engine re-checks them from themselves. */
import * as v from 'valibot';
import type { Project } from './project.ts';

const record = v.looseObject({
  format: v.literal('digit-assay/record'),
  version: v.literal(1),
  request: v.looseObject({}),
  outcome: v.picklist(['relation', 'excluded', 'basis-dependent', 'inconclusive', 'cancelled']),
  relation: v.array(v.looseObject({ constant: v.string(), latex: v.string(), coefficient: v.string() })),
  diagnosis: v.array(v.string()),
});

const value = v.object({
  id: v.string(),
  label: v.string(),
  text: v.string(),
  trustedDigits: v.nullable(v.number()),
  divideBy: v.string(),
  basis: v.array(v.string()),
  records: v.array(record),
});

const project = v.object({
  format: v.literal('digit-assay/project'),
  version: v.literal(1),
  id: v.string(),
  title: v.string(),
  note: v.string(),
  values: v.pipe(v.array(value), v.minLength(1)),
  basisSets: v.array(v.object({ id: v.string(), name: v.string(), entries: v.array(v.string()) })),
  selected: v.string(),
});

/** The project, or undefined for data of another shape or version. */
export function readProject(data: unknown): Project | undefined {
  const read = v.safeParse(project, data);
  return read.success ? (read.output as unknown as Project) : undefined;
}
