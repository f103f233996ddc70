/** Plans: what they lay out, how they run, pause and go on. Values computed from the typed expressions named. */
import { describe, expect, it } from 'vitest';
import { ConstantCache } from '../../src/constants/cache.ts';
import { dropDependent, withoutConstant } from '../../src/search/drop.ts';
import { ladderBases } from '../../src/search/ladder.ts';
import { COMMON_FACTORS, layOut, type PlanSpec } from '../../src/search/plan.ts';
import { digitsToHold, largestBasis, stepEstimate } from '../../src/search/plan-cost.ts';
import { createPlan, type Execute, type PlanRun } from '../../src/search/plan-run.ts';
import { runSearch } from '../../src/search/run.ts';
import { evaluateToDigits } from '../../src/worker/tasks.ts';

const cache = new ConstantCache();
const execute: Execute = (request, { signal }) => runSearch(request, { cache, signal });
const digitsOf = (text: string, digits: number): string => evaluateToDigits(text, digits, { cache }).digits;
const kinds = (plan: PlanRun): string[] => plan.steps.map((step) => plan.state(step.key).kind);

const zeta = digitsOf('7*zeta(3)/4-pi^2*log(2)/6', 60);
const ladder: PlanSpec = { kind: 'ladder', value: { name: 'two-loop', value: zeta }, bases: ladderBases(3) };

describe('laying out', () => {
  it('keeps the rungs of a ladder in order and counts them against the surplus', () => {
    const steps = layOut(ladder);
    expect(steps.map((s) => s.title.replace('two-loop: ', ''))).toEqual(ladderBases(3).map((b) => b.title));
    expect(new Set(steps.map((s) => s.request.amongSearches))).toEqual(new Set([steps.length]));
  });

  it('orders a batch by cost', () => {
    const bases = [8, 2, 5].map((weight) => ({ title: `w${weight}`, basis: { space: 'mzv', weight, lower: true } }));
    const steps = layOut({ kind: 'batch', values: [{ name: 'a', value: zeta }], bases });
    expect(steps.map((s) => s.title)).toEqual(['a: w2', 'a: w5', 'a: w8']);
  });

  it('raises the weight along a series and divides by each factor of a scan', () => {
    const values = ['a', 'b', 'c'].map((name) => ({ name, value: zeta }));
    const series = layOut({ kind: 'series', values, space: 'alternating', firstWeight: 1, lower: true });
    const weights = series.map((s) => (s.request.basis as { weight: number }).weight);
    expect(weights.sort()).toEqual([1, 2, 3]);
    const value = { name: 'v', value: zeta, divideBy: 'pi' };
    const scan = layOut({
      kind: 'factors',
      value,
      factors: ['1', 'sqrt(3)'],
      basis: { title: 'ζ', basis: ['zeta(3)'] },
    });
    expect(scan.map((s) => s.request.divideBy).sort()).toEqual(['(pi)*(sqrt(3))', 'pi']);
  });

  it('says which steps the digits cannot support', () => {
    const plan = createPlan(
      { kind: 'ladder', value: { name: 'short', value: zeta.slice(0, 24) }, bases: ladderBases(6) },
      { execute },
    );
    const unsupported = plan.steps.filter((s) => !s.estimate.supported && s.request.form !== 'algebraic');
    expect(unsupported.length).toBeGreaterThan(0);
    for (const s of unsupported) expect(plan.state(s.key)).toMatchObject({ kind: 'skipped' });
  });

  it('refuses a plan without steps and two values of one name', () => {
    const value = { name: 'a', value: zeta };
    expect(() => layOut({ kind: 'batch', values: [], bases: [] })).toThrow(/no steps/);
    expect(() => layOut({ kind: 'batch', values: [value, value], bases: ladderBases(1) })).toThrow(/named “a”/);
  });

  it('foresees digits consistently: what is needed is carried', () => {
    for (const [constants, height] of [
      [3, 4],
      [12, 2],
      [40, 6],
    ] as const) {
      const digits = digitsToHold(constants, height);
      expect(stepEstimate(digits, constants).coefficientDigits).toBeGreaterThanOrEqual(height - 1e-9);
      expect(largestBasis(digits, height)).toBe(constants);
      expect(digitsToHold(constants + 1, height)).toBeGreaterThan(digits);
    }
  });
});

