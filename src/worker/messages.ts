/** The one list of what a page (or a Node parent) can ask of an engine worker. Both ends are checked against it. */
import type { Advice } from '../search/advice.ts';
import type { Catalogue } from '../search/catalogue.ts';
import type { LedgerEntry, LedgerHit } from '../search/ledger.ts';
import type { PlanSpec, PlanStep, PlanValue } from '../search/plan.ts';
import type { SearchProgress, SearchRecord } from '../search/record.ts';
import type { BasisSpec, SearchRequest } from '../search/request.ts';
import type { Rewritten } from '../search/rewrite.ts';

export interface BasisElementView {
  readonly text: string;
  readonly latex: string;
  readonly weight: number | null;
  readonly family: string;
}

export interface EngineTasks {
  /** Run one search to its record. */
  search: { request: SearchRequest; response: SearchRecord; progress: SearchProgress };
  /** Digits of a typed constant, correctly rounded. */
  evaluate: {
    request: { text: string; digits: number };
    response: {
      digits: string;
      /** Imaginary part of a complex constant, to the same place as the real part. */
      imaginary: string | null;
      latex: string;
      weight: number | null;
      /** Key of the family, for a single constant. */
      family: string | null;
    };
    progress: { fraction: number };
  };
  /** Check typed constants and expand spaces without computing digits. */
  basis: { request: { basis: BasisSpec }; response: { elements: readonly BasisElementView[] }; progress: never };
  /** Families, their listed constants, and spaces. */
  catalogue: { request: Record<string, never>; response: Catalogue; progress: never };
  /** A typed constant written exactly in the elements of a space. */
  rewrite: { request: { text: string; space: string }; response: Rewritten; progress: never };
  /** The steps of a plan, with what each will cost; for a ladder from nothing give the largest weight instead of its bases. */
  plan: {
    request: { spec: PlanSpec } | { value: PlanValue; maxWeight: number };
    response: { spec: PlanSpec; steps: readonly PlanStep[] };
    progress: never;
  };
  /** What to try after a record without a relation that holds. */
  advice: {
    request: { record: SearchRecord; tried: readonly BasisSpec[] };
    response: { advice: readonly Advice[] };
    progress: never;
  };
  /** Earlier values and findings that a new value is a multiple of, up to one more constant. */
  ledger: {
    request: { value: Pick<SearchRequest, 'value' | 'trustedDigits'>; entries: readonly LedgerEntry[] };
    response: { hits: readonly LedgerHit[] };
    progress: never;
  };
  /** Compute part `part` of `parts` of the constants of a search and store them; does nothing without a store. */
  compute: {
    request: { search: SearchRequest; part: number; parts: number };
    response: { computed: number };
    progress: { fraction: number };
  };
  /** Recompute a record from itself alone. */
  check: {
    request: { record: unknown };
    response: { ok: boolean; findings: readonly { what: string; ok: boolean; detail: string }[] };
    progress: SearchProgress;
  };
}

export type TaskName = keyof EngineTasks;

export type ToWorker =
  | { readonly kind: 'start'; readonly id: number; readonly task: TaskName; readonly request: unknown }
  | { readonly kind: 'cancel'; readonly id: number };

/** Errors cross as tagged data and are rebuilt with class and code on the other side. */
export interface ErrorData {
  readonly name: string;
  readonly message: string;
  readonly code: string | null;
  readonly at: { offset: number; length: number; line: number; column: number } | null;
}

export type FromWorker =
  | { readonly kind: 'progress'; readonly id: number; readonly progress: unknown }
  | { readonly kind: 'done'; readonly id: number; readonly response: unknown }
  | { readonly kind: 'failed'; readonly id: number; readonly error: ErrorData };
