import { bandsName, type Settings } from './settings';

export type Organ = 'stomach' | 'heart' | 'breathing';

/** How a figure is compared between fasting and fed. */
export type ChangeRule = 'difference' | 'none';

/** One figure of the program: what it is called, how it is written, what it means. Keys are stable; files carry them. */
export interface FigureDefinition {
  readonly key: string;
  readonly organ: Organ;
  readonly label: string;
  readonly unit: string;
  readonly decimals: number;
  readonly change: ChangeRule;
  /** Shown in the short list of the Findings pane; the rest opens below it. */
  readonly main: boolean;
  readonly definition: string;
  readonly source: string;
  /** The settings that the figure depends on, in words. */
  readonly settings: (settings: Settings) => string;
}

const epochs = (s: Settings) =>
  `Epochs of ${s.epoch.lengthS} s every ${s.epoch.stepS} s; kept up to ${Math.round(100 * s.epoch.maxSpoiled)} % spoiled; false alarm ${Math.round(100 * s.epoch.falseAlarm)} % an epoch`;
const bands = (s: Settings) => `${epochs(s)}; limits ${bandsName(s.rhythmBands)}`;
const beats = () =>
  'NN intervals: between two N beats, neither placed, nothing spoiled, missing or unusable between';
const spectra = (s: Settings) =>
  `Segments of ${s.variability.segmentS} s; LF ${s.variability.lfHz.join('-')} Hz, HF ${s.variability.hfHz.join('-')} Hz; at least ${Math.round(100 * s.variability.minNnShare)} % NN`;

type Row = Omit<FigureDefinition, 'organ'>;
const row = (
  key: string,
  label: string,
  unit: string,
  decimals: number,
  rest: Pick<Row, 'definition' | 'source' | 'settings'> & Partial<Pick<Row, 'change' | 'main'>>,
): Row => ({ key, label, unit, decimals, change: 'difference', main: false, ...rest });

const TASK_FORCE = 'Task Force 1996, Eur Heart J 17:354';
const CUSTOM = 'usual practice of the field; the exact rule is this program’s, see README';

