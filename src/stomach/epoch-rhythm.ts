import type { EpochFlag, Rhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';
import { besidePeak, independentValues, type Spectrum, standsOut } from './background';
import {
  type Band,
  bandPeaks,
  densityDb,
  highestPeak,
  peakShare,
  type SpectrumPeak,
} from './dominant-peak';
import { atBreathing, atHalfOfCrests, onDrift } from './epoch-flags';
import { halfPeaks, isLocked, type SampledPart } from './harmonic';
import { rhythmOf } from './rhythm-class';
import { steadyPeak } from './steady-wave';
import { leastBackground, type WindowRow } from './window-row';

/** An epoch or one half of it. */
export type EpochPart = Spectrum & SampledPart;

/** One kept epoch, ready to be judged. */
export interface EpochInput extends EpochPart {
  readonly crestCpm: Cpm | null;
  /** Between which rates the breathing lies; null where it is not known. */
  readonly breathing: Band | null;
  /** Its two halves; null where one of them is too spoiled. Asked for only when needed. */
  readonly halves: () => readonly [EpochPart, EpochPart] | null;
  /** The epoch among the windows beside it; null where these are too few to say anything. */
  readonly row: WindowRow | null;
}

export interface EpochRhythm {
  readonly dfCpm: Cpm | null;
  readonly dpDb: number | null;
  readonly peakShare: number | null;
  readonly rhythm: Rhythm;
  readonly flags: readonly EpochFlag[];
}

const searchBand = (settings: Settings): Band => settings.rhythmBands;

/** The peak that gives a part its rhythm, or only the highest where none stands out. */
interface Dominant {
  readonly peak: SpectrumPeak;
  readonly outstanding: boolean;
  /** True where it stands out by itself, without the windows beside it. */
  readonly alone: boolean;
  /** True where a higher peak, its locked double, has given way to it. */
  readonly harmonic: boolean;
}

/**
 * The lower peak whose locked double `peak` is, or null. The place of the lower peak is given by
 * the double, so it is tested as one value and not as the highest of many.
 */
function fundamentalOf(part: EpochPart, peak: SpectrumPeak, settings: Settings) {
  const peaks = bandPeaks(besidePeak(part, peak.cpm), part.binCpm, searchBand(settings));
  const { falseAlarm } = settings.epoch;
  return (
    halfPeaks(peak, peaks).find(
      (lower) =>
        standsOut(part, lower, { falseAlarm, independent: 1, besideCpm: [peak.cpm] }) &&
        isLocked(part, lower.cpm),
    ) ?? null
  );
}

/** What else is known when a part is judged: the row of an epoch, or the epoch that a half is of. */
interface Around {
  readonly row?: WindowRow | null;
  readonly whole?: EpochPart;
}

function dominantOf(
  part: EpochPart,
  falseAlarm: number,
  settings: Settings,
  { row = null, whole }: Around,
): Dominant | null {
  const band = searchBand(settings);
  const peaks = bandPeaks(part.density, part.binCpm, band);
  const highest = highestPeak(peaks);
  if (!highest) return null;
  const alone = standsOut(part, highest, {
    falseAlarm,
    independent: independentValues(band, part.lengthS),
    ...(whole && { whole }),
    ...(row && { leastBackground: () => leastBackground(row, part.density, highest) }),
  });
  const peak = alone ? highest : row && steadyPeak(row, part.density, peaks, falseAlarm);
  if (!peak) return { peak: highest, outstanding: false, alone, harmonic: false };
  const lower = fundamentalOf(part, peak, settings);
  return { peak: lower ?? peak, outstanding: true, alone, harmonic: lower !== null };
}

/** Least change of DF from one half to the other that is more than one half can resolve. */
const LEAST_CHANGE_CELLS = 3;
/** From one half to the other a wave and its harmonic may wander apart by this share of the double, and at least so much. */
const DOUBLE_ACROSS_HALVES = { share: 0.15, leastCpm: 0.75 };
/** A line whose power falls below this share from one half to the other is not there in the other. */
const GONE = 0.2;
/** So far the wave of the slower half may have wandered in the other. */
const WANDER_CPM = 0.3;

interface HalfRhythm {
  readonly half: EpochPart;
  readonly peak: SpectrumPeak;
}

/** True where the faster half's peak is a harmonic of the slower's rhythm, which is there in it as well. */
function isSameWave(slower: HalfRhythm, faster: HalfRhythm): boolean {
  const double = 2 * slower.peak.cpm;
  const { share, leastCpm } = DOUBLE_ACROSS_HALVES;
  if (Math.abs(faster.peak.cpm - double) > Math.max(share * double, leastCpm)) return false;
  const { half, peak } = faster;
  const from = Math.max(1, Math.round((slower.peak.cpm - WANDER_CPM) / half.binCpm));
  const to = Math.round((slower.peak.cpm + WANDER_CPM) / half.binCpm);
  const near = besidePeak(half, peak.cpm).subarray(from, to + 1);
  return near.some((density) => density >= GONE * slower.peak.density);
}

/** True where two peaks are of different bands and clearly apart. */
function differ(a: SpectrumPeak, b: SpectrumPeak, lengthS: Seconds, settings: Settings): boolean {
  if (Math.abs(a.cpm - b.cpm) < (LEAST_CHANGE_CELLS * 60) / lengthS) return false;
  return rhythmOf(a.cpm, settings.rhythmBands) !== rhythmOf(b.cpm, settings.rhythmBands);
}

/**
 * True where both halves have a rhythm of their own, of different bands and clearly apart, and one
 * is not the other's harmonic. Breathing is no rhythm here.
 */
function changesInside(input: EpochInput, settings: Settings): boolean {
  const halves = input.halves();
  if (!halves) return false;
  const [first, second] = halves.map((half) =>
    highestPeak(bandPeaks(half.density, half.binCpm, searchBand(settings))),
  );
  if (!first || !second || !differ(first, second, input.lengthS, settings)) return false;
  const found = halves.flatMap((half): HalfRhythm[] => {
    const dominant = dominantOf(half, settings.epoch.falseAlarm / 2, settings, { whole: input });
    if (!dominant?.outstanding || atBreathing(half, dominant.peak.cpm, input.breathing, true))
      return [];
    return [{ half, peak: dominant.peak }];
  });
  if (found.length < 2) return false;
  const [slower, faster] = found.sort((a, b) => a.peak.cpm - b.peak.cpm);
  return differ(slower.peak, faster.peak, input.lengthS, settings) && !isSameWave(slower, faster);
}

function flagsOf(input: EpochInput, { peak, alone, harmonic }: Dominant, settings: Settings) {
  const { density, binCpm } = input;
  const flags: EpochFlag[] = [];
  if (harmonic) flags.push('harmonic');
  if (!harmonic && atHalfOfCrests(peak.cpm, input.crestCpm)) flags.push('half');
  if (atBreathing(input, peak.cpm, input.breathing, alone)) flags.push('breathing');
  if (onDrift(density, binCpm, peak, settings.rhythmBands)) flags.push('drift');
  return flags;
}

/**
 * DF, DP, peak share, rhythm and flags of one kept epoch. The dominant peak is the highest local
 * maximum of the search band where that stands out by itself, else the one for which the epoch and
 * the independent windows beside it have the most evidence, where that is enough; a locked double
 * gives way to its lower peak; two rhythms in its halves make it mixed; without such a peak there is
 * no rhythm; a peak that may be breathing or drift is not decidable.
 */
export function epochRhythm(input: EpochInput, settings: Settings): EpochRhythm {
  const { density, binCpm } = input;
  const filled: readonly EpochFlag[] = input.spoiledFraction > 0 ? ['filled'] : [];
  const found = dominantOf(input, settings.epoch.falseAlarm, settings, input);
  if (!found) return { dfCpm: null, dpDb: null, peakShare: null, rhythm: 'none', flags: filled };
  const { peak, outstanding } = found;
  const flags = outstanding ? flagsOf(input, found, settings) : [];
  return {
    dfCpm: peak.cpm,
    dpDb: densityDb(peak.density),
    peakShare: peakShare(density, binCpm, peak.cpm, searchBand(settings)),
    rhythm: decide(input, found, flags, settings),
    flags: [...flags, ...filled],
  };
}

function decide(
  input: EpochInput,
  { peak, outstanding }: Dominant,
  flags: readonly EpochFlag[],
  settings: Settings,
): Rhythm {
  if (flags.includes('breathing') || flags.includes('drift')) return 'undecided';
  if (changesInside(input, settings)) return 'mixed';
  return outstanding ? rhythmOf(peak.cpm, settings.rhythmBands) : 'none';
}
