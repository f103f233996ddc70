/** A search whose constants are computed on all workers of the pool first. */
import { InputError } from '../number/errors.ts';
import { readValue } from '../search/intake.ts';
import type { SearchRecord } from '../search/record.ts';
import type { SearchRequest } from '../search/request.ts';
import type { CallOptions, EngineClient } from './client.ts';

/** Below this many digits the constants are computed faster than they are passed around. */
const WORTH_SHARING = 400;

/** As `client.call('search', …)`; from 400 digits on, each of `workers` workers computes a share of the constants and stores it for the others. */
export async function searchInParallel(
  client: EngineClient,
  workers: number,
  request: SearchRequest,
  options: CallOptions<'search'> = {},
): Promise<SearchRecord> {
  if (workers > 1 && request.form !== 'algebraic' && digitsOf(request) >= WORTH_SHARING) {
    const start = performance.now();
    const fractions = Array.from({ length: workers }, () => 0);
    await Promise.all(
      fractions.map((_, part) =>
        client.call(
          'compute',
          { search: request, part, parts: workers },
          {
            ...(options.signal === undefined ? {} : { signal: options.signal }),
            onProgress: ({ fraction }) => {
              fractions[part] = fraction;
              const elapsedMs = performance.now() - start;
              const done = fractions.reduce((sum, f) => sum + f, 0) / workers;
              const remainingMs = done > 0.05 ? (elapsedMs * (1 - done)) / done : null;
              options.onProgress?.({
                stage: 'constants',
                fraction: done,
                iterations: 0,
                normBoundLog10: 0,
                elapsedMs,
                remainingMs,
              });
            },
          },
        ),
      ),
    );
  }
  return client.call('search', request, options);
}

/** Digits of the value; 0 for one that cannot be read (the search itself says why). */
function digitsOf(request: SearchRequest): number {
  try {
    return readValue(request).written;
  } catch (error) {
    if (error instanceof InputError) return 0;
    throw error;
  }
}
