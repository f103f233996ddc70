import type { Ball } from '../number/ball.ts';
import { InputError } from '../number/errors.ts';
import { toAccuracy } from './accurate.ts';
import type { EvaluationContext, Family } from './family.ts';

export interface Single {
  readonly key: string;
  readonly title: string;
  readonly name: string;
  readonly weight: number | null;
  readonly latex: string;
  readonly definition: string;
  readonly source: string;
  /** The constant with `work` fraction bits and whatever radius comes out. */
  compute(work: number, context: EvaluationContext): Ball;
}

/** The family of one constant that has a name and no arguments. */
export function singleConstant(one: Single): Family<{ readonly name: string }> {
  return {
    key: one.key,
    title: one.title,
    names: [one.name],
    parse: (term) => {
      if (term.kind === 'symbol') return { name: one.name };
      throw new InputError('wrong-arguments', `${one.name} is a number and takes no arguments.`);
    },
    weight: () => one.weight,
    latex: () => one.latex,
    text: () => one.name,
    isReal: () => true,
    evaluate: (_, bits, context) => toAccuracy(bits, 12, (work) => one.compute(work, context)),
    definition: one.definition,
    source: one.source,
    examples: [one.name],
  };
}
