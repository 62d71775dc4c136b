import { bandPassTaps } from '../numeric/fir';
import type { KernelSpectrum } from '../numeric/kernel-spectrum';
import { blockSizeFor, kernelSpectrum, overlapSave } from '../numeric/overlap-save';

/** Lowest rate at which QRS complexes can be told from other waves. */
export const LOWEST_RATE_HZ = 50;

/** A zero-phase filter, planned once. */
export interface Band {
  readonly taps: Float64Array;
  readonly spectrum: KernelSpectrum;
}

/** The two bands a detector looks at. */
export interface QrsBands {
  /** About 5-20 Hz, where a QRS complex stands out of T and P waves and of muscle noise (Thakor 1984, from memory). */
  readonly energy: Band;
  /** About 3-25 Hz, wide enough to know complexes by their shape. */
  readonly shape: Band;
  /** Samples the filters reach to each side. */
  readonly reach: number;
}

/** Zero-phase filters of both bands. Throws below LOWEST_RATE_HZ. */
export function qrsBands(rateHz: number): QrsBands {
  if (!(rateHz >= LOWEST_RATE_HZ))
    throw new Error(`QRS detection needs at least ${LOWEST_RATE_HZ} Hz, not ${rateHz}`);
  const top = 0.49 * rateHz;
  const energy = bandPassTaps({
    rateHz,
    lowStopHz: 2,
    lowPassHz: 6,
    highPassHz: Math.min(18, 0.8 * top),
    highStopHz: Math.min(24, top),
    attenuationDb: 40,
  });
  const shape = bandPassTaps({
    rateHz,
    lowStopHz: 1,
    lowPassHz: 4,
    highPassHz: Math.min(24, 0.8 * top),
    highStopHz: Math.min(32, top),
    attenuationDb: 40,
  });
  return {
    energy: bandOf(energy),
    shape: bandOf(shape),
    reach: (Math.max(energy.length, shape.length) - 1) / 2,
  };
}

function bandOf(taps: Float64Array): Band {
  const kernels = [{ taps, origin: (taps.length - 1) / 2 }] as const;
  const blockSize = blockSizeFor(kernels, 1e6);
  return { taps, spectrum: kernelSpectrum({ blockSize, kernels, decimate: 1 }) };
}

/** One band of a stretch. */
export function filterBand(stretch: Float64Array, band: Band): Float64Array {
  return overlapSave(stretch, { spectrum: band.spectrum, ends: 'zero' })[0];
}

/** Root of the mean of squares of x over `width` samples (made odd) about any sample; what lies outside x counts as 0. */
export function rmsAbout(x: Float64Array, width: number): (at: number) => number {
  const half = Math.floor(width / 2);
  const sums = new Float64Array(x.length + 1);
  for (let i = 0; i < x.length; i += 1) sums[i + 1] = sums[i] + x[i] * x[i];
  const scale = 1 / (2 * half + 1);
  return (at) => {
    const from = Math.min(x.length, Math.max(0, at - half));
    const to = Math.min(x.length, at + half + 1);
    return Math.sqrt(Math.max(0, sums[to] - sums[from]) * scale);
  };
}
