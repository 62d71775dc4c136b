import { NO_BREATHING } from '../src/heart/breathing';
import { heartHalfWidths } from '../src/heart/half-widths';
import { heartFiguresInSteps } from '../src/heart/heart-figures';
import { rrSeries } from '../src/heart/rr-series';
import { type BeatList, changeBeats, firstBeatAt } from '../src/recording/beat';
import type { Doubt, DoubtEffect, Mend } from '../src/recording/doubt';
import { type Figures, type FigureValue, numberOf } from '../src/recording/figure';
import { lostOn } from '../src/recording/lost';
import { type Phase, phasesOrWhole } from '../src/recording/phase';
import type { Interval, Span, SpanTarget } from '../src/recording/span';
import { stomachFigures } from '../src/stomach/figures';
import { stomachHalfWidths, TIME_KEYS } from '../src/stomach/half-widths';
import { slowWaveRhythmInSteps } from '../src/stomach/slow-wave-rhythm';
import { createStomachMemory, type StomachMemory } from '../src/stomach/stomach-memory';
import { secondsToTicks } from '../src/units/ticks';
import { type Job, withRests } from './job';
import type { DoubtInputs } from './pipeline-doubts';

/** Figures that a doubt may move, in the order they are shown. */
const HEART_KEYS = ['heart_rate_bpm', 'rmssd_ms', 'sdnn_ms', 'lf_ms2', 'hf_ms2'] as const;
const STOMACH_KEYS = ['df_median_cpm', ...TIME_KEYS, 'dp_mean_spectrum_db'] as const;
/** Beats so far outside a phase are kept beside its own. */
const BESIDE_S = 10;

type Organ = 'heart' | 'stomach';

/** The figures of one organ in one phase as they stand, and as they would be. */
interface Side {
  readonly keys: readonly string[];
  readonly before: Figures;
  readonly halfWidths: Readonly<Record<string, number>>;
  readonly after: (mend: Mend) => Generator<void, Figures>;
}

/**
 * The doubts with what each mend does to the figure it moves most in its phase, the one that moves one most first; ties in the
 * order of time. The slow wave is taken as it is drawn now, though spans that change draw it anew.
 */
export async function withEffects(
  from: DoubtInputs,
  doubts: readonly Doubt[],
  job: Job,
): Promise<readonly Doubt[]> {
  const phases = phasesOrWhole(from.inputs.phases, from.recording.durationS);
  const sides = new Map<string, Side>();
  const sideOf = async (organ: Organ, phase: Phase, place: number): Promise<Side> => {
    const key = `${organ} ${place}`;
    const made = organ === 'heart' ? heartSide : stomachSide;
    const side = sides.get(key) ?? (await withRests(made(from, phase), job));
    sides.set(key, side);
    return side;
  };
  const judged: Doubt[] = [];
  for (const doubt of doubts) {
    const place = phases.findIndex(({ fromS, toS }) => doubt.toS >= fromS && doubt.toS < toS);
    const { mend } = doubt;
    if (place < 0 || !mend) {
      judged.push(doubt);
      continue;
    }
    let effect: DoubtEffect | null = null;
    for (const organ of organsOf(from, mend)) {
      await job.breathe();
      const side = await sideOf(organ, phases[place], place);
      const changed = await withRests(side.after(mend), job);
      effect = greater(effect, greatestOf(phases[place], side, changed));
    }
    judged.push({ ...doubt, effect });
  }
  return inOrder(judged);
}

/** The one that moves a figure most first; a stretch comes before what it holds, since it settles all of that. */
function inOrder(doubts: readonly Doubt[]): readonly Doubt[] {
  const ranked = doubts.map((doubt) => {
    const { kind, fromS, toS } = doubt;
    const held = (one: Doubt) => kind === 'span' && one.fromS >= fromS && one.toS <= toS;
    return { doubt, rank: Math.max(0, ...doubts.filter(held).map(weight), weight(doubt)) };
  });
  ranked.sort(
    (a, b) =>
      Number(b.rank > a.rank) - Number(b.rank < a.rank) ||
      Number(b.doubt.kind === 'span') - Number(a.doubt.kind === 'span') ||
      a.doubt.fromS - b.doubt.fromS,
  );
  return ranked.map(({ doubt }) => doubt);
}

const weight = ({ effect }: Doubt): number => effect?.weight ?? 0;

const greater = (a: DoubtEffect | null, b: DoubtEffect | null): DoubtEffect | null =>
  (b?.weight ?? 0) > (a?.weight ?? 0) ? b : a;

/** Whose figures a mend can reach. */
function organsOf({ inputs, heart }: DoubtInputs, mend: Mend): readonly Organ[] {
  const target: SpanTarget | null = mend.kind === 'beats' ? 'heart' : targetOf(inputs.spans, mend);
  const organs: Organ[] = [];
  if (heart && (target === 'heart' || target === 'both')) organs.push('heart');
  if (target === 'stomach' || target === 'both') organs.push('stomach');
  return organs;
}

