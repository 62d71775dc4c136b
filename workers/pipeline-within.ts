import { detectInSteps } from '../src/heart/detect';
import { type BeatList, NO_BEATS } from '../src/recording/beat';
import { Refusal } from '../src/recording/failure';
import { leadChannels, leadFault, leadKey, sameLead } from '../src/recording/lead';
import type { SignalSource } from '../src/recording/recording';
import type { HeartOutput } from '../src/recording/separated';
import { type Interval, joinIntervals, spansOf } from '../src/recording/span';
import { loadRoutes } from '../src/separate/routes';
import { createSeparation } from '../src/separate/separation';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import { formatClock } from '../src/units/time';
import type { FoundWithin, WithinRequest } from './analysis-api';
import { inTurns, type Job } from './job';
import { readLead } from './lead-pass';

/** Looked at to each side of the stretch, so that the shapes and the rhythm of its surroundings are known. */
const AROUND_S = 60;
/** Read beyond that, so that no filter feels the ends of what is read. */
const MARGIN_S = 60;
/** Longest piece given to the separation at once. */
const PIECE_SAMPLES = 16384;
/** Log-odds that looking more or less eagerly adds to every place: e squared to one. */
const EAGER = { less: -2, usual: 0, more: 2 } as const;
const SIGNS = { upright: 1, inverted: -1 } as const;

export interface WithinInputs {
  readonly source: SignalSource;
  /** The heart lead's own heartbeat as the review has it. */
  readonly kept: HeartOutput | null;
  readonly request: WithinRequest;
}

/** A part of a heartbeat signal and the index of its first sample among the lead's own. */
interface Stretch {
  readonly heartbeat: Float32Array;
  readonly rateHz: number;
  readonly decimation: number;
  readonly firstSample: number;
}

/**
 * Finds the beats of a stretch of a lead, any lead in volts, from that stretch and a minute to each side alone: the file is
 * read there only, and nothing that was found before changes. Throws Refusal where the lead cannot serve or carries no rate
 * for beats.
 */
export async function detectWithin(
  { source, kept, request }: WithinInputs,
  job: Job,
): Promise<FoundWithin> {
  const { lead, heartLead, polarity, eager } = request;
  const { channels, durationS } = source.recording;
  const fault = leadFault(lead, channels, 'heart');
  if (fault !== null) throw cannotServe(fault, request);
  const lookedIn = {
    fromS: Math.max(0, request.fromS - AROUND_S),
    toS: Math.min(durationS, request.toS + AROUND_S),
  };
  const stretch =
    kept && sameLead(lead, heartLead)
      ? cutFrom(kept, lookedIn)
      : await readStretch(source, request, lookedIn, job);
  if (!stretch) throw cannotServe('Its rate leaves no band for beats.', request);
  const ownHz = channels[leadChannels(lead)[0]].rateHz;
  const startS = stretch.firstSample / ownHz;
  const blocked = blockedIn(source, request);
  const found = await inTurns(
    detectInSteps({
      heartbeat: stretch.heartbeat,
      rateHz: stretch.rateHz,
      ticksPerSample: TICKS_PER_SAMPLE * stretch.decimation,
      excluded: blocked.map(({ fromS, toS }) => ({ fromS: fromS - startS, toS: toS - startS })),
      eager: EAGER[eager],
      ...(polarity === 'dominant' ? {} : { sign: SIGNS[polarity] }),
    }),
    job,
    'Finding the heartbeats',
  );
  const heartHz = channels[leadChannels(heartLead)[0]].rateHz;
  const shift = stretch.firstSample * TICKS_PER_SAMPLE;
  return {
    beats: onClockOf(found.beats, (tick) => Math.round(((tick + shift) * heartHz) / ownHz)),
    lookedIn,
    left: blocked.filter(({ fromS, toS }) => toS > request.fromS && fromS < request.toS),
  };
}

function cannotServe(message: string, { fromS, toS }: WithinRequest): Refusal {
  return new Refusal({
    kind: 'wrong-input',
    message: `No heartbeat can be looked for in this lead. ${message}`,
    place: `${formatClock(fromS, 1)} to ${formatClock(toS, 1)}`,
    remedy: 'Choose another lead.',
  });
}

/** Stretches of the lead that carry no heartbeat: spoiled for the heart, or missing. */
function blockedIn(
  { recording }: SignalSource,
  { lead, spans }: WithinRequest,
): readonly Interval[] {
  const own = leadChannels(lead);
  const gaps = recording.gaps.filter(({ channel }) => channel === null || own.includes(channel));
  return joinIntervals([...spansOf(spans, leadKey(lead), 'heart'), ...gaps]);
}

function cutFrom({ heartbeat, rateHz, decimation }: HeartOutput, within: Interval): Stretch {
  const from = Math.max(0, Math.floor(within.fromS * rateHz));
  const to = Math.min(heartbeat.length, Math.ceil(within.toS * rateHz));
  return {
    heartbeat: heartbeat.subarray(from, to),
    rateHz,
    decimation,
    firstSample: from * decimation,
  };
}

async function readStretch(
  source: SignalSource,
  { lead, settings }: WithinRequest,
  within: Interval,
  job: Job,
): Promise<Stretch | null> {
  const { rateHz, sampleCount } = source.recording.channels[leadChannels(lead)[0]];
  const from = Math.max(0, Math.floor((within.fromS - MARGIN_S) * rateHz));
  const to = Math.min(sampleCount, Math.ceil((within.toS + MARGIN_S) * rateHz));
  const samples = await readLead(source, lead, from, to);
  const separation = createSeparation({
    lead: leadKey(lead),
    rateHz,
    sampleCount: samples.length,
    settings,
    routes: await loadRoutes([settings.heartRoute]),
    wants: { slow: false, heart: true },
  });
  for (let i = 0; i < samples.length; i += PIECE_SAMPLES) {
    separation.push(samples.subarray(i, i + PIECE_SAMPLES));
    await job.breathe();
  }
  const heart = separation.finish().heart;
  if (!heart) return null;
  const startS = from / rateHz;
  const cut = cutFrom(heart, { fromS: within.fromS - startS, toS: within.toS - startS });
  return { ...cut, firstSample: from + cut.firstSample };
}

/** Beats with their ticks told by another clock; of two that fall on one tick the first stays. */
function onClockOf(beats: BeatList, tickOf: (tick: number) => number): BeatList {
  const ticks = Array.from(beats.ticks, tickOf);
  const kept = ticks.flatMap((tick, i) => (i === 0 || tick > ticks[i - 1] ? [i] : []));
  if (kept.length === 0) return NO_BEATS;
  return {
    ticks: Float64Array.from(kept, (i) => ticks[i]),
    classes: Uint8Array.from(kept, (i) => beats.classes[i]),
    origins: Uint8Array.from(kept, (i) => beats.origins[i]),
  };
}
