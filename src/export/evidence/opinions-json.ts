import {
  type Agreement,
  LEAST_AGREEMENT_PCT,
  MOST_POWER_DIFFERENCE_PCT,
  type OpinionsEvidence,
  type PartOpinions,
  SAME_CPM,
} from '../../recording/evidence/opinions';
import { roundedTo } from '../write-number';

const cpm = (value: number | null) => (value === null ? null : roundedTo(value, 3));
const seconds = (value: number) => roundedTo(value, 6);

const agreement = ({ same, of, medianCpm }: Agreement) => ({
  same,
  of,
  median_cpm: cpm(medianCpm),
});

const partJson = (part: PartOpinions) => ({
  name: part.name,
  phase: part.phase,
  from_s: seconds(part.fromS),
  to_s: seconds(part.toS),
  df_median_cpm: cpm(part.hannCpm),
  burg: agreement(part.burg),
  multitaper: agreement(part.multitaper),
  crests: agreement(part.crests),
  powers: Object.fromEntries(
    part.powers.map(({ key, lombMs2, welchMs2 }) => [
      key,
      { lomb_scargle: roundedTo(lombMs2, 1), welch: roundedTo(welchMs2, 1) },
    ]),
  ),
  disagreements: part.disagreements.map(({ key, words }) => ({ figure: key, words })),
});

/** The part `opinions` of findings.json. */
export const opinionsJson = (value: OpinionsEvidence): unknown => ({
  lead: value.lead,
  same_within_cpm: SAME_CPM,
  least_agreement_pct: LEAST_AGREEMENT_PCT,
  most_power_difference_pct: MOST_POWER_DIFFERENCE_PCT,
  phases: value.parts.map(partJson),
  epochs: value.epochs.map((epoch) => ({
    phase: epoch.phase,
    centre_s: seconds(epoch.centreS),
    df_cpm: cpm(epoch.hannCpm),
    burg_cpm: cpm(epoch.burgCpm),
    burg_order: epoch.burgOrder,
    multitaper_cpm: cpm(epoch.multitaperCpm),
    crest_cpm: cpm(epoch.crestCpm),
  })),
});
