import { type Interval, joinIntervals } from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { SampleGap } from './gaps';

/** How far what is missing before and after a sample is felt in a filter's output. */
export interface Reach {
  /** Seconds after the start of the lead, or after a gap. */
  readonly afterS: Seconds;
  /** Seconds before the end of the lead, or before a gap. */
  readonly beforeS: Seconds;
}

/**
 * The stretches a filter cannot fill cleanly: the gaps, what lies within its reach of them, and
 * the two ends of the lead. Joined, ascending, inside the lead.
 */
export function uncleanStretches(
  gaps: readonly SampleGap[],
  sampleCount: number,
  rateHz: Hertz,
  reach: Reach,
): readonly Interval[] {
  const endS = sampleCount / rateHz;
  const inside = (fromS: number, toS: number): Interval => ({
    fromS: Math.max(0, fromS),
    toS: Math.min(endS, toS),
  });
  return joinIntervals([
    inside(0, reach.afterS),
    ...gaps.map(({ from, to }) =>
      inside(from / rateHz - reach.beforeS, to / rateHz + reach.afterS),
    ),
    inside(endS - reach.beforeS, endS),
  ]);
}
