import { cos } from '../numeric/elementary';
import { evenInverse } from '../numeric/even-inverse';
import { localMaxima } from '../numeric/peaks';
import type { Cpm } from '../units/rate';
import { leadBackground } from './lead-background';
import type { LeadSpectra } from './lead-spectra';

/** What does not stand out of the background is lowered to this, never taken away. */
const LEAST_GAIN = 0.1;
/** A wave of a window stands this many times over the background. */
const STANDS_OUT = 6;
/** Where the wave itself is looked for. */
const WAVE_CPM = [1, 9] as const;
/** Harmonics are followed up to here. */
const HIGHEST_CPM = 15;
/** A harmonic lies within this of its multiple, and fills so much to each side. */
const NEAR_CPM = 0.25;
const HALF_WIDTH_CPM = 0.6;
/** A third harmonic and beyond has at most this part of the power of the one before. */
const FALLS_TO = 0.8;

/** Bin of the highest local maximum in [fromCpm, toCpm], or -1. */
function highestBin(density: Float64Array, binCpm: Cpm, fromCpm: Cpm, toCpm: Cpm): number {
  let best = -1;
  const from = Math.max(1, Math.floor(fromCpm / binCpm));
  const to = Math.min(density.length - 1, Math.ceil(toCpm / binCpm) + 1);
  for (const k of localMaxima(density, from, to))
    if (best < 0 || density[k] > density[best]) best = k;
  return best;
}

/** Bins of the harmonics of a window's wave that stand out, each no higher than the one before lets expect. */
function harmonicBins(density: Float64Array, background: Float64Array, binCpm: Cpm): number[] {
  const wave = highestBin(density, binCpm, WAVE_CPM[0], WAVE_CPM[1]);
  if (wave < 0 || density[wave] < STANDS_OUT * background[wave]) return [];
  const bins: number[] = [];
  let before = density[wave];
  for (let m = 2; m * wave * binCpm <= HIGHEST_CPM; m += 1) {
    const at = m * wave * binCpm;
    const bin = highestBin(density, binCpm, at - NEAR_CPM, at + NEAR_CPM);
    const standsOut = bin > 0 && density[bin] > STANDS_OUT * background[bin];
    if (!standsOut || density[bin] > FALLS_TO * before) break;
    bins.push(bin);
    before = density[bin];
  }
  return bins;
}

/** Mean power over the windows that belongs to harmonics of each window's own wave, by bin. */
function harmonicPower({ windows, binCpm, mean }: LeadSpectra, background: Float64Array) {
  const power = new Float64Array(mean.length);
  const half = Math.round(HALF_WIDTH_CPM / binCpm);
  for (const density of windows)
    for (const bin of harmonicBins(density, background, binCpm))
      for (let k = Math.max(0, bin - half); k <= bin + half && k < power.length; k += 1)
        power[k] += Math.max(0, density[k] - background[k]) / windows.length;
  return power;
}

/**
 * Gain of the linear filter that best parts a lead's waves from its own background, by bin (Wiener 1949, spectra estimated
 * from the lead): (P - N) / P with P the mean spectrum and N the background beneath it, at least 0.1. Above `highCpm` only
 * harmonics of the wave of each window count, so that breathing is kept out and a tachygastria's harmonic is not.
 */
export function fittedGain(spectra: LeadSpectra, highCpm: Cpm): Float64Array {
  const { mean, binCpm } = spectra;
  const background = leadBackground(spectra);
  const harmonics = harmonicPower(spectra, background);
  return mean.map((power, k) => {
    const waves = k * binCpm < highCpm ? power - background[k] : harmonics[k];
    const gain = power > 0 ? waves / power : 0;
    return k * binCpm < highCpm ? Math.max(LEAST_GAIN, gain) : Math.min(1, gain);
  });
}

/** Zero-phase taps of a gain by bin of a transform of `size` points, `half` to each side under a Hann lag window. */
export function gainTaps(gain: Float64Array, size: number, half: number): Float64Array {
  const response = evenInverse(gain, size);
  return Float64Array.from({ length: 2 * half + 1 }, (_, i) => {
    const lag = Math.abs(i - half);
    return response[lag] * (0.5 + 0.5 * cos((Math.PI * lag) / (half + 1)));
  });
}
