import { type FigureMeaning, OWN_RULE } from './figure-definition';
import { bandsName, type Settings } from './settings';

const epochs = (s: Settings) =>
  `Epochs of ${s.epoch.lengthS} s every ${s.epoch.stepS} s; kept up to ${Math.round(100 * s.epoch.maxSpoiled)} % spoiled; false alarm ${Math.round(100 * s.epoch.falseAlarm)} % an epoch`;
const bands = (s: Settings) => `${epochs(s)}; limits ${bandsName(s.rhythmBands)}`;

/** What each of the stomach's figures means, by its key. */
export const STOMACH_MEANINGS: Readonly<Record<string, FigureMeaning>> = {
  df_median_cpm: {
    definition:
      'Median of the dominant frequency over the kept epochs that have a rhythm. DF is the largest local maximum of the spectrum in the search band where that stands out by itself, else the local maximum for which the epoch and the independent minutes beside it together have the most evidence, where that is enough; refined by a parabola through the logarithm of three points.',
    source: 'Chen 1996, World J Gastroenterol 2(Suppl 1):9 (concept)',
    settings: epochs,
  },
  df_mean_cpm: {
    definition: 'Mean of DF over the kept epochs that have a rhythm.',
    source: OWN_RULE,
    settings: epochs,
  },
  df_sd_cpm: {
    definition: 'Standard deviation (n − 1) of DF over the kept epochs that have a rhythm.',
    source: OWN_RULE,
    settings: epochs,
  },
  df_instability_pct: {
    definition: '100 SD / mean of DF (n − 1) over the kept epochs that have a rhythm.',
    source: 'name: Lim 2012, World J Gastroenterol 18:5948; formula from memory',
    settings: epochs,
  },
  dp_instability_pct: {
    definition:
      '100 SD / mean of DP in linear power (n − 1) over the kept epochs that have a rhythm.',
    source: 'formula from memory',
    settings: epochs,
  },
  time_normo_pct: {
    definition: 'Share of the kept epochs whose DF lies in the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10 (normogastria index)',
    settings: bands,
  },
  time_brady_pct: {
    definition: 'Share of the kept epochs whose DF lies below the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10',
    settings: bands,
  },
  time_tachy_pct: {
    definition: 'Share of the kept epochs whose DF lies above the normal band.',
    source: 'Komorowski & Pietraszek 2016, J Med Syst 40:10',
    settings: bands,
  },
  time_none_pct: {
    definition:
      'Share of the kept epochs in which no peak stands out of the recording’s own local background, neither by itself nor with the minutes beside it.',
    source: OWN_RULE,
    settings: bands,
  },
  time_mixed_pct: {
    definition: 'Share of the kept epochs in which the rhythm changes inside the epoch.',
    source: OWN_RULE,
    settings: bands,
  },
  time_undecided_pct: {
    definition: 'Share of the kept epochs whose peak may be breathing or drift.',
    source: OWN_RULE,
    settings: bands,
  },
  dp_mean_spectrum_db: {
    definition:
      'Power density at the DF of the phase’s mean spectrum, dB re 1 µV²/Hz. The change is the fed-to-fasting power ratio, each at its own DF.',
    source: 'Chen 1996 (concept)',
    settings: epochs,
  },
  df_mean_spectrum_cpm: {
    definition: 'Dominant frequency of the mean of the kept epochs’ spectra.',
    source: OWN_RULE,
    settings: epochs,
  },
  dp_median_epoch_db: {
    definition:
      'Median over the kept epochs with a rhythm of the power density at DF, dB re 1 µV²/Hz. The change is the median-epoch power ratio.',
    source: OWN_RULE,
    settings: epochs,
  },
  share_brady_pct: {
    definition:
      'Power of the mean spectrum below the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  },
  share_normo_pct: {
    definition: 'Power of the mean spectrum in the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  },
  share_tachy_pct: {
    definition:
      'Power of the mean spectrum above the normal band over its power in the search band.',
    source: 'name: Bradshaw 2016, Neurogastroenterol Motil',
    settings: bands,
  },
  stomach_kept_min: {
    definition:
      'Minutes of the phase on the reported lead that no spoiled span for the stomach covers.',
    source: OWN_RULE,
    settings: epochs,
  },
};
