import type { OpinionsEvidence } from '../../src/recording/evidence/opinions';

/** Second opinions on an invented study. */
export const INVENTED_OPINIONS: OpinionsEvidence = {
  lead: '#1',
  epochs: [
    {
      phase: 'fasting',
      centreS: 120,
      hannCpm: 3.012,
      burgCpm: 3.0309,
      burgOrder: 41,
      multitaperCpm: 2.9987,
      crestCpm: 3.1,
    },
    {
      phase: 'fasting',
      centreS: 180,
      hannCpm: null,
      burgCpm: null,
      burgOrder: 12,
      multitaperCpm: 5.2,
      crestCpm: null,
    },
  ],
  parts: [
    {
      name: 'fasting',
      phase: 'fasting',
      fromS: 0,
      toS: 1800,
      hannCpm: 3.012,
      burg: { same: 26, of: 27, medianCpm: 3.03 },
      multitaper: { same: 20, of: 27, medianCpm: 3.2 },
      crests: { same: 27, of: 27, medianCpm: 3.1 },
      powers: [
        { key: 'lf_ms2', lombMs2: 410.26, welchMs2: 402.11 },
        { key: 'hf_ms2', lombMs2: 300, welchMs2: 420 },
      ],
      disagreements: [
        { key: 'df_median_cpm', words: 'multitaper agrees in 20 of 27 epochs' },
        { key: 'hf_ms2', words: 'Welch gives 420 ms²' },
      ],
    },
  ],
};
