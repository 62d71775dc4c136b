import { beatDoubts } from '../src/heart/beat-doubts';
import { alikeTo, averageRow, LOOK_BEFORE_S } from '../src/heart/look-alikes';
import type { Doubt, SettledDoubt } from '../src/recording/doubt';
import { Refusal } from '../src/recording/failure';
import type { Recording } from '../src/recording/recording';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import type { DoubtList, LookAlikes } from './analysis-api';
import type { Job } from './job';
import type { Computed, ResultInputs } from './pipeline-results';

/** Everything the doubts of a review are read from. */
export interface DoubtInputs extends ResultInputs {
  readonly recording: Recording;
  readonly computed: Computed;
}

/** All doubts in ascending time without their effects, settled ones too. */
export function plainDoubts({
  inputs,
  heart,
  heartRateHz,
  blocked,
  detection,
}: DoubtInputs): readonly Doubt[] {
  if (!heart || !detection) return [];
  return beatDoubts({
    beats: inputs.beats,
    rateHz: heartRateHz,
    heartbeat: heart.heartbeat,
    heartbeatHz: heart.rateHz,
    ticksPerSample: TICKS_PER_SAMPLE * heart.decimation,
    blocked,
    detection,
  });
}

const openOf = (from: DoubtInputs, settled: readonly SettledDoubt[]): readonly Doubt[] => {
  const done = new Set(settled.map(({ id }) => id));
  return plainDoubts(from).filter(({ id }) => !done.has(id));
};

/** The open doubts with what their mends would do, in the order of it. */
export async function doubtList(
  from: DoubtInputs,
  settled: readonly SettledDoubt[],
  job: Job,
): Promise<DoubtList> {
  await job.breathe();
  return { edit: from.inputs.edit, open: openOf(from, settled) };
}

/** What looks like the beat of an open doubt. Throws Refusal where no such doubt stands at a beat. */
export function lookAlikes(
  from: DoubtInputs,
  settled: readonly SettledDoubt[],
  doubtId: string,
): LookAlikes {
  const open = openOf(from, settled);
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
