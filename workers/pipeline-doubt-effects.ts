import { NO_BREATHING } from '../src/heart/breathing';
import { heartHalfWidths } from '../src/heart/half-widths';
import { heartFigures } from '../src/heart/heart-figures';
import { rrSeries } from '../src/heart/rr-series';
import { type BeatList, changeBeats, firstBeatAt } from '../src/recording/beat';
import type { Doubt, DoubtEffect } from '../src/recording/doubt';
import type { Figures, FigureValue } from '../src/recording/figure';
import { type Phase, phasesOrWhole } from '../src/recording/phase';
import type { Interval } from '../src/recording/span';
import { secondsToTicks } from '../src/units/ticks';
import type { Job } from './job';
import type { DoubtInputs } from './pipeline-doubts';

/** Figures of the heart that a doubt of a beat may move, in the order they are shown. */
const HEART_KEYS = ['heart_rate_bpm', 'rmssd_ms', 'sdnn_ms', 'lf_ms2', 'hf_ms2'] as const;
/** Beats so far outside a phase are kept beside its own. */
const BESIDE_S = 10;

/** What the figures of one phase are, and what they would be. */
interface PhaseEffects {
  readonly effectOf: (doubt: Doubt) => DoubtEffect | null;
}

/** The doubts with what each mend does to the figure it moves most, the one that moves one most first; ties by time. */
export async function withEffects(
  from: DoubtInputs,
  doubts: readonly Doubt[],
  job: Job,
): Promise<readonly Doubt[]> {
  const known = new Map<Phase, PhaseEffects>();
  const phases = phasesOrWhole(from.inputs.phases, from.recording.durationS);
  const judged: Doubt[] = [];
  for (const doubt of doubts) {
    await job.breathe();
    const phase = phases.find(({ fromS, toS }) => doubt.toS >= fromS && doubt.toS < toS);
    if (!phase || !doubt.mend) {
      judged.push(doubt);
      continue;
    }
    const effects = known.get(phase) ?? heartEffects(from, phase);
    known.set(phase, effects);
    judged.push({ ...doubt, effect: effects.effectOf(doubt) });
  }
  const weight = ({ effect }: Doubt) => effect?.weight ?? 0;
  return judged.sort((a, b) => weight(b) - weight(a) || a.fromS - b.fromS);
}

function heartEffects(from: DoubtInputs, phase: Phase): PhaseEffects {
  const { inputs, heartRateHz: rateHz, blocked, detection, computed } = from;
  const { settings } = inputs;
  const near = beatsNear(inputs.beats, phase, rateHz);
  const figuresOf = (beats: BeatList, without: readonly Interval[]) => {
    const rr = rrSeries(beats, rateHz, without);
    const timingSdMs = detection?.timingSdMs ?? Number.NaN;
    const breathing = computed.breathing ?? NO_BREATHING;
    const part = phase;
    const input = { rr, beats, rateHz, part, blocked: without, settings, timingSdMs, breathing };
    return { rr, ...heartFigures(input) };
  };
  const before = figuresOf(near, blocked);
  const widths = heartHalfWidths(
    { rr: before.rr, part: phase, segments: before.segments, settings: settings.variability },
    before.figures,
  );
  return {
    effectOf({ mend }) {
      if (mend?.kind === 'beats') {
        const after = figuresOf(changeBeats(near, mend.removed, mend.added), blocked);
        return greatestEffect(phase, before.figures, after.figures, widths);
      }
      return null;
    },
  };
}

function beatsNear({ ticks, classes, origins }: BeatList, phase: Phase, rateHz: number): BeatList {
  const all = { ticks, classes, origins };
  const first = firstBeatAt(all, secondsToTicks(phase.fromS - BESIDE_S, rateHz));
  const end = firstBeatAt(all, secondsToTicks(phase.toS + BESIDE_S, rateHz));
  return {
    ticks: ticks.subarray(first, end),
    classes: classes.subarray(first, end),
    origins: origins.subarray(first, end),
  };
}

/** The figure that moves most beside its own range; null where none moves. */
function greatestEffect(
  phase: Phase,
  before: Figures,
  after: Figures,
  widths: Readonly<Record<string, number>>,
): DoubtEffect | null {
  let greatest: DoubtEffect | null = null;
  for (const figure of HEART_KEYS) {
    const [was, is] = [before[figure], after[figure]];
    const weight = weightOf(was, is, widths[figure]);
    if (!(weight > (greatest?.weight ?? 0))) continue;
    greatest = { figure, phase: phase.name, before: was, after: is, weight };
  }
  return greatest;
}

/** Change over half the range's width; over the figure itself where no range is known; Infinity where a figure comes or goes. */
function weightOf(was: FigureValue, is: FigureValue, half: number | undefined): number {
  if (was.kind !== is.kind) return Number.POSITIVE_INFINITY;
  if (was.kind !== 'number' || is.kind !== 'number') return 0;
  const change = Math.abs(is.value - was.value);
  return change / (half ?? Math.abs(was.value));
}
