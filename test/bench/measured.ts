/** One line of the table. */
export interface Measured {
  readonly part: string;
  readonly what: string;
  readonly value: number;
  /** "ms", "s", "MB", "kB", "times", ''. */
  readonly unit: string;
  readonly decimals: number;
  /** What design.md allows, in words; '' where nothing is said. */
  readonly budget: string;
  /** What has to be known to read the number. */
  readonly note: string;
}

/** What every part is given. */
export interface Bench {
  /** Length of the invented study in minutes; the budgets hold for 60. */
  readonly minutes: number;
  /** A folder of its own, removed at the end. */
  readonly folder: string;
  /** Says what is going on, or why something is left out. */
  readonly say: (line: string) => void;
}

export type Part = (bench: Bench) => Promise<readonly Measured[]>;

/** The middle of some values; the mean of both where there are two. NaN of none. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1
    ? sorted[middle]
    : ((sorted[middle - 1] ?? Number.NaN) + (sorted[middle] ?? Number.NaN)) / 2;
}

/** Time of some work, in ms. */
export interface Timed {
  /** Of the processor, all threads of the process together: what other work on the machine does not change. */
  readonly processorMs: number;
  readonly clockMs: number;
}

/** Does some work and says how long it took. */
export async function timed<T>(work: () => T | Promise<T>): Promise<Timed & { readonly made: T }> {
  const before = process.cpuUsage();
  const startMs = performance.now();
  const made = await work();
  const clockMs = performance.now() - startMs;
  const { user, system } = process.cpuUsage(before);
  return { made, processorMs: (user + system) / 1000, clockMs };
}

/** Medians of repeated work. */
export const medianTimed = (runs: readonly Timed[]): Timed => ({
  processorMs: median(runs.map((run) => run.processorMs)),
  clockMs: median(runs.map((run) => run.clockMs)),
});

/** A line for a time of the processor, with the clock's beside it. */
export const timeLine = (part: string, what: string, time: Timed, budget = ''): Measured => ({
  part,
  what,
  value: time.processorMs,
  unit: 'ms',
  decimals: time.processorMs < 20 ? 1 : 0,
  budget,
  note: `processor time; ${Math.round(time.clockMs)} ms by the clock`,
});

/** A line for how many times faster something is than its reference. */
export const ratioLine = (
  part: string,
  what: string,
  reference: Timed,
  ours: Timed,
  budget = '',
): Measured => ({
  part,
  what,
  value: reference.processorMs / ours.processorMs,
  unit: 'times',
  decimals: 2,
  budget,
  note: `${Math.round(reference.processorMs)} ms over ${Math.round(ours.processorMs)} ms of processor time`,
});
