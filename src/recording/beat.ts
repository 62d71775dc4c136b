import { firstAtOrAfter } from '../numeric/first-at-or-after';

/** Beat classes of ANSI/AAMI EC57: normal, supraventricular, ventricular, fusion, unknown or not usable. */
export const BEAT_CLASSES = ['N', 'S', 'V', 'F', 'Q'] as const;
export type BeatClass = (typeof BEAT_CLASSES)[number];

/** Where a beat comes from; `placed` is put by a person where no R peak is visible, its intervals are not NN. */
export const BEAT_ORIGINS = ['detected', 'added', 'moved', 'placed', 'imported'] as const;
export type BeatOrigin = (typeof BEAT_ORIGINS)[number];

/** One beat; `tick` is its time in whole 1/64 samples of the heart lead's own rate. */
export interface Beat {
  readonly tick: number;
  readonly beatClass: BeatClass;
  readonly origin: BeatOrigin;
}

/**
 * Beats of one lead in ascending time, as columns: `ticks` in 1/64 samples (strictly ascending), `classes` and `origins` as
 * indexes into BEAT_CLASSES and BEAT_ORIGINS. All three have the same length. Never changed in place.
 */
export interface BeatList {
  readonly ticks: Float64Array;
  readonly classes: Uint8Array;
  readonly origins: Uint8Array;
}

export const NO_BEATS: BeatList = {
  ticks: new Float64Array(0),
  classes: new Uint8Array(0),
  origins: new Uint8Array(0),
};

/** The beat at an index; throws RangeError outside the list. */
export function beatAt(beats: BeatList, index: number): Beat {
  if (!(index >= 0 && index < beats.ticks.length)) throw new RangeError(`no beat ${index}`);
  return {
    tick: beats.ticks[index],
    beatClass: BEAT_CLASSES[beats.classes[index]],
    origin: BEAT_ORIGINS[beats.origins[index]],
  };
}

/** Index of the first beat at or after a tick (the length where there is none). */
export function firstBeatAt(beats: BeatList, tick: number): number {
  return firstAtOrAfter(beats.ticks, tick);
}

/** Beats from rows in any order. Throws RangeError where two rows share a tick or a tick is no whole number. */
export function beatsOf(rows: readonly Beat[]): BeatList {
  const sorted = [...rows].sort((a, b) => a.tick - b.tick);
  const ticks = Float64Array.from(sorted, (row) => row.tick);
  ticks.forEach((tick, i) => {
    if (!Number.isInteger(tick) || (i > 0 && tick === ticks[i - 1]))
      throw new RangeError(`beats want whole, distinct ticks; got ${tick}`);
  });
  return {
    ticks,
    classes: Uint8Array.from(sorted, (row) => BEAT_CLASSES.indexOf(row.beatClass)),
    origins: Uint8Array.from(sorted, (row) => BEAT_ORIGINS.indexOf(row.origin)),
  };
}

/**
 * The list with some beats taken out and others put in, O(n). Throws RangeError where a beat to take out is not there as
 * given, or a beat to put in stands at an occupied tick.
 */
export function changeBeats(
  beats: BeatList,
  removed: readonly Beat[],
  added: readonly Beat[],
): BeatList {
  const gone = new Set<number>();
  for (const row of removed) {
    const index = firstBeatAt(beats, row.tick);
    const there = index < beats.ticks.length && beats.ticks[index] === row.tick;
    if (!there || BEAT_CLASSES[beats.classes[index]] !== row.beatClass)
      throw new RangeError(`no beat of class ${row.beatClass} at tick ${row.tick}`);
    gone.add(index);
  }
  const put = beatsOf(added);
  const length = beats.ticks.length - gone.size + put.ticks.length;
  const ticks = new Float64Array(length);
  const classes = new Uint8Array(length);
  const origins = new Uint8Array(length);
  let from = 0;
  let next = 0;
  for (let to = 0; to < length; to += 1) {
    while (gone.has(from)) from += 1;
    const takeNew =
      next < put.ticks.length &&
      (from >= beats.ticks.length || put.ticks[next] <= beats.ticks[from]);
    const list = takeNew ? put : beats;
    const index = takeNew ? next : from;
    ticks[to] = list.ticks[index];
    classes[to] = list.classes[index];
    origins[to] = list.origins[index];
    if (to > 0 && ticks[to] === ticks[to - 1])
      throw new RangeError(`a beat stands at tick ${ticks[to]} already`);
    if (takeNew) next += 1;
    else from += 1;
  }
  return { ticks, classes, origins };
}
