import type { EvidenceLine } from './evidence-line';
import type { PhaseModulation, RivalVerdict, SharedPhase, TogetherEvidence } from './together';

type Found = Extract<PhaseModulation, { kind: 'found' }>;

/** From here on a rhythm finds itself again after the shifts, so that the test tells little. */
const STEADY = 0.5;
const SIGNIFICANT = 0.05;

export const EXPLORATORY = 'exploratory, no reference values';

/** "0.41 %". */
export const depthPercent = (value: number): string => `${value.toFixed(2)} %`;

/** p as printed: never 0, since it cannot be less than one over all shifts and one. */
export const pWords = (p: number): string => (p < 0.1 ? p.toFixed(3) : p.toFixed(2));

/** Depth, what chance gives, p and cycles of one phase. */
export function depthWords({ depthPct, chancePct, p, cycles, surrogates }: Found): string {
  return `RR ±${depthPercent(depthPct)} by the slow wave’s phase, by chance up to ±${depthPercent(chancePct)} (95 %); p ${pWords(p)}, ${surrogates} shifts, ${cycles.toFixed(0)} cycles`;
}

export const VERDICT_WORDS: Readonly<Record<RivalVerdict, string>> = {
  seen: 'seen',
  'not-seen': 'not seen',
  'not-tested': 'not tested',
};

/** What limits the test itself; null where nothing does. */
export const steadyWords = ({ steadiness }: Found): string | null =>
  steadiness > STEADY
    ? 'the rhythm is so steady that shifting it changes little: the test can hardly tell'
    : null;

/** Rival explanations in a few words: "other explanations seen: 0.1 Hz waves; not seen: breathing, leakage". */
function rivalSummary({ rivals }: Found): string {
  const names = { breathing: 'breathing', waves: '0.1 Hz waves', leak: 'leakage' } as const;
  const having = (verdict: RivalVerdict) =>
    (['breathing', 'waves', 'leak'] as const)
      .filter((key) => rivals[key].verdict === verdict)
      .map((key) => names[key]);
  const parts = (['seen', 'not-seen', 'not-tested'] as const).flatMap((verdict) => {
    const list = having(verdict);
    return list.length > 0 ? [`${VERDICT_WORDS[verdict]}: ${list.join(', ')}`] : [];
  });
  return `other explanations ${parts.join('; ')}`;
}

const found = (phase: SharedPhase): phase is SharedPhase & { modulation: Found } =>
  phase.modulation.kind === 'found';

/** What the numbers of one phase come to, without a claim. */
export function modulationVerdict({ p, rivals }: Found): string {
  if (p >= SIGNIFICANT) return 'no more than chance';
  const seen = Object.values(rivals).some(({ verdict }) => verdict === 'seen');
  return seen ? 'more than chance, but another explanation is seen' : 'more than chance';
}

/** What the trust section of Findings and the report say of it: a line a phase, each with its rivals. */
export function togetherLines(value: TogetherEvidence): readonly EvidenceLine[] {
  if (!value.heartRead)
    return [{ name: 'Both rhythms', words: 'no heart lead is read', mark: null }];
  const tested = value.phases.filter(found);
  if (tested.length === 0) {
    const why = value.phases.map(({ name, modulation }) =>
      modulation.kind === 'withheld' ? `${name}: ${modulation.reason}` : name,
    );
    return [{ name: 'Both rhythms', words: `not tested (${why.join('; ')})`, mark: null }];
  }
  return tested.map(({ name, modulation }) => ({
    name: `Both rhythms, ${name}`,
    words: `${modulationVerdict(modulation)}: ${depthWords(modulation)}`,
    mark: [EXPLORATORY, steadyWords(modulation), rivalSummary(modulation)]
      .filter((one) => one !== null)
      .join('; '),
  }));
}
