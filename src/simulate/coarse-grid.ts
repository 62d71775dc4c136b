import type { Random } from '../numeric/random';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { quickNormal } from './quick-normal';
import { type Track, trackBetween } from './spec';

/**
 * The grid on which everything slow is computed, near 25 Hz: point i is at sample i * every. It reaches one point past the
 * last sample.
 */
export interface CoarseGrid {
  readonly every: number;
  readonly stepS: Seconds;
  readonly points: number;
}

const COARSE_HZ = 25;

export function coarseGrid(samples: number, rateHz: Hertz): CoarseGrid {
  const every = Math.max(1, Math.floor(rateHz / COARSE_HZ));
  return { every, stepS: every / rateHz, points: Math.ceil(samples / every) + 1 };
}

/** A track at every point. */
export function trackOnGrid(track: Track, grid: CoarseGrid): Float64Array {
  const values = new Float64Array(grid.points);
  if (typeof track === 'number') return values.fill(track);
  let next = 0;
  for (let i = 0; i < grid.points; i += 1) {
    const timeS = i * grid.stepS;
    while (next < track.length && track[next].atS <= timeS) next += 1;
    values[i] = trackBetween(track, next, timeS);
  }
  return values;
}

/** Running integral of a rate in cycles a minute, in cycles from 0 (trapezoid rule). */
export function cyclesOf(ratesPerMin: Float64Array, grid: CoarseGrid): Float64Array {
  const cycles = new Float64Array(grid.points);
  const half = grid.stepS / 120;
  for (let i = 1; i < grid.points; i += 1)
    cycles[i] = cycles[i - 1] + (ratesPerMin[i - 1] + ratesPerMin[i]) * half;
  return cycles;
}

/**
 * Adds to `values` a stationary, near-Gaussian process whose correlation falls as exp(-lag / timeS) (Ornstein & Uhlenbeck 1930),
 * with standard deviation `deviation`.
 */
export function addWander(
  values: Float64Array,
  random: Random,
  deviation: number,
  timeS: Seconds,
  stepS: Seconds,
): void {
  if (deviation === 0) return;
  const keep = Math.max(0, 1 - stepS / timeS);
  const push = deviation * Math.sqrt(1 - keep * keep);
  let value = deviation * quickNormal(random);
  for (let i = 0; i < values.length; i += 1) {
    values[i] += value;
    value = keep * value + push * quickNormal(random);
  }
}

/** Adds values of the grid to samples, by the cubic through four points whose slopes are central differences. */
export function addUpsampled(samples: Float64Array, coarse: Float64Array, every: number): void {
  const weights = Array.from({ length: every }, (_, k) => cubicWeights(k / every));
  const last = coarse.length - 1;
  for (let i = 0; i < last; i += 1) {
    const b = coarse[i];
    const c = coarse[i + 1];
    const a = i > 0 ? coarse[i - 1] : 2 * b - c;
    const d = i + 2 <= last ? coarse[i + 2] : 2 * c - b;
    const from = i * every;
    const to = Math.min(samples.length, from + every);
    for (let n = from; n < to; n += 1) {
      const w = weights[n - from];
      samples[n] += w[0] * a + w[1] * b + w[2] * c + w[3] * d;
    }
  }
}

/** Weights of the points at -1, 0, 1, 2 for a place between 0 and 1. */
function cubicWeights(u: number): Float64Array {
  const u2 = u * u;
  const u3 = u2 * u;
  return Float64Array.of(
    (-u + 2 * u2 - u3) / 2,
    (2 - 5 * u2 + 3 * u3) / 2,
    (u + 4 * u2 - 3 * u3) / 2,
    (u3 - u2) / 2,
  );
}
