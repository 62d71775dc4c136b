import { runningQuantile } from '../numeric/running-quantile';
import { quantile } from '../numeric/statistics';
import type { BaseColumns } from './base-columns';
import { type Excursion, excursionsAbove } from './excursions';
import { ownLevel } from './own-level';
import { slidingRange } from './sliding-range';

/** Half of the window of the running level. */
export const LEVEL_HALF_S = 300;

/** Times the own level at which a burst begins and ends; set on simulated studies (test/trust). */
const ROUGH = { enter: 3, leave: 1.7 };
const JUMP = { enter: 3.2, leave: 2 };
/** Roughness between beats that is this share of the beats' own does no harm. */
const HARMLESS_SHARE = 0.18;
/** Between beats: the lower third of a second's columns. */
const WINDOW_S = 1.1;
const BETWEEN_BEATS = 0.3;

const times = (level: Float64Array, factor: number, atLeast = 0): Float64Array =>
  level.map((value) => Math.max(atLeast, factor * value));

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

/**
 * Muscle bursts: stretches where the roughness between the beats (the lower third of each second's columns, so that QRS
 * complexes have no say) is far over the recording's own level and would matter beside its beats.
 */
export function roughStretches(
  columns: BaseColumns,
  roughness: Float64Array,
  stepUv: number,
): readonly Excursion[] {
  const { columnS } = columns;
  const width = oddCount(WINDOW_S, columnS);
  const between = runningQuantile(roughness, width, BETWEEN_BEATS);
  blankWhereFew(between, roughness, (width - 1) / 2);
  const known = roughness.filter((value) => !Number.isNaN(value));
  if (known.length === 0) return [];
  const harmless = HARMLESS_SHARE * quantile(known, 0.95);
  const level = ownLevel(between, Math.round(LEVEL_HALF_S / columnS), 0.7 * stepUv);
  return excursionsAbove(
    between,
    times(level, ROUGH.enter, harmless),
    times(level, ROUGH.leave, 0.6 * harmless),
  );
}

/**
 * Jumps within 0.2 s that are several times as high as what each second usually holds, which is its QRS: what a detector
 * would take for a beat. `low` and `high` are the columns' own, NaN where they do not count.
 */
export function jumpStretches(
  { columnS }: BaseColumns,
  low: Float64Array,
  high: Float64Array,
  stepUv: number,
): readonly Excursion[] {
  const spread = slidingRange(low, high, 2);
  const zero = spread.map((value) => (Number.isNaN(value) ? Number.NaN : 0));
  const eachSecond = slidingRange(zero, spread, oddCount(1.5, columnS));
  const level = ownLevel(eachSecond, Math.round(LEVEL_HALF_S / columnS), 4 * stepUv);
  return excursionsAbove(spread, times(level, JUMP.enter), times(level, JUMP.leave));
}
