import { beatDoubtsInSteps } from '../src/heart/beat-doubts';
import { type BeatLook, createBeatLooks } from '../src/heart/beat-looks';
import type { Detection } from '../src/heart/detect';
import type { BeatDoubtsInput } from '../src/heart/doubt-view';
import { cleanSpans, doubtedStretches } from '../src/heart/heart-span-doubts';
import { alikeTo, averageRow, LOOK_BEFORE_S } from '../src/heart/look-alikes';
import { stillOpen } from '../src/heart/open-doubts';
import type { Doubt, SettledDoubt } from '../src/recording/doubt';
import { Refusal } from '../src/recording/failure';
import { lostOn } from '../src/recording/lost';
import type { Recording } from '../src/recording/recording';
import { spansOf } from '../src/recording/span';
import { epochDoubts } from '../src/stomach/epoch-doubts';
import { slowSpanDoubts } from '../src/stomach/span-doubts';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import type { DoubtList, LookAlikes } from './analysis-api';
import { inTurns, type Job } from './job';
import { withEffects } from './pipeline-doubt-effects';
import type { Computed, ResultInputs } from './pipeline-results';

/** Everything the doubts of a review are read from. */
export interface DoubtInputs extends ResultInputs {
  readonly recording: Recording;
  readonly computed: Computed;
}

/** How beats look, by the detection they are looked at beside; each beat is looked at once. */
const looks = new WeakMap<Detection, (tick: number) => BeatLook>();

function looksOf(detection: Detection, input: BeatDoubtsInput): (tick: number) => BeatLook {
  const known = looks.get(detection);
  if (known) return known;
  const made = createBeatLooks({ ...input, averages: detection.averages });
  looks.set(detection, made);
  return made;
}

/** All doubts in ascending time without their effects, settled ones too. */
async function plainDoubts(from: DoubtInputs, job: Job): Promise<readonly Doubt[]> {
  const heart = await heartDoubts(from, job);
  await job.breathe();
  return [...heart, ...stomachDoubts(from)].sort((a, b) => a.fromS - b.fromS);
}

async function heartDoubts(from: DoubtInputs, job: Job): Promise<readonly Doubt[]> {
  const { inputs, heart, heartRateHz, blocked, detection } = from;
  if (!heart || !detection) return [];
  const input: BeatDoubtsInput = {
    beats: inputs.beats,
    rateHz: heartRateHz,
    heartbeat: heart.heartbeat,
    heartbeatHz: heart.rateHz,
    ticksPerSample: TICKS_PER_SAMPLE * heart.decimation,
    blocked,
    detection,
  };
  const lookAt = looksOf(detection, input);
  const beats = await inTurns(beatDoubtsInSteps(input, lookAt), job, 'Looking for doubts');
  const spans = spansOf(inputs.spans, heart.lead, 'heart');
  return [...beats, ...doubtedStretches(beats, heart.lead), ...cleanSpans(input, lookAt, spans)];
}

/** Doubts of the reported lead, whose figures are printed. */
function stomachDoubts({ inputs, recording, slow, computed }: DoubtInputs): readonly Doubt[] {
  const { roles, settings, spans } = inputs;
  const { lead, recorded, rateHz } = slow[roles.reported];
  const gaps = lostOn(roles.slow[roles.reported], 'stomach', [], recording.gaps);
  const own = spansOf(spans, lead, 'stomach');
  const { epochs } = computed.stomach[roles.reported].rhythm;
  return [
    ...slowSpanDoubts({ lead, recorded, rateHz, spans: own, gaps }),
    ...epochDoubts(epochs, settings.rhythmBands, settings.epoch.stepS),
  ];
}

/** The open doubts in the order of time, without their effects. */
export async function openDoubts(
  from: DoubtInputs,
  settled: readonly SettledDoubt[],
  job: Job,
): Promise<readonly Doubt[]> {
  const all = await plainDoubts(from, job);
  return stillOpen(all, settled, from.inputs.beats, from.heartRateHz);
}

/** The open doubts with what their mends would do, in the order of it. */
export async function doubtList(
  from: DoubtInputs,
  settled: readonly SettledDoubt[],
  job: Job,
): Promise<DoubtList> {
  return {
    edit: from.inputs.edit,
    open: await withEffects(from, await openDoubts(from, settled, job), job),
  };
}

/** What looks like the beat of an open doubt. Throws Refusal where no such doubt stands at a beat. */
export async function lookAlikes(
  from: DoubtInputs,
  settled: readonly SettledDoubt[],
  doubtId: string,
  job: Job,
): Promise<LookAlikes> {
  const open = await openDoubts(from, settled, job);
  const asked = open.find(({ id }) => id === doubtId);
  const { heart, detection } = from;
  const found =
    asked && heart
      ? alikeTo({ ...heart, ticksPerSample: TICKS_PER_SAMPLE * heart.decimation }, asked, open)
      : null;
  if (!heart || !found)
    throw new Refusal({
      kind: 'wrong-input',
      message: 'This doubt does not stand at a beat that others could look like.',
      place: asked ? null : doubtId,
      remedy: 'Choose a doubt of a beat from the list.',
    });
  const average = detection?.averages.at(0);
  return {
    edit: from.inputs.edit,
    rateHz: heart.rateHz,
    beforeS: LOOK_BEFORE_S,
    ...found,
    averageUv: average ? averageRow(average, heart.rateHz) : null,
  };
}