function targetOf(
  spans: readonly Span[],
  mend: Exclude<Mend, { kind: 'beats' }>,
): SpanTarget | null {
  if (mend.kind === 'exclude') return mend.span.target;
  return spans.find(({ id }) => id === mend.spanId)?.target ?? null;
}

/** The spans as a mend would leave them. */
export function spansAfter(spans: readonly Span[], mend: Mend): readonly Span[] {
  if (mend.kind === 'beats') return spans;
  if (mend.kind === 'include') return spans.filter(({ id }) => id !== mend.spanId);
  return [...spans, { ...mend.span, id: Number.NaN }];
}

function* heartSide(from: DoubtInputs, part: Phase): Generator<void, Side> {
  const { inputs, recording, heartRateHz: rateHz, detection, computed } = from;
  const { settings, roles } = inputs;
  const near = beatsNear(inputs.beats, part, rateHz);
  const figuresOf = function* (beats: BeatList, blocked: readonly Interval[]) {
    const rr = rrSeries(beats, rateHz, blocked);
    const timingSdMs = detection?.timingSdMs ?? Number.NaN;
    const breathing = computed.breathing ?? NO_BREATHING;
    const input = { rr, beats, rateHz, part, blocked, settings, timingSdMs, breathing };
    return { rr, ...(yield* heartFiguresInSteps(input)) };
  };
  const { rr, figures, segments } = yield* figuresOf(near, from.blocked);
  return {
    keys: HEART_KEYS,
    before: figures,
    halfWidths: heartHalfWidths({ rr, part, segments, settings: settings.variability }, figures),
    *after(mend) {
      if (mend.kind === 'beats')
        return (yield* figuresOf(changeBeats(near, mend.removed, mend.added), from.blocked))
          .figures;
      const spans = spansAfter(inputs.spans, mend);
      const blocked = roles.heart ? lostOn(roles.heart, 'heart', spans, recording.gaps) : [];
      return (yield* figuresOf(near, blocked)).figures;
    },
  };
}

function beatsNear({ ticks, classes, origins }: BeatList, part: Phase, rateHz: number): BeatList {
  const all = { ticks, classes, origins };
  const first = firstBeatAt(all, secondsToTicks(part.fromS - BESIDE_S, rateHz));
  const end = firstBeatAt(all, secondsToTicks(part.toS + BESIDE_S, rateHz));
  return {
    ticks: ticks.subarray(first, end),
    classes: classes.subarray(first, end),
    origins: origins.subarray(first, end),
  };
}

/** What an analysis of a slow wave leaves for the next of the same one. */
const memories = new WeakMap<object, StomachMemory>();

function* stomachSide(
  { inputs, recording, slow, computed }: DoubtInputs,
  part: Phase,
): Generator<void, Side> {
  const { settings, roles } = inputs;
  const lead = roles.slow[roles.reported];
  const drawn = slow[roles.reported];
  const memory = memories.get(drawn) ?? createStomachMemory();
  memories.set(drawn, memory);
  const phases = phasesOrWhole(inputs.phases, recording.durationS);
  const { breathing } = computed;
  const figuresOf = function* (spans: readonly Span[]) {
    const spoiled = lostOn(lead, 'stomach', spans, recording.gaps);
    const options = { slow: drawn, spoiled, phases, settings, breathing, memory };
    const analysis = yield* slowWaveRhythmInSteps(options);
    return { analysis, ...stomachFigures({ analysis, phase: part, spoiled, settings }) };
  };
  const { analysis, figures, keptS } = yield* figuresOf(inputs.spans);
  const kept = analysis.rhythm.epochs.filter(
    (epoch) => epoch.kept && epoch.fromS >= part.fromS && epoch.toS <= part.toS,
  );
  return {
    keys: STOMACH_KEYS,
    before: figures,
    halfWidths: stomachHalfWidths(kept, figures, keptS / 60),
    *after(mend) {
      return (yield* figuresOf(spansAfter(inputs.spans, mend))).figures;
    },
  };
}

/** The figure that a mend moves most beside its own range; null where it moves none. */
function greatestOf({ name }: Phase, { keys, before, halfWidths }: Side, changed: Figures) {
  let greatest: DoubtEffect | null = null;
  for (const figure of keys) {
    const [was, is] = [before[figure], changed[figure]];
    const weight = weightOf(was, is, halfWidths[figure]);
    if (!(weight > (greatest?.weight ?? 0))) continue;
    greatest = { figure, phase: name, before: was, after: is, weight };
  }
  return greatest;
}

/** Change over half the range's width; over the figure itself where no range is known; Infinity where a figure comes or goes. */
function weightOf(was: FigureValue, is: FigureValue, half: number | undefined): number {
  if ((was.kind === 'withheld') !== (is.kind === 'withheld')) return Number.POSITIVE_INFINITY;
  const change = Math.abs(numberOf(is) - numberOf(was));
  return change > 0 ? change / (half ?? Math.abs(numberOf(was))) : 0;
}
