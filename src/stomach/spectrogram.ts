import type { Spectrogram } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import type { Hertz } from '../units/rate';
import { densityDb } from './dominant-peak';
import { epochStarts } from './epoch-layout';
import type { SharedWindows } from './shared-windows';

/** Columns made between two rests. */
const COLUMNS_A_STEP = 10;

/**
 * The running spectrum of a whole lead for the eye: windows as long as an epoch, one every step from
 * its first sample on whatever the phases, the bins that cover the rhythm bands, dB re 1 uV2/Hz.
 * A column is NaN where the window would not be kept as an epoch. Takes a rest now and then.
 */
export function* runningSpectrogram(
  windows: SharedWindows,
  sampleCount: number,
  rateHz: Hertz,
  settings: Settings,
): Generator<void, Spectrogram> {
  const { lengthS, stepS, maxSpoiled } = settings.epoch;
  const { lowCpm, highCpm } = settings.rhythmBands;
  const { binCpm, binCount: available } = windows;
  const firstBin = Math.floor(lowCpm / binCpm);
  const lastBin = Math.min(available - 1, Math.ceil(highCpm / binCpm));
  const binCount = Math.max(0, lastBin - firstBin + 1);
  const starts = epochStarts({ fromS: 0, toS: sampleCount / rateHz }, { lengthS, stepS });
  const levelDb = new Float32Array(starts.length * binCount).fill(Number.NaN);
  for (let column = 0; column < starts.length; column += 1) {
    if (column % COLUMNS_A_STEP === COLUMNS_A_STEP - 1) yield;
    const first = Math.round(starts[column] * rateHz);
    if (windows.at(first).spoiledFraction > maxSpoiled) continue;
    const density = windows.densityAt(first);
    for (let k = 0; k < binCount; k++)
      levelDb[column * binCount + k] = densityDb(density[firstBin + k]);
  }
  return {
    centresS: Float64Array.from(starts, (fromS) => fromS + lengthS / 2),
    firstCpm: firstBin * binCpm,
    stepCpm: binCpm,
    binCount,
    levelDb,
  };
}
