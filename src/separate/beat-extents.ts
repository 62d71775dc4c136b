import { BEAT_CLASSES, BEAT_ORIGINS, type BeatClass, type BeatList } from '../recording/beat';
import type { BeatAverageSettings } from '../recording/settings';
import type { Hertz } from '../units/rate';
import { TICKS_PER_SAMPLE } from '../units/ticks';

/** Parts of the intervals before and after a beat that are its own, together below 1: averages of neighbours never overlap. */
const SHARE_BEFORE = 0.36;
const SHARE_AFTER = 0.6;
/** A longer interval is a pause and counts as this in the usual interval. */
const PAUSE_S = 1.5;
/** A beat whose neighbour comes sooner than this part of the usual interval has no room to be averaged. */
const ROOM = 0.75;
/** Beats between two yields. */
export const BEATS_A_STEP = 256;

/** Beats that share an average. */
export interface BeatGroup {
  readonly beatClass: BeatClass;
  /** Indexes into the beats, ascending. */
  readonly members: readonly number[];
}

/** Beats on the sample clock of a lead, with what belongs to each. */
export interface PlacedBeats {
  readonly rateHz: Hertz;
  /** Times in samples of the lead, between them. */
  readonly at: Float64Array;
  /** Whole samples before and after each beat that its class's average is wide there. */
  readonly before: Int32Array;
  readonly after: Int32Array;
  /** 0 where a neighbour is so near that the beat may not enter an average. */
  readonly hasRoom: Uint8Array;
  readonly groups: readonly BeatGroup[];
  /** Beats of no average of their own: of class Q, or placed where no R peak is seen. They may be given that of class N. */
  readonly others: readonly number[];
}

/** Members of a group about its m-th, half of `count` on either side, as far as there are any. */
export function windowAbout(m: number, size: number, count: number): readonly [number, number] {
  const half = Math.floor(count / 2);
  return [Math.max(0, m - half), Math.min(size, m + half + 1)];
}

function groupsOf({ classes, origins }: BeatList) {
  const placed = BEAT_ORIGINS.indexOf('placed');
  const averaged = BEAT_CLASSES.filter((one) => one !== 'Q');
  const groups = averaged.map((beatClass) => ({ beatClass, members: [] as number[] }));
  const others: number[] = [];
  classes.forEach((index, k) => {
    const group = groups.find(({ beatClass }) => beatClass === BEAT_CLASSES[index]);
    if (group && origins[k] !== placed) group.members.push(k);
    else others.push(k);
  });
  return { groups: groups.filter(({ members }) => members.length > 0), others };
}

/** Mean of the intervals (in samples) before or after some beats, pauses shortened; NaN where there is none. */
function meanInterval(
  at: Float64Array,
  members: readonly number[],
  step: -1 | 1,
  longest: number,
  counts: (k: number, other: number) => boolean,
): number {
  let [sum, count] = [0, 0];
  for (const k of members) {
    const other = k + step;
    if (other < 0 || other >= at.length || !counts(k, other)) continue;
    sum += Math.min(longest, Math.abs(at[other] - at[k]));
    count += 1;
  }
  return sum / count;
}

/**
 * Lays beats on the clock of a lead of `rateHz`. How wide an average is follows the usual intervals of its class nearby, so
 * that a fast rhythm has narrow ones. Yields now and then, so that others get their turn.
 */
export function* placeBeats(
  beats: BeatList,
  beatRateHz: Hertz,
  rateHz: Hertz,
  { beforeMs, afterMs, beats: count }: BeatAverageSettings,
): Generator<void, PlacedBeats> {
  const at = beats.ticks.map((tick) => (tick * rateHz) / (TICKS_PER_SAMPLE * beatRateHz));
  const before = new Int32Array(at.length);
  const after = new Int32Array(at.length);
  const hasRoom = new Uint8Array(at.length);
  const { groups, others } = groupsOf(beats);
  const most = [beforeMs, afterMs].map((ms) => Math.ceil((ms / 1000) * rateHz));
  const isSame = (k: number, other: number) => beats.classes[k] === beats.classes[other];
  /** The usual interval to beats of the same class; to any where there are none. */
  const usual = (near: readonly number[], step: -1 | 1): number =>
    meanInterval(at, near, step, PAUSE_S * rateHz, isSame) ||
    meanInterval(at, near, step, PAUSE_S * rateHz, () => true);
  const lay = (k: number, near: readonly number[]): void => {
    const prior = usual(near, -1);
    const next = usual(near, 1);
    before[k] = Math.floor(Math.min(most[0], SHARE_BEFORE * prior || most[0]));
    after[k] = Math.floor(Math.min(most[1], SHARE_AFTER * next || most[1]));
    const tooSoon = at[k] - at[k - 1] < ROOM * prior || at[k + 1] - at[k] < ROOM * next;
    hasRoom[k] = tooSoon ? 0 : 1;
  };
  for (const { members } of groups)
    for (let m = 0; m < members.length; m += 1) {
      if (m % BEATS_A_STEP === 0) yield;
      lay(members[m], members.slice(...windowAbout(m, members.length, count)));
    }
  for (const k of others) lay(k, [k]);
  return { rateHz, at, before, after, hasRoom, groups, others };
}
