import { removeLine } from '../numeric/detrend';
import type { BreathingSeries } from '../recording/heart-series';
import type { Hertz } from '../units/rate';
import {
  BREATHING_WINDOW_S,
  breathingCentres,
  breathingPeak,
  breathingSpectrum,
} from './breathing-peak';

/** Means of this many samples bring a lead near this rate. */
const WORKING_RATE_HZ = 4;
const LEAST_KEPT = 0.75;

export const NO_BREATHING: BreathingSeries = {
  centresS: new Float64Array(0),
  perMinute: new Float64Array(0),
  from: 'none',
};

/** Means of whole blocks of samples, NaN left out; a block of NaN is NaN. */
function blockMeans(samples: ArrayLike<number>, size: number): Float64Array {
  const means = new Float64Array(Math.floor(samples.length / size));
  for (let block = 0; block < means.length; block += 1) {
    let [sum, count] = [0, 0];
    for (let i = block * size; i < (block + 1) * size; i += 1) {
      if (Number.isNaN(samples[i])) continue;
      sum += samples[i];
      count += 1;
    }
    means[block] = sum / count;
  }
  return means;
}

/** A window less its mean and line, NaN set to 0; null where under three quarters of it are there. */
function keptWindow(x: Float64Array, from: number, length: number): Float64Array | null {
  const window = x.slice(from, from + length);
  const weights = Uint8Array.from(window, (value) => (Number.isNaN(value) ? 0 : 1));
  const kept = weights.reduce((sum, one) => sum + one, 0);
  if (kept < LEAST_KEPT * length) return null;
  for (let i = 0; i < length; i += 1) if (weights[i] === 0) window[i] = 0;
  const flat = removeLine(window, weights);
  for (let i = 0; i < length; i += 1) if (weights[i] === 0) flat[i] = 0;
  return flat;
}

/**
 * Breathing rate over time from a breathing lead in any unit, NaN where samples are missing, at a rate of 1 Hz or more
 * (above 8 Hz it is averaged down to 4-8 Hz first): the spectral peak of 60 s windows every 30 s, as breathingPeak says.
 * Rates above 0.45 of the sampling rate are not looked for. Throws for a rate under 1 Hz.
 */
export function breathingFromLead(samples: ArrayLike<number>, rateHz: Hertz): BreathingSeries {
  if (!(rateHz >= 1)) throw new Error(`breathing needs 1 Hz or more, not ${rateHz} Hz`);
  const size = Math.max(1, Math.floor(rateHz / WORKING_RATE_HZ));
  const x = blockMeans(samples, size);
  const workingHz = rateHz / size;
  const length = Math.floor(BREATHING_WINDOW_S * workingHz + 1e-9);
  const centresS = breathingCentres(samples.length / rateHz);
  const perMinute = centresS.map((centreS) => {
    const from = Math.round((centreS - BREATHING_WINDOW_S / 2) * workingHz);
    const window = from + length <= x.length ? keptWindow(x, from, length) : null;
    if (window === null) return Number.NaN;
    return breathingPeak(breathingSpectrum(window, workingHz), 0.45 * 60 * workingHz);
  });
  return { centresS, perMinute, from: 'lead' };
}
