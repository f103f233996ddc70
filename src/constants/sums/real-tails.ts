/** The double-tails pass for the letters 0, 1 and −1; see double-tails.ts for the method and the proof of its radius. */
import type { EvaluationContext } from '../family.ts';
import {
  type Bracket,
  centralInverses,
  gatherBracket,
  powersOf,
  pulse,
  type TailsSize,
  timesPolynomial,
} from './double-tails.ts';
import type { Plan } from './plan.ts';

/** J₀ of every core, in units of 2^−work, where the only letters are 0, 1 and −1 (codes 0, 1, 2). */
export function realTails(plan: Plan, size: TailsSize, context: EvaluationContext): bigint[] {
  const { cores } = plan;
  const empty = centralInverses(size.steps, size.work);
  let values = cores.map(() => 0n);
  let next = cores.map(() => 0n);
  const halved = cores.map((core) => core.first === 2);
  const negated = cores.map((core) => core.last === 2);
  // 1 − 2a = 3 for the single letter −1.
  const brackets = cores.map((core) => gatherBracket(core, plan, 3));
  for (let n = size.steps; n >= 1; n--) {
    const powers = powersOf(n, plan.maxExponent);
    for (let c = 0; c < cores.length; c++) {
      const { exponent, terms } = brackets[c] as Bracket;
      let bracket = 0n;
      for (const { core, polynomial } of terms) {
        bracket += timesPolynomial(polynomial, n, (core < 0 ? empty[n] : values[core]) as bigint);
      }
      let sum = (values[c] as bigint) + bracket / (powers[exponent] as bigint);
      if (halved[c]) sum >>= 1n;
      next[c] = negated[c] ? -sum : sum;
    }
    [values, next] = [next, values];
    pulse(n, size.steps, context);
  }
  return values;
}
