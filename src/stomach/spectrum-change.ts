import { densityDb } from './dominant-peak';
import type { StomachFigures } from './figures';

export interface PowerRatio {
  readonly linear: number;
  readonly db: number;
}

/** How power at DF changed from one phase to another; null where a phase carries none. */
export interface SpectrumChange {
  /** From the mean spectra, each at its own DF. */
  readonly meanSpectra: PowerRatio | null;
  /** From the medians over the epochs with a rhythm. */
  readonly medianEpochs: PowerRatio | null;
}

function ratio(before: number | null, after: number | null): PowerRatio | null {
  if (before === null || after === null || !(before > 0) || !(after > 0)) return null;
  return { linear: after / before, db: densityDb(after / before) };
}

/** The fed-to-fasting power ratio (or that of any two phases), linear and in dB: 2 is 3.01 dB. */
export function spectrumChange(
  fasting: Pick<StomachFigures, 'meanSpectrum' | 'medianDensity'>,
  fed: Pick<StomachFigures, 'meanSpectrum' | 'medianDensity'>,
): SpectrumChange {
  return {
    meanSpectra: ratio(
      fasting.meanSpectrum?.peak?.density ?? null,
      fed.meanSpectrum?.peak?.density ?? null,
    ),
    medianEpochs: ratio(fasting.medianDensity, fed.medianDensity),
  };
}
