import type { Bench, Measured, Part } from '../measured';
import { Coverage, HEART, STOMACH, scoreStudy, type TruthOfBoth } from './coverage';
import { timeLines } from './hour';
import type { Person } from './person';
import { heartTruth, stomachTruth, type Truth } from './truth';

/** Correlation times of the wander, in minutes, and the DF that people tend to. */
const WANDERS_MIN = [0.5, 1, 2, 4];
const DF_CPM = [3, 3.7];
/** Studies of each wander: a thousand in all. */
const STUDIES = 250;
/** Six-hour pieces that a stomach's tendency is read from. */
const PIECES = 6;

const ROWS: readonly (readonly [key: string, label: string, claim: string])[] = [
  ['df_median_cpm', 'DF, median', '92-98'],
  ['df_mean_cpm', 'DF, mean', ''],
  ['df_sd_cpm', 'DF, SD', ''],
  ['df_instability_pct', 'instability of DF', ''],
  ['dp_instability_pct', 'instability of DP', ''],
  ['time_normo_pct', 'percent of time, normo', '85-99'],
  ['time_tachy_pct', 'percent of time, tachy', '85-99'],
  ['dp_mean_spectrum_db', 'power, DP', ''],
  ['df_mean_spectrum_cpm', 'DF of mean spectrum', ''],
  ['dp_median_epoch_db', 'DP, median', ''],
  ['share_normo_pct', 'power share, normo', ''],
  ['change of DF', 'change of DF', ''],
  ['power ratio', 'power ratio, fed over fasting', '92-98'],
  ['power ratio of median epochs', 'power ratio of median epochs', ''],
  ['change of percent of time', 'change of percent of time, normo', ''],
  ['heart_rate_bpm', 'heart rate', ''],
  ['rmssd_ms', 'RMSSD', '92-98'],
  ['sdnn_ms', 'SDNN, 5 min', ''],
  ['sdnn_whole_ms', 'SDNN, whole phase', ''],
  ['pnn50_pct', 'pNN50', ''],
  ['lf_ms2', 'LF', ''],
  ['hf_ms2', 'HF', ''],
  ['lf_hf_ratio', 'LF/HF ratio', ''],
  ['change of RMSSD', 'change of RMSSD', ''],
  ['change of heart rate', 'change of heart rate', ''],
  ['change of HF', 'change of HF', ''],
];

function truthOf(make: (state: 'fasting' | 'fed') => Truth): TruthOfBoth {
  return { fasting: make('fasting'), fed: make('fed') };
}

/** Every study of one correlation time. */
function covered(wanderMin: number, say: Bench['say']): Coverage {
  const coverage = new Coverage();
  const base = 1000 * wanderMin;
  DF_CPM.forEach((dfCpm, place) => {
    const person: Person = { wanderMin, dfCpm };
    const ofStomach = truthOf((state) =>
      stomachTruth(person, state, PIECES, base + (state === 'fed' ? 2e6 : 1e6)),
    );
    const ofHeart = truthOf((state) =>
      heartTruth(person, state, base + (state === 'fed' ? 4e6 : 3e6)),
    );
    for (let k = 0; k < STUDIES / DF_CPM.length; k += 1) {
      const seed = base + 1e5 * (place + 1) + 2 * k;
      scoreStudy(coverage, STOMACH, person, ofStomach, seed);
      scoreStudy(coverage, HEART, person, ofHeart, seed + 1e7);
    }
  });
  say(`people who wander over ${wanderMin} min: ${STUDIES} studies scored`);
  return coverage;
}

const shareOf = (held: number, told: number) => (100 * held) / told;

/** A line a figure: coverage over all studies, with that of each correlation time. */
function coverageLines(coverages: readonly Coverage[]): readonly Measured[] {
  return ROWS.map(([key, label, claim]) => {
    const each = coverages.map((coverage) => coverage.of(key));
    const told = each.reduce((sum, one) => sum + one.told, 0);
    const held = each.reduce((sum, one) => sum + one.held, 0);
    const parts = each.map((one) => shareOf(one.held, one.told).toFixed(0)).join(', ');
    return {
      part: 'ranges',
      what: `truth inside the range: ${label}`,
      value: shareOf(held, told),
      unit: '%',
      decimals: 1,
      budget: claim,
      note: `wander over ${WANDERS_MIN.join(', ')} min: ${parts}; ${told} ranges`,
    };
  });
}

/**
 * A thousand invented studies of half an hour fasting and half an hour fed: how often the nominal 95 % range by chance holds
 * the person's tendency, by figure; then the time of all ranges for a study.
 */
export const ranges: Part = async (bench) => {
  const coverages = WANDERS_MIN.map((wanderMin) => covered(wanderMin, bench.say));
  return [...coverageLines(coverages), ...(await timeLines(bench))];
};
