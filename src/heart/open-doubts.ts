import { type BeatList, firstBeatAt } from '../recording/beat';
import type { Doubt, SettledDoubt } from '../recording/doubt';
import type { Hertz } from '../units/rate';
import { TICKS_PER_SAMPLE } from '../units/ticks';

/** A place nearer to a beat than this is that beat. */
const SAME_BEAT_S = 0.15;

/**
 * The doubts that nobody has settled. A beat that was looked at is not asked about again, whatever reason comes up for it
 * then; nor is a beat proposed where one was taken away as too many. `rateHz` is the rate the ticks count in.
 */
export function stillOpen(
  doubts: readonly Doubt[],
  settled: readonly SettledDoubt[],
  beats: BeatList,
  rateHz: Hertz,
): readonly Doubt[] {
  const ids = new Set(settled.map(({ id }) => id));
  const ticks = new Set(settled.flatMap(({ tick }) => (tick === null ? [] : [tick])));
  const gone = [...ticks].filter((tick) => beats.ticks[firstBeatAt(beats, tick)] !== tick);
  const reach = SAME_BEAT_S * TICKS_PER_SAMPLE * rateHz;
  const isGone = (tick: number) => gone.some((one) => Math.abs(one - tick) < reach);
  return doubts.filter(({ id, tick, mend }) => {
    if (ids.has(id) || (tick !== null && ticks.has(tick))) return false;
    const put = mend?.kind === 'beats' && mend.removed.length === 0 ? mend.added : [];
    return put.length === 0 || !put.every((beat) => isGone(beat.tick));
  });
}
