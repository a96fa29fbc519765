interface TraceEvent {
  readonly name: string;
  readonly pid: number;
  readonly tid: number;
  readonly tdur?: number;
  readonly args?: { readonly name?: string };
}

/** What a browser must trace for `longestTasks`. */
export const TASKS: readonly string[] = ['toplevel'];

/** Milliseconds of processor time that the page's five longest tasks took: unlike a frame, they do not wait for others. */
export function longestTasks(trace: string): number[] {
  // oxlint-disable-next-line typescript/no-unsafe-type-assertion -- the browser's own format
  const { traceEvents } = JSON.parse(trace) as { traceEvents: TraceEvent[] };
  const pages = traceEvents
    .filter(({ name, args }) => name === 'thread_name' && args?.name === 'CrRendererMain')
    .map(({ pid, tid }) => `${pid} ${tid}`);
  const tasks = traceEvents.filter(
    ({ name, pid, tid }) => name === 'ThreadControllerImpl::RunTask' && pages.includes(`${pid} ${tid}`),
  );
  const longest = tasks.map(({ tdur = 0 }) => tdur / 1000).toSorted((a, b) => b - a);
  return longest.slice(0, 5);
}
