/** What a page's main thread did, from a Chromium trace. */

interface TraceEvent {
  readonly name: string;
  readonly ph: string;
  readonly pid: number;
  readonly tid: number;
  readonly tdur?: number;
  readonly args?: { readonly name?: string };
}

/**
 * CPU milliseconds of each task of the renderers' main threads. CPU time, not wall time: a task that only waits while other
 * programs use the machine is not the page's doing.
 */
export function mainThreadTasks(trace: Buffer): number[] {
  const { traceEvents } = JSON.parse(trace.toString()) as { traceEvents: TraceEvent[] };
  const main = new Set(
    traceEvents
      .filter((e) => e.name === 'thread_name' && e.args?.name === 'CrRendererMain')
      .map((e) => `${e.pid}/${e.tid}`),
  );
  return traceEvents
    .filter((e) => e.name.endsWith('RunTask') && e.tdur !== undefined && main.has(`${e.pid}/${e.tid}`))
    .map((e) => (e.tdur ?? 0) / 1000);
}
