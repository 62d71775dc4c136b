import { removeLine } from './detrend';
import { dft } from './dft';
import { isPowerOfTwo, sharedFft } from './fft';
import { mean } from './statistics';

/** Frequency from one bin to the next of a transform of `size` points. */
export function binHz(rateHz: number, size: number): number {
  return rateHz / size;
}

/** Full interleaved spectrum of real values, any number of them from 1. */
export function realSpectrum(x: Float64Array): Float64Array {
  const out = new Float64Array(2 * x.length);
  if (isPowerOfTwo(x.length) && x.length > 1) {
    sharedFft(x.length).forwardReal(x, out);
    return out;
  }
  for (let i = 0; i < x.length; i++) out[2 * i] = x[i];
  return dft(out);
}

/**
 * One-sided power spectral density in units^2/Hz, floor(size / 2) + 1 bins of rateHz / size:
 * |X|^2 / (rate sum w^2), doubled except at 0 and at half the rate (Welch 1967; scipy's
 * 'density'). x and taper are as long as each other; x times taper is padded with zeros to
 * `size`, any whole number from x.length on (a power of two is quickest). Nothing is detrended.
 */
export function powerDensity(
  x: Float64Array,
  taper: Float64Array,
  rateHz: number,
  size: number,
): Float64Array {
  if (x.length !== taper.length || size < x.length)
    throw new Error(`${x.length} samples, taper of ${taper.length}, transform of ${size}`);
  const padded = new Float64Array(size);
  let squares = 0;
  for (let i = 0; i < x.length; i++) {
    padded[i] = x[i] * taper[i];
    squares += taper[i] * taper[i];
  }
  const spectrum = realSpectrum(padded);
  const density = new Float64Array(Math.floor(size / 2) + 1);
  const scale = 1 / (rateHz * squares);
  for (let k = 0; k < density.length; k++) {
    const power = spectrum[2 * k] * spectrum[2 * k] + spectrum[2 * k + 1] * spectrum[2 * k + 1];
    density[k] = power * scale * (k === 0 || 2 * k === size ? 1 : 2);
  }
  return density;
}

export interface WelchOptions {
  readonly rateHz: number;
  readonly taper: Float64Array;
  /** Samples from one segment to the next, from 1. */
  readonly step: number;
  /** Size of the transform, from the taper's length on. */
  readonly size: number;
  /** What is taken off each segment first. */
  readonly detrend: 'none' | 'mean' | 'line';
}

/** A segment less its mean or its fitted line; the same array where nothing is taken off. */
export function detrended(segment: Float64Array, kind: WelchOptions['detrend']): Float64Array {
  if (kind === 'none') return segment;
  if (kind === 'line') return removeLine(segment);
  const level = mean(segment);
  return segment.map((value) => value - level);
}

/**
 * Power spectral density averaged over segments as long as the taper (Welch 1967), scaled as
 * powerDensity. Segments are those wholly inside x; throws where there is none.
 */
export function welch(x: Float64Array, options: WelchOptions): Float64Array {
  const { rateHz, taper, step, size, detrend } = options;
  if (x.length < taper.length || !(step >= 1))
    throw new Error(`segments of ${taper.length} samples every ${step} do not fit ${x.length}`);
  const average = new Float64Array(Math.floor(size / 2) + 1);
  let count = 0;
  for (let from = 0; from + taper.length <= x.length; from += step) {
    const segment = detrended(x.subarray(from, from + taper.length), detrend);
    const density = powerDensity(segment, taper, rateHz, size);
    for (let k = 0; k < average.length; k++) average[k] += density[k];
    count += 1;
  }
  for (let k = 0; k < average.length; k++) average[k] /= count;
  return average;
}
