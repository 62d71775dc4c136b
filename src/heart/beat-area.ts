import { median } from '../numeric/statistics';

/** What an average beat takes in before and after R, and the level it stands on. */
const BEFORE_S = 0.28;
const AFTER_S = 0.5;
/** The level is the middle value up to here, ahead of the P wave; where beats come fast the T wave before reaches into it. */
const LEVEL_TO_S = 0.22;
const LEAST_AFTER_S = 0.2;
const FEWEST_BEATS = 20;

/**
 * Area in uV s of a lead's usual beat over the level before its P wave (QRS, T wave and what else follows it within half a
 * second, less where beats come sooner): what one beat adds to the lead far below its own rate. From the mean of the recorded
 * lead about the R times, in which slow wave and breathing average out; samples from the recording's time `firstS` on, NaN
 * in gaps. Null for fewer than 20 whole beats.
 */
export function beatAreaUvS(
  samples: Float64Array,
  rateHz: number,
  firstS: number,
  rTimesS: Float64Array,
): number | null {
  const before = Math.round(BEFORE_S * rateHz);
  const intervals = Array.from(rTimesS.subarray(1), (time, i) => time - rTimesS[i]);
  if (intervals.length < FEWEST_BEATS) return null;
  const room = Math.max(LEAST_AFTER_S, median(intervals) - BEFORE_S);
  const after = Math.round(Math.min(AFTER_S, room) * rateHz);
  const sum = new Float64Array(before + after + 1);
  let count = 0;
  for (const time of rTimesS) {
    const from = Math.round((time - firstS) * rateHz) - before;
    if (from < 0 || from + sum.length > samples.length) continue;
    const beat = samples.subarray(from, from + sum.length);
    if (beat.some(Number.isNaN)) continue;
    for (let i = 0; i < sum.length; i += 1) sum[i] += beat[i];
    count += 1;
  }
  if (count < FEWEST_BEATS) return null;
  for (let i = 0; i < sum.length; i += 1) sum[i] /= count;
  const level = median(sum.subarray(0, Math.max(1, before - Math.round(LEVEL_TO_S * rateHz))));
  return sum.reduce((area, value) => area + (value - level) / rateHz, 0);
}
