import type { RrSeries } from '../recording/heart-series';

/** Heart rate beat by beat: NaN at intervals that are not NN, where the line is broken. */
export interface RateLine {
  readonly timesS: Float64Array;
  readonly perMinute: Float32Array;
}

/** Heart rate in beats a minute from NN intervals, 60000/rr; NaN elsewhere and where beats before it are missing. */
export function heartRateLine(rr: RrSeries): RateLine {
  const perMinute = new Float32Array(rr.rrMs.length).fill(Number.NaN);
  for (let i = 0; i < perMinute.length; i += 1)
    if (rr.nn[i] === 1 && rr.rrMs[i] > 0) perMinute[i] = 60_000 / rr.rrMs[i];
  return { timesS: rr.timesS, perMinute };
}

/** Rates of equal parts of time; NaN in parts without one. */
export interface RateColumns {
  readonly low: Float32Array;
  readonly high: Float32Array;
  readonly mean: Float32Array;
}

/**
 * Least, greatest and mean rate in each of `columns` equal parts of [0, durationS); NaN in parts without one. Reduces a day's line
 * to what a strip can show.
 */
export function rateColumns(line: RateLine, durationS: number, columns: number): RateColumns {
  const low = new Float32Array(columns).fill(Number.NaN);
  const high = new Float32Array(columns).fill(Number.NaN);
  const mean = new Float32Array(columns);
  const counts = new Uint32Array(columns);
  for (let i = 0; i < line.timesS.length; i += 1) {
    const value = line.perMinute[i];
    if (Number.isNaN(value)) continue;
    const column = Math.min(columns - 1, Math.floor((line.timesS[i] / durationS) * columns));
    if (!(value >= low[column])) low[column] = value;
    if (!(value <= high[column])) high[column] = value;
    mean[column] += value;
    counts[column] += 1;
  }
  for (let i = 0; i < columns; i += 1) mean[i] = counts[i] > 0 ? mean[i] / counts[i] : Number.NaN;
  return { low, high, mean };
}

/**
 * Limits of a rate axis for the whole study: the middle 98 % of the values with a tenth to spare, on whole tens (or fives
 * under 40), at least 20 wide (10 under 40). Null without values.
 */
export function rateLimits(perMinute: ArrayLike<number>): readonly [number, number] | null {
  const values = Array.from(perMinute)
    .filter((value) => !Number.isNaN(value))
    .sort((a, b) => a - b);
  if (values.length === 0) return null;
  const at = (share: number) => values[Math.round(share * (values.length - 1))];
  const step = at(0.99) < 40 ? 5 : 10;
  const spare = (at(0.99) - at(0.01)) / 10;
  let low = Math.max(0, Math.floor((at(0.01) - spare) / step) * step);
  let high = Math.ceil((at(0.99) + spare) / step) * step;
  while (high - low < 2 * step) {
    high += step;
    if (high - low < 2 * step && low >= step) low -= step;
  }
  return [low, high];
}
