import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { median } from '../numeric/statistics';
import type { BreathingSeries } from '../recording/heart-series';
import type { RhythmBands } from '../recording/settings';
import { type Cpm, type Hertz, hzToCpm } from '../units/rate';
import type { Seconds } from '../units/time';
import type { SpectrumPeak } from './dominant-peak';

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

/** Median breathing rate of an epoch; null where under half of its values can be told. */
export function breathingOf(
  breathing: BreathingSeries | null,
  fromS: Seconds,
  toS: Seconds,
): Cpm | null {
  if (!breathing || breathing.from === 'none') return null;
  const first = firstAtOrAfter(breathing.centresS, fromS);
  const end = firstAtOrAfter(breathing.centresS, toS);
  const rates = breathing.perMinute.subarray(first, end).filter(Number.isFinite);
  return rates.length > 0 && 2 * rates.length >= end - first ? median(rates) : null;
}

/** Where a line at a rate shows after sampling at `rateHz`. */
function aliasOf(cpm: Cpm, rateHz: Hertz): Cpm {
  const sampling = hzToCpm(rateHz);
  return Math.abs(cpm - sampling * Math.round(cpm / sampling));
}

/**
 * True where a peak may be breathing: at its rate or the alias of it, or at half of it where the
 * breathing line itself is in the lead and at least as strong (a subharmonic weaker than its
 * fundamental). Tolerance one resolution cell (0.25 cpm for 240 s).
 */
export function atBreathing(
  peak: SpectrumPeak,
  breathingCpm: Cpm | null,
  options: {
    readonly rateHz: Hertz;
    readonly lengthS: Seconds;
    readonly densityAt: (cpm: Cpm) => number;
  },
): boolean {
  if (breathingCpm === null) return false;
  const tolerance = 60 / options.lengthS;
  const near = (cpm: Cpm) => Math.abs(peak.cpm - cpm) <= tolerance;
  const seen = aliasOf(breathingCpm, options.rateHz);
  if (near(seen)) return true;
  return near(seen / 2) && options.densityAt(seen) >= peak.density;
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
