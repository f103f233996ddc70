/** The tasks around a search, as a page asks for them: plan, advice, ledger. */
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { createPlan } from '../../src/search/plan-run.ts';
import { tasks } from '../../src/worker/tasks.ts';

const context = { signal: new AbortController().signal, onProgress: () => undefined, cache: new ConstantCache() };
/** ζ(3), 50 digits (OEIS A002117). */
const zeta3 = '1.2020569031595942853997381615114499907649862923405';

describe('tasks around a search', () => {
  it('a ladder from nothing but a value and a weight is laid out, survives the way through JSON, and runs', async () => {
    const answer = await tasks.plan({ value: { name: 'v', value: zeta3 }, maxWeight: 3 }, context);
    const { spec, steps } = JSON.parse(JSON.stringify(answer)) as typeof answer;
    const plan = createPlan(spec, {
      steps,
      execute: (request, { signal }) => tasks.search(request, { ...context, signal }),
    });
    await plan.start();
    const records = Object.values(plan.snapshot().records);
    expect(records.at(-1)?.expression?.text).toBe('zeta(3)');
    expect(records.at(-1)?.verdict).toBe('holds');
    const { advice } = await tasks.advice({ record: records[0] as never, tried: [] }, context);
    expect(advice.map((a) => a.kind)).toContain('space');
  });

  it('a ladder of no weight is refused', async () => {
    const request = { value: { name: 'v', value: zeta3 }, maxWeight: Number.NaN };
    await expect(tasks.plan(request, context)).rejects.toMatchObject({ code: 'bad-weight' });
  });

  it('the ledger knows a value again', async () => {
    const entries = [{ name: 'earlier', value: { expression: '3*zeta(3)/5' } }];
    const { hits } = await tasks.ledger({ value: { value: zeta3 }, entries }, context);
    expect(hits).toMatchObject([{ name: 'earlier', factor: '5/3', extra: null }]);
  });
});
