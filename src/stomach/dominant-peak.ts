import { log10 } from '../numeric/elementary';
import { localMaxima, logParabola } from '../numeric/peaks';
import type { Cpm } from '../units/rate';

/** A search band [lowCpm, highCpm). */
export interface Band {
  readonly lowCpm: Cpm;
  readonly highCpm: Cpm;
}

export interface SpectrumPeak {
  readonly bin: number;
  readonly cpm: Cpm;
  /** Power density at the peak, uV2/Hz. */
  readonly density: number;
}

const HALF_PEAK_CPM = 0.5;

/**
 * Local maxima of a density inside the band, never its edges, each refined by a parabola through
 * the logarithm of three bins (bias below 0.0001 cpm for a tone with Hann and four-fold padding).
 * Ascending; a maximum refined to just outside the band is not in it.
 */
export function bandPeaks(density: Float64Array, binCpm: number, band: Band): SpectrumPeak[] {
  const from = Math.max(0, Math.floor(band.lowCpm / binCpm));
  const to = Math.ceil(band.highCpm / binCpm) + 1;
  return Array.from(localMaxima(density, from, to), (bin) => {
    const top = logParabola(density[bin - 1], density[bin], density[bin + 1]);
    return { bin, cpm: (bin + top.offset) * binCpm, density: top.height };
  }).filter(({ cpm }) => cpm >= band.lowCpm && cpm < band.highCpm);
}

/** The highest of some peaks, the lowest in frequency where two are equal; null of none. */
export function highestPeak(peaks: readonly SpectrumPeak[]): SpectrumPeak | null {
  let best: SpectrumPeak | null = null;
  for (const peak of peaks) if (best === null || peak.density > best.density) best = peak;
  return best;
}

/** The dominant peak of a density in the band; null where it has no local maximum there. */
export function dominantPeak(
  density: Float64Array,
  binCpm: number,
  band: Band,
): SpectrumPeak | null {
  return highestPeak(bandPeaks(density, binCpm, band));
}

/** Sum of the bins whose frequency lies in [lowCpm, highCpm). */
export function bandSum(density: Float64Array, binCpm: number, band: Band): number {
  const from = Math.max(0, Math.ceil(band.lowCpm / binCpm - 1e-9));
  let sum = 0;
  for (let k = from; k < density.length && k * binCpm < band.highCpm - 1e-9; k++) sum += density[k];
  return sum;
}

/** Power within 0.5 cpm of a frequency (inside the band) over the power in the band, 0 to 1. */
export function peakShare(density: Float64Array, binCpm: number, cpm: Cpm, band: Band): number {
  const all = bandSum(density, binCpm, band);
  const near = bandSum(density, binCpm, {
    lowCpm: Math.max(band.lowCpm, cpm - HALF_PEAK_CPM),
    highCpm: Math.min(band.highCpm, cpm + HALF_PEAK_CPM),
  });
  return all > 0 ? near / all : 0;
}

/** Decibel re 1 uV2/Hz. */
export function densityDb(density: number): number {
  return 10 * log10(density);
}
