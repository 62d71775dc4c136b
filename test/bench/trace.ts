/** An event of a browser's trace, as far as it is needed (Trace Event Format; times in us). */
interface TraceEvent {
  readonly name: string;
  readonly ph: string;
  readonly pid: number;
  readonly tid: number;
  readonly ts: number;
  readonly dur?: number;
  /** Processor time of the thread. */
  readonly tdur?: number;
  readonly args: { readonly name?: string };
}

/** Events of the page's main thread: of several page processes, the one with the most frames. */
function mainThread(events: readonly TraceEvent[]): readonly TraceEvent[] {
  const threads = events.filter(
    ({ name, args }) => name === 'thread_name' && args.name === 'CrRendererMain',
  );
  const all = threads.map(({ pid, tid }) =>
    events.filter((event) => event.pid === pid && event.tid === tid),
  );
  const frames = (some: readonly TraceEvent[]) => some.filter(isFrame).length;
  return all.sort((a, b) => frames(b) - frames(a))[0] ?? [];
}

const isFrame = ({ name, ph }: TraceEvent): boolean => name === 'AnimationFrame' && ph === 'b';

/** Calls of script that are not made inside another, in order. */
function outerCalls(events: readonly TraceEvent[]): readonly TraceEvent[] {
  const calls = events
    .filter(({ name, ph }) => name === 'FunctionCall' && ph === 'X')
    .sort((a, b) => a.ts - b.ts);
  let endUs = 0;
  return calls.filter(({ ts, dur }) => {
    const outer = ts >= endUs;
    if (outer) endUs = ts + (dur ?? 0);
    return outer;
  });
}

/**
 * Script on a page's main thread from each frame to the next, in ms of processor time, out of a trace of the category
 * `devtools.timeline`: frames, pointer, messages from the worker and timers together.
 */
export function scriptMsByFrame(trace: string): readonly number[] {
  const read: { readonly traceEvents: readonly TraceEvent[] } = JSON.parse(trace);
  const events = mainThread(read.traceEvents);
  const starts = events.filter(isFrame).map(({ ts }) => ts);
  starts.sort((a, b) => a - b);
  const sums = starts.map(() => 0);
  let frame = 0;
  for (const { ts, dur, tdur } of outerCalls(events)) {
    while (frame + 1 < starts.length && starts[frame + 1] <= ts) frame += 1;
    if (ts >= starts[frame]) sums[frame] += (tdur ?? dur ?? 0) / 1000;
  }
  return sums.slice(0, -1);
}
