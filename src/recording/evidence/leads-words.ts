import { isMeal } from '../phase';
import type { EvidenceLine } from './evidence-line';
import type { LagFound, LeadPair, LeadsEvidence, PairInPhase } from './leads';

type Compared = Extract<LeadPair, { kind: 'compared' }>;

/** Pairs that have a line of their own; the page holds all. */
const MOST_LINES = 3;

const signed = (value: number, decimals: number): string =>
  value
    .toFixed(decimals)
    .replace(/^-(?=0(\.0*)?$)/, '')
    .replace('-', '−');

/** "EGG 1 and EGG 2". */
export const pairName = ({ firstName, secondName }: LeadPair): string =>
  `${firstName} and ${secondName}`;

/** Said of a range where it stands alone; in a line that says it once, nothing. */
const BY_CHANCE = '95 % by chance ';

/** Coupling of a phase in words: "73 % (95 % by chance 41–99)". */
export function couplingWords(
  { coupling, couplingRange }: PairInPhase,
  ranges = BY_CHANCE,
): string {
  switch (coupling.kind) {
    case 'number': {
      const range = couplingRange?.map((one) => one.toFixed(0)).join('–');
      return `${coupling.value.toFixed(0)} %${range === undefined ? '' : ` (${ranges}${range})`}`;
    }
    case 'count':
      return `${coupling.count} of ${coupling.of} ${coupling.what}`;
    case 'withheld':
      return `not given: ${coupling.reason}`;
  }
}

/** Which lead is earlier and by how much, with its range; a range that holds 0 names no order. */
export function lagWords(pair: LeadPair, lag: LagFound, ranges = BY_CHANCE): string {
  if (lag.kind === 'withheld') return `no lag: ${lag.reason}`;
  const { lagS, lowS, highS } = lag;
  const range = (low: number, high: number) => `(${ranges}${signed(low, 1)} to ${signed(high, 1)})`;
  if (lowS <= 0 && highS >= 0)
    return `neither earlier, lag ${signed(lagS, 1)} s ${range(lowS, highS)}`;
  return lagS > 0
    ? `${pair.firstName} earlier by ${signed(lagS, 1)} s ${range(lowS, highS)}`
    : `${pair.secondName} earlier by ${signed(-lagS, 1)} s ${range(-highS, -lowS)}`;
}

/** Coherence at DF, never rounded up to 1, beside the level of unrelated noise; a dash where it could not be computed. */
export const coherenceWords = (lag: LagFound): string =>
  lag.coherence === null || lag.level === null
    ? '—'
    : `${(Math.floor(100 * lag.coherence) / 100).toFixed(2)} (noise under ${lag.level.toFixed(2)})`;

const phaseWords = (pair: Compared, phase: PairInPhase): string =>
  `${phase.name}: coupled ${couplingWords(phase, '')}; ${lagWords(pair, phase.lag, '')}.`;

/** Meals are on the page only, unless there is nothing else. */
const phasesOf = ({ phases }: Compared): readonly PairInPhase[] => {
  const others = phases.filter((phase) => !isMeal(phase));
  return others.length > 0 ? others : phases;
};

/** What the trust section of Findings and the report say of it. No line says more than which lead is earlier. */
export function leadsLines({ leadCount, pairs }: LeadsEvidence): readonly EvidenceLine[] {
  if (leadCount < 2)
    return [{ name: 'Several leads', words: 'one slow-wave lead: nothing to compare', mark: null }];
  const compared = pairs.filter((pair) => pair.kind === 'compared');
  const lines = compared.slice(0, MOST_LINES).map((pair) => ({
    name: pairName(pair),
    words: phasesOf(pair)
      .map((phase) => phaseWords(pair, phase))
      .join(' ')
      .concat(' Ranges are 95 % by chance.'),
    mark: pair.mark,
  }));
  const more = compared.length - lines.length;
  const left = pairs.length - compared.length;
  const rest = [
    ...(more > 0 ? [`${more} more ${more === 1 ? 'pair' : 'pairs'} on the page`] : []),
    ...(left > 0
      ? [`${left} ${left === 1 ? 'pair' : 'pairs'} not shown, with the reason on the page`]
      : []),
  ];
  return rest.length > 0
    ? [...lines, { name: 'Several leads', words: rest.join('; '), mark: null }]
    : lines;
}
