import { type Beat, type BeatList, beatAt, firstBeatAt } from '../recording/beat';
import { leadChannels } from '../recording/lead';
import type { Recording } from '../recording/recording';
import type { Roles } from '../recording/roles';
import { secondsToTicks, ticksToSeconds } from '../units/ticks';
import type { TimeWindow } from './view-store';

/** Own rate of the heart lead in Hz: the clock of the beats' ticks. Null without a heart lead. */
export function heartRateHz(roles: Roles, recording: Recording): number | null {
  if (!roles.heart) return null;
  const [channel] = leadChannels(roles.heart);
  return recording.channels[channel]?.rateHz ?? null;
}

/** Indexes [from, to) of the beats inside a window. */
export function beatsInView(
  beats: BeatList,
  window: TimeWindow,
  rateHz: number,
): readonly [from: number, to: number] {
  return [
    firstBeatAt(beats, secondsToTicks(window.fromS, rateHz)),
    firstBeatAt(beats, secondsToTicks(window.toS, rateHz) + 1),
  ];
}

/** The beats of some ticks that are there now, with their index, in ascending time. */
export function beatsAtTicks(
  beats: BeatList,
  ticks: readonly number[],
): readonly (Beat & { readonly index: number })[] {
  return [...ticks]
    .sort((a, b) => a - b)
    .flatMap((tick) => {
      const index = firstBeatAt(beats, tick);
      return beats.ticks[index] === tick ? [{ ...beatAt(beats, index), index }] : [];
    });
}

/** RR interval in ms that ends at beat `index`; NaN for the first beat. */
export function rrMsAt(beats: BeatList, index: number, rateHz: number): number {
  if (index < 1 || index >= beats.ticks.length) return Number.NaN;
  return ticksToSeconds(beats.ticks[index] - beats.ticks[index - 1], rateHz) * 1000;
}
