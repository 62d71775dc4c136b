import { halfWidth } from '../numeric/half-width';
import { mean, median, wilson } from '../numeric/statistics';
import { type Figures, numberOf } from '../recording/figure';
import type { Epoch } from '../recording/rhythm';
import { densityOfDb } from './decibel';
import { densityDb } from './dominant-peak';
import { hasRhythm } from './rhythm-class';

/** Epochs that share samples are drawn together: four of 240 s every 60 s. */
const BLOCK = 4;
const FEWEST_BLOCKS = 3;
/** Minutes for one independent look at the rhythm. */
const MINUTES_A_LOOK = 4;

/** Percentages of time that a doubt may move. */
export const TIME_KEYS = [
  'time_normo_pct',
  'time_brady_pct',
  'time_tachy_pct',
  'time_none_pct',
  'time_undecided_pct',
] as const;

/**
 * Half the width of the nominal 95 % range of a part's stomach figures, by key; a figure of which none can be told is not
 * there. Percentages of time by Wilson 1927 with a look every four kept minutes, DF and DP by the moving-block bootstrap over
 * epochs (Kuensch 1989). `epochs` are those kept in the part.
 */
export function stomachHalfWidths(
  epochs: readonly Epoch[],
  figures: Figures,
  keptMinutes: number,
): Readonly<Record<string, number>> {
  const looks = keptMinutes / MINUTES_A_LOOK;
  const shares = TIME_KEYS.map((key) => {
    const share = numberOf(figures[key]) / 100;
    if (Number.isNaN(share)) return [key, Number.NaN] as const;
    const { low, high } = wilson(looks * Math.min(1, share), looks);
    return [key, (100 * (high - low)) / 2] as const;
  });
  const steady = epochs.filter(hasRhythm);
  const df = steady.flatMap(({ dfCpm }) => (dfCpm === null ? [] : [dfCpm]));
  const power = epochs.flatMap(({ dpDb }) => (dpDb === null ? [] : [densityOfDb(dpDb)]));
  return Object.fromEntries(
    [
      ...shares,
      ['df_median_cpm', epochsHalfWidth(df, median)] as const,
      ['dp_mean_spectrum_db', epochsHalfWidth(power, (values) => densityDb(mean(values)))] as const,
    ].filter(([, half]) => half > 0 && Number.isFinite(half)),
  );
}

function epochsHalfWidth(values: readonly number[], of: (drawn: Float64Array) => number): number {
  const drawn = new Float64Array(values.length);
  return halfWidth(
    { count: values.length, blockLength: BLOCK, fewestBlocks: FEWEST_BLOCKS },
    (places) => {
      places.forEach((place, i) => {
        drawn[i] = values[place];
      });
      return of(drawn);
    },
  );
}
