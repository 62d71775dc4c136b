import { type FigureRow, figureRow } from './figure-definition';

/** The stomach's figures in the order they are shown. */
export const STOMACH_ROWS: readonly FigureRow[] = [
  figureRow('df_median_cpm', 'DF, median', 'cpm', 2, { main: true }),
  figureRow('df_mean_cpm', 'DF, mean', 'cpm', 2),
  figureRow('df_sd_cpm', 'DF, SD', 'cpm', 2),
  figureRow('df_instability_pct', 'Instability of DF', '%', 0),
  figureRow('dp_instability_pct', 'Instability of DP', '%', 0),
  figureRow('time_normo_pct', 'Normogastria', '% of time', 0, { main: true }),
  figureRow('time_brady_pct', 'Bradygastria', '% of time', 0, { main: true }),
  figureRow('time_tachy_pct', 'Tachygastria', '% of time', 0, { main: true }),
  figureRow('time_none_pct', 'No rhythm', '% of time', 0, { main: true }),
  figureRow('time_mixed_pct', 'Mixed', '% of time', 0, { main: true }),
  figureRow('time_undecided_pct', 'Not decidable', '% of time', 0, { main: true }),
  figureRow('dp_mean_spectrum_db', 'Power, DP', 'dB', 1, { main: true }),
  figureRow('df_mean_spectrum_cpm', 'DF of mean spectrum', 'cpm', 2),
  figureRow('dp_median_epoch_db', 'DP, median', 'dB', 1),
  figureRow('share_brady_pct', 'Power share, brady', '%', 0),
  figureRow('share_normo_pct', 'Power share, normo', '%', 0),
  figureRow('share_tachy_pct', 'Power share, tachy', '%', 0),
  figureRow('stomach_kept_min', 'Kept', 'min', 1, { main: true, change: 'none' }),
];
