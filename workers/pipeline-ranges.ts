import { NO_BREATHING } from '../src/heart/breathing';
import { breathingChanceRange, heartChanceRanges } from '../src/heart/chance-ranges';
import type { Decision, Undecided } from '../src/heart/decisions';
import { heartDoubtRanges } from '../src/heart/doubt-ranges';
import type { SegmentResult } from '../src/heart/segments';
import { type ChanceRange, differenceRange, type Range } from '../src/numeric/chance-range';
import { pow } from '../src/numeric/elementary';
import type { Doubt } from '../src/recording/doubt';
import type {
  ChangeRange,
  DoubtsRange,
  FigureRanges,
  PhaseRanges,
  RangesEvidence,
} from '../src/recording/evidence/ranges';
import { numberOf } from '../src/recording/figure';
import { FIGURES } from '../src/recording/figure-catalogue';
import type { PhaseFindings } from '../src/recording/findings';
import { leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import { phasesOrWhole } from '../src/recording/phase';
import type { Interval, Span } from '../src/recording/span';
import { stomachChanceRanges } from '../src/stomach/chance-ranges';
import { type LimitsMemory, limitsRanges, type PartLimits } from '../src/stomach/limits-ranges';
import { inTurns, type Job } from './job';
import { spansAfter } from './pipeline-doubt-effects';
import type { EvidenceInputs } from './pipeline-evidence';
import type { Study } from './pipeline-study';
import { identity } from './remember';

/** Ranges by chance of a part, by key. */
type ByKey<T> = Readonly<Record<string, T>>;

/** The pieces of a study's ranges, each kept until something that it hangs on changes. */
interface Pieces {
  stomachChance: Piece<readonly ByKey<ChanceRange>[]>;
  heartChance: Piece<readonly ByKey<ChanceRange>[]>;
  limits: Piece<ReadonlyMap<string, PartLimits>>;
  doubts: Piece<readonly ByKey<DoubtsRange>[]>;
}

interface Piece<T> {
  readonly key: string;
  readonly value: T;
}

const NOTHING: Pieces = {
  stomachChance: { key: '', value: [] },
  heartChance: { key: '', value: [] },
  limits: { key: '', value: new Map() },
  doubts: { key: '', value: [] },
};

const BY_CHANCE = 'Drawing the study anew';

const pieces = new WeakMap<Study, Pieces>();

/** The piece as it is kept where its key is the same, else made anew. */
async function piece<P extends keyof Pieces>(
  study: Study,
  name: P,
  key: string,
  make: () => Promise<Pieces[P]['value']>,
): Promise<Pieces[P]['value']> {
  const kept = pieces.get(study) ?? NOTHING;
  if (kept[name].key === key) return kept[name].value;
  const value = await make();
  pieces.set(study, { ...(pieces.get(study) ?? NOTHING), [name]: { key, value } });
  return value;
}

/** How far every figure could be from the truth: by chance, by open doubts, by other limits. */
export async function rangesOf(from: EvidenceInputs, job: Job): Promise<RangesEvidence> {
  const { computed, study } = from;
  const { phases } = computed.findings;
  const places = phases.map(({ name, fromS, toS }) => [name, fromS, toS]);
  const reported = computed.stomach[from.inputs.roles.reported];
  const stomachKey = JSON.stringify([identity(reported), places, phases.map(stomachPrinted)]);
  const heartKey = JSON.stringify([computed.marks.heart, identity(computed.breathing), places]);
  const doubts = heartDoubts(from);
  const stomach = await piece(study, 'stomachChance', stomachKey, () => stomachChance(from, job));
  const heart = await piece(study, 'heartChance', heartKey, () => heartChance(from, job));
  const open = doubts.map(({ id }) => id);
  const byDoubts = await piece(study, 'doubts', JSON.stringify([heartKey, open]), () =>
    doubtRanges(from, doubts, job),
  );
  const limits = await piece(study, 'limits', stomachKey, () => byLimits(from, job));
  const chance = phases.map((_, k) => ({ ...stomach[k], ...heart[k] }));
  return {
    phases: phases.map((phase, k) =>
      rangesOfPhase(phase, chance[k], byDoubts[k], limits.get(phase.name) ?? {}),
    ),
    changes: changeRanges(from, chance),
    openHeartDoubts: doubts.length,
  };
}

/** What is withheld of a phase's stomach figures, which filters may cause beside the epochs. */
const stomachPrinted = ({ figures }: PhaseFindings): string =>
  FIGURES.filter(({ key, organ }) => organ === 'stomach' && figures[key]?.kind === 'withheld')
    .map(({ key }) => key)
    .join();

function rangesOfPhase(
  { name, figures }: PhaseFindings,
  chance: ByKey<ChanceRange>,
  doubts: ByKey<DoubtsRange>,
  limits: PartLimits,
): PhaseRanges {
  const ranges = FIGURES.flatMap(({ key }): FigureRanges[] => {
    const figure = figures[key];
    if (!figure || figure.kind === 'withheld') return [];
    const one = {
      key,
      chance: chance[key] ?? null,
      doubts: doubts[key] ?? null,
      limits: limits[key] ?? null,
    };
    return one.chance || one.doubts || one.limits ? [one] : [];
  });
  return { name, figures: ranges };
}

function changeRanges(
  { computed }: EvidenceInputs,
  chance: readonly ByKey<ChanceRange>[],
): readonly ChangeRange[] {
  const { phases, changes } = computed.findings;
  return changes.flatMap(({ key, from, to, value }): ChangeRange[] => {
    const [before, after] = [from, to].map((name) => {
      const place = phases.findIndex((phase) => phase.name === name);
      const range = chance[place]?.[key];
      const figure = phases[place]?.figures[key];
      return range && figure ? { ...range, value: numberOf(figure) } : null;
    });
    if (value.kind !== 'number' || !before || !after) return [];
    const { low, high } = differenceRange(before, after);
    if (!Number.isFinite(low) || !Number.isFinite(high)) return [];
    return [{ key, from, to, low, high, ratio: ratioOf(key, { low, high }) }];
  });
}

/** A change in dB as one of the ratio of powers. */
function ratioOf(key: string, { low, high }: Range): Range | null {
  if (FIGURES.find((figure) => figure.key === key)?.unit !== 'dB') return null;
  return { low: pow(10, low / 10), high: pow(10, high / 10) };
}

async function stomachChance(
  { inputs, computed }: EvidenceInputs,
  job: Job,
): Promise<readonly ByKey<ChanceRange>[]> {
  const { settings, roles } = inputs;
  const analysis = computed.stomach[roles.reported];
  const found: ByKey<ChanceRange>[] = [];
  for (const phase of computed.findings.phases) {
    const { figures, keptStomachS: keptS } = phase;
    const steps = stomachChanceRanges({ analysis, part: phase, figures, keptS, settings });
    found.push(await inTurns(steps, job, BY_CHANCE));
  }
  return found;
}

/** What the heart's figures of a part are computed from; null without a heart lead. */
function heartOf({ inputs, computed, heartRateHz, blocked, detection }: EvidenceInputs) {
  const { heart, breathing } = computed;
  if (!heart) return null;
  return {
    rr: heart.rr,
    beats: inputs.beats,
    rateHz: heartRateHz,
    blocked,
    settings: inputs.settings,
    timingSdMs: detection?.timingSdMs ?? Number.NaN,
    breathing: breathing ?? NO_BREATHING,
  };
}

async function heartChance(from: EvidenceInputs, job: Job): Promise<readonly ByKey<ChanceRange>[]> {
  const heart = heartOf(from);
  const { breathing, findings } = from.computed;
  const found: ByKey<ChanceRange>[] = [];
  for (const phase of findings.phases) {
    const { figures } = phase;
    const ofHeart = heart
      ? await inTurns(heartChanceRanges({ ...heart, part: phase, figures }), job, BY_CHANCE)
      : {};
    const rate = figures.breathing_bpm;
    const ofBreathing =
      breathing && rate?.kind === 'number'
        ? breathingChanceRange(breathing, phase, rate.value)
        : null;
    found.push(ofBreathing ? { ...ofHeart, breathing_bpm: ofBreathing } : ofHeart);
  }
  return found;
}

/** What was tried of a study's drawn leads; of a long one nothing is kept, since it would be hundreds of megabytes. */
const tried = new WeakMap<object, LimitsMemory>();
const KEPT_UP_TO_S = 4 * 3600;

async function byLimits(
  { inputs, recording, slow, computed }: EvidenceInputs,
  job: Job,
): Promise<ReadonlyMap<string, PartLimits>> {
  const { settings, roles, spans } = inputs;
  const { forSpectra } = slow[roles.reported];
  const isLong = recording.durationS > KEPT_UP_TO_S;
  const memories: LimitsMemory | null = isLong ? null : (tried.get(forSpectra) ?? new Map());
  if (memories) tried.set(forSpectra, memories);
  const steps = limitsRanges(
    {
      slow: slow[roles.reported],
      spoiled: lostOn(roles.slow[roles.reported], 'stomach', spans, recording.gaps),
      phases: phasesOrWhole(inputs.phases, recording.durationS),
      settings,
      breathing: computed.breathing,
    },
    computed.findings.phases,
    memories,
  );
  return inTurns(steps, job, 'Trying other limits');
}

/** Open doubts whose mend reaches the heart's figures. */
function heartDoubts({ inputs, open }: EvidenceInputs): readonly Doubt[] {
  const { heart } = inputs.roles;
  if (!heart) return [];
  const key = leadKey(heart);
  const actsOnHeart = (span: Pick<Span, 'lead' | 'target'>) =>
    (span.lead === null || span.lead === key) && span.target !== 'stomach';
  return open.filter(({ mend }) => {
    if (mend === null || mend.kind === 'beats') return mend !== null;
    const span =
      mend.kind === 'exclude' ? mend.span : inputs.spans.find(({ id }) => id === mend.spanId);
    return span !== undefined && actsOnHeart(span);
  });
}

function decisionOf({ mend }: Doubt, spans: readonly Span[]): Decision {
  if (mend === null) throw new Error('a doubt without a mend decides nothing');
  if (mend.kind === 'beats') return { removed: mend.removed, added: mend.added, span: null };
  const span: Interval | undefined =
    mend.kind === 'exclude' ? mend.span : spans.find(({ id }) => id === mend.spanId);
  if (!span) throw new Error('a span that would be taken back is not there');
  return { removed: [], added: [], span };
}

function undecidedOf(
  { inputs, recording, heartRateHz }: EvidenceInputs,
  doubts: readonly Doubt[],
): Undecided {
  const { heart } = inputs.roles;
  const known = new Map<string, readonly Interval[]>();
  return {
    beats: inputs.beats,
    rateHz: heartRateHz,
    decisions: doubts.map((doubt) => decisionOf(doubt, inputs.spans)),
    blockedWhen(mended) {
      const key = mended.join();
      const spans = mended.reduce<readonly Span[]>((before, k) => {
        const { mend } = doubts[k];
        return mend ? spansAfter(before, mend) : before;
      }, inputs.spans);
      const blocked =
        known.get(key) ?? (heart ? lostOn(heart, 'heart', spans, recording.gaps) : []);
      known.set(key, blocked);
      return blocked;
    },
  };
}

async function doubtRanges(
  from: EvidenceInputs,
  doubts: readonly Doubt[],
  job: Job,
): Promise<readonly ByKey<DoubtsRange>[]> {
  const { phases } = from.computed.findings;
  const heart = heartOf(from);
  if (!heart || doubts.length === 0) return phases.map(() => ({}));
  const undecided = undecidedOf(from, doubts);
  const known = new Map<string, SegmentResult>();
  const found: ByKey<DoubtsRange>[] = [];
  for (const phase of phases) {
    const { figures } = phase;
    const steps = heartDoubtRanges({ ...heart, undecided, part: phase, figures, known });
    found.push(await inTurns(steps, job, 'Deciding doubts one way and the other'));
  }
  return found;
}
