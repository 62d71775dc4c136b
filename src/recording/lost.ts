import type { Seconds } from '../units/time';
import { type Lead, leadChannels, leadKey } from './lead';
import type { Gap } from './recording';
import { type Interval, joinIntervals, type Span, spansOf } from './span';

/** True where samples of the lead are missing somewhere between two times. */
export function gapBetween(
  lead: Lead,
  gaps: readonly Gap[],
  fromS: Seconds,
  toS: Seconds,
): boolean {
  const channels = leadChannels(lead);
  return gaps.some(
    (gap) =>
      (gap.channel === null || channels.includes(gap.channel)) &&
      gap.fromS < toS &&
      gap.toS > fromS,
  );
}

/** Stretches of a lead that are lost to an organ's figures: spoiled for it, or missing in the file. */
export function lostOn(
  lead: Lead,
  organ: 'stomach' | 'heart',
  spans: readonly Span[],
  gaps: readonly Gap[],
): readonly Interval[] {
  const channels = leadChannels(lead);
  const missing = gaps.filter(({ channel }) => channel === null || channels.includes(channel));
  return joinIntervals([...spansOf(spans, leadKey(lead), organ), ...missing]);
}
