import { type FigureRow, figureRow, OWN_RULE } from './figure-definition';
import type { Settings } from './settings';

const beats = () =>
  'NN intervals: between two N beats, neither placed, nothing spoiled, missing or unusable between, 300 to 2000 ms long';
const spectra = (s: Settings) =>
  `Segments of ${s.variability.segmentS} s; LF ${s.variability.lfHz.join('-')} Hz, HF ${s.variability.hfHz.join('-')} Hz; at least ${Math.round(100 * s.variability.minNnShare)} % NN`;

const TASK_FORCE = 'Task Force 1996, Eur Heart J 17:354';

/** The heart's figures in the order they are shown. */
export const HEART_ROWS: readonly FigureRow[] = [
  figureRow('heart_rate_bpm', 'Heart rate', '1/min', 1, {
    main: true,
    definition: '60000 / mean NN.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('nn_mean_ms', 'Mean NN', 'ms', 0, {
    definition: 'Mean of the NN intervals.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('rmssd_ms', 'RMSSD', 'ms', 1, {
    main: true,
    definition:
      'Root of the mean square of differences between adjacent NN intervals; only pairs that share a beat.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('sdnn_ms', 'SDNN, 5 min', 'ms', 1, {
    main: true,
    definition:
      'Standard deviation (n − 1) of the NN intervals in each 5 min segment, averaged over the segments that carry it.',
    source: TASK_FORCE,
    settings: spectra,
  }),
  figureRow('sdnn_whole_ms', 'SDNN, whole phase', 'ms', 1, {
    change: 'none',
    definition:
      'Standard deviation (n − 1) of all NN intervals of the phase; grows with length, so it carries its minutes and no change.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('sdsd_ms', 'SDSD', 'ms', 1, {
    definition: 'Standard deviation (n − 1) of the differences between adjacent NN intervals.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('pnn50_pct', 'pNN50', '%', 0, {
    definition: 'Share of adjacent NN pairs that differ by more than 50 ms (strictly).',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('sd1_ms', 'SD1', 'ms', 1, {
    definition:
      'Spread across the identity line of the plot of each NN against the next: SDSD / √2.',
    source: 'Brennan 2001, IEEE Trans Biomed Eng',
    settings: beats,
  }),
  figureRow('sd2_ms', 'SD2', 'ms', 1, {
    change: 'none',
    definition:
      'Spread along the identity line: √(2 SDNN² − SDSD² / 2), with SDNN of the whole phase; grows with length, so it carries its minutes and no change.',
    source: 'Brennan 2001, IEEE Trans Biomed Eng',
    settings: beats,
  }),
  figureRow('triangular_index', 'Triangular index', '', 1, {
    change: 'none',
    definition:
      'Number of NN intervals over the height of their histogram in bins of 1/128 s; needs 20 min.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('lf_ms2', 'LF', 'ms²', 0, {
    main: true,
    definition:
      'Power of the NN intervals in the LF band by Lomb-Scargle on the beats’ times, averaged over segments. The stomach’s 0.05 Hz lies inside this band.',
    source: `${TASK_FORCE}; Lomb 1976; Scargle 1982`,
    settings: spectra,
  }),
  figureRow('hf_ms2', 'HF', 'ms²', 0, {
    main: true,
    definition:
      'Power of the NN intervals in the HF band by Lomb-Scargle on the beats’ times, averaged over segments.',
    source: `${TASK_FORCE}; Lomb 1976; Scargle 1982`,
    settings: spectra,
  }),
  figureRow('lf_hf_ratio', 'LF/HF ratio', '', 2, {
    main: true,
    definition: 'LF over HF, of the averaged powers.',
    source: TASK_FORCE,
    settings: spectra,
  }),
  figureRow('lf_nu_pct', 'LF, normalised', '%', 0, {
    definition: '100 LF / (LF + HF).',
    source: TASK_FORCE,
    settings: spectra,
  }),
  figureRow('hf_nu_pct', 'HF, normalised', '%', 0, {
    definition: '100 HF / (LF + HF).',
    source: TASK_FORCE,
    settings: spectra,
  }),
  figureRow('vlf_ms2', 'VLF', 'ms²', 0, {
    change: 'none',
    definition: 'Power in 0.003 Hz to the LF band; only from segments of 20 min or more.',
    source: TASK_FORCE,
    settings: spectra,
  }),
  figureRow('lf_welch_ms2', 'LF, Welch', 'ms²', 0, {
    definition:
      'Second opinion: LF by Welch’s method on the tachogram resampled at 4 Hz by a cubic spline.',
    source: 'Welch 1967; resampling from memory',
    settings: spectra,
  }),
  figureRow('hf_welch_ms2', 'HF, Welch', 'ms²', 0, {
    definition:
      'Second opinion: HF by Welch’s method on the tachogram resampled at 4 Hz by a cubic spline.',
    source: 'Welch 1967; resampling from memory',
    settings: spectra,
  }),
  figureRow('rmssd_floor_ms', 'RMSSD, timing floor', 'ms', 1, {
    change: 'none',
    definition:
      'The RMSSD that the measured error of the R times alone would give: √6 times its standard deviation.',
    source: 'arithmetic',
    settings: beats,
  }),
  figureRow('hf_floor_ms2', 'HF, timing floor', 'ms²', 0, {
    change: 'none',
    definition: 'The HF power that the measured error of the R times alone would give.',
    source: 'arithmetic',
    settings: spectra,
  }),
  figureRow('nn_share_pct', 'NN share', '%', 0, {
    main: true,
    change: 'none',
    definition:
      'NN intervals over all RR intervals of the phase. It tells how much there is to go by, so it is given also where over half of the phase is lost.',
    source: TASK_FORCE,
    settings: beats,
  }),
  figureRow('beats', 'Beats', '', 0, {
    change: 'none',
    definition: 'Beats of every class in the phase.',
    source: 'count',
    settings: beats,
  }),
  figureRow('ectopic_beats', 'Beats S, V, F', '', 0, {
    change: 'none',
    definition: 'Beats of classes S, V and F in the phase.',
    source: 'ANSI/AAMI EC57 classes',
    settings: beats,
  }),
  figureRow('heart_kept_min', 'Kept', 'min', 1, {
    main: true,
    change: 'none',
    definition: 'Minutes of the phase on the heart lead that no spoiled span for the heart covers.',
    source: OWN_RULE,
    settings: beats,
  }),
];
