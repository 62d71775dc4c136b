import { mean, median, standardDeviation } from '../numeric/statistics';
import {
  type Figures,
  type FigureValue,
  numberFigure,
  PARTLY_SPOILED,
  withheld,
} from '../recording/figure';
import type { Adequacy } from '../recording/findings';
import type { BreathingSeries } from '../recording/heart-series';
import type { Epoch, EpochFlag, Rhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import type { Seconds } from '../units/time';
import { type StomachCoverage, stomachCoverage } from './coverage';
import { densityOfDb } from './decibel';
import { densityDb } from './dominant-peak';
import { bandShares, type MeanSpectrum, meanSpectrum } from './mean-spectrum';
import { hasRhythm } from './rhythm-class';
import type { EpochAnalysis } from './slow-wave-rhythm';

export interface StomachFiguresOptions {
  readonly analysis: EpochAnalysis;
  /** A phase, or a named part of one: the epochs wholly inside it count. */
  readonly phase: { readonly name: string; readonly fromS: Seconds; readonly toS: Seconds };
  /** Spoiled stretches that act on the stomach's figures of this lead. */
  readonly spoiled: readonly Interval[];
  readonly settings: Settings;
}

export interface StomachFigures {
  readonly figures: Figures;
  readonly keptS: Seconds;
  readonly adequacy: Adequacy;
}

/** Kept epochs of a phase with their spectra. */
export interface KeptEpochs {
  readonly epochs: readonly Epoch[];
  readonly spectra: readonly Float64Array[];
}

const EDGE_S = 1e-6;
const plural = (count: number, what: string) => `${count} ${what}${count === 1 ? '' : 's'}`;

/** The kept epochs that lie wholly inside a stretch. */
export function keptEpochs(analysis: EpochAnalysis, fromS: Seconds, toS: Seconds): KeptEpochs {
  const epochs: Epoch[] = [];
  const spectra: Float64Array[] = [];
  analysis.rhythm.epochs.forEach((epoch, i) => {
    const spectrum = analysis.epochSpectra[i];
    const inside = epoch.fromS >= fromS - EDGE_S && epoch.toS <= toS + EDGE_S;
    if (!epoch.kept || !spectrum || !inside) return;
    epochs.push(epoch);
    spectra.push(spectrum);
  });
  return { epochs, spectra };
}

/** 100 SD / mean with n - 1, in percent. */
export function instabilityPercent(values: ArrayLike<number>): number {
  return (100 * standardDeviation(values)) / mean(values);
}

const FLAG_WORDS: readonly (readonly [EpochFlag, string])[] = [
  ['harmonic', 'larger harmonic'],
  ['half', 'peak at half the crest rate'],
  ['filled', PARTLY_SPOILED],
];

/** How many of the epochs carry each flag that acts, as marks. */
function flagMarks(epochs: readonly Epoch[]): string[] {
  return FLAG_WORDS.flatMap(([flag, words]) => {
    const count = epochs.filter((epoch) => epoch.flags.includes(flag)).length;
    return count > 0 ? [`${words} in ${plural(count, 'epoch')}`] : [];
  });
}

/** Why no epoch gives a DF: none is kept, or what they are instead of a rhythm. */
function noRhythm(epochs: readonly Epoch[]): string {
  if (epochs.length === 0) return NOTHING_KEPT;
  const counts = WITHOUT_RHYTHM.flatMap(([rhythm, words]) => {
    const count = epochs.filter((epoch) => epoch.rhythm === rhythm).length;
    return count > 0 ? [{ count, words }] : [];
  });
  if (counts.length === 1) return `every kept epoch is ${counts[0].words}`;
  const list = counts.map(({ count, words }) => `${count} ${words}`).join(', ');
  return `no kept epoch has a rhythm of one band: ${list}`;
}

const WITHOUT_RHYTHM: readonly (readonly [Rhythm, string])[] = [
  ['none', 'without rhythm'],
  ['mixed', 'mixed'],
  ['undecided', 'not decidable (may be breathing or drift)'],
];
const TOO_FEW = 'fewer than two epochs have a rhythm';
const NOTHING_KEPT = 'no epoch is kept';

function frequencyFigures(
  epochs: readonly Epoch[],
  { marks, overHalfLost }: StomachCoverage,
): Figures {
  const steady = epochs.filter(hasRhythm);
  const df = steady.flatMap(({ dfCpm }) => (dfCpm === null ? [] : [dfCpm]));
  const dp = steady.flatMap(({ dpDb }) => (dpDb === null ? [] : [densityOfDb(dpDb)]));
  const basis = plural(steady.length, 'epoch');
  const from = (least: number, value: () => number, extra: readonly string[] = []): FigureValue =>
    df.length >= least
      ? numberFigure(value(), basis, [...marks, ...extra])
      : withheld(df.length === 0 ? noRhythm(epochs) : TOO_FEW);
  const instability = (values: readonly number[]) =>
    overHalfLost === null ? from(2, () => instabilityPercent(values)) : withheld(overHalfLost);
  return {
    df_median_cpm: from(1, () => median(df), flagMarks(steady)),
    df_mean_cpm: from(1, () => mean(df)),
    df_sd_cpm: from(2, () => standardDeviation(df)),
    df_instability_pct: instability(df),
    dp_instability_pct: instability(dp),
    dp_median_epoch_db: from(1, () => densityDb(median(dp))),
  };
}

const MAY_BE_BREATHING =
  'slow breathing (5-8 a minute) cannot be told from tachygastria here: breathing is not known';

/** True where the breathing rate is told nowhere from one time to another. */
function isBreathingUnknown(
  breathing: BreathingSeries | null,
  { fromS, toS }: StomachFiguresOptions['phase'],
): boolean {
  if (breathing === null || breathing.from === 'none') return true;
  const { centresS, perMinute } = breathing;
  return !centresS.some((t, i) => t >= fromS && t < toS && Number.isFinite(perMinute[i]));
}

function timeFigure(
  epochs: readonly Epoch[],
  rhythm: Rhythm,
  coverage: StomachCoverage,
  breathingUnknown: boolean,
): FigureValue {
  if (coverage.percentages === 'withheld') return withheld(coverage.reason);
  if (epochs.length === 0) return withheld(NOTHING_KEPT);
  const count = epochs.filter((epoch) => epoch.rhythm === rhythm).length;
  const doubt = rhythm === 'tachy' && count > 0 && breathingUnknown ? [MAY_BE_BREATHING] : [];
  const marks = [...coverage.marks, ...doubt];
  if (coverage.percentages === 'count')
    return { kind: 'count', count, of: epochs.length, what: 'epochs', marks };
  const basis = `${count} of ${plural(epochs.length, 'epoch')}`;
  return numberFigure((100 * count) / epochs.length, basis, marks);
}

function spectrumFigures(
  spectrum: MeanSpectrum | null,
  settings: Settings,
  { marks, overHalfLost }: StomachCoverage,
): Figures {
  if (!spectrum) {
    const none = withheld(NOTHING_KEPT);
    return {
      dp_mean_spectrum_db: none,
      df_mean_spectrum_cpm: none,
      share_brady_pct: none,
      share_normo_pct: none,
      share_tachy_pct: none,
    };
  }
  const basis = plural(spectrum.epochs, 'epoch');
  const { peak } = spectrum;
  const shares = bandShares(spectrum.density, spectrum.binCpm, settings.rhythmBands);
  const share = (value: number) => {
    if (overHalfLost !== null) return withheld(overHalfLost);
    return Number.isFinite(value)
      ? numberFigure(100 * value, basis, marks)
      : withheld('no power in the search band');
  };
  const peakless = withheld('the mean spectrum has no peak in the search band');
  return {
    dp_mean_spectrum_db: peak ? numberFigure(peak.dpDb, basis, marks) : peakless,
    df_mean_spectrum_cpm: peak ? numberFigure(peak.dfCpm, basis, marks) : peakless,
    share_brady_pct: share(shares.brady),
    share_normo_pct: share(shares.normo),
    share_tachy_pct: share(shares.tachy),
  };
}

/**
 * All stomach figures of a phase or a part of it, by key of the figure catalogue, over the kept
 * epochs that lie wholly inside. DF statistics are over epochs with a rhythm of one band; percent
 * of time over all kept epochs, as counts or withheld where coverage says so; no figure in percent
 * where over half of the phase is lost; power is averaged before decibels are taken.
 */
export function stomachFigures(options: StomachFiguresOptions): StomachFigures {
  const { analysis, phase, spoiled, settings } = options;
  const coverage = stomachCoverage(phase, [...spoiled, ...analysis.missing]);
  const { epochs, spectra } = keptEpochs(analysis, phase.fromS, phase.toS);
  const spectrum = meanSpectrum(spectra, analysis.binCpm, settings.rhythmBands);
  const breathingUnknown = isBreathingUnknown(analysis.breathing, phase);
  const time = (rhythm: Rhythm) => timeFigure(epochs, rhythm, coverage, breathingUnknown);
  return {
    figures: {
      ...frequencyFigures(epochs, coverage),
      time_normo_pct: time('normo'),
      time_brady_pct: time('brady'),
      time_tachy_pct: time('tachy'),
      time_none_pct: time('none'),
      time_mixed_pct: time('mixed'),
      time_undecided_pct: time('undecided'),
      ...spectrumFigures(spectrum, settings, coverage),
      stomach_kept_min: numberFigure(
        coverage.keptS / 60,
        `of ${((phase.toS - phase.fromS) / 60).toFixed(1)} min`,
        coverage.marks,
      ),
    },
    keptS: coverage.keptS,
    adequacy: coverage.adequacy,
  };
}
