import { dft, inverseDft } from './dft';
import { atan2 } from './elementary';

/**
 * The analytic signal of real x, interleaved re, im (Gabor 1946): x and its Hilbert transform, by
 * taking the negative frequencies out of its spectrum. x counts as periodic, so about one period of
 * a band-passed x at either end is not to be believed. Any length; O(n log n). A NaN spoils all of it,
 * so gaps are to be filled before.
 */
export function analyticSignal(x: Float64Array): Float64Array {
  const n = x.length;
  if (n === 0) return new Float64Array(0);
  const complex = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) complex[2 * i] = x[i];
  const spectrum = dft(complex);
  for (let k = 1; k < n; k++) {
    const factor = 2 * k < n ? 2 : 2 * k === n ? 1 : 0;
    spectrum[2 * k] *= factor;
    spectrum[2 * k + 1] *= factor;
  }
  return inverseDft(spectrum);
}

/**
 * Phase of a band-passed signal in radians, -pi to pi: that of its analytic signal, 0 at crests and
 * rising with time. Meaningless where the signal is all but 0.
 */
export function hilbertPhase(x: Float64Array): Float64Array {
  const analytic = analyticSignal(x);
  return Float64Array.from(x, (_, i) => atan2(analytic[2 * i + 1], analytic[2 * i]));
}
