import { firstBeatAt } from '../recording/beat';
import { leadKey } from '../recording/lead';
import { type Interval, joinIntervals, spansOf, withoutIntervals } from '../recording/span';
import type { Hertz } from '../units/rate';
import { secondsToTicks } from '../units/ticks';
import type { SessionState } from './document';

/** Shorter pieces hold no beat worth looking for. */
const LEAST_S = 0.5;

/**
 * Stretches that count for the heart again after an edit and in which no beat stands: the detector leaves spoiled spans out,
 * so that beats have to be looked for there now. `rateHz` is the rate of the heart lead's ticks.
 */
export function freedForHeart(
  before: SessionState,
  after: SessionState,
  rateHz: Hertz,
): readonly Interval[] {
  const { heart } = after.roles;
  if (!heart || before.spans === after.spans) return [];
  const key = leadKey(heart);
  const blocked = (state: SessionState) => joinIntervals(spansOf(state.spans, key, 'heart'));
  const freed = withoutIntervals(blocked(before), blocked(after));
  return freed.filter(({ fromS, toS }) => {
    const next = firstBeatAt(after.beats, secondsToTicks(fromS, rateHz));
    const holdsBeat = after.beats.ticks[next] < secondsToTicks(toS, rateHz);
    return toS - fromS >= LEAST_S && !holdsBeat;
  });
}
