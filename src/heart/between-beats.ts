import { log10 } from '../numeric/elementary';
import { quantileInPlace } from '../numeric/statistics';
import type { Shape } from './beat-shapes';

/** A stretch of signal is judged by so much on either side. */
export const SIDE_S = 1.5;

/**
 * Quantile of x (`length` values) over the 1.5 s before or after each half second from `from` on, whichever is more, so that a burst of noise
 * is known from its first sample to its last.
 */
export function noiseByHalfSecond(
  x: (at: number) => number,
  length: number,
  rateHz: number,
  from: number,
  to: number,
  quantile: number,
): Float64Array {
  const count = Math.ceil((2 * (to - from)) / rateHz);
  const lag = Math.round(2 * SIDE_S);
  const step = Math.max(1, Math.floor(rateHz / 60));
  const few = new Float64Array(Math.ceil((SIDE_S * rateHz) / step) + 2);
  const sides = new Float64Array(count + lag);
  for (let h = 0; h < sides.length; h += 1) {
    const first = Math.max(0, Math.round(from + (h + 0.5 - lag) * 0.5 * rateHz));
    const last = Math.min(length, Math.round(from + (h + 0.5) * 0.5 * rateHz));
    let n = 0;
    for (let i = first; i < last; i += step) few[n++] = x(i);
    sides[h] = quantileInPlace(few, quantile, n);
  }
  const noise = new Float64Array(count);
  for (let h = 0; h < count; h += 1) noise[h] = Math.max(sides[h], sides[h + lag]);
  return noise;
}

/** The shape band with its projections on the shapes searched for. */
export interface Projected {
  readonly band: Float64Array;
  readonly shapes: readonly Shape[];
  /** Projection of the window about each sample on each shape's average of norm 1. */
  readonly fits: readonly Float64Array[];
  /** Root of the sum of squares of the window about a sample. */
  readonly normAt: (sample: number) => number;
  /** What the rarity of each shape costs it. */
  readonly costs: readonly number[];
}

/** A shape seen a tenth as often must be more alike by so much: of two that fit, the frequent one is likelier. */
const RARITY_COST = 0.06;

/** What the rarity of each shape costs it, as likeness; 0 for the most frequent. */
export function rarityCosts(shapes: readonly Shape[]): number[] {
  const most = Math.max(...shapes.map(({ count }) => count));
  return shapes.map(({ count }) => RARITY_COST * log10(most / count));
}

/** A place with the shape that fits it best, their normalised correlation, and the size beside the shape's own. */
export interface Fitted {
  readonly sample: number;
  readonly shape: number;
  readonly likeness: number;
  readonly size: number;
}

/** Best fitting shape within `reach` samples of a place, and where. */
export function bestFit(
  { fits, normAt, costs, shapes }: Projected,
  at: number,
  reach: number,
): Fitted {
  let best = { sample: at, shape: 0, likeness: -1 };
  let value = -2;
  const last = Math.min(fits[0].length - 1, at + reach);
  for (let i = Math.max(0, at - reach); i <= last; i += 1) {
    const scale = 1 / (normAt(i) + 1e-12);
    for (let k = 0; k < fits.length; k += 1) {
      const likeness = fits[k][i] * scale;
      if (likeness - costs[k] <= value) continue;
      value = likeness - costs[k];
      best = { sample: i, shape: k, likeness };
    }
  }
  return { ...best, size: fits[best.shape][best.sample] / shapes[best.shape].norm };
}

/** The band with the usual course of each beat taken out, in the beat's own size: what is between the beats. */
export function withoutBeats(
  projected: Projected,
  beats: readonly number[],
  reach: number,
): Float64Array {
  const rest = projected.band.slice();
  for (const beat of beats) {
    const { sample, shape, size } = bestFit(projected, beat, reach);
    const { course, before } = projected.shapes[shape];
    const from = Math.max(0, before - sample);
    const to = Math.min(course.length, rest.length - sample + before);
    for (let i = from; i < to; i += 1) rest[sample - before + i] -= size * course[i];
  }
  return rest;
}
