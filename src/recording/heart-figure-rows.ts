import { type FigureRow, figureRow } from './figure-definition';

/** The heart's figures in the order they are shown. */
export const HEART_ROWS: readonly FigureRow[] = [
  figureRow('heart_rate_bpm', 'Heart rate', '1/min', 1, { main: true }),
  figureRow('nn_mean_ms', 'Mean NN', 'ms', 0),
  figureRow('rmssd_ms', 'RMSSD', 'ms', 1, { main: true }),
  figureRow('sdnn_ms', 'SDNN, 5 min', 'ms', 1, { main: true }),
  figureRow('sdnn_whole_ms', 'SDNN, whole phase', 'ms', 1, { change: 'none' }),
  figureRow('sdsd_ms', 'SDSD', 'ms', 1),
  figureRow('pnn50_pct', 'pNN50', '%', 0),
  figureRow('sd1_ms', 'SD1', 'ms', 1),
  figureRow('sd2_ms', 'SD2', 'ms', 1, { change: 'none' }),
  figureRow('triangular_index', 'Triangular index', '', 1, { change: 'none' }),
  figureRow('lf_ms2', 'LF', 'ms²', 0, { main: true }),
  figureRow('hf_ms2', 'HF', 'ms²', 0, { main: true }),
  figureRow('lf_hf_ratio', 'LF/HF ratio', '', 2, { main: true }),
  figureRow('lf_nu_pct', 'LF, normalised', '%', 0),
  figureRow('hf_nu_pct', 'HF, normalised', '%', 0),
  figureRow('vlf_ms2', 'VLF', 'ms²', 0, { change: 'none' }),
  figureRow('lf_welch_ms2', 'LF, Welch', 'ms²', 0),
  figureRow('hf_welch_ms2', 'HF, Welch', 'ms²', 0),
  figureRow('rmssd_floor_ms', 'RMSSD, timing floor', 'ms', 1, { change: 'none' }),
  figureRow('hf_floor_ms2', 'HF, timing floor', 'ms²', 0, { change: 'none' }),
  figureRow('nn_share_pct', 'NN share', '%', 0, { main: true, change: 'none' }),
  figureRow('beats', 'Beats', '', 0, { change: 'none' }),
  figureRow('ectopic_beats', 'Beats S, V, F', '', 0, { change: 'none' }),
  figureRow('heart_kept_min', 'Kept', 'min', 1, { main: true, change: 'none' }),
];