const STOMACH: readonly Row[] = [
  row('df_median_cpm', 'DF, median', 'cpm', 2, {
    main: true,
    definition:
      'Median of the dominant frequency over the kept epochs that have a rhythm. DF is the largest local maximum of the spectrum in the search band, refined by a parabola through the logarithm of three points.',
    source: 'Chen 1996, World J Gastroenterol 2(Suppl 1):9 (concept)',
    settings: epochs,
  }),
  row('df_mean_cpm', 'DF, mean', 'cpm', 2, {
    definition: 'Mean of DF over the kept epochs that have a rhythm.',
    source: CUSTOM,
    settings: epochs,
  }),
  row('df_sd_cpm', 'DF, SD', 'cpm', 2, {
    definition: 'Standard deviation (n − 1) of DF over the kept epochs that have a rhythm.',
    source: CUSTOM,
    settings: epochs,
  }),
  row('df_instability_pct', 'Instability of DF', '%', 0, {
    definition: '100 SD / mean of DF (n − 1) over the kept epochs that have a rhythm.',
    source: 'name: Lim 2012, World J Gastroenterol 18:5948; formula from memory',
    settings: epochs,
  }),
  row('dp_instability_pct', 'Instability of DP', '%', 0, {
    definition:
      '100 SD / mean of DP in linear power (n − 1) over the kept epochs that have a rhythm.',
    source: 'formula from memory',
    settings: epochs,
  }),
  row('time_normo_pct', 'Normogastria', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose DF lies in the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10 (normogastria index)',
    settings: bands,
  }),
  row('time_brady_pct', 'Bradygastria', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose DF lies below the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10',
    settings: bands,
  }),
  row('time_tachy_pct', 'Tachygastria', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose DF lies above the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10',
    settings: bands,
  }),
  row('time_none_pct', 'No rhythm', '% of time', 0, {
    main: true,
    definition:
      'Share of the kept epochs in which no peak stands out of the recording’s own local background.',
    source: CUSTOM,
    settings: bands,
  }),
  row('time_mixed_pct', 'Mixed', '% of time', 0, {
    definition: 'Share of the kept epochs in which the rhythm changes inside the epoch.',
    source: CUSTOM,
    settings: bands,
  }),
  row('time_undecided_pct', 'Not decidable', '% of time', 0, {
    definition: 'Share of the kept epochs whose peak may be breathing or drift.',
    source: CUSTOM,
    settings: bands,
  }),
  row('dp_mean_spectrum_db', 'DP, mean spectrum', 'dB', 1, {
    main: true,
    definition:
      'Power density at the DF of the phase’s mean spectrum, dB re 1 µV²/Hz. The change is the fed-to-fasting power ratio, each at its own DF.',
    source: 'Chen 1996 (concept)',
    settings: epochs,
  }),
  row('df_mean_spectrum_cpm', 'DF, mean spectrum', 'cpm', 2, {
    definition: 'Dominant frequency of the mean of the kept epochs’ spectra.',
    source: CUSTOM,
    settings: epochs,
  }),
  row('dp_median_epoch_db', 'DP, median epoch', 'dB', 1, {
    definition:
      'Median over the kept epochs with a rhythm of the power density at DF, dB re 1 µV²/Hz. The change is the median-epoch power ratio.',
    source: CUSTOM,
    settings: epochs,
  }),
  row('share_brady_pct', 'Power share, brady', '%', 0, {
    definition:
      'Power of the mean spectrum below the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  }),
  row('share_normo_pct', 'Power share, normo', '%', 0, {
    definition: 'Power of the mean spectrum in the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  }),
  row('share_tachy_pct', 'Power share, tachy', '%', 0, {
    definition:
      'Power of the mean spectrum above the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  }),
  row('stomach_kept_min', 'Kept, stomach', 'min', 1, {
    main: true,
    change: 'none',
    definition:
      'Minutes of the phase on the reported lead that no spoiled span for the stomach covers.',
    source: CUSTOM,
    settings: epochs,
  }),
];

const HEART: readonly Row[] = [
  row('heart_rate_bpm', 'Heart rate', '1/min', 1, {
    main: true,
    definition: '60000 / mean NN.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('nn_mean_ms', 'Mean NN', 'ms', 0, {
    definition: 'Mean of the NN intervals.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('rmssd_ms', 'RMSSD', 'ms', 1, {
    main: true,
    definition:
      'Root of the mean square of differences between adjacent NN intervals; only pairs that share a beat.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('sdnn_ms', 'SDNN, 5 min', 'ms', 1, {
    main: true,
    definition:
      'Standard deviation (n − 1) of the NN intervals in each 5 min segment, averaged over the segments that carry it.',
    source: TASK_FORCE,
    settings: spectra,
  }),
  row('sdnn_whole_ms', 'SDNN, whole phase', 'ms', 1, {
    change: 'none',
    definition:
      'Standard deviation (n − 1) of all NN intervals of the phase; grows with length, so it carries its minutes and no change.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('sdsd_ms', 'SDSD', 'ms', 1, {
    definition: 'Standard deviation (n − 1) of the differences between adjacent NN intervals.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('pnn50_pct', 'pNN50', '%', 0, {
    definition: 'Share of adjacent NN pairs that differ by more than 50 ms (strictly).',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('sd1_ms', 'SD1', 'ms', 1, {
    definition:
      'Spread across the identity line of the plot of each NN against the next: SDSD / √2.',
    source: 'Brennan 2001, IEEE Trans Biomed Eng',
    settings: beats,
  }),
  row('sd2_ms', 'SD2', 'ms', 1, {
    definition: 'Spread along the identity line: √(2 SDNN² − SDSD² / 2).',
    source: 'Brennan 2001, IEEE Trans Biomed Eng',
    settings: beats,
  }),
  row('triangular_index', 'Triangular index', '', 1, {
    change: 'none',
    definition:
      'Number of NN intervals over the height of their histogram in bins of 1/128 s; needs 20 min.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('lf_ms2', 'LF', 'ms²', 0, {
    main: true,
    definition:
      'Power of the NN intervals in the LF band by Lomb-Scargle on the beats’ times, averaged over segments. The stomach’s 0.05 Hz lies inside this band.',
    source: `${TASK_FORCE}; Lomb 1976; Scargle 1982`,
    settings: spectra,
  }),
  row('hf_ms2', 'HF', 'ms²', 0, {
    main: true,
    definition:
      'Power of the NN intervals in the HF band by Lomb-Scargle on the beats’ times, averaged over segments.',
    source: `${TASK_FORCE}; Lomb 1976; Scargle 1982`,
    settings: spectra,
  }),
  row('lf_hf_ratio', 'LF/HF ratio', '', 2, {
    main: true,
    definition: 'LF over HF, of the averaged powers.',
    source: TASK_FORCE,
    settings: spectra,
  }),
  row('lf_nu_pct', 'LF, normalised', '%', 0, {
    definition: '100 LF / (LF + HF).',
    source: TASK_FORCE,
    settings: spectra,
  }),
  row('hf_nu_pct', 'HF, normalised', '%', 0, {
    definition: '100 HF / (LF + HF).',
    source: TASK_FORCE,
    settings: spectra,
  }),
  row('vlf_ms2', 'VLF', 'ms²', 0, {
    change: 'none',
    definition: 'Power in 0.003 Hz to the LF band; only from segments of 20 min or more.',
    source: TASK_FORCE,
    settings: spectra,
  }),
  row('lf_welch_ms2', 'LF, Welch', 'ms²', 0, {
    definition:
      'Second opinion: LF by Welch’s method on the tachogram resampled at 4 Hz by a cubic spline.',
    source: 'Welch 1967; resampling from memory',
    settings: spectra,
  }),
  row('hf_welch_ms2', 'HF, Welch', 'ms²', 0, {
    definition:
      'Second opinion: HF by Welch’s method on the tachogram resampled at 4 Hz by a cubic spline.',
    source: 'Welch 1967; resampling from memory',
    settings: spectra,
  }),
  row('rmssd_floor_ms', 'RMSSD, timing floor', 'ms', 1, {
    change: 'none',
    definition:
      'The RMSSD that the measured error of the R times alone would give: √6 times its standard deviation.',
    source: 'arithmetic',
    settings: beats,
  }),
  row('hf_floor_ms2', 'HF, timing floor', 'ms²', 0, {
    change: 'none',
    definition: 'The HF power that the measured error of the R times alone would give.',
    source: 'arithmetic',
    settings: spectra,
  }),
  row('nn_share_pct', 'NN share', '%', 0, {
    main: true,
    change: 'none',
    definition: 'NN intervals over all RR intervals of the phase.',
    source: TASK_FORCE,
    settings: beats,
  }),
  row('beats', 'Beats', '', 0, {
    change: 'none',
    definition: 'Beats of every class in the phase.',
    source: 'count',
    settings: beats,
  }),
  row('ectopic_beats', 'Beats S, V, F', '', 0, {
    change: 'none',
    definition: 'Beats of classes S, V and F in the phase.',
    source: 'ANSI/AAMI EC57 classes',
    settings: beats,
  }),
  row('heart_kept_min', 'Kept, heart', 'min', 1, {
    main: true,
    change: 'none',
    definition: 'Minutes of the phase on the heart lead that no spoiled span for the heart covers.',
    source: CUSTOM,
    settings: beats,
  }),
];

const BREATHING: readonly Row[] = [
  row('breathing_bpm', 'Breathing', '1/min', 1, {
    main: true,
    definition:
      'Median breathing rate of the phase, from the breathing lead, else derived from R height and RR intervals (marked derived).',
    source: 'Moody 1985, Comput Cardiol (derived)',
    settings: () => 'Peak between 4 and 40 a minute in windows of 60 s',
  }),
  row('movement_pct', 'Movement', '% of time', 0, {
    main: true,
    definition:
      'Share of the phase under spoiled spans with cause talk, move, cough, eat, electrode, step or burst on the reported lead.',
    source: CUSTOM,
    settings: () => 'Spoiled spans as listed',
  }),
];

const withOrgan = (organ: Organ, rows: readonly Row[]): readonly FigureDefinition[] =>
  rows.map((one) => ({ ...one, organ }));

/** Every figure in the order it is shown. */
export const FIGURES: readonly FigureDefinition[] = [
  ...withOrgan('stomach', STOMACH),
  ...withOrgan('heart', HEART),
  ...withOrgan('breathing', BREATHING),
];

export type FigureKey = string;
