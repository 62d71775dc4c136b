import { expect, test } from 'vitest';
import { opinionsJson } from '../../src/export/evidence/opinions-json';
import { INVENTED_OPINIONS } from './invented-opinions';

test('second opinions are written by phase and by epoch, in snake_case, rounded', () => {
  expect(opinionsJson(INVENTED_OPINIONS)).toEqual({
    lead: '#1',
    same_within_cpm: 0.25,
    least_agreement_pct: 90,
    most_power_difference_pct: 25,
    phases: [
      {
        name: 'fasting',
        phase: 'fasting',
        from_s: 0,
        to_s: 1800,
        df_median_cpm: 3.012,
        burg: { same: 26, of: 27, median_cpm: 3.03 },
        multitaper: { same: 20, of: 27, median_cpm: 3.2 },
        crests: { same: 27, of: 27, median_cpm: 3.1 },
        powers: {
          lf_ms2: { lomb_scargle: 410.3, welch: 402.1 },
          hf_ms2: { lomb_scargle: 300, welch: 420 },
        },
        disagreements: [
          { figure: 'df_median_cpm', words: 'multitaper agrees in 20 of 27 epochs' },
          { figure: 'hf_ms2', words: 'Welch gives 420 ms²' },
        ],
      },
    ],
    epochs: [
      {
        phase: 'fasting',
        centre_s: 120,
        df_cpm: 3.012,
        burg_cpm: 3.031,
        burg_order: 41,
        multitaper_cpm: 2.999,
        crest_cpm: 3.1,
      },
      {
        phase: 'fasting',
        centre_s: 180,
        df_cpm: null,
        burg_cpm: null,
        burg_order: 12,
        multitaper_cpm: 5.2,
        crest_cpm: null,
      },
    ],
  });
});
