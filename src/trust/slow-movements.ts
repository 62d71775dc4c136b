import { runningMedian } from '../numeric/running-quantile';
import type { BaseColumns } from './base-columns';
import { type Excursion, excursionsAbove } from './excursions';
import { ownLevel } from './own-level';
import { slidingRange } from './sliding-range';
import { LEVEL_HALF_S } from './sudden-bursts';

/** Swings are measured over this long: more than a slow wave's rise, less than its cycle. */
export const SWING_S = 8;
/** Times the own level at which a movement begins and ends; set on simulated studies (test/trust). */
const SWING = { enter: 3.2, leave: 1.8 };
/** A step rises within 0.6 s and stays for two; it is this much over the usual change in that time. */
const STEP_HALF_S = 0.3;
const STEP_STAYS_S = 2;
const STEP_OVER_USUAL = 12;
const STEP_KEEPS = 0.5;

/** An excursion of the slow part of the lead, and whether it begins as a step does. */
export interface SlowMovement extends Excursion {
  /** Column of the highest jump; null where the lead only swings. */
  readonly stepAt: number | null;
}

/** Mean of the columns with QRS complexes taken out: the median of half a second. */
export function slowTrack(mean: Float64Array, columnS: number): Float64Array {
  return runningMedian(mean, 2 * Math.max(0, Math.round(0.2 / columnS)) + 1);
}

/** Change across 2 half-widths about each column; NaN at the ends and where a value is missing. */
function changeAcross(track: Float64Array, half: number): Float64Array {
  return track.map((_, i) =>
    i - half >= 0 && i + half < track.length ? track[i + half] - track[i - half] : Number.NaN,
  );
}

function meanOf(track: Float64Array, from: number, to: number): number {
  let [sum, count] = [0, 0];
  for (let i = Math.max(0, from); i < Math.min(track.length, to); i += 1) {
    if (Number.isNaN(track[i])) continue;
    sum += track[i];
    count += 1;
  }
  return sum / count;
}

/** Column of the sharpest lasting jump of an excursion, or null. */
function stepWithin(
  track: Float64Array,
  change: Float64Array,
  level: Float64Array,
  { from, to }: Excursion,
  columnS: number,
): number | null {
  let at = -1;
  for (let i = from; i < to; i += 1) {
    const over = Math.abs(change[i]) > STEP_OVER_USUAL * level[i];
    if (over && (at < 0 || Math.abs(change[i]) > Math.abs(change[at]))) at = i;
  }
  if (at < 0) return null;
  const near = Math.round((2 * STEP_HALF_S) / columnS);
  const long = Math.round(STEP_STAYS_S / columnS);
  const kept = meanOf(track, at + near, at + long) - meanOf(track, at - long, at - near);
  return Math.abs(kept) > STEP_KEEPS * Math.abs(change[at]) ? at : null;
}

/**
 * Stretches where the slow part of the lead swings far more within 8 s than is usual about that time: movements, and steps
 * (an electrode's jump) until they have settled. A window that only reaches the movement with its edge is not counted.
 * `mean` is each column's, NaN where it does not count.
 */
export function slowMovements(
  columns: BaseColumns,
  mean: Float64Array,
  stepUv: number,
): readonly SlowMovement[] {
  const { columnS } = columns;
  const levelHalf = Math.round(LEVEL_HALF_S / columnS);
  const track = slowTrack(mean, columnS);
  const width = Math.max(3, Math.round(SWING_S / columnS));
  const swing = slidingRange(track, track, width);
  const level = ownLevel(swing, levelHalf, 4 * stepUv);
  const half = Math.max(1, Math.round(STEP_HALF_S / columnS));
  const change = changeAcross(track, half);
  const changeLevel = ownLevel(
    change.map((value) => Math.abs(value)),
    levelHalf,
    4 * stepUv,
  );
  const edge = Math.floor(width / 2) - Math.round(1 / columnS);
  return excursionsAbove(
    swing,
    level.map((value) => SWING.enter * value),
    level.map((value) => SWING.leave * value),
  ).map((found) => {
    const stepAt = stepWithin(track, change, changeLevel, found, columnS);
    const from = found.from === 0 ? 0 : found.from + edge;
    const to = found.to === columns.count ? found.to : found.to - edge;
    return { from: Math.min(from, to - 1), to: Math.max(to, from + 1), stepAt };
  });
}
