/** Giving the event loop a turn inside long work, so that a cancel can be heard. */

const BETWEEN_PAUSES = 25;

/** Returns a function to be awaited between short pieces of work: it waits for one turn of the event loop every 25 ms and throws the signal's reason once that is aborted. */
export function pacer(signal: AbortSignal | undefined): () => Promise<void> | undefined {
  let last = performance.now();
  return () => {
    if (performance.now() - last < BETWEEN_PAUSES) return undefined;
    return new Promise<void>((resolve, reject) => {
      setTimeout(() => {
        last = performance.now();
        if (signal?.aborted) reject(signal.reason);
        else resolve();
      }, 0);
    });
  };
}
