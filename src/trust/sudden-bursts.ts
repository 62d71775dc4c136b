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
const HARMLESS_SHARE = 0.25;
/** Between beats: the lower third of a second's columns. */
const WINDOW_S = 1.1;
const BETWEEN_BEATS = 0.3;

const times = (level: Float64Array, factor: number, atLeast = 0): Float64Array =>
  level.map((value) => Math.max(atLeast, factor * value));

const oddCount = (seconds: number, columnS: number): number =>
  2 * Math.floor(seconds / columnS / 2) + 1;

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
  const between = runningQuantile(roughness, oddCount(WINDOW_S, columnS), BETWEEN_BEATS);
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
 * Jumps within 0.1 s that are several times as high as what each second usually holds, which is its QRS: what a detector
 * would take for a beat. `spread` is greatest less least of each column, NaN where it does not count.
 */
export function jumpStretches(
  columns: BaseColumns,
  spread: Float64Array,
  stepUv: number,
): readonly Excursion[] {
  const { columnS } = columns;
  const zero = spread.map((value) => (Number.isNaN(value) ? Number.NaN : 0));
  const eachSecond = slidingRange(zero, spread, oddCount(1.5, columnS));
  const level = ownLevel(eachSecond, Math.round(LEVEL_HALF_S / columnS), 4 * stepUv);
  return excursionsAbove(spread, times(level, JUMP.enter), times(level, JUMP.leave));
}
