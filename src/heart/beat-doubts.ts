import type { Doubt } from '../recording/doubt';
import { isWithin, joinIntervals } from '../recording/span';
import { type BeatLook, createBeatLooks } from './beat-looks';
import { type BeatDoubtsInput, type DoubtView, doubtView, type Reason } from './doubt-view';
import { gapReason } from './gap-doubts';
import { oddsReasons } from './odds-doubts';
import { rhythmReason } from './rhythm-doubts';
import { shapeReason } from './shape-doubts';

/** Beats looked at between two steps. */
const BEATS_A_STEP = 40;

/**
 * Doubts of beats in ascending time, one a beat, without their effects, in small steps: yields the part done. `lookAt` tells
 * how the heartbeat looks at a tick.
 */
export function* beatDoubtsInSteps(
  input: BeatDoubtsInput,
  lookAt: (tick: number) => BeatLook,
): Generator<number, readonly Doubt[]> {
  const looks: BeatLook[] = [];
  for (const tick of input.beats.ticks) {
    looks.push(lookAt(tick));
    if (looks.length % BEATS_A_STEP === 0) yield (0.5 * looks.length) / input.beats.ticks.length;
  }
  const view = doubtView(input, looks);
  const excluded = joinIntervals(input.blocked);
  const byBeat = new Map<number, Reason>();
  const take = (reason: Reason | null) => {
    if (!reason || isWithin(view.timesS[reason.beat], excluded)) return;
    const before = byBeat.get(reason.beat);
    if (!before || reason.strength > before.strength) byBeat.set(reason.beat, reason);
  };
  for (let beat = 0; beat < view.count; beat += 1) {
    for (const find of [gapReason, rhythmReason, shapeReason]) take(find(view, beat));
    if (beat % BEATS_A_STEP === 0) yield 0.5 + (0.5 * beat) / view.count;
  }
  oddsReasons(view).forEach(take);
  const reasons = [...byBeat.values()]
    .filter(({ beat, kind }) => !isEarlyByOther(kind, byBeat.get(beat - 1)))
    .sort((a, b) => a.beat - b.beat);
  return turnsJoined(reasons).map((run) => doubtOf(view, run));
}

const TOO_MANY: readonly Doubt['kind'][] = ['extra-beat', 'tall-wave', 'two-candidates'];

/** A beat that comes early only after one that is itself too many. */
const isEarlyByOther = (kind: Doubt['kind'], before: Reason | undefined): boolean =>
  kind === 'early-beat' && before !== undefined && TOO_MANY.includes(before.kind);

/** Beats in a row that stand upside down are one place: a change of sign lasts. */
function turnsJoined(reasons: readonly Reason[]): readonly (readonly Reason[])[] {
  const runs: Reason[][] = [];
  for (const reason of reasons) {
    const last = runs.at(-1)?.at(-1);
    const goesOn =
      reason.kind === 'sign-change' &&
      last?.kind === 'sign-change' &&
      reason.beat - last.beat <= MOST_BETWEEN;
    if (goesOn) runs.at(-1)?.push(reason);
    else runs.push([reason]);
  }
  return runs;
}

/** The doubts of beats at once. */
export function beatDoubts(input: BeatDoubtsInput): readonly Doubt[] {
  const looks = createBeatLooks({ ...input, averages: input.detection.averages });
  const steps = beatDoubtsInSteps(input, looks);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** Beats of a stretch of changed sign may be so far apart in the list: one of them in doubt for another reason parts nothing. */
const MOST_BETWEEN = 2;
const BEFORE_GAP: readonly Doubt['kind'][] = ['missed-beat'];

function doubtOf({ beats, timesS }: DoubtView, run: readonly Reason[]): Doubt {
  const [{ beat, kind, why, mend }] = run;
  const last = run[run.length - 1].beat;
  const tick = beats.ticks[beat];
  const before = BEFORE_GAP.includes(kind) && beat > 0 ? beat - 1 : beat;
  return {
    id: `${kind}-${tick}`,
    kind,
    fromS: timesS[before],
    toS: timesS[last],
    tick,
    lead: null,
    why: run.length > 1 ? `From here on ${last - beat + 1} beats stand upside down. ${why}` : why,
    mend,
    effect: null,
  };
}
