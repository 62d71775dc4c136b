import { sharedFft } from '../numeric/fft';
import { hannPeriodic } from '../numeric/windows';

/** Windows of 60 s every 30 s; a breathing rate is looked for between 4 and 40 a minute. */
export const BREATHING_WINDOW_S = 60;
export const BREATHING_STEP_S = 30;
export const SLOWEST_PER_MINUTE = 4;
export const FASTEST_PER_MINUTE = 40;
/** Share of the band's power that a breathing rhythm has within 2.5 a minute of its peak; noise alone seldom has 0.4. */
const CLEAR_SHARE = 0.5;
const PEAK_HALF_WIDTH = 2.5;

/** Power on a grid of whole steps of `stepPerMinute` from 0 on; only its shape matters. */
export interface BreathingSpectrum {
  readonly power: Float64Array;
  readonly stepPerMinute: number;
}

const tapers = new Map<number, Float64Array>();

function taperOf(length: number): Float64Array {
  const taper = tapers.get(length) ?? hannPeriodic(length);
  tapers.set(length, taper);
  return taper;
}

/** Spectrum of one window without mean and line, Hann taper, padded to twice its length or more. */
export function breathingSpectrum(window: Float64Array, rateHz: number): BreathingSpectrum {
  let size = 64;
  while (size < 2 * window.length) size *= 2;
  const padded = new Float64Array(size);
  const taper = taperOf(window.length);
  for (let i = 0; i < window.length; i += 1) padded[i] = window[i] * taper[i];
  const spectrum = new Float64Array(2 * size);
  sharedFft(size).forwardReal(padded, spectrum);
  const power = new Float64Array(size / 2);
  for (let k = 0; k < power.length; k += 1)
    power[k] = spectrum[2 * k] ** 2 + spectrum[2 * k + 1] ** 2;
  return { power, stepPerMinute: (60 * rateHz) / size };
}

/** Place and height of the largest local maximum of power[low..high], refined by a parabola; null where there is none. */
function largestPeak(power: Float64Array, low: number, high: number): number | null {
  let best = -1;
  for (let k = Math.max(1, low); k <= Math.min(high, power.length - 2); k += 1) {
    const isPeak = power[k] > power[k - 1] && power[k] >= power[k + 1];
    if (isPeak && (best < 0 || power[k] > power[best])) best = k;
  }
  if (best < 0) return null;
  const [before, at, after] = [power[best - 1], power[best], power[best + 1]];
  const bend = before - 2 * at + after;
  return bend < 0 ? best + (0.5 * (before - after)) / bend : best;
}

/** Indexes of a spectrum between which breathing is looked for. */
function bandOf({ power, stepPerMinute }: BreathingSpectrum, ceilingPerMinute: number) {
  const top = Math.min(FASTEST_PER_MINUTE, ceilingPerMinute);
  const low = Math.ceil(SLOWEST_PER_MINUTE / stepPerMinute);
  return { low, high: Math.min(power.length - 2, Math.floor(top / stepPerMinute)) };
}

/** Share of the power between 4 a minute and the ceiling (40 at most) that lies within 2.5 a minute of a rate. */
export function shareNear(
  spectrum: BreathingSpectrum,
  perMinute: number,
  ceilingPerMinute: number,
): number {
  const { power, stepPerMinute } = spectrum;
  const { low, high } = bandOf(spectrum, ceilingPerMinute);
  let [all, near] = [0, 0];
  for (let k = low; k <= high; k += 1) {
    all += power[k];
    if (Math.abs(k * stepPerMinute - perMinute) <= PEAK_HALF_WIDTH) near += power[k];
  }
  return near / all;
}

/**
 * Breathing rate a minute of a spectrum: its largest local maximum between 4 and the smaller of 40 and the ceiling, where
 * half of the power of that band lies within 2.5 a minute of it; else NaN (the rule is this program's).
 */
export function breathingPeak(spectrum: BreathingSpectrum, ceilingPerMinute: number): number {
  const { low, high } = bandOf(spectrum, ceilingPerMinute);
  const peak = largestPeak(spectrum.power, low, high);
  if (peak === null) return Number.NaN;
  const perMinute = peak * spectrum.stepPerMinute;
  return shareNear(spectrum, perMinute, ceilingPerMinute) >= CLEAR_SHARE ? perMinute : Number.NaN;
}

/** Centres of the windows that fit a length. */
export function breathingCentres(lengthS: number): Float64Array {
  const count = Math.floor((lengthS - BREATHING_WINDOW_S) / BREATHING_STEP_S + 1e-9) + 1;
  return Float64Array.from(
    { length: Math.max(0, count) },
    (_, k) => k * BREATHING_STEP_S + BREATHING_WINDOW_S / 2,
  );
}
