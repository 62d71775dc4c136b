/** Samples [from, to) in which something holds without a break. */
export interface Run {
  readonly from: number;
  readonly to: number;
}

/** Collects runs while samples pass one by one; keeps only those long enough. */
export interface Runs {
  readonly isOpen: boolean;
  /** Sample `index` is in; begins a run where none is open. */
  open(index: number): void;
  /** Sample `index` is the first that is not in. */
  close(index: number): void;
  /** The runs, after the last sample; `end` is how many samples there were. */
  finish(end: number): readonly Run[];
}

/** A collector of runs of at least `leastSamples`. */
export function createRuns(leastSamples: number): Runs {
  const kept: Run[] = [];
  let from = -1;
  const runs = {
    isOpen: false,
    open(index: number) {
      if (runs.isOpen) return;
      runs.isOpen = true;
      from = index;
    },
    close(index: number) {
      if (runs.isOpen && index - from >= leastSamples) kept.push({ from, to: index });
      runs.isOpen = false;
    },
    finish(end: number) {
      runs.close(end);
      return kept;
    },
  };
  return runs;
}
