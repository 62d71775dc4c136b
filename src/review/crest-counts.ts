import { firstAtOrAfter } from '../numeric/first-at-or-after';
import type { Interval } from '../recording/span';
import type { TimeWindow } from './view-store';

/** Crests of the drawn slow wave in one whole minute of the recording. */
export interface CrestCount {
  /** Middle of the minute. */
  readonly atS: number;
  readonly count: number;
}

/**
 * Crests counted in every whole minute that begins inside a window and lies inside the study; `crestsS` ascending. Minutes
 * that the filter could not fill cleanly are left out: a count of theirs would say nothing.
 */
export function crestsPerMinute(
  crestsS: ArrayLike<number>,
  window: TimeWindow,
  durationS: number,
  unclean: readonly Interval[],
): readonly CrestCount[] {
  const counts: CrestCount[] = [];
  const end = Math.min(window.toS, durationS);
  for (let minute = Math.ceil(window.fromS / 60); (minute + 1) * 60 <= end; minute += 1) {
    const fromS = minute * 60;
    if (unclean.some((one) => one.toS > fromS && one.fromS < fromS + 60)) continue;
    const count = firstAtOrAfter(crestsS, fromS + 60) - firstAtOrAfter(crestsS, fromS);
    counts.push({ atS: fromS + 30, count });
  }
  return counts;
}
