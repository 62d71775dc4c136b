/** Samples [from, to) of a signal. */
export interface SampleRun {
  readonly from: number;
  readonly to: number;
}

/** The runs of NaN in a signal, ascending and apart. O(n). */
export function nanRuns(signal: Float64Array): readonly SampleRun[] {
  const runs: SampleRun[] = [];
  let from = -1;
  for (let i = 0; i <= signal.length; i += 1) {
    const missing = i < signal.length && Number.isNaN(signal[i]);
    if (missing && from < 0) from = i;
    if (!missing && from >= 0) {
      runs.push({ from, to: i });
      from = -1;
    }
  }
  return runs;
}
