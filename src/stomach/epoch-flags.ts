import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { median, quantile } from '../numeric/statistics';
import type { BreathingSeries } from '../recording/heart-series';
import type { RhythmBands } from '../recording/settings';
import { type Cpm, type Hertz, hzToCpm } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Spectrum } from './background';
import { type Band, bandSum, type SpectrumPeak } from './dominant-peak';
import { isLocked, type SampledPart } from './harmonic';

/** DF and half of the crest rate count as equal within this share. */
const HALF_TOLERANCE = 0.07;
const LEAST_CRESTS = 4;

/** Crests per minute between the first and the last crest of [fromS, toS); null where there are under four. */
export function crestRateCpm(crestsS: Float64Array, fromS: Seconds, toS: Seconds): Cpm | null {
  const first = firstAtOrAfter(crestsS, fromS);
  const last = firstAtOrAfter(crestsS, toS) - 1;
  if (last - first + 1 < LEAST_CRESTS) return null;
  return (60 * (last - first)) / (crestsS[last] - crestsS[first]);
}

/** True where the spectrum's peak lies at half of the rate of the crests: every second one differs. */
export function atHalfOfCrests(dfCpm: Cpm, crestCpm: Cpm | null): boolean {
  return crestCpm !== null && Math.abs(2 * dfCpm - crestCpm) <= HALF_TOLERANCE * crestCpm;
}

/** Rates further than this from the median are another rhythm taken for breathing, not its own unrest. */
const MOST_UNREST_PER_MIN = 0.8;

/**
 * Between which rates the breathing of an epoch lies, from the tenth to the ninetieth percentile of
 * what is told, at most 0.8 a minute from the median; null where under half of it can be told.
 */
export function breathingOf(
  breathing: BreathingSeries | null,
  fromS: Seconds,
  toS: Seconds,
): Band | null {
  if (!breathing || breathing.from === 'none') return null;
  const first = firstAtOrAfter(breathing.centresS, fromS);
  const end = firstAtOrAfter(breathing.centresS, toS);
  const rates = breathing.perMinute.subarray(first, end).filter(Number.isFinite);
  if (rates.length === 0 || 2 * rates.length < end - first) return null;
  const middle = median(rates);
  return {
    lowCpm: Math.max(quantile(rates, 0.1), middle - MOST_UNREST_PER_MIN),
    highCpm: Math.min(quantile(rates, 0.9), middle + MOST_UNREST_PER_MIN),
  };
}

/** Where lines of a band show after sampling at `rateHz`. */
function aliasOf({ lowCpm, highCpm }: Band, rateHz: Hertz): Band {
  const sampling = hzToCpm(rateHz);
  const seen = (cpm: Cpm) => Math.abs(cpm - sampling * Math.round(cpm / sampling));
  const [a, b] = [seen(lowCpm), seen(highCpm)];
  return { lowCpm: Math.min(a, b), highCpm: Math.max(a, b) };
}

/** A band with a margin of one resolution cell and half of its own width: a minute's rates are means. */
function widened({ lowCpm, highCpm }: Band, cellCpm: Cpm): Band {
  const margin = cellCpm + (highCpm - lowCpm) / 2;
  return { lowCpm: lowCpm - margin, highCpm: highCpm + margin };
}

const inside = (cpm: Cpm, { lowCpm, highCpm }: Band) => cpm >= lowCpm && cpm <= highCpm;

/** Breathing that changes its rate spreads so far beyond it; a peak there is its flank where it is so many times lower. */
const FLANK_CPM = 1.5;
const FLANK_TIMES = 4;

function onFlank(
  { density, binCpm }: Spectrum,
  peakCpm: Cpm,
  { lowCpm, highCpm }: Band,
  times: number,
): boolean {
  if (!inside(peakCpm, { lowCpm: lowCpm - FLANK_CPM, highCpm: highCpm + FLANK_CPM })) return false;
  const least = times * density[Math.round(peakCpm / binCpm)];
  const from = Math.max(0, Math.round(lowCpm / binCpm));
  return density.subarray(from, Math.round(highCpm / binCpm)).some((value) => value > least);
}

/** Least power at the breathing rate, as a share of that at its double, for the double to be breathing (our rule). */
const LEAST_SHARE_OF_DOUBLE = 0.1;

/**
 * True where a peak may be breathing: at its rate or the alias of it, or on the flank of it; at half of it where the power
 * at the rate itself is at least that at the half and locked to it, as where every breath has two
 * humps; at its
 * double where the power at the rate is at least a tenth of that at the double.
 */
export function atBreathing(
  part: Spectrum & SampledPart,
  peakCpm: Cpm,
  breathing: Band | null,
  standsAlone: boolean,
): boolean {
  if (breathing === null) return false;
  const { density, binCpm, lengthS, rateHz } = part;
  const seen = aliasOf(breathing, rateHz);
  const at = (ratio: number) =>
    widened({ lowCpm: ratio * seen.lowCpm, highCpm: ratio * seen.highCpm }, 60 / lengthS);
  const power = (ratio: number) => bandSum(density, binCpm, at(ratio));
  if (inside(peakCpm, at(1)) || onFlank(part, peakCpm, at(1), standsAlone ? FLANK_TIMES : 1))
    return true;
  if (inside(peakCpm, at(0.5))) return power(1) >= power(0.5) && isLocked(part, peakCpm);
  return inside(peakCpm, at(2)) && power(1) >= LEAST_SHARE_OF_DOUBLE * power(2);
}

const LEAST_DRIFT_CPM = 0.25;

/**
 * True where a peak below the normal band stands on the flank of something stronger below the
 * search band: drift of the electrodes, not a slow rhythm.
 */
export function onDrift(
  density: Float64Array,
  binCpm: number,
  peak: SpectrumPeak,
  bands: RhythmBands,
): boolean {
  if (peak.cpm >= bands.normoLowCpm) return false;
  const from = Math.ceil(LEAST_DRIFT_CPM / binCpm);
  for (let k = from; k * binCpm < Math.min(bands.lowCpm, peak.cpm - 0.5); k++)
    if (density[k] > peak.density) return true;
  return false;
}
