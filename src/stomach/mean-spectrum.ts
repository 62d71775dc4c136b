import type { RhythmBands } from '../recording/settings';
import type { Cpm } from '../units/rate';
import { bandSum, densityDb, dominantPeak } from './dominant-peak';

/** The mean of the kept epochs' spectra of a phase (of linear power, never of dB), and its peak. */
export interface MeanSpectrum {
  /** uV2/Hz; bin k lies at k * binCpm. */
  readonly density: Float64Array;
  readonly binCpm: number;
  readonly epochs: number;
  /** Null where the mean has no local maximum in the search band. */
  readonly peak: { readonly dfCpm: Cpm; readonly dpDb: number } | null;
}

/** Mean of densities bin by bin, with its dominant peak; null of none. */
export function meanSpectrum(
  densities: readonly Float64Array[],
  binCpm: number,
  bands: RhythmBands,
): MeanSpectrum | null {
  if (densities.length === 0) return null;
  const density = new Float64Array(densities[0].length);
  for (const one of densities) for (let k = 0; k < density.length; k++) density[k] += one[k];
  for (let k = 0; k < density.length; k++) density[k] /= densities.length;
  const peak = dominantPeak(density, binCpm, bands);
  return {
    density,
    binCpm,
    epochs: densities.length,
    peak: peak && { dfCpm: peak.cpm, dpDb: densityDb(peak.density) },
  };
}

/** Share (0 to 1) of a density's power in the search band that lies in each rhythm band. */
export function bandShares(
  density: Float64Array,
  binCpm: number,
  bands: RhythmBands,
): { readonly brady: number; readonly normo: number; readonly tachy: number } {
  const { lowCpm, normoLowCpm, normoHighCpm, highCpm } = bands;
  const sum = (low: Cpm, high: Cpm) => bandSum(density, binCpm, { lowCpm: low, highCpm: high });
  const all = sum(lowCpm, highCpm);
  return {
    brady: sum(lowCpm, normoLowCpm) / all,
    normo: sum(normoLowCpm, normoHighCpm) / all,
    tachy: sum(normoHighCpm, highCpm) / all,
  };
}
