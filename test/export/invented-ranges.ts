import type { RangesEvidence } from '../../src/recording/evidence/ranges';

/** Ranges of an invented study, as the worker would hand them over. */
export const INVENTED_RANGES: RangesEvidence = {
  phases: [
    {
      name: 'fasting',
      figures: [
        {
          key: 'df_median_cpm',
          chance: { low: 2.7049, high: 2.9951 },
          doubts: null,
          limits: null,
        },
        {
          key: 'time_normo_pct',
          chance: { low: 52.4, high: 97.6 },
          doubts: null,
          limits: {
            low: 60.2,
            high: 92.6,
            lowBy: '1-2.5-3.5-9 cpm, epochs of 3 min',
            highBy: '1-2-4-9 cpm, epochs of 5 min',
          },
        },
        {
          key: 'rmssd_ms',
          chance: { low: 28.11, high: 41.07 },
          doubts: { low: 30.02, high: 36.46, exact: true, doubts: 3 },
          limits: null,
        },
      ],
    },
  ],
  changes: [
    {
      key: 'dp_mean_spectrum_db',
      from: 'fasting',
      to: 'fed',
      low: -0.44,
      high: 3.81,
      ratio: { low: 0.9036, high: 2.4044 },
    },
  ],
  openHeartDoubts: 3,
};