describe('running', () => {
  it('climbs to the first relation that holds and skips the rest', async () => {
    const plan = createPlan(ladder, { execute });
    expect(await plan.start()).toBe('finished');
    const states = plan.steps.map((step) => plan.state(step.key));
    const hit = states.findIndex((s) => s.kind === 'done' && s.record.verdict === 'holds');
    expect(plan.steps[hit]?.title).toContain('alternating sums, weight ≤ 3');
    for (const s of states.slice(0, hit)) expect(s.kind === 'done' && s.record.verdict).toBe('excluded');
    expect(new Set(states.slice(hit + 1).map((s) => s.kind))).toEqual(new Set(['skipped']));
  });

  it('finds the factor that a value has to be divided by', async () => {
    const value = { name: 'v', value: digitsOf('sqrt(3)*(2*zeta(3)-5*pi^2/7)', 60) };
    const basis = { title: 'weight ≤ 3', basis: ['pi^2', 'zeta(3)'] };
    const plan = createPlan({ kind: 'factors', value, factors: COMMON_FACTORS, basis }, { execute });
    await plan.start();
    const hits = plan.steps.filter((step) => {
      const state = plan.state(step.key);
      return state.kind === 'done' && state.record.verdict === 'holds';
    });
    expect(hits.map((step) => step.request.divideBy)).toEqual(['sqrt(3)']);
  });

  it('pauses between steps and goes on after a reload without repeating a search', async () => {
    let runs = 0;
    const counted: Execute = (request, options) => {
      runs += 1;
      if (runs === 3) plan.pause();
      return execute(request, options);
    };
    const plan: PlanRun = createPlan(ladder, { execute: counted });
    expect(await plan.start()).toBe('paused');
    const stored = JSON.parse(JSON.stringify(plan.snapshot()));
    expect(Object.keys(stored.records)).toHaveLength(3);
    const again = createPlan(stored.spec, { execute: counted, finished: stored.records });
    expect(await again.start()).toBe('finished');
    const whole = createPlan(ladder, { execute });
    await whole.start();
    expect(kinds(again)).toEqual(kinds(whole));
    expect(runs).toBe(kinds(whole).filter((kind) => kind === 'done').length);
  });

  it('cancels what runs, keeps what is finished, and can start again', async () => {
    const slow: Execute = (request, { signal, onProgress }) =>
      request.label?.includes('weight ≤ 2')
        ? new Promise((_, reject) => signal.addEventListener('abort', () => reject(signal.reason)))
        : execute(request, { signal, onProgress });
    const plan = createPlan(ladder, { execute: slow });
    const ended = plan.start();
    await new Promise((resolve) => setTimeout(resolve, 300));
    plan.cancel();
    expect(await ended).toBe('cancelled');
    expect(kinds(plan).slice(0, 3)).toEqual(['done', 'waiting', 'waiting']);
  });

  it('a step that fails does not end the plan', async () => {
    const failing: Execute = (request, options) =>
      request.label?.includes('rational') ? Promise.reject(new Error('lost')) : execute(request, options);
    const plan = createPlan(ladder, { execute: failing });
    expect(await plan.start()).toBe('finished');
    expect(plan.state('0')).toEqual({ kind: 'failed', reason: 'lost' });
    expect(kinds(plan)).toContain('done');
  });

  it('runs as many searches at once as there are lanes', async () => {
    let [now, most] = [0, 0];
    const watched: Execute = async (request, options) => {
      most = Math.max(most, ++now);
      await new Promise((resolve) => setTimeout(resolve, 5));
      const record = await execute(request, options);
      now -= 1;
      return record;
    };
    const values = ['a', 'b', 'c', 'd'].map((name) => ({ name, value: zeta }));
    const plan = createPlan(
      { kind: 'batch', values, bases: [{ title: 'ζ', basis: ['zeta(3)'] }] },
      { execute: watched, lanes: 2 },
    );
    await plan.start();
    expect([most, plan.status, plan.remainingMs()]).toEqual([2, 'finished', 0]);
  });
});

describe('dependent bases', () => {
  const basis = ['zeta(2)', 'pi^2', 'zeta(3)', 'log(6)', 'pi^2*log(2)', 'log(2)', 'log(3)'];

  it('drops constants until the basis is independent, and finds the relation', async () => {
    const record = await dropDependent({ value: zeta, basis }, (request) => runSearch(request, { cache }));
    expect([record.outcome, record.verdict]).toEqual(['relation', 'holds']);
    expect(record.request.basis).toHaveLength(5);
  });

  it('drops the constant asked for, and refuses one that takes no part', async () => {
    const record = await runSearch({ value: zeta, basis: basis.slice(0, 3) }, { cache });
    expect(withoutConstant(record, 'zeta(2)').request.basis).toEqual(['pi^2', 'zeta(3)']);
    expect(withoutConstant(record).dropped).toBe('pi^2');
    expect(() => withoutConstant(record, 'zeta(3)')).toThrow(/takes no part/);
  });
});
