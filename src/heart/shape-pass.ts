import type { KernelSpectrum } from '../numeric/kernel-spectrum';
import { blockSizeFor, kernelSpectrum, overlapSave } from '../numeric/overlap-save';
import { SHAPE_LAG_S, type Shape } from './beat-shapes';
import { type Projected, rarityCosts, SIDE_S } from './between-beats';
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
import { fittedPlaces, weigher } from './weigh-places';

/** Shapes searched for over the whole study, at most. */
const MOST_SEARCHED = 4;
/** A place is worth weighing from this part of a shape's usual size on. */
const LEAST_SIZE = 0.2;

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
  /** QRS energy there. */
  readonly energyUv: number;
  /** Share of the learned beats that have the shape. */
  readonly share: number;
  /** How much it is like a P wave and like a T wave of the usual beats, 0 to 1. */
  readonly likeP: number;
  readonly likeT: number;
  /** Root mean square of the shape band over the window about it. */
  readonly rmsUv: number;
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
  const margin = bands.reach + 2 * half + Math.max(apart, Math.ceil(SIDE_S * rateHz));
  for (const { from, to, stretch, start } of chunksOf(signal, margin)) {
    const projected = projectBand(filterBand(stretch, bands.shape), searched, plans);
    yield from / samples.length;
    const near: number[] = [];
    while (firstFrom < first.length && first[firstFrom] < start) firstFrom += 1;
    for (let i = firstFrom; i < first.length && first[i] < start + stretch.length; i += 1)
      near.push(first[i] - start);
    const crests: Crest[] = [];
    for (; crestFrom < energy.crests.length && energy.crests[crestFrom].sample < to; crestFrom += 1)
      crests.push({
        ...energy.crests[crestFrom],
        sample: energy.crests[crestFrom].sample - start,
      });
    const places = placesOf(projected, crests, apart, from - start, to - start);
    const fitted = fittedPlaces(projected, places, Math.round(SHAPE_LAG_S * rateHz));
    const weigh = weigher(projected, near, fitted, {
      rateHz,
      half,
      from: from - start,
      to: to - start,
    });
    yield from / samples.length;
    for (const fit of fitted) {
      const sample = fit.sample + start;
      const energyUv = energyAt(energy, sample / rateHz);
      if (isUsable(usable, sample)) found.push({ ...weigh(fit), sample, energyUv });
    }
    yield to / samples.length;
  }
  return found.sort((a, b) => a.sample - b.sample);
}

/** The greatest energy within a step of the envelope of a time. */
function energyAt({ envelope, envelopeHz }: Energy, timeS: number): number {
  const at = Math.round(timeS * envelopeHz);
  let greatest = 0;
  for (let i = at - 1; i <= at + 1; i += 1) if (envelope[i] > greatest) greatest = envelope[i];
  return greatest;
}

function unlike({ sample, energyUv }: Crest): Candidate {
  return {
    sample,
    shape: -1,
    size: 0,
    likeness: 0,
    overNoise: 0,
    bestLikeness: 1,
    energyUv,
    share: 1,
    likeP: 0,
    likeT: 0,
    rmsUv: energyUv,
  };
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

/** Places worth weighing: crests of the projection on each shape, and crests of the energy. */
function placesOf(
  { fits, shapes }: Projected,
  crests: readonly Crest[],
  apart: number,
  from: number,
  to: number,
): number[] {
  const places = crests.map(({ sample }) => sample);
  fits.forEach((fit, k) => {
    const least = LEAST_SIZE * shapes[k].norm;
    for (const at of crestsIn(fit, from, to, apart)) if (fit[at] > least) places.push(at);
  });
  return places.sort((a, b) => a - b);
}
