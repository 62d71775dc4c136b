/** Samples [from, to) in which something holds without a break. */
export interface Run {
  readonly from: number;
  readonly to: number;
}

/** Collects runs while samples pass one by one; keeps only those long enough. */
export interface RunCollector {
  /** Tells whether sample `index` is in; indexes come in order, none left out. */
  step(index: number, isIn: boolean): void;
  /** The runs, after the last sample; `end` is how many samples there were. */
  finish(end: number): readonly Run[];
}

/** A collector of runs of at least `leastSamples`. */
export function createRunCollector(leastSamples: number): RunCollector {
  const runs: Run[] = [];
  let from = -1;
  const close = (to: number): void => {
    if (from >= 0 && to - from >= leastSamples) runs.push({ from, to });
    from = -1;
  };
  return {
    step(index, isIn) {
      if (isIn) {
        if (from < 0) from = index;
      } else if (from >= 0) close(index);
    },
    finish(end) {
      close(end);
      return runs;
    },
  };
}
