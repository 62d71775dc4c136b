import { lombScargle } from '../numeric/lomb-scargle';
import { welch } from '../numeric/spectrum';
import { cubicSpline } from '../numeric/spline';
import { mean } from '../numeric/statistics';
import { hannPeriodic } from '../numeric/windows';
import type { Hertz } from '../units/rate';
import { type Band, bandPower } from './band-power';

/** Rate of the resampled tachogram, and the Welch windows laid on it (64 s, half overlapping; common practice). */
export const TACHOGRAM_RATE_HZ = 4;
const WELCH_SAMPLES = 256;
const WELCH_TAPER = hannPeriodic(WELCH_SAMPLES);
/** A hole between two intervals that is longer than this is bridged by a straight line. */
const LONGEST_SPLINE_S = 2.5;
const BRIDGE_STEP_S = 1;

/** Values less the line fitted to them by least squares over their times. Lengths are equal. */
export function withoutLine(timesS: Float64Array, values: Float64Array): Float64Array {
  const n = values.length;
  let [timeSum, valueSum] = [0, 0];
  for (let i = 0; i < n; i += 1) {
    timeSum += timesS[i];
    valueSum += values[i];
  }
  const [timeMean, valueMean] = [timeSum / n, valueSum / n];
  let [across, along] = [0, 0];
  for (let i = 0; i < n; i += 1) {
    across += (timesS[i] - timeMean) * (values[i] - valueMean);
    along += (timesS[i] - timeMean) ** 2;
  }
  const slope = along > 0 ? across / along : 0;
  return values.map((value, i) => value - valueMean - slope * (timesS[i] - timeMean));
}

/** Half the mean rate of the beats: above it a series of beats holds nothing of its own. */
export const beatNyquistOf = (meanMs: number): Hertz => 500 / meanMs;

/**
 * Power in ms^2 of NN intervals in each band by Lomb-Scargle on the times of the beats that end them (Lomb 1976;
 * Scargle 1982; Laguna 1998), mean and line removed. The grid is 1 / T with T = n / (n - 1) times the time from first to
 * last, on which evenly spaced values give back exactly their variance; the scale takes the mean interval for the
 * spacing, so that holes left by removed intervals neither add nor take power. Nothing is counted above half the mean
 * beat rate. Needs three intervals or more with ascending times; NaN for fewer.
 */
export function lombBandPowers(
  timesS: Float64Array,
  rrMs: Float64Array,
  bands: readonly Band[],
): number[] {
  const n = timesS.length;
  if (n < 3) return bands.map(() => Number.NaN);
  const lengthS = ((timesS[n - 1] - timesS[0]) * n) / (n - 1);
  const stepHz = 1 / lengthS;
  const nyquistHz = beatNyquistOf(mean(rrMs));
  const lowest = Math.max(1, Math.floor(Math.min(...bands.map((band) => band[0])) * lengthS));
  const top = Math.min(nyquistHz, Math.max(...bands.map((band) => band[1])));
  const count = Math.max(0, Math.ceil(top * lengthS) - lowest + 1);
  const freqsHz = Float64Array.from({ length: count }, (_, k) => (lowest + k) * stepHz);
  const density = lombScargle(timesS, withoutLine(timesS, rrMs), freqsHz);
  let intervals = 0;
  for (const one of rrMs) intervals += one / 1000;
  const scale = intervals / lengthS;
  return bands.map(
    ([low, high]) =>
      scale * bandPower(density, lowest * stepHz, stepHz, [low, Math.min(high, nyquistHz)]),
  );
}

/** The intervals with points put on a straight line into every long hole, so that a spline cannot swing there. */
function bridged(timesS: Float64Array, rrMs: Float64Array): { x: Float64Array; y: Float64Array } {
  const x: number[] = [];
  const y: number[] = [];
  for (let i = 0; i < timesS.length; i += 1) {
    const hole = i > 0 ? timesS[i] - timesS[i - 1] : 0;
    const pieces = hole > LONGEST_SPLINE_S ? Math.ceil(hole / BRIDGE_STEP_S) : 1;
    for (let k = 1; k < pieces; k += 1) {
      x.push(timesS[i - 1] + (hole * k) / pieces);
      y.push(rrMs[i - 1] + ((rrMs[i] - rrMs[i - 1]) * k) / pieces);
    }
    x.push(timesS[i]);
    y.push(rrMs[i]);
  }
  return { x: Float64Array.from(x), y: Float64Array.from(y) };
}

/** NN intervals on an even grid of 4 Hz from the first beat's time on, by a cubic spline; holes are bridged by lines. */
export function resampledTachogram(timesS: Float64Array, rrMs: Float64Array): Float64Array {
  const { x, y } = bridged(timesS, rrMs);
  const first = timesS[0];
  const lengthS = timesS[timesS.length - 1] - first;
  const count = Math.floor(lengthS * TACHOGRAM_RATE_HZ + 1e-9) + 1;
  return cubicSpline(
    x,
    y,
  )(Float64Array.from({ length: count }, (_, k) => first + k / TACHOGRAM_RATE_HZ));
}

/**
 * Second opinion: the same powers by Welch's method (1967) on the tachogram resampled at 4 Hz by a cubic spline, Hann
 * windows of 64 s, half overlapping, each less its line. NaN where not one window fits.
 */
export function welchBandPowers(
  timesS: Float64Array,
  rrMs: Float64Array,
  bands: readonly Band[],
): number[] {
  const tooShort = () => bands.map(() => Number.NaN);
  if (timesS.length < 3) return tooShort();
  const even = resampledTachogram(timesS, rrMs);
  if (even.length < WELCH_SAMPLES) return tooShort();
  const density = welch(even, {
    rateHz: TACHOGRAM_RATE_HZ,
    taper: WELCH_TAPER,
    step: WELCH_SAMPLES / 2,
    size: WELCH_SAMPLES,
    detrend: 'line',
  });
  const stepHz = TACHOGRAM_RATE_HZ / WELCH_SAMPLES;
  return bands.map((band) => bandPower(density, 0, stepHz, band));
}
