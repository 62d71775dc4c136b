import { removeLine } from '../numeric/detrend';
import { nextPowerOfTwo } from '../numeric/fft';
import { powerDensity } from '../numeric/spectrum';
import { hannPeriodic } from '../numeric/windows';
import { zeroedWindow } from '../numeric/zeroed-window';
import { type Cpm, type Hertz, hzToCpm } from '../units/rate';

const WINDOW_S = 240;
const STEP_S = 60;
/** Windows between two rests. */
const WINDOWS_A_STEP = 15;
/** Largest part of a window, weighted by the taper, that may be missing. */
const MOST_MISSING = 0.25;

/** Spectra of a slow lead over the study, of its kept samples. */
export interface LeadSpectra {
  /** One a window that is kept: one-sided density in uV2/Hz, bin k at k * binCpm. */
  readonly windows: readonly Float64Array[];
  readonly mean: Float64Array;
  readonly binCpm: Cpm;
  /** Points of the transform. */
  readonly size: number;
}

/** Whether what is missing is 0 in the windows, or has been bridged. */
export type Missing = 'zero' | 'bridged';

/**
 * Periodograms of 240 s Hann windows a minute apart (the whole lead where it is shorter), zero-padded to the next power of
 * two of at least four times; the line is taken off. Missing samples (`kept` 0) are 0 after that and the power of a line is
 * made whole, unless they have been bridged. Null where no window is three quarters there. Takes a rest now and then.
 */
export function* leadSpectra(
  lead: Float64Array,
  kept: Uint8Array,
  rateHz: Hertz,
  missing: Missing,
): Generator<void, LeadSpectra | null> {
  const length = Math.min(lead.length, Math.round(WINDOW_S * rateHz));
  if (length < 2) return null;
  const step = Math.max(1, Math.round(STEP_S * rateHz));
  const taper = hannPeriodic(length);
  const whole = taper.reduce((sum, weight) => sum + weight, 0);
  const size = nextPowerOfTwo(4 * Math.round(WINDOW_S * rateHz));
  const windows: Float64Array[] = [];
  for (let from = 0; from + length <= lead.length; from += step) {
    if ((from / step) % WINDOWS_A_STEP === WINDOWS_A_STEP - 1) yield;
    const mask = kept.subarray(from, from + length);
    const values = lead.subarray(from, from + length);
    const { samples, keptTaper } = zeroedWindow(values, mask, taper);
    if (keptTaper < (1 - MOST_MISSING) * whole) continue;
    if (missing === 'bridged') {
      windows.push(powerDensity(removeLine(values), taper, rateHz, size));
      continue;
    }
    const correction = (whole / keptTaper) ** 2;
    const density = powerDensity(samples, taper, rateHz, size);
    windows.push(density.map((value) => correction * value));
  }
  if (windows.length === 0) return null;
  const mean = new Float64Array(windows[0].length);
  for (const one of windows) for (let k = 0; k < mean.length; k += 1) mean[k] += one[k];
  for (let k = 0; k < mean.length; k += 1) mean[k] /= windows.length;
  return { windows, mean, binCpm: hzToCpm(rateHz / size), size };
}
