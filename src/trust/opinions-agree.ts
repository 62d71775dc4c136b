import { median } from '../numeric/statistics';
import {
  type Agreement,
  type Disagreement,
  type EpochOpinions,
  LEAST_AGREEMENT_PCT,
  MOST_POWER_DIFFERENCE_PCT,
  type PartOpinions,
  type PowerPair,
  SAME_CPM,
} from '../recording/evidence/opinions';
import type { PhaseFindings } from '../recording/findings';
import type { Cpm } from '../units/rate';

const EDGE_CPM = 1e-9;

const medianOf = (values: readonly (Cpm | null)[]): Cpm | null => {
  const there = values.filter((value) => value !== null);
  return there.length > 0 ? median(there) : null;
};

/**
 * How often a method gives DF again within 0.25 cpm, over epochs with a rhythm; one in which it finds nothing counts as not
 * given again.
 */
export function agreementOf(
  epochs: readonly EpochOpinions[],
  opinion: (epoch: EpochOpinions) => Cpm | null,
): Agreement {
  const steady = epochs.filter(({ hannCpm }) => hannCpm !== null);
  const isSame = (epoch: EpochOpinions): boolean => {
    const [df, other] = [epoch.hannCpm, opinion(epoch)];
    return df !== null && other !== null && Math.abs(df - other) <= SAME_CPM + EDGE_CPM;
  };
  return {
    same: steady.filter(isSame).length,
    of: steady.length,
    medianCpm: medianOf(steady.map(opinion)),
  };
}

/** LF and HF of a part by both methods, where it has both. */
function powersOf({ figures }: PhaseFindings): readonly PowerPair[] {
  return (['lf', 'hf'] as const).flatMap((band) => {
    const key = `${band}_ms2` as const;
    const [lomb, welch] = [figures[key], figures[`${band}_welch_ms2`]];
    return lomb?.kind === 'number' && welch?.kind === 'number'
      ? [{ key, lombMs2: lomb.value, welchMs2: welch.value }]
      : [];
  });
}

/** By how many percent of their mean two powers differ; 0 where both are 0. */
export function differencePct({ lombMs2, welchMs2 }: PowerPair): number {
  const mean = (lombMs2 + welchMs2) / 2;
  return mean > 0 ? (100 * (welchMs2 - lombMs2)) / mean : 0;
}

const percentSame = ({ same, of }: Agreement): number => (of > 0 ? (100 * same) / of : 100);

function dfDisagreements({
  hannCpm,
  burg,
  multitaper,
  crests,
}: Pick<PartOpinions, 'hannCpm' | 'burg' | 'multitaper' | 'crests'>): readonly Disagreement[] {
  if (hannCpm === null) return [];
  const key = 'df_median_cpm';
  const others = [
    ['Burg', burg],
    ['multitaper', multitaper],
  ] as const;
  const said = others.flatMap(([name, agreement]) =>
    percentSame(agreement) < LEAST_AGREEMENT_PCT
      ? [{ key, words: `${name} agrees in ${agreement.same} of ${agreement.of} epochs` }]
      : [],
  );
  const rate = crests.medianCpm;
  return rate !== null && Math.abs(rate - hannCpm) > SAME_CPM + EDGE_CPM
    ? [...said, { key, words: `the drawn wave has ${rate.toFixed(2)} crests a minute` }]
    : said;
}

const powerDisagreements = (powers: readonly PowerPair[]): readonly Disagreement[] =>
  powers.flatMap((pair) =>
    Math.abs(differencePct(pair)) > MOST_POWER_DIFFERENCE_PCT
      ? [{ key: pair.key, words: `Welch gives ${Math.round(pair.welchMs2)} ms²` }]
      : [],
  );

/** What other methods say of one phase or part, from its epochs and its figures. */
export function partOpinions(part: PhaseFindings, epochs: readonly EpochOpinions[]): PartOpinions {
  const { name, phase, fromS, toS } = part;
  const frequencies = {
    hannCpm: medianOf(epochs.map(({ hannCpm }) => hannCpm)),
    burg: agreementOf(epochs, ({ burgCpm }) => burgCpm),
    multitaper: agreementOf(epochs, ({ multitaperCpm }) => multitaperCpm),
    crests: agreementOf(epochs, ({ crestCpm }) => crestCpm),
  };
  const powers = powersOf(part);
  return {
    name,
    phase,
    fromS,
    toS,
    ...frequencies,
    powers,
    disagreements: [...dfDisagreements(frequencies), ...powerDisagreements(powers)],
  };
}
