/** Carrying out a plan: several searches at once, with pause, cancel, and a state from which it goes on after a reload. */
import { dropDependent } from './drop.ts';
import { layOut, type PlanSpec, type PlanStep } from './plan.ts';
import type { SearchProgress, SearchRecord } from './record.ts';
import type { SearchRequest } from './request.ts';

/** Runs one search: in this thread, or in a worker. Rejects when the signal is aborted. */
export type Execute = (
  request: SearchRequest,
  options: { readonly signal: AbortSignal; readonly onProgress: (progress: SearchProgress) => void },
) => Promise<SearchRecord>;

/** What is known of a step. */
export type StepState =
  | { readonly kind: 'waiting' }
  | { readonly kind: 'running'; readonly progress: SearchProgress | null }
  | { readonly kind: 'done'; readonly record: SearchRecord }
  /** A relation that holds was found for its value, or the digits cannot carry it. */
  | { readonly kind: 'skipped'; readonly reason: string }
  | { readonly kind: 'failed'; readonly reason: string };

/** Plain JSON from which a plan goes on. */
export interface PlanSnapshot {
  readonly format: 'digit-assay/plan';
  readonly version: 1;
  readonly spec: PlanSpec;
  /** By step key. */
  readonly records: Readonly<Record<string, SearchRecord>>;
}

export interface PlanOptions {
  readonly execute: Execute;
  /** Searches at the same time; default 1. */
  readonly lanes?: number;
  /** The plan's steps where they have been laid out already, in a worker for example. */
  readonly steps?: readonly PlanStep[];
  /** Records of an earlier run of the same plan. */
  readonly finished?: Readonly<Record<string, SearchRecord>>;
  /** After every change of a step. */
  readonly onChange?: () => void;
}

export type PlanStatus = 'ready' | 'running' | 'paused' | 'cancelled' | 'finished';

export interface PlanRun {
  readonly steps: readonly PlanStep[];
  readonly status: PlanStatus;
  state(key: string): StepState;
  /** Starts or goes on. Resolves when every step is done, skipped or failed, or when the plan is paused or cancelled. */
  start(): Promise<PlanStatus>;
  /** Lets running steps finish and begins no others. */
  pause(): void;
  /** Stops running steps; their work is lost, finished ones are kept. */
  cancel(): void;
  /** Estimate for the waiting steps, scaled by what finished ones took. */
  remainingMs(): number;
  snapshot(): PlanSnapshot;
}

const HOLDS = 'A relation that holds has been found for this value.';

/** Lays a plan out and makes it ready to run. Throws InputError as `layOut`. */
export function createPlan(spec: PlanSpec, options: PlanOptions): PlanRun {
  const steps = options.steps ?? layOut(spec);
  const states = new Map<string, StepState>(steps.map((step) => [step.key, first(step, options.finished)]));
  const lanes = Math.max(1, options.lanes ?? 1);
  const running = new Map<string, AbortController>();
  let status: PlanStatus = 'ready';
  let spent = 0;
  let foreseen = 0;
  // A function, so that its answer is not narrowed by what was assigned before an await.
  const now = (): PlanStatus => status;

  const set = (key: string, state: StepState): void => {
    states.set(key, state);
    options.onChange?.();
  };
  const settleGroup = (group: string): void => {
    for (const step of steps) {
      if (step.group !== group || states.get(step.key)?.kind !== 'waiting') continue;
      set(step.key, { kind: 'skipped', reason: HOLDS });
    }
  };
  const next = (): PlanStep | undefined => steps.find((step) => states.get(step.key)?.kind === 'waiting');

  const carryOut = async (step: PlanStep): Promise<void> => {
    const controller = new AbortController();
    running.set(step.key, controller);
    set(step.key, { kind: 'running', progress: null });
    const started = performance.now();
    try {
      const record = await dropDependent(step.request, (request) =>
        options.execute(request, {
          signal: controller.signal,
          onProgress: (progress) => set(step.key, { kind: 'running', progress }),
        }),
      );
      spent += performance.now() - started;
      foreseen += step.estimate.milliseconds;
      set(step.key, { kind: 'done', record });
      if (record.verdict === 'holds') settleGroup(step.group);
    } catch (error) {
      if (controller.signal.aborted) set(step.key, { kind: 'waiting' });
      else set(step.key, { kind: 'failed', reason: error instanceof Error ? error.message : String(error) });
    } finally {
      running.delete(step.key);
    }
  };
  const lane = async (): Promise<void> => {
    for (let step = next(); now() === 'running' && step !== undefined; step = next()) await carryOut(step);
  };

  for (const step of steps) {
    const state = states.get(step.key);
    if (state?.kind === 'done' && state.record.verdict === 'holds') settleGroup(step.group);
  }
  return {
    steps,
    get status() {
      return status;
    },
    state: (key) => {
      const state = states.get(key);
      if (state === undefined) throw new RangeError(`state: expected the key of a step, got ${key}`);
      return state;
    },
    async start() {
      if (running.size > 0) throw new RangeError('start: expected no step to be running');
      status = 'running';
      await Promise.all(Array.from({ length: lanes }, lane));
      if (now() === 'running') status = 'finished';
      options.onChange?.();
      return status;
    },
    pause() {
      if (status === 'running') status = 'paused';
    },
    cancel() {
      if (status !== 'finished') status = 'cancelled';
      for (const controller of running.values()) controller.abort(new Error('The plan was cancelled.'));
    },
    remainingMs() {
      const scale = foreseen > 0 ? spent / foreseen : 1;
      const waiting = steps.filter((step) => states.get(step.key)?.kind === 'waiting');
      return (waiting.reduce((sum, step) => sum + step.estimate.milliseconds, 0) * scale) / lanes;
    },
    snapshot: () => ({ format: 'digit-assay/plan', version: 1, spec, records: recordsOf(states) }),
  };
}

function first(step: PlanStep, finished: PlanOptions['finished']): StepState {
  const record = finished?.[step.key];
  if (record !== undefined) return { kind: 'done', record };
  const { supported, digitsNeeded, numbers } = step.estimate;
  if (supported || step.request.form === 'algebraic') return { kind: 'waiting' };
  return {
    kind: 'skipped',
    reason: `The digits cannot carry ${numbers} numbers; about ${digitsNeeded} would be needed for coefficients of two digits.`,
  };
}

function recordsOf(states: ReadonlyMap<string, StepState>): Record<string, SearchRecord> {
  const done = [...states].flatMap(([key, state]) => (state.kind === 'done' ? [[key, state.record] as const] : []));
  return Object.fromEntries(done);
}
