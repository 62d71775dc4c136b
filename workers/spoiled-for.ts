import { type Lead, leadChannels, leadKey } from '../src/recording/lead';
import type { Recording } from '../src/recording/recording';
import { type Interval, joinIntervals, type Span, spansOf } from '../src/recording/span';

/** Stretches of a lead that carry nothing for an organ: spoiled for it, or missing. */
export function spoiledFor(
  organ: 'stomach' | 'heart',
  { gaps }: Pick<Recording, 'gaps'>,
  lead: Lead,
  spans: readonly Span[],
): readonly Interval[] {
  const channels = leadChannels(lead);
  const own = gaps.filter(({ channel }) => channel === null || channels.includes(channel));
  return joinIntervals([...spansOf(spans, leadKey(lead), organ), ...own]);
}
