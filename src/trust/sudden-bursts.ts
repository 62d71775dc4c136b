import { runningQuantile } from '../numeric/running-quantile';
import { median } from '../numeric/statistics';
import type { BaseColumns } from './base-columns';
import { withoutBeats } from './beat-like-jumps';
import { type Excursion, excursionsAbove } from './excursions';
import { ownLevel } from './own-level';
import { slidingRange } from './sliding-range';

/** Half of the window of the running level. */
export const LEVEL_HALF_S = 300;

/** Times the own level at which a burst begins and ends; set on simulated studies (test/trust). */
const ROUGH = { enter: 2.5, leave: 1.6 };
const JUMP = { enter: 3.2, leave: 2 };
/** Beats can be read where the lead between them is less than this share as much like a QRS complex as they are. */
const HARMLESS_SHARE = 0.2;
/** Between beats: the lowest fifth of a second's columns, also where T waves fill most of it. */
const WINDOW_S = 1.1;
const BETWEEN_BEATS = 0.2;
/** As long as any interval between beats, or nearly: it holds a QRS complex. */
const HOLDS_BEAT_S = 1.5;

const times = (level: Float64Array, factor: number): Float64Array =>
  level.map((value) => factor * value);

const oddCount = (seconds: number, columnS: number): number =>
  2 * Math.floor(seconds / columnS / 2) + 1;

/** Puts NaN where under half of the window about a column is there: the beats could be all that is left of it. */
function blankWhereFew(y: Float64Array, x: Float64Array, half: number): void {
  let there = 0;
  for (let i = -half; i < x.length; i += 1) {
    if (i + half < x.length && !Number.isNaN(x[i + half])) there += 1;
    if (i - half - 1 >= 0 && !Number.isNaN(x[i - half - 1])) there -= 1;
    if (i >= 0 && there < half + 1) y[i] = Number.NaN;
  }
}

/** The greatest value of each 1.5 s, which is that of a QRS complex, at the recording's own level. */
function beatLevel(x: Float64Array, columnS: number, floor: number): Float64Array {
  const zero = x.map((value) => (Number.isNaN(value) ? Number.NaN : 0));
  const eachSecond = slidingRange(zero, x, oddCount(HOLDS_BEAT_S, columnS));
  return ownLevel(eachSecond, Math.round(LEVEL_HALF_S / columnS), floor);
}

/**
 * A stretch whose ends are told by the columns themselves: from half a window inside each end outwards as long as they are
 * rough, which may take in a QRS complex that adjoins.
 */
function sharpEnds(
  found: Excursion,
  roughness: Float64Array,
  leave: Float64Array,
  columnS: number,
): Excursion {
  const reach = Math.round(WINDOW_S / columnS / 2);
  const middle = Math.floor((found.from + found.to) / 2);
  let from = Math.min(middle, found.from + reach);
  let to = Math.max(middle + 1, found.to - reach);
  const least = Math.max(0, found.from - reach);
  const most = Math.min(roughness.length, found.to + reach);
  while (from > least && roughness[from - 1] > leave[from - 1]) from -= 1;
  while (to < most && roughness[to] > leave[to]) to += 1;
  return { from, to };
}

/** Roughness or likeness between the beats: that of the lowest fifth of each second's columns, NaN where too few are there. */
function betweenBeats(x: Float64Array, columnS: number): Float64Array {
  const width = oddCount(WINDOW_S, columnS);
  const between = runningQuantile(x, width, BETWEEN_BEATS);
  blankWhereFew(between, x, (width - 1) / 2);
  return between;
}

function medianWithin(x: Float64Array, { from, to }: Excursion): number {
  const known = x.subarray(from, to).filter((value) => !Number.isNaN(value));
  return known.length > 0 ? median(known) : Number.NaN;
}

/**
 * Muscle bursts and hum: stretches where the roughness between the beats is far over the recording's own level, as long as
 * beats cannot be read there for certain. `roughness` and `likeQrs` are the columns' own, NaN where they do not count.
 * Takes a rest now and then.
 */
export function* roughStretches(
  { columnS }: BaseColumns,
  roughness: Float64Array,
  likeQrs: Float64Array,
  stepUv: number,
): Generator<void, readonly Excursion[]> {
  const between = betweenBeats(roughness, columnS);
  yield;
  const level = ownLevel(between, Math.round(LEVEL_HALF_S / columnS), 0.7 * stepUv);
  const leave = times(level, ROUGH.leave);
  yield;
  const disturbance = betweenBeats(likeQrs, columnS);
  yield;
  const beats = times(beatLevel(likeQrs, columnS, 0), HARMLESS_SHARE);
  return excursionsAbove(between, times(level, ROUGH.enter), leave)
    .filter((found) => !(medianWithin(disturbance, found) < medianWithin(beats, found)))
    .map((found) => sharpEnds(found, roughness, leave, columnS));
}

/**
 * Jumps within 0.2 s that are several times as high as what each second usually holds, which is its QRS, and are no beats of
 * another kind: what a detector would take for a beat. `low`, `high` and `mean` are the columns' own, NaN where they do not
 * count.
 */
export function jumpStretches(
  columns: BaseColumns,
  low: Float64Array,
  high: Float64Array,
  mean: Float64Array,
  stepUv: number,
): readonly Excursion[] {
  const spread = slidingRange(low, high, 2);
  const level = beatLevel(spread, columns.columnS, 4 * stepUv);
  const leave = times(level, JUMP.leave);
  const raised = excursionsAbove(spread, leave, leave);
  const enter = times(level, JUMP.enter);
  return withoutBeats(raised, columns, mean).filter(({ from, to }) => {
    for (let i = from; i < to; i += 1) if (spread[i] > enter[i]) return true;
    return false;
  });
}
