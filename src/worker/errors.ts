/** Errors as tagged data across the worker boundary, and back with class and code. */
import { InputError, PrecisionError } from '../number/errors.ts';
import type { ErrorData } from './messages.ts';

/** The worker ended (crashed or was stopped) before it answered. */
export class WorkerDied extends Error {
  override readonly name = 'WorkerDied';
  readonly code = 'worker-died';
}

/** The task was cancelled. Named as the platform names it, so that one test serves fetch-like code too. */
export class AbortError extends Error {
  override readonly name = 'AbortError';
  readonly code = 'aborted';
}

export function toErrorData(error: unknown): ErrorData {
  if (error instanceof InputError)
    return { name: error.name, message: error.message, code: error.code, at: error.at ?? null };
  if (error instanceof Error) {
    const code = 'code' in error && typeof error.code === 'string' ? error.code : null;
    return { name: error.name, message: error.message, code, at: null };
  }
  return { name: 'Error', message: String(error), code: null, at: null };
}

export function fromErrorData(data: ErrorData): Error {
  switch (data.name) {
    case 'InputError':
      return new InputError(data.code ?? 'input', data.message, data.at ?? undefined);
    case 'PrecisionError':
      return new PrecisionError(data.message);
    case 'AbortError':
      return new AbortError(data.message);
    case 'RangeError':
      return new RangeError(data.message);
    case 'TypeError':
      return new TypeError(data.message);
    default:
      return new Error(data.message);
  }
}
