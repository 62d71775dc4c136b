import type { Gap } from '../recording/recording';
import type { Seconds } from '../units/time';

/** Records that follow one another without a gap; their first sample was taken `startS` after the recording's first. */
export interface RecordRun {
  readonly firstRecord: number;
  readonly records: number;
  readonly startS: Seconds;
}

/** Seconds from the recording's first sample to the end of its last record. */
export function lengthOf(runs: readonly RecordRun[], recordDurationS: Seconds): Seconds {
  const last = runs[runs.length - 1];
  return last.startS + last.records * recordDurationS;
}

/** What lies between the runs, on all channels. */
export const gapsBetween = (runs: readonly RecordRun[], recordDurationS: Seconds): readonly Gap[] =>
  runs.slice(1).map(({ startS }, i) => ({
    channel: null,
    fromS: runs[i].startS + runs[i].records * recordDurationS,
    toS: startS,
  }));

/**
 * Place on a channel's own even grid of the first sample of a run: that nearest to its time, so that nothing is moved by more
 * than half a sample. Places of later runs never lie before the end of earlier ones.
 */
export const firstPlace = (
  { startS }: RecordRun,
  samplesPerRecord: number,
  recordDurationS: Seconds,
): number => Math.round((startS * samplesPerRecord) / recordDurationS);

/** Samples of a channel on its even grid, those in gaps counted. */
export function placesOf(
  runs: readonly RecordRun[],
  samplesPerRecord: number,
  recordDurationS: Seconds,
): number {
  const last = runs[runs.length - 1];
  return firstPlace(last, samplesPerRecord, recordDurationS) + last.records * samplesPerRecord;
}
