import type { BeatStretch } from '../src/heart/heart-leftover';
import { type Lead, leadChannels } from '../src/recording/lead';
import type { Interval } from '../src/recording/span';
import type { Routes } from '../src/separate/routes';
import { createSeparation } from '../src/separate/separation';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import type { Job } from './job';
import { leadSamples } from './lead-pass';
import type { EvidenceInputs } from './pipeline-evidence';
import { leadChannel } from './pipeline-signals';

/** Read to each side of a stretch, so that no filter feels the ends of what is read. */
const MARGIN_S = 10;
const PIECE_SAMPLES = 16_384;

/** A stretch of the heart lead as it was read: its first sample and the samples, with its beats. */
export interface ReadStretch extends BeatStretch {
  readonly within: Interval;
  readonly firstSample: number;
}

/** The stretches of the heart lead, read from the file with a margin to each side. */
export async function readStretches(
  from: EvidenceInputs,
  lead: Lead,
  stretches: readonly Interval[],
  job: Job,
): Promise<readonly ReadStretch[]> {
  const { study, inputs, recording, heart } = from;
  const { rateHz, sampleCount } = leadChannel(recording, lead);
  const decimation = heart?.decimation ?? 1;
  const channels = leadChannels(lead);
  const read: ReadStretch[] = [];
  for (const within of stretches) {
    const first = Math.max(0, Math.floor((within.fromS - MARGIN_S) * rateHz));
    const firstSample = first - (first % decimation);
    const end = Math.min(sampleCount, Math.ceil((within.toS + MARGIN_S) * rateHz));
    const whole = end - ((end - firstSample) % decimation);
    const parts: Float64Array[] = [];
    for (const channel of channels)
      parts.push(await study.source.read(channel, firstSample, whole));
    const samples = leadSamples(lead, (channel) => parts[channels.indexOf(channel)]);
    const places: number[] = [];
    const classes: number[] = [];
    inputs.beats.ticks.forEach((tick, k) => {
      const place = tick / TICKS_PER_SAMPLE - firstSample;
      if (place < 0 || place >= samples.length) return;
      places.push(place);
      classes.push(inputs.beats.classes[k]);
    });
    read.push({ within, firstSample, samples, places, classes });
    await job.breathe();
  }
  return read;
}

/** The stretches with something in them, through the heart's route, one after the other in one signal. */
export async function routedTogether(
  from: EvidenceInputs,
  rateHz: number,
  stretches: readonly Float64Array[],
  routes: Routes,
  job: Job,
) {
  const parts: Float32Array[] = [];
  for (const samples of stretches) {
    const separation = createSeparation({
      lead: from.heart?.lead ?? '',
      rateHz,
      sampleCount: samples.length,
      settings: from.inputs.settings,
      routes,
      wants: { slow: false, heart: true },
    });
    for (let i = 0; i < samples.length; i += PIECE_SAMPLES) {
      separation.push(samples.subarray(i, i + PIECE_SAMPLES));
      await job.breathe();
    }
    const { heart } = separation.finish();
    if (heart) parts.push(heart.heartbeat);
  }
  const whole = new Float32Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  const starts = parts.map((part) => {
    whole.set(part, at);
    at += part.length;
    return at - part.length;
  });
  return { whole, starts };
}

/** Times of the beats of a stretch, in seconds of the study. */
export const ownTimes = ({ places, firstSample }: ReadStretch, rateHz: number): readonly number[] =>
  places.map((place) => (place + firstSample) / rateHz);
