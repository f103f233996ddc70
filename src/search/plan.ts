/** Plans: several searches that belong together, laid out before any of them runs. */
import { InputError } from '../number/errors.ts';
import { resolveBasis } from './basis.ts';
import { readValue } from './intake.ts';
import { type StepEstimate, stepEstimate } from './plan-cost.ts';
import type { BasisSpec, Form, SearchRequest } from './request.ts';

/** A value as a plan takes it: what a request says about its value, under a name of its own. */
export interface PlanValue {
  readonly name: string;
  readonly value: SearchRequest['value'];
  readonly trustedDigits?: number;
  readonly divideBy?: string;
}

/** One way to look at a value: a basis, or a form that needs none or another one. */
export interface PlanBasis {
  readonly title: string;
  readonly basis?: BasisSpec;
  readonly form?: Form;
  readonly degree?: number;
}

export type PlanSpec =
  | { readonly kind: 'single'; readonly value: PlanValue; readonly basis: PlanBasis }
  /** Growing bases; ends for this value at the first relation that holds. */
  | { readonly kind: 'ladder'; readonly value: PlanValue; readonly bases: readonly PlanBasis[] }
  /** Coefficients in order of the expansion parameter; the one at place k is searched at weight `firstWeight` + k. */
  | {
      readonly kind: 'series';
      readonly values: readonly PlanValue[];
      readonly space: string;
      readonly firstWeight: number;
      /** Whether lower weights are offered too. */
      readonly lower?: boolean;
    }
  /** Every value with every basis; ends for a value at its first relation that holds. */
  | { readonly kind: 'batch'; readonly values: readonly PlanValue[]; readonly bases: readonly PlanBasis[] }
  /** One basis, the value divided by each of the typed factors. */
  | {
      readonly kind: 'factors';
      readonly value: PlanValue;
      readonly factors: readonly string[];
      readonly basis: PlanBasis;
    };

export interface PlanStep {
  /** Unique in the plan and the same whenever the plan is laid out again. */
  readonly key: string;
  readonly title: string;
  /** Steps of one group look at one value; a relation that holds ends the group. */
  readonly group: string;
  readonly request: SearchRequest;
  readonly estimate: StepEstimate;
}

const MOST_STEPS = 20_000;

/** Factors that Feynman integrals with masses or at threshold are commonly divided by. */
export const COMMON_FACTORS: readonly string[] = ['1', 'sqrt(3)', 'pi', 'pi^2', 'sqrt(3)*pi', 'sqrt(2)', 'sqrt(5)'];

/**
 * The steps of a plan, cheapest first; those of one group of a ladder stay in their order. Steps that the digits cannot
 * support are included and say so. Throws InputError for a plan without steps, with two values of one name, or with a
 * value or basis that cannot be read.
 */
export function layOut(spec: PlanSpec): readonly PlanStep[] {
  const drafts = draftsOf(spec);
  if (drafts.length === 0) throw new InputError('empty-plan', 'The plan has no steps: give it a value and a basis.');
  if (drafts.length > MOST_STEPS)
    throw new InputError('plan-too-large', `A plan may have ${MOST_STEPS} steps; this one has ${drafts.length}.`);
  const names = spec.kind === 'batch' || spec.kind === 'series' ? spec.values.map((v) => v.name) : [];
  const twice = names.find((name, k) => names.indexOf(name) < k);
  if (twice !== undefined) throw new InputError('named-twice', `Two values of the plan are named “${twice}”.`);
  const steps = drafts.map((draft, k) => step(draft, k, drafts.length));
  if (spec.kind === 'ladder') return steps;
  return [...steps].sort((a, b) => a.estimate.milliseconds - b.estimate.milliseconds);
}

interface Draft {
  readonly value: PlanValue;
  readonly basis: PlanBasis;
}

function draftsOf(spec: PlanSpec): readonly Draft[] {
  switch (spec.kind) {
    case 'single':
      return [{ value: spec.value, basis: spec.basis }];
    case 'ladder':
      return spec.bases.map((basis) => ({ value: spec.value, basis }));
    case 'batch':
      return spec.values.flatMap((value) => spec.bases.map((basis) => ({ value, basis })));
    case 'series':
      return spec.values.map((value, k) => {
        const weight = spec.firstWeight + k;
        const basis = { space: spec.space, weight, ...(spec.lower === undefined ? {} : { lower: spec.lower }) };
        return { value, basis: { title: `weight ${weight}`, basis } };
      });
    case 'factors':
      return spec.factors.map((factor) => ({
        value: { ...spec.value, ...(factor === '1' ? {} : { divideBy: combined(spec.value.divideBy, factor) }) },
        basis: { ...spec.basis, title: `${spec.basis.title}, divided by ${factor}` },
      }));
  }
}

function combined(first: string | undefined, second: string): string {
  return first === undefined ? second : `(${first})*(${second})`;
}

function step({ value, basis }: Draft, place: number, count: number): PlanStep {
  const { name, ...valuePart } = value;
  const { title, ...basisPart } = basis;
  const request: SearchRequest = {
    ...valuePart,
    ...basisPart,
    method: 'lattice',
    label: `${name}: ${title}`,
    ...(count === 1 ? {} : { amongSearches: count }),
  };
  const read = readValue(request);
  const constants = basis.basis === undefined ? (basis.degree ?? 1) : resolveBasis(basis.basis).length;
  return {
    key: `${place}`,
    title: `${name}: ${title}`,
    group: name,
    request,
    estimate: stepEstimate(read.trusted, constants, read.parts.length, count),
  };
}
