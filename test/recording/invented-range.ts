import type { SiteRange } from '../../src/recording/site-reference';

/** An invented range of a site. */
export const INVENTED_RANGE: SiteRange = {
  figure: 'df_median_cpm',
  phase: 'fasting',
  minMinutes: 25,
  maxMinutes: 35,
  posture: '',
  meal: '',
  low: 2.1,
  high: 4.3,
  population: 'invented people',
  source: 'invented paper',
};
