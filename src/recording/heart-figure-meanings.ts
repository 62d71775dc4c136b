import { type FigureMeaning, OWN_RULE } from './figure-definition';
import type { Settings } from './settings';

const beats = () =>
  'NN intervals: between two N beats, neither placed, nothing spoiled, missing or unusable between, 300 to 2000 ms long';
const spectra = (s: Settings) =>
  `Segments of ${s.variability.segmentS} s; LF ${s.variability.lfHz.join('-')} Hz, HF ${s.variability.hfHz.join('-')} Hz; at least ${Math.round(100 * s.variability.minNnShare)} % NN`;

const TASK_FORCE = 'Task Force 1996, Eur Heart J 17:354';

/** What each of the heart's figures means, by its key. */
export const HEART_MEANINGS: Readonly<Record<string, FigureMeaning>> = {
  heart_rate_bpm: {
    definition: '60000 / mean NN.',
    source: TASK_FORCE,
    settings: beats,
  },
  nn_mean_ms: {
    definition: 'Mean of the NN intervals.',
    source: TASK_FORCE,
    settings: beats,
  },
  rmssd_ms: {
    definition:
      'Root of the mean square of differences between adjacent NN intervals; only pairs that share a beat.',
    source: TASK_FORCE,
    settings: beats,
  },
  sdnn_ms: {
    definition:
      'Standard deviation (n − 1) of the NN intervals in each 5 min segment, averaged over the segments that carry it.',
    source: TASK_FORCE,
    settings: spectra,
  },
  sdnn_whole_ms: {
    definition:
      'Standard deviation (n − 1) of all NN intervals of the phase; grows with length, so it carries its minutes and no change.',
    source: TASK_FORCE,
    settings: beats,
  },
  sdsd_ms: {
    definition: 'Standard deviation (n − 1) of the differences between adjacent NN intervals.',
    source: TASK_FORCE,
    settings: beats,
  },
  pnn50_pct: {
    definition: 'Share of adjacent NN pairs that differ by more than 50 ms (strictly).',
    source: TASK_FORCE,
    settings: beats,
  },
  sd1_ms: {
    definition:
      'Spread across the identity line of the plot of each NN against the next: SDSD / √2.',
    source: 'Brennan 2001, IEEE Trans Biomed Eng',
    settings: beats,
  },
  sd2_ms: {
    definition:
      'Spread along the identity line: √(2 SDNN² − SDSD² / 2), with SDNN of the whole phase; grows with length, so it carries its minutes and no change.',
    source: 'Brennan 2001, IEEE Trans Biomed Eng',
    settings: beats,
  },
  triangular_index: {
    definition:
      'Number of NN intervals over the height of their histogram in bins of 1/128 s; needs 20 min.',
    source: TASK_FORCE,
    settings: beats,
  },
  lf_ms2: {
    definition:
      'Power of the NN intervals in the LF band by Lomb-Scargle on the beats’ times, averaged over segments. The stomach’s 0.05 Hz lies inside this band.',
    source: `${TASK_FORCE}; Lomb 1976; Scargle 1982`,
    settings: spectra,
  },
  hf_ms2: {
    definition:
      'Power of the NN intervals in the HF band by Lomb-Scargle on the beats’ times, averaged over segments.',
    source: `${TASK_FORCE}; Lomb 1976; Scargle 1982`,
    settings: spectra,
  },
  lf_hf_ratio: {
    definition: 'LF over HF, of the averaged powers.',
    source: TASK_FORCE,
    settings: spectra,
  },
  lf_nu_pct: {
    definition: '100 LF / (LF + HF).',
    source: TASK_FORCE,
    settings: spectra,
  },
  hf_nu_pct: {
    definition: '100 HF / (LF + HF).',
    source: TASK_FORCE,
    settings: spectra,
  },
  vlf_ms2: {
    definition: 'Power in 0.003 Hz to the LF band; only from segments of 20 min or more.',
    source: TASK_FORCE,
    settings: spectra,
  },
  lf_welch_ms2: {
    definition:
      'Second opinion: LF by Welch’s method on the tachogram resampled at 4 Hz by a cubic spline.',
    source: 'Welch 1967; resampling from memory',
    settings: spectra,
  },
  hf_welch_ms2: {
    definition:
      'Second opinion: HF by Welch’s method on the tachogram resampled at 4 Hz by a cubic spline.',
    source: 'Welch 1967; resampling from memory',
    settings: spectra,
  },
  rmssd_floor_ms: {
    definition:
      'The RMSSD that the measured error of the R times alone would give: √6 times its standard deviation.',
    source: 'arithmetic',
    settings: beats,
  },
  hf_floor_ms2: {
    definition: 'The HF power that the measured error of the R times alone would give.',
    source: 'arithmetic',
    settings: spectra,
  },
  nn_share_pct: {
    definition:
      'NN intervals over all RR intervals of the phase. It tells how much there is to go by, so it is given also where over half of the phase is lost.',
    source: TASK_FORCE,
    settings: beats,
  },
  beats: {
    definition: 'Beats of every class in the phase.',
    source: 'count',
    settings: beats,
  },
  ectopic_beats: {
    definition: 'Beats of classes S, V and F in the phase.',
    source: 'ANSI/AAMI EC57 classes',
    settings: beats,
  },
  heart_kept_min: {
    definition: 'Minutes of the phase on the heart lead that no spoiled span for the heart covers.',
    source: OWN_RULE,
    settings: beats,
  },
};
