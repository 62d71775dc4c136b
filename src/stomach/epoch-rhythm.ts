import type { EpochFlag, Rhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import type { Cpm, Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { independentValues, standsOut } from './background';
import {
  type Band,
  bandPeaks,
  densityDb,
  highestPeak,
  peakShare,
  type SpectrumPeak,
} from './dominant-peak';
import { atBreathing, atHalfOfCrests, onDrift } from './epoch-flags';
import { halfPeaks, isLocked } from './harmonic';
import { rhythmOf } from './rhythm-class';

/** A spectrum with what is needed to judge a peak of it. */
export interface Spectrum {
  readonly density: Float64Array;
  readonly binCpm: number;
  readonly lengthS: Seconds;
}

/** One kept epoch, ready to be judged. */
export interface EpochInput extends Spectrum {
  /** Detrended, spoiled samples 0. */
  readonly samples: Float64Array;
  readonly rateHz: Hertz;
  readonly spoiledFraction: number;
  readonly crestCpm: Cpm | null;
  readonly breathingCpm: Cpm | null;
  /** Spectra of its two halves; null where one of them is too spoiled. Asked for only when needed. */
  readonly halves: () => readonly [Spectrum, Spectrum] | null;
}

export interface EpochRhythm {
  readonly dfCpm: Cpm | null;
  readonly dpDb: number | null;
  readonly peakShare: number | null;
  readonly rhythm: Rhythm;
  readonly flags: readonly EpochFlag[];
}

const searchBand = (settings: Settings): Band => settings.rhythmBands;

/** The highest peak of a spectrum if it stands out of the background at the rate given. */
function outstandingPeak(
  spectrum: Spectrum,
  band: Band,
  falseAlarm: number,
): { readonly peak: SpectrumPeak | null; readonly outstanding: boolean } {
  const { density, binCpm, lengthS } = spectrum;
  const peak = highestPeak(bandPeaks(density, binCpm, band));
  const independent = independentValues(band, lengthS);
  const outstanding =
    peak !== null && standsOut(density, binCpm, peak, { lengthS, falseAlarm, independent });
  return { peak, outstanding };
}

/**
 * The lower peak whose locked double `peak` is, or null. The place of the lower peak is given by
 * the double, so it is tested as one value and not as the highest of many.
 */
function fundamentalOf(input: EpochInput, peak: SpectrumPeak, settings: Settings) {
  const { density, binCpm, lengthS, samples, rateHz } = input;
  const peaks = bandPeaks(density, binCpm, searchBand(settings));
  const { falseAlarm } = settings.epoch;
  return (
    halfPeaks(peak, peaks).find(
      (lower) =>
        standsOut(density, binCpm, lower, { lengthS, falseAlarm, independent: 1 }) &&
        isLocked(samples, rateHz, lengthS, lower.cpm),
    ) ?? null
  );
}

/** Least change of DF from one half to the other that is more than one half can resolve. */
const LEAST_CHANGE_CELLS = 3;

/**
 * True where both halves have a rhythm of their own, of different bands and clearly apart, and one
 * is not the other's harmonic.
 */
function changesInside(input: EpochInput, settings: Settings): boolean {
  const halves = input.halves();
  if (!halves) return false;
  const band = searchBand(settings);
  const [before, after] = halves.map((half) =>
    outstandingPeak(half, band, settings.epoch.falseAlarm / 2),
  );
  if (!before.outstanding || !after.outstanding || !before.peak || !after.peak) return false;
  const [low, high] =
    before.peak.cpm < after.peak.cpm ? [before.peak, after.peak] : [after.peak, before.peak];
  if (high.cpm - low.cpm < (LEAST_CHANGE_CELLS * 60) / input.lengthS) return false;
  if (rhythmOf(low.cpm, settings.rhythmBands) === rhythmOf(high.cpm, settings.rhythmBands))
    return false;
  const doubled = halfPeaks(high, [low]).length > 0;
  return !(doubled && isLocked(input.samples, input.rateHz, input.lengthS, low.cpm));
}

function flagsOf(input: EpochInput, peak: SpectrumPeak, harmonic: boolean, settings: Settings) {
  const { density, binCpm, rateHz, lengthS } = input;
  const densityAt = (cpm: Cpm) => density[Math.round(cpm / binCpm)] ?? 0;
  const flags: EpochFlag[] = [];
  if (harmonic) flags.push('harmonic');
  if (!harmonic && atHalfOfCrests(peak.cpm, input.crestCpm)) flags.push('half');
  if (atBreathing(peak, input.breathingCpm, { rateHz, lengthS, densityAt }))
    flags.push('breathing');
  if (onDrift(density, binCpm, peak, settings.rhythmBands)) flags.push('drift');
  return flags;
}

/**
 * DF, DP, peak share, rhythm and flags of one kept epoch. The dominant peak is the highest local
 * maximum of the search band; a locked double gives way to its lower peak; without a peak that
 * stands out of the local background there is no rhythm; a peak that may be breathing or drift is
 * not decidable; two rhythms in its halves make it mixed.
 */
export function epochRhythm(input: EpochInput, settings: Settings): EpochRhythm {
  const { density, binCpm } = input;
  const band = searchBand(settings);
  const filled: readonly EpochFlag[] = input.spoiledFraction > 0 ? ['filled'] : [];
  const found = outstandingPeak(input, band, settings.epoch.falseAlarm);
  if (!found.peak)
    return { dfCpm: null, dpDb: null, peakShare: null, rhythm: 'none', flags: filled };
  const lower = found.outstanding ? fundamentalOf(input, found.peak, settings) : null;
  const peak = lower ?? found.peak;
  const flags = found.outstanding ? flagsOf(input, peak, lower !== null, settings) : [];
  return {
    dfCpm: peak.cpm,
    dpDb: densityDb(peak.density),
    peakShare: peakShare(density, binCpm, peak.cpm, band),
    rhythm: found.outstanding ? decide(input, peak, flags, settings) : 'none',
    flags: [...flags, ...filled],
  };
}

function decide(
  input: EpochInput,
  peak: SpectrumPeak,
  flags: readonly EpochFlag[],
  settings: Settings,
): Rhythm {
  if (flags.includes('breathing') || flags.includes('drift')) return 'undecided';
  if (changesInside(input, settings)) return 'mixed';
  return rhythmOf(peak.cpm, settings.rhythmBands);
}
