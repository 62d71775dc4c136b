import { type FigureRow, figureRow, OWN_RULE } from './figure-definition';
import { bandsName, type Settings } from './settings';

const epochs = (s: Settings) =>
  `Epochs of ${s.epoch.lengthS} s every ${s.epoch.stepS} s; kept up to ${Math.round(100 * s.epoch.maxSpoiled)} % spoiled; false alarm ${Math.round(100 * s.epoch.falseAlarm)} % an epoch`;
const bands = (s: Settings) => `${epochs(s)}; limits ${bandsName(s.rhythmBands)}`;

/** The stomach's figures in the order they are shown. */
export const STOMACH_ROWS: readonly FigureRow[] = [
  figureRow('df_median_cpm', 'DF, median', 'cpm', 2, {
    main: true,
    definition:
      'Median of the dominant frequency over the kept epochs that have a rhythm. DF is the largest local maximum of the spectrum in the search band, refined by a parabola through the logarithm of three points.',
    source: 'Chen 1996, World J Gastroenterol 2(Suppl 1):9 (concept)',
    settings: epochs,
  }),
  figureRow('df_mean_cpm', 'DF, mean', 'cpm', 2, {
    definition: 'Mean of DF over the kept epochs that have a rhythm.',
    source: OWN_RULE,
    settings: epochs,
  }),
  figureRow('df_sd_cpm', 'DF, SD', 'cpm', 2, {
    definition: 'Standard deviation (n − 1) of DF over the kept epochs that have a rhythm.',
    source: OWN_RULE,
    settings: epochs,
  }),
  figureRow('df_instability_pct', 'Instability of DF', '%', 0, {
    definition: '100 SD / mean of DF (n − 1) over the kept epochs that have a rhythm.',
    source: 'name: Lim 2012, World J Gastroenterol 18:5948; formula from memory',
    settings: epochs,
  }),
  figureRow('dp_instability_pct', 'Instability of DP', '%', 0, {
    definition:
      '100 SD / mean of DP in linear power (n − 1) over the kept epochs that have a rhythm.',
    source: 'formula from memory',
    settings: epochs,
  }),
  figureRow('time_normo_pct', 'Normogastria', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose DF lies in the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10 (normogastria index)',
    settings: bands,
  }),
  figureRow('time_brady_pct', 'Bradygastria', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose DF lies below the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10',
    settings: bands,
  }),
  figureRow('time_tachy_pct', 'Tachygastria', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose DF lies above the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10',
    settings: bands,
  }),
  figureRow('time_none_pct', 'No rhythm', '% of time', 0, {
    main: true,
    definition:
      'Share of the kept epochs in which no peak stands out of the recording’s own local background.',
    source: OWN_RULE,
    settings: bands,
  }),
  figureRow('time_mixed_pct', 'Mixed', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs in which the rhythm changes inside the epoch.',
    source: OWN_RULE,
    settings: bands,
  }),
  figureRow('time_undecided_pct', 'Not decidable', '% of time', 0, {
    main: true,
    definition: 'Share of the kept epochs whose peak may be breathing or drift.',
    source: OWN_RULE,
    settings: bands,
  }),
  figureRow('dp_mean_spectrum_db', 'Power, DP', 'dB', 1, {
    main: true,
    definition:
      'Power density at the DF of the phase’s mean spectrum, dB re 1 µV²/Hz. The change is the fed-to-fasting power ratio, each at its own DF.',
    source: 'Chen 1996 (concept)',
    settings: epochs,
  }),
  figureRow('df_mean_spectrum_cpm', 'DF of mean spectrum', 'cpm', 2, {
    definition: 'Dominant frequency of the mean of the kept epochs’ spectra.',
    source: OWN_RULE,
    settings: epochs,
  }),
  figureRow('dp_median_epoch_db', 'DP, median', 'dB', 1, {
    definition:
      'Median over the kept epochs with a rhythm of the power density at DF, dB re 1 µV²/Hz. The change is the median-epoch power ratio.',
    source: OWN_RULE,
    settings: epochs,
  }),
  figureRow('share_brady_pct', 'Power share, brady', '%', 0, {
    definition:
      'Power of the mean spectrum below the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  }),
  figureRow('share_normo_pct', 'Power share, normo', '%', 0, {
    definition: 'Power of the mean spectrum in the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  }),
  figureRow('share_tachy_pct', 'Power share, tachy', '%', 0, {
    definition:
      'Power of the mean spectrum above the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  }),
  figureRow('stomach_kept_min', 'Kept', 'min', 1, {
    main: true,
    change: 'none',
    definition:
      'Minutes of the phase on the reported lead that no spoiled span for the stomach covers.',
    source: OWN_RULE,
    settings: epochs,
  }),
];
