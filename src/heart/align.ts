import { crestPlace } from './sub-sample';

/** Half of the window that a beat is timed by: its QRS complex. */
export const TIMING_HALF_S = 0.1;

/** What a beat is timed with: an average with mean and slope taken out, so that the baseline does not move the time. */
export interface Timer {
  readonly weights: Float64Array;
  readonly half: number;
  readonly norm: number;
}

/** Timer from the 2 half + 1 samples of an average about its middle. */
export function timerOf(average: Float64Array): Timer {
  const half = (average.length - 1) / 2;
  let mean = 0;
  let slope = 0;
  let spread = 0;
  for (let i = 0; i < average.length; i += 1) {
    mean += average[i] / average.length;
    slope += average[i] * (i - half);
    spread += (i - half) ** 2;
  }
  const weights = average.map((value, i) => value - mean - (slope / spread) * (i - half));
  let power = 0;
  for (const weight of weights) power += weight * weight;
  return { weights, half, norm: Math.sqrt(power) };
}

export interface Alignment {
  /** Place of the average's middle in the row, between samples. */
  readonly place: number;
  /** Normalised correlation there, mean and slope taken out, -1 to 1. */
  readonly likeness: number;
  /** Size of the beat, the average's being 1. */
  readonly size: number;
}

/** Lags beyond the search that the crest between samples is read from. */
const MARGIN = 8;

/**
 * Where in a row the average lies best: the greatest cross-correlation (matched filter; Kay 1993, chapter 3, for its error)
 * within `search` samples of `near`, read between samples. The row must reach half + search + 8 samples to both sides.
 */
export function align(row: Float64Array, timer: Timer, near: number, search: number): Alignment {
  const { weights, half, norm } = timer;
  const lags = 2 * (search + MARGIN) + 1;
  const fits = new Float64Array(lags);
  let best = MARGIN;
  for (let k = 0; k < lags; k += 1) {
    const from = near - search - MARGIN + k - half;
    let sum = 0;
    for (let i = Math.max(0, -from); i < weights.length && from + i < row.length; i += 1)
      sum += weights[i] * row[from + i];
    fits[k] = sum;
  }
  for (let k = MARGIN; k < lags - MARGIN; k += 1) if (fits[k] > fits[best]) best = k;
  const place = near - search - MARGIN + crestPlace(fits, best);
  const at = near - search - MARGIN + best;
  return {
    place,
    likeness: fits[best] / (norm * spreadOf(row, at - half, at + half) + 1e-12),
    size: fits[best] / norm ** 2,
  };
}

/** Root of the sum of squares of row[from..to] about its line. */
function spreadOf(row: Float64Array, from: number, to: number): number {
  const centre = (from + to) / 2;
  let n = 0;
  let mean = 0;
  let slope = 0;
  let spread = 0;
  let power = 0;
  for (let i = Math.max(0, from); i <= to && i < row.length; i += 1) {
    n += 1;
    mean += row[i];
    power += row[i] * row[i];
    slope += row[i] * (i - centre);
    spread += (i - centre) ** 2;
  }
  if (n < 3) return 0;
  return Math.sqrt(Math.max(0, power - (mean * mean) / n - (slope * slope) / spread));
}
