import type { KernelSpectrum } from '../numeric/kernel-spectrum';
import { blockSizeFor, kernelSpectrum, overlapSave } from '../numeric/overlap-save';
import { SHAPE_LAG_S, type Shape } from './beat-shapes';
import {
  bestFit,
  noiseByHalfSecond,
  type Projected,
  rarityCosts,
  withoutBeats,
} from './between-beats';
import {
  CREST_APART_S,
  type Crest,
  chunksOf,
  crestsIn,
  type Energy,
  type HeartSignal,
} from './energy-pass';
import { filterBand, rmsAbout } from './qrs-bands';
import { isUsable } from './usable-signal';

/** Shapes searched for over the whole study, at most. */
const MOST_SEARCHED = 4;
/** A place is worth weighing from this part of a shape's usual size on. */
const LEAST_SIZE = 0.2;
/** Independent values in a window of the shape band: twice its width in Hz times its length in s, less the slope of its edges. */
const WINDOW_FREEDOM = 8;

/** A place where a beat may be. */
export interface Candidate {
  /** Middle of the best fitting shape, or crest of the energy where none fits. */
  readonly sample: number;
  /** Index of the best fitting shape; -1 where none was searched for. */
  readonly shape: number;
  /** Projection on the shape over the shape's usual one. */
  readonly size: number;
  /** Normalised correlation with the shape, -1 to 1. */
  readonly likeness: number;
  /** Projection over the standard deviation of the projections of noise near it. */
  readonly overNoise: number;
  /** Likeness of a usual beat in this noise to its own shape. */
  readonly bestLikeness: number;
  /** QRS energy at the nearest crest, 0 where none is near. */
  readonly energyUv: number;
}

/** Looks for the learned shapes everywhere, `first` being the beats they were learned from; yields the part done. */
export function* shapePass(
  signal: HeartSignal,
  shapes: readonly Shape[],
  energy: Energy,
  first: readonly number[],
): Generator<number, Candidate[]> {
  const { samples, rateHz, bands, usable } = signal;
  const searched = shapes.slice(0, MOST_SEARCHED);
  if (searched.length === 0) return energy.crests.map(unlike);
  const half = searched[0].half;
  const apart = Math.round(CREST_APART_S * rateHz);
  const plans = projections(searched);
  const found: Candidate[] = [];
  let firstFrom = 0;
  let crestFrom = 0;
  for (const { from, to, stretch, start } of chunksOf(signal, bands.reach + 2 * half + apart)) {
    const projected = projectBand(filterBand(stretch, bands.shape), searched, plans);
    const near: number[] = [];
    while (firstFrom < first.length && first[firstFrom] < start) firstFrom += 1;
    for (let i = firstFrom; i < first.length && first[i] < start + stretch.length; i += 1)
      near.push(first[i] - start);
    const weigh = weigher(projected, near, { rateHz, half, from: from - start, to: to - start });
    const crests: Crest[] = [];
    for (; crestFrom < energy.crests.length && energy.crests[crestFrom].sample < to; crestFrom += 1)
      crests.push({
        ...energy.crests[crestFrom],
        sample: energy.crests[crestFrom].sample - start,
      });
    for (const place of placesOf(projected, crests, apart, from - start, to - start)) {
      const weighed = weigh(place.sample);
      const sample = weighed.sample + start;
      if (isUsable(usable, sample)) found.push({ ...weighed, sample, energyUv: place.energyUv });
    }
    yield to / samples.length;
  }
  return found.sort((a, b) => a.sample - b.sample);
}

function unlike({ sample, energyUv }: Crest): Candidate {
  return { sample, shape: -1, size: 0, likeness: 0, overNoise: 0, bestLikeness: 1, energyUv };
}

/** Plans the projections on all shapes, two to a filter. */
function projections(shapes: readonly Shape[]): KernelSpectrum[] {
  const kernels = shapes.map(({ average, half, norm }) => ({
    taps: average.map((_, i) => average[average.length - 1 - i] / norm),
    origin: half,
  }));
  const plans: KernelSpectrum[] = [];
  for (let k = 0; k < kernels.length; k += 2) {
    const set =
      k + 1 < kernels.length ? ([kernels[k], kernels[k + 1]] as const) : ([kernels[k]] as const);
    plans.push(kernelSpectrum({ kernels: set, blockSize: blockSizeFor(set, 1e6), decimate: 1 }));
  }
  return plans;
}

function projectBand(
  band: Float64Array,
  shapes: readonly Shape[],
  plans: readonly KernelSpectrum[],
): Projected {
  const width = 2 * shapes[0].half + 1;
  const rms = rmsAbout(band, width);
  const scale = Math.sqrt(width);
  return {
    band,
    shapes,
    fits: plans.flatMap((spectrum) => overlapSave(band, { spectrum, ends: 'zero' })),
    normAt: (sample) => scale * rms(sample),
    costs: rarityCosts(shapes),
  };
}

/** Places worth weighing: crests of the projections, with the energy's crest at each, and crests of the energy alone. */
function placesOf(
  { fits, shapes }: Projected,
  crests: readonly Crest[],
  apart: number,
  from: number,
  to: number,
): Crest[] {
  const best = new Float64Array(fits[0].length);
  fits.forEach((fit, k) => {
    const scale = 1 / shapes[k].norm;
    for (let i = 0; i < best.length; i += 1) best[i] = Math.max(best[i], fit[i] * scale);
  });
  const places = crestsIn(best, from, to, apart)
    .filter((at) => best[at] > LEAST_SIZE)
    .map((sample) => ({ sample, energyUv: 0 }));
  const alone: Crest[] = [];
  let next = 0;
  for (const crest of crests) {
    while (
      next < places.length - 1 &&
      Math.abs(places[next + 1].sample - crest.sample) <=
        Math.abs(places[next].sample - crest.sample)
    )
      next += 1;
    const place = places[next];
    if (place && Math.abs(place.sample - crest.sample) <= apart)
      place.energyUv = Math.max(place.energyUv, crest.energyUv);
    else alone.push(crest);
  }
  return [...places, ...alone];
}

interface View {
  readonly rateHz: number;
  readonly half: number;
  readonly from: number;
  readonly to: number;
}

/** Weighs a place: which shape fits best near it, how well, how large, against the noise between the beats near it. */
function weigher(
  projected: Projected,
  beats: readonly number[],
  { rateHz, half, from, to }: View,
): (at: number) => Omit<Candidate, 'energyUv'> {
  const { shapes, fits } = projected;
  const reach = Math.round(SHAPE_LAG_S * rateHz);
  const rest = rmsAbout(withoutBeats(projected, beats, reach), 2 * half + 1);
  const noise = noiseByHalfSecond(rest, projected.band.length, rateHz, from, to, 0.5);
  return (at) => {
    const moment = Math.min(noise.length - 1, Math.max(0, Math.floor((2 * (at - from)) / rateHz)));
    const noisePower = noise[moment] ** 2 * (2 * half + 1);
    const { sample, shape, likeness } = bestFit(projected, at, reach);
    const { norm } = shapes[shape];
    const fit = fits[shape][sample];
    return {
      sample,
      shape,
      likeness,
      size: fit / norm,
      overNoise: fit / (Math.sqrt(noisePower / WINDOW_FREEDOM) + 1e-12),
      bestLikeness: norm / Math.sqrt(norm ** 2 + noisePower),
    };
  };
}
