import type { EvidenceLine } from './evidence-line';
import type { Agreement, OpinionsEvidence, PartOpinions, PowerPair } from './opinions';
import { SAME_CPM } from './opinions';

/** Share of epochs in percent, in whole numbers; a share below 100 is never written so. */
export const samePercent = ({ same, of }: Agreement): number =>
  of > 0 ? Math.floor((100 * same) / of) : 0;

/** What two powers differ by, as Welch's over the mean of both, in percent with its sign. */
export function differenceWords({ lombMs2, welchMs2 }: PowerPair): string {
  const mean = (lombMs2 + welchMs2) / 2;
  const rounded = mean > 0 ? Math.round((100 * (welchMs2 - lombMs2)) / mean) : 0;
  return `${rounded > 0 ? '+' : rounded < 0 ? '−' : '±'}${Math.abs(rounded)} %`;
}

/** Phases themselves, without the half hours a fed phase is also shown in. */
const wholePhases = ({ parts }: OpinionsEvidence): readonly PartOpinions[] =>
  parts.filter(({ name, phase }) => name === phase);

function frequencyWords({ name, hannCpm, burg, multitaper, crests }: PartOpinions): string {
  if (hannCpm === null) return `${name}: no epoch with a rhythm`;
  const rate = crests.medianCpm === null ? 'none' : crests.medianCpm.toFixed(2);
  return `${name}: Burg ${samePercent(burg)} %, multitaper ${samePercent(multitaper)} % of ${burg.of}, crests ${rate} for DF ${hannCpm.toFixed(2)}`;
}

function powerWords({ name, powers }: PartOpinions): string {
  const said = powers.map(
    (pair) => `${pair.key === 'lf_ms2' ? 'LF' : 'HF'} ${differenceWords(pair)}`,
  );
  return `${name}: ${said.join(', ')}`;
}

/** The phases in which figures of some keys are not borne out; null where all are. */
function markOf(parts: readonly PartOpinions[], keys: readonly string[]): string | null {
  const names = parts
    .filter(({ disagreements }) => disagreements.some(({ key }) => keys.includes(key)))
    .map(({ name }) => name);
  return names.length > 0 ? `other methods disagree: ${names.join(', ')}` : null;
}

/** What the trust section of Findings and the report say of it. */
export function opinionsLines(value: OpinionsEvidence): readonly EvidenceLine[] {
  const phases = wholePhases(value);
  const withPowers = phases.filter(({ powers }) => powers.length > 0);
  return [
    {
      name: 'DF by other methods',
      words: `epochs within ${SAME_CPM} cpm of DF. ${phases.map(frequencyWords).join('; ')}`,
      mark: markOf(phases, ['df_median_cpm']),
    },
    ...(withPowers.length > 0
      ? [
          {
            name: 'Welch beside Lomb-Scargle',
            words: withPowers.map(powerWords).join('; '),
            mark: markOf(withPowers, ['lf_ms2', 'hf_ms2']),
          },
        ]
      : []),
  ];
}
