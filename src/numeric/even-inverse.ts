import { sharedFft } from './fft';

/**
 * Inverse transform of a real, even spectrum of `size` points (a power of two), given by its bins 0 .. size / 2: real and
 * even too, so that lags 0 .. size / 2 - 1 hold all of it. Throws where the size is no power of two.
 */
export function evenInverse(byBin: Float64Array, size: number): Float64Array {
  const spectrum = new Float64Array(2 * size);
  for (let k = 0; k < size; k += 1) spectrum[2 * k] = byBin[Math.min(k, size - k)];
  const out = new Float64Array(2 * size);
  sharedFft(size).inverse(spectrum, out);
  return Float64Array.from({ length: size / 2 }, (_, lag) => out[2 * lag]);
}
