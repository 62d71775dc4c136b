import { cos } from '../numeric/elementary';
import { crestPlace } from './sub-sample';

/** Half of the window that a beat is timed by: its QRS complex. */
export const TIMING_HALF_S = 0.1;

/** Part of the window over which its weight falls to 0 at each end, so that what lies at its edge does not matter. */
const EDGE_PART = 0.25;

/** What a beat is timed with: an average with mean and slope taken out, so that the baseline does not move the time. */
export interface Timer {
  /** Weights of the matched filter; they sum to 0, and so do they times their place. */
  readonly weights: Float64Array;
  /** How much each sample of the window counts, 0 to 1. */
  readonly taper: Float64Array;
  readonly half: number;
  /** What the filter gives on the average itself. */
  readonly power: number;
}

/** Timer from the 2 half + 1 samples of an average about its middle. */
export function timerOf(average: Float64Array): Timer {
  const half = (average.length - 1) / 2;
  const taper = average.map((_, i) => edgeWeight(Math.min(i, 2 * half - i) / (2 * half)));
  const line = lineOf(average, taper, 0);
  const weights = average.map(
    (value, i) => taper[i] * (value - line.mean - line.slope * (i - half)),
  );
  return { weights, taper, half, power: line.rest };
}

/** Cosine fall to both ends (Tukey 1967), by distance from the nearer end as part of the window. */
function edgeWeight(fromEnd: number): number {
  return fromEnd >= EDGE_PART
    ? 1
    : 0.5 - 0.5 * cos((Math.PI * (fromEnd + 0.01)) / (EDGE_PART + 0.01));
}

/** Weighted line through a part of x, from `from` on, and the weighted sum of squares about it. */
function lineOf(
  x: Float64Array,
  taper: Float64Array,
  from: number,
): { mean: number; slope: number; rest: number } {
  const half = (taper.length - 1) / 2;
  let weight = 1e-30;
  let level = 0;
  let tilt = 0;
  let spread = 1e-30;
  let power = 0;
  for (let i = Math.max(0, -from); i < taper.length && from + i < x.length; i += 1) {
    const value = x[from + i];
    const part = taper[i];
    weight += part;
    level += part * value;
    tilt += part * value * (i - half);
    spread += part * (i - half) ** 2;
    power += part * value * value;
  }
  const rest = power - (level * level) / weight - (tilt * tilt) / spread;
  return { mean: level / weight, slope: tilt / spread, rest: Math.max(0, rest) };
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
  const { weights, half, power } = timer;
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
  const from = near - search - MARGIN;
  const rest = lineOf(row, timer.taper, from + best - half).rest;
  return {
    place: from + crestPlace(fits, best),
    likeness: fits[best] / (Math.sqrt(power * rest) + 1e-12),
    size: fits[best] / (power + 1e-12),
  };
}
