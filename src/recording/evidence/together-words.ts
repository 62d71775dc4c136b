import type { EvidenceLine } from './evidence-line';
import type {
  PhaseModulation,
  Rivals,
  RivalVerdict,
  SharedPhase,
  TogetherEvidence,
} from './together';

type Found = Extract<PhaseModulation, { kind: 'found' }>;

/** From here on a rhythm finds itself again after the shifts, so that the test tells little. */
const STEADY = 0.5;
const SIGNIFICANT = 0.05;

export const EXPLORATORY = 'exploratory, no reference values';

const percent = (value: number): string => `${value.toFixed(2)} %`;

/** p as printed: never 0, since it cannot be less than one over all shifts and one. */
export const pWords = (p: number): string => (p < 0.01 ? p.toFixed(3) : p.toFixed(2));

/** Depth, what chance gives, p and cycles of one phase. */
export function depthWords({ depthPct, chancePct, p, cycles, surrogates }: Found): string {
  return `RR ±${percent(depthPct)} with the slow wave’s phase; chance alone stays under ±${percent(chancePct)} in 95 of 100 (p ${pWords(p)}, ${surrogates} circular shifts, ${cycles.toFixed(0)} cycles)`;
}

const VERDICT: Readonly<Record<RivalVerdict, string>> = {
  seen: 'seen',
  'not-seen': 'not seen',
  'not-tested': 'not tested',
};

/** What each rival explanation comes to, with what it was judged by. */
export function rivalRows({ breathing, waves, leak }: Rivals): readonly {
  readonly name: string;
  readonly verdict: string;
  readonly words: string;
}[] {
  return [
    { name: 'Breathing', verdict: VERDICT[breathing.verdict], words: breathingWords(breathing) },
    { name: '0.1 Hz waves', verdict: VERDICT[waves.verdict], words: wavesWords(waves) },
    { name: 'Leakage of the heartbeat', verdict: VERDICT[leak.verdict], words: leakWords(leak) },
  ];
}

function breathingWords({ coherence, level, perMin, multiple }: Rivals['breathing']): string {
  const shared =
    coherence === null || level === null
      ? 'coherence of RR and breathing at DF could not be computed'
      : `RR and breathing at DF: coherence ${coherence.toFixed(2)}, noise under ${level.toFixed(2)}`;
  if (perMin === null) return `${shared}; breathing rate not known`;
  const near = multiple === null ? 'near no whole multiple of DF' : `near ${multiple} times DF`;
  return `${shared}; breathing ${perMin.toFixed(1)} a minute, ${near}`;
}

function wavesWords({ powerRatio, secondDepthPct }: Rivals['waves']): string {
  const ratio =
    powerRatio === null
      ? 'power of RR at twice DF could not be computed'
      : `RR has ${powerRatio.toFixed(powerRatio < 10 ? 1 : 0)} times as much power about twice DF as about DF`;
  return `${ratio}; it goes ±${percent(secondDepthPct)} twice a cycle`;
}

function leakWords({ leakUv, slowUv, withoutDepthPct, withoutP, heightP }: Rivals['leak']): string {
  const share =
    leakUv === null
      ? 'what the beats put into the lead could not be measured'
      : `the beats put about ${leakUv.toFixed(leakUv < 10 ? 1 : 0)} µV of ${slowUv.toFixed(0)} µV into the lead near DF`;
  const without =
    withoutDepthPct === null || withoutP === null
      ? ''
      : `; with that taken out RR ±${percent(withoutDepthPct)} (p ${pWords(withoutP)})`;
  const heights = heightP === null ? '' : `; R height with the same phase p ${pWords(heightP)}`;
  return share + without + heights;
}

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
    return list.length > 0 ? [`${VERDICT[verdict]}: ${list.join(', ')}`] : [];
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
    words: `${depthWords(modulation)}: ${modulationVerdict(modulation)}`,
    mark: [EXPLORATORY, steadyWords(modulation), rivalSummary(modulation)]
      .filter((one) => one !== null)
      .join('; '),
  }));
}
