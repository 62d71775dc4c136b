import { type ChanceRange, differenceRange, type Range } from '../../../src/numeric/chance-range';
import { numberOf } from '../../../src/recording/figure';
import { intervals, type Person, type State, stomachLead } from './person';
import { heartStudied, type Studied, stomachStudied } from './studied';
import type { Truth } from './truth';

/** How often ranges held the truth, by figure. */
export class Coverage {
  private readonly counts = new Map<string, { told: number; held: number; widths: number[] }>();

  add(key: string, { low, high }: Range, truth: number): void {
    const one = this.counts.get(key) ?? { told: 0, held: 0, widths: [] };
    this.counts.set(key, one);
    one.told += 1;
    if (truth >= low && truth <= high) one.held += 1;
    one.widths.push(high - low);
  }

  keys(): readonly string[] {
    return [...this.counts.keys()];
  }

  of(key: string) {
    return this.counts.get(key) ?? { told: 0, held: 0, widths: [] };
  }
}

const PHASE_MIN = 30;

/** Figures whose change from fasting to fed is scored as well, under this name. */
export const CHANGES: Readonly<Record<string, string>> = {
  df_median_cpm: 'change of DF',
  dp_mean_spectrum_db: 'power ratio',
  dp_median_epoch_db: 'power ratio of median epochs',
  time_normo_pct: 'change of percent of time',
  rmssd_ms: 'change of RMSSD',
  heart_rate_bpm: 'change of heart rate',
  hf_ms2: 'change of HF',
};

export interface TruthOfBoth {
  readonly fasting: Truth;
  readonly fed: Truth;
}

function scorePhase(coverage: Coverage, { ranges }: Studied, truth: Truth): void {
  for (const [key, range] of Object.entries(ranges)) {
    const value = truth.get(key);
    if (value !== undefined) coverage.add(key, range, value);
  }
}

function scoreChanges(
  coverage: Coverage,
  [fasting, fed]: readonly [Studied, Studied],
  truth: TruthOfBoth,
): void {
  for (const [key, name] of Object.entries(CHANGES)) {
    const [before, after] = [fasting.ranges[key], fed.ranges[key]];
    const [from, to] = [truth.fasting.get(key), truth.fed.get(key)];
    if (!before || !after || from === undefined || to === undefined) continue;
    const ranged = (one: Studied, range: ChanceRange) => ({
      value: numberOf(one.figures[key]),
      ...range,
    });
    const range = differenceRange(ranged(fasting, before), ranged(fed, after));
    coverage.add(name, range, to - from);
  }
}

type Make = (person: Person, state: State, seed: number) => Studied;

export const STOMACH: Make = (person, state, seed) =>
  stomachStudied(stomachLead(person, state, PHASE_MIN, seed), PHASE_MIN);
export const HEART: Make = (person, state, seed) =>
  heartStudied(intervals(person, state, PHASE_MIN, seed), PHASE_MIN);

/** One study of half an hour fasting and half an hour fed, scored against the person's tendencies. */
export function scoreStudy(
  coverage: Coverage,
  make: Make,
  person: Person,
  truth: TruthOfBoth,
  seed: number,
): void {
  const studied = [make(person, 'fasting', seed), make(person, 'fed', seed + 1)] as const;
  scorePhase(coverage, studied[0], truth.fasting);
  scorePhase(coverage, studied[1], truth.fed);
  scoreChanges(coverage, studied, truth);
}
