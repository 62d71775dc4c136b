import { sinc } from '../numeric/elementary';
import { convolveSame } from '../numeric/fir';
import { kaiserAt } from '../numeric/windows';

const HALF_TAPS = 16;
const KAISER_BETA = 8;

/**
 * A signal moved later by `delayS` (earlier where negative), by any part of a sample: windowed-sinc
 * interpolation (Kaiser 1974), for signals that end well below half the rate. As long as before;
 * what comes in at an end holds the end's value. NaN is not allowed.
 */
export function delayed(signal: Float64Array, delayS: number, rateHz: number): Float64Array {
  if (delayS === 0 || signal.length === 0) return signal.slice();
  const samples = delayS * rateHz;
  const whole = Math.round(samples);
  const part = samples - whole;
  const taps = new Float64Array(2 * HALF_TAPS + 1);
  let sum = 0;
  for (let j = -HALF_TAPS; j <= HALF_TAPS; j++) {
    const offset = j - part;
    const tap = sinc(offset) * kaiserAt(offset / (HALF_TAPS + 1), KAISER_BETA);
    taps[j + HALF_TAPS] = tap;
    sum += tap;
  }
  for (let j = 0; j < taps.length; j++) taps[j] /= sum;
  const shifted = convolveSame(signal, taps, 'reflect-odd');
  const last = shifted.length - 1;
  return shifted.map((_, i) => shifted[Math.max(0, Math.min(last, i - whole))]);
}
