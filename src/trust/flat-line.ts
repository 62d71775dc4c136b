import { quantile } from '../numeric/statistics';
import type { Interval } from '../recording/span';
import type { BaseColumns } from './base-columns';
import { excursionsAbove } from './excursions';
import { slidingRange } from './sliding-range';

const LEAST_S = 2;
/** A coarse or slow lead stands still by itself; what is flat must stand still this much longer than it usually does. */
const TIMES_USUAL = 5;
const LONGEST_USUAL_S = 20;
/** Nearly flat: within two steps, or this share of the usual range, for two seconds. */
const NEARLY_STEPS = 2;
const NEARLY_SHARE = 0.005;
const USUAL_STEPS = 20;

/** Length of constant run in which half of the time under runs of at most 20 s lies; 0 where there are none. */
function usualRunS(lengthsS: readonly number[]): number {
  const usual = lengthsS.filter((one) => one <= LONGEST_USUAL_S).sort((a, b) => a - b);
  const total = usual.reduce((sum, one) => sum + one, 0);
  let sum = 0;
  for (const one of usual) {
    sum += one;
    if (sum >= total / 2) return one;
  }
  return 0;
}

/** How often the lead stands still: share of its time in constant runs of at most 20 s. */
function exactlyFlat(columns: BaseColumns, rateHz: number): readonly Interval[] {
  const lengths = columns.constant.map(({ from, to }) => (to - from) / rateHz);
  const inRuns = lengths.filter((one) => one <= LONGEST_USUAL_S).reduce((sum, one) => sum + one, 0);
  const oftenStill = inRuns > 0.2 * (columns.sampleCount / rateHz);
  const least = oftenStill
    ? Math.min(LONGEST_USUAL_S, Math.max(LEAST_S, TIMES_USUAL * usualRunS(lengths)))
    : LEAST_S;
  return columns.constant
    .filter((_, i) => lengths[i] > least)
    .map(({ from, to }) => ({ fromS: from / rateHz, toS: to / rateHz }));
}

/** A lead that usually spans many steps and now moves by one or two, as an open input does. */
function nearlyFlat(columns: BaseColumns, stepUv: number): readonly Interval[] {
  const width = Math.max(2, Math.round(LEAST_S / columns.columnS));
  const range = slidingRange(columns.low, columns.high, width);
  const moving = range.filter((one) => one > 0);
  if (moving.length === 0) return [];
  const usual = quantile(moving, 0.6);
  if (usual < USUAL_STEPS * stepUv) return [];
  const limit = Math.max(NEARLY_STEPS * stepUv, NEARLY_SHARE * usual);
  const stillness = range.map((one) => -one);
  const at = new Float64Array(range.length).fill(-limit * (1 + 1e-9) - 1e-12);
  const half = Math.floor(width / 2);
  return excursionsAbove(stillness, at, at).map(({ from, to }) => ({
    fromS: Math.max(0, from - half) * columns.columnS,
    toS: Math.min(columns.count, to + width - 1 - half) * columns.columnS,
  }));
}

/**
 * Stretches of over 2 s in which the lead does not change, in seconds from its first sample: not at all (longer where the
 * lead is coarse or slow enough to stand still by itself), or by a step or two where it usually spans twenty.
 */
export function flatLines(
  columns: BaseColumns,
  rateHz: number,
  stepUv: number,
): readonly Interval[] {
  return [...exactlyFlat(columns, rateHz), ...nearlyFlat(columns, stepUv)];
}
