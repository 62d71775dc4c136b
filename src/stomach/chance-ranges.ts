import {
  type ChanceRange,
  type ChanceScale,
  chanceRange,
  type Drawable,
  type Ordered,
} from '../numeric/chance-range';
import { mean, median, standardDeviation, wilson } from '../numeric/statistics';
import { type Figures, numberOf } from '../recording/figure';
import type { Rhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import type { Seconds } from '../units/time';
import { densityOfDb } from './decibel';
import { bandSum, densityDb, dominantPeak } from './dominant-peak';
import { effectiveLooks } from './effective-looks';
import { instabilityPercent, type KeptEpochs, keptEpochs } from './figures';
import { meanSpectrum } from './mean-spectrum';
import { hasRhythm } from './rhythm-class';
import type { EpochAnalysis } from './slow-wave-rhythm';

/** Fewer epochs say nothing of how they scatter. */
const FEWEST_EPOCHS = 8;
/** Minutes for one independent look at the rhythm. */
const MINUTES_A_LOOK = 4;
/** So far about its peak the mean spectrum is drawn anew. */
const ABOUT_PEAK_CPM = 0.8;

export interface StomachRangesInput {
  readonly analysis: EpochAnalysis;
  readonly part: { readonly fromS: Seconds; readonly toS: Seconds };
  /** The part's figures as printed. */
  readonly figures: Figures;
  readonly keptS: Seconds;
  readonly settings: Settings;
}

type Told = readonly [key: string, range: ChanceRange | null];

/** Every percentage of time, by the rhythm it counts. */
const TIME_OF: readonly (readonly [string, Rhythm])[] = [
  ['time_normo_pct', 'normo'],
  ['time_brady_pct', 'brady'],
  ['time_tachy_pct', 'tachy'],
  ['time_none_pct', 'none'],
  ['time_mixed_pct', 'mixed'],
  ['time_undecided_pct', 'undecided'],
];

/**
 * Nominal 95 % ranges by chance of a part's stomach figures, by key; a figure of which none can be told is not there. Epochs
 * are drawn in blocks that share samples (`chanceRange`); percentages of time by Wilson 1927 with a look every four kept
 * minutes, fewer where runs are longer. A figure a step.
 */
export function* stomachChanceRanges(
  input: StomachRangesInput,
): Generator<number, Readonly<Record<string, ChanceRange>>> {
  const { analysis, part, figures } = input;
  const kept = keptEpochs(analysis, part.fromS, part.toS);
  const groups = [timeRanges, spectrumRanges, rhythmRanges];
  const told: [string, ChanceRange][] = [];
  for (const [place, rangesOf] of groups.entries())
    for (const [key, range] of rangesOf(input, kept)) {
      if (range && figures[key] && figures[key].kind !== 'withheld') told.push([key, range]);
      yield (place + 1) / groups.length;
    }
  return Object.fromEntries(told);
}

function* timeRanges(
  { figures, keptS, settings }: StomachRangesInput,
  { epochs }: KeptEpochs,
): Generator<Told> {
  if (epochs.length === 0) return;
  for (const [key, rhythm] of TIME_OF) {
    const share = numberOf(figures[key]) / 100;
    if (Number.isNaN(share)) continue;
    const most = keptS / 60 / MINUTES_A_LOOK;
    const looks = effectiveLooks(epochs, rhythm, most, settings.epoch.lengthS);
    const { low, high } = wilson(looks * Math.min(1, share), looks);
    yield [key, { low: 100 * low, high: 100 * high, degrees: null }];
  }
}

const orderedOf = (count: number, { epoch }: Settings): Ordered => ({
  count,
  blockLength: Math.max(1, Math.round(epoch.lengthS / epoch.stepS)),
  minutes: (count * epoch.stepS) / 60,
});

/** A statistic of some values as the bootstrap asks for it. */
function drawnFrom(
  values: Float64Array,
  of: (drawn: Float64Array) => number,
): (places: Int32Array) => number {
  const drawn = new Float64Array(values.length);
  return (places) => {
    for (let i = 0; i < places.length; i += 1) drawn[i] = values[places[i]];
    return of(drawn);
  };
}

/** Figures of the epochs that have a rhythm. */
function* rhythmRanges(
  { figures, settings }: StomachRangesInput,
  { epochs }: KeptEpochs,
): Generator<Told> {
  const steady = epochs.filter(hasRhythm);
  if (steady.length < FEWEST_EPOCHS) return;
  const df = Float64Array.from(steady, ({ dfCpm }) => dfCpm ?? Number.NaN);
  const dp = Float64Array.from(steady, ({ dpDb }) => densityOfDb(dpDb ?? Number.NaN));
  const ordered = orderedOf(steady.length, settings);
  const range = (
    key: string,
    values: Float64Array,
    scale: ChanceScale,
    of: (drawn: Float64Array) => number,
    influence: (value: number) => number,
  ): Told => {
    const from: Drawable = {
      kind: 'places',
      figure: drawnFrom(values, of),
      influence: values.map(influence),
    };
    return [key, chanceRange(from, numberOf(figures[key]), ordered, scale)];
  };
  const [dfMean, dfMedian, dpMean, dpMedian] = [mean(df), median(df), mean(dp), median(dp)];
  const bySide = (middle: number) => (value: number) => Math.sign(value - middle);
  const bySquare = (middle: number) => (value: number) => (value - middle) ** 2;
  yield range('df_median_cpm', df, 'linear', median, bySide(dfMedian));
  yield range('df_mean_cpm', df, 'linear', mean, (value) => value);
  yield range('df_sd_cpm', df, 'log', standardDeviation, bySquare(dfMean));
  yield range('df_instability_pct', df, 'log', instabilityPercent, bySquare(dfMean));
  yield range('dp_instability_pct', dp, 'log', instabilityPercent, bySquare(dpMean));
  yield range('dp_median_epoch_db', dp, 'linear', (x) => densityDb(median(x)), bySide(dpMedian));
}

/** Figures of the mean spectrum. */
function* spectrumRanges(
  { analysis, figures, settings }: StomachRangesInput,
  { spectra }: KeptEpochs,
): Generator<Told> {
  if (spectra.length < FEWEST_EPOCHS) return;
  const { binCpm } = analysis;
  const ordered = orderedOf(spectra.length, settings);
  const bands = settings.rhythmBands;
  const all = Float64Array.from(spectra, (one) => bandSum(one, binCpm, bands));
  const share = (key: string, lowCpm: number, highCpm: number): Told => {
    const above = Float64Array.from(spectra, (one) => bandSum(one, binCpm, { lowCpm, highCpm }));
    const from: Drawable = {
      kind: 'sums',
      above,
      below: all,
      figure: (some, whole) => (100 * some) / whole,
    };
    return [key, chanceRange(from, numberOf(figures[key]), ordered, 'percent')];
  };
  yield* peakRanges(spectra, binCpm, { figures, ordered, settings });
  yield share('share_brady_pct', bands.lowCpm, bands.normoLowCpm);
  yield share('share_normo_pct', bands.normoLowCpm, bands.normoHighCpm);
  yield share('share_tachy_pct', bands.normoHighCpm, bands.highCpm);
}

interface OfSpectra {
  readonly figures: Figures;
  readonly ordered: Ordered;
  readonly settings: Settings;
}

/** Height and place of the peak of the mean spectrum, from what lies about it. */
function* peakRanges(
  spectra: readonly Float64Array[],
  binCpm: number,
  { figures, ordered, settings }: OfSpectra,
): Generator<Told> {
  const dfCpm = meanSpectrum(spectra, binCpm, settings.rhythmBands)?.peak?.dfCpm;
  if (dfCpm === undefined) return;
  const first = Math.max(0, Math.round((dfCpm - ABOUT_PEAK_CPM) / binCpm));
  const about = spectra.map((one) =>
    one.subarray(first, Math.round((dfCpm + ABOUT_PEAK_CPM) / binCpm) + 1),
  );
  const peak = Math.round(dfCpm / binCpm) - first;
  const top = Float64Array.from(about, (one) => one[peak]);
  const slope = Float64Array.from(about, (one) => one[peak + 1] - one[peak - 1]);
  const sum = new Float64Array(about[0].length);
  const drawnPeak = (places: Int32Array) => {
    sum.fill(0);
    for (let i = 0; i < places.length; i += 1) {
      const one = about[places[i]];
      for (let k = 0; k < sum.length; k += 1) sum[k] += one[k];
    }
    return dominantPeak(sum, binCpm, { lowCpm: 0, highCpm: sum.length * binCpm });
  };
  const range = (
    key: string,
    influence: Float64Array,
    figure: (places: Int32Array) => number,
  ): Told => {
    const from: Drawable = { kind: 'places', figure, influence };
    return [key, chanceRange(from, numberOf(figures[key]), ordered, 'linear')];
  };
  yield range('dp_mean_spectrum_db', top, (places) =>
    densityDb(drawnPeak(places)?.density ?? Number.NaN),
  );
  yield range('df_mean_spectrum_cpm', slope, (places) => drawnPeak(places)?.cpm ?? Number.NaN);
}
