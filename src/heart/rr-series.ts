import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { BEAT_CLASSES, BEAT_ORIGINS, type BeatList } from '../recording/beat';
import type { RrSeries } from '../recording/heart-series';
import { type Interval, joinIntervals } from '../recording/span';
import type { Hertz } from '../units/rate';
import { TICKS_PER_SAMPLE, ticksToSeconds } from '../units/ticks';
import type { Seconds } from '../units/time';

const NORMAL = BEAT_CLASSES.indexOf('N');
const SUPRAVENTRICULAR = BEAT_CLASSES.indexOf('S');
const ECTOPIC: readonly number[] = (['S', 'V', 'F'] as const).map((one) =>
  BEAT_CLASSES.indexOf(one),
);
const PLACED = BEAT_ORIGINS.indexOf('placed');

/**
 * Intervals outside these limits are no NN: shorter ones hold a beat too many, longer ones miss beats or are a pause, which is
 * told of apart. Common practice, no single source.
 */
export const NN_LIMITS_MS = [300, 2000] as const;

/** Times of the beats in seconds from the start of the recording. */
export function beatTimes(beats: BeatList, rateHz: Hertz): Float64Array {
  return beats.ticks.map((tick) => ticksToSeconds(tick, rateHz));
}

/**
 * One flag for each interval between neighbouring ascending times: 1 where a stretch of `blocked` reaches inside it.
 * A stretch that only touches a beat blocks nothing. O(times + stretches).
 */
export function blockedIntervals(timesS: Float64Array, blocked: readonly Interval[]): Uint8Array {
  const flags = new Uint8Array(Math.max(0, timesS.length - 1));
  const stretches = joinIntervals(blocked);
  let at = 0;
  for (let i = 0; i < flags.length; i += 1) {
    while (at < stretches.length && stretches[at].toS <= timesS[i]) at += 1;
    if (at < stretches.length && stretches[at].fromS < timesS[i + 1]) flags[i] = 1;
  }
  return flags;
}

/**
 * RR intervals between neighbouring beats of any class, one fewer than there are beats; interval i runs from beat i to
 * beat i + 1 and stands at the latter's time. An interval is NN where both beats are N and neither is placed, and nothing
 * blocked lies between (Task Force 1996), and where it lies within NN_LIMITS_MS. A Q beat stands in the list, so that nothing is ever joined across it.
 * `rateHz` is the rate the ticks count in; `blocked` holds the spoiled spans for the heart and the gaps, in any order.
 */
export function rrSeries(beats: BeatList, rateHz: Hertz, blocked: readonly Interval[]): RrSeries {
  const times = beatTimes(beats, rateHz);
  const count = Math.max(0, times.length - 1);
  const inBlocked = blockedIntervals(times, blocked);
  const rrMs = new Float64Array(count);
  const nn = new Uint8Array(count);
  const carries = (beat: number) =>
    beats.classes[beat] === NORMAL && beats.origins[beat] !== PLACED;
  for (let i = 0; i < count; i += 1) {
    rrMs[i] = (1000 * (beats.ticks[i + 1] - beats.ticks[i])) / (TICKS_PER_SAMPLE * rateHz);
    const likely = rrMs[i] >= NN_LIMITS_MS[0] && rrMs[i] <= NN_LIMITS_MS[1];
    nn[i] = likely && inBlocked[i] === 0 && carries(i) && carries(i + 1) ? 1 : 0;
  }
  return { timesS: times.slice(1), rrMs, nn };
}

/** What each interval says of the rhythm, one value an interval. */
export interface RhythmFlags {
  /**
   * 1 for intervals that tell the rhythm: as NN, but S beats count too, since a rhythm that comes from above the ventricles is
   * what is to be judged.
   */
  readonly tells: Uint8Array;
  /** 1 for intervals that end in an S, V or F beat, with nothing blocked between. */
  readonly ectopic: Uint8Array;
}

/** The flags of beats; `rateHz` and `blocked` as for rrSeries. */
export function rhythmFlags(
  beats: BeatList,
  rateHz: Hertz,
  blocked: readonly Interval[],
): RhythmFlags {
  const inBlocked = blockedIntervals(beatTimes(beats, rateHz), blocked);
  const tells = (beat: number) =>
    (beats.classes[beat] === NORMAL || beats.classes[beat] === SUPRAVENTRICULAR) &&
    beats.origins[beat] !== PLACED;
  return {
    tells: inBlocked.map((isBlocked, i) => (isBlocked === 0 && tells(i) && tells(i + 1) ? 1 : 0)),
    ectopic: inBlocked.map((isBlocked, i) =>
      isBlocked === 0 && ECTOPIC.includes(beats.classes[i + 1]) ? 1 : 0,
    ),
  };
}

/** Intervals [first, end) of a series that lie wholly in [fromS, toS): they begin at or after fromS and end before toS. */
export function intervalsWithin(
  rr: RrSeries,
  fromS: Seconds,
  toS: Seconds,
): { readonly first: number; readonly end: number } {
  let first = firstAtOrAfter(rr.timesS, fromS);
  const end = firstAtOrAfter(rr.timesS, toS);
  while (first < end && rr.timesS[first] - rr.rrMs[first] / 1000 < fromS - 1e-9) first += 1;
  return { first, end: Math.max(first, end) };
}
