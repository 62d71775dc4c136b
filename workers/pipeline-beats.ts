import { type Detection, type DetectionInput, detectInSteps } from '../src/heart/detect';
import { placeBeat } from '../src/heart/place-beat';
import { Refusal } from '../src/recording/failure';
import { type Lead, leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import type { Roles } from '../src/recording/roles';
import type { Settings } from '../src/recording/settings';
import type { Interval, Span } from '../src/recording/span';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import type { PlacedBeat } from './analysis-api';
import { inTurns, type Job } from './job';
import { doubtedOf } from './judged-spans';
import type { Study } from './pipeline-study';

/** The spans that the watch over each lead proposes, without ids. */
export function proposedSpans(study: Study, roles: Roles): readonly Omit<Span, 'id'>[] {
  const leads = new Map(
    [...roles.slow, ...(roles.heart ? [roles.heart] : [])].map((lead) => [leadKey(lead), lead]),
  );
  return [...leads.values()].flatMap((lead) => study.signals.get(lead)?.proposedSpans ?? []);
}

export const withIds = (spans: readonly Omit<Span, 'id'>[]): readonly Span[] =>
  spans.map((span, i) => ({ ...span, id: i + 1 }));

type LookedIn = Pick<DetectionInput, 'excluded' | 'doubted'>;

/** Where the detector does not look, and where it is to say whether beats can be read. */
export function toJudge(study: Study, lead: Lead, proposed: readonly Omit<Span, 'id'>[]): LookedIn {
  const doubted = doubtedOf(lead, proposed);
  const others = proposed.filter((span) => !doubted.includes(span));
  return {
    excluded: blockedOf(study, lead, withIds(others)),
    doubted: doubted.map(({ fromS, toS }) => ({ fromS, toS })),
  };
}

/** Stretches of a lead that carry no heartbeat: spoiled for the heart, or missing. */
export function blockedOf(study: Study, lead: Lead, spans: readonly Span[]): readonly Interval[] {
  return lostOn(lead, 'heart', spans, study.source.recording.gaps);
}

/** The beats of a lead, found once for the same signal and the same stretches left out; null where it has no heartbeat. */
export async function detectionOf(
  study: Study,
  lead: Lead,
  { excluded = [], doubted = [] }: LookedIn,
  { heartRoute, heartBandHz, fractional }: Settings,
  job: Job,
): Promise<Detection | null> {
  const heart = study.signals.heart(lead);
  if (!heart) return null;
  const key = JSON.stringify([
    leadKey(lead),
    excluded,
    doubted,
    heartRoute,
    heartBandHz,
    fractional,
  ]);
  if (study.detection?.key !== key) {
    const signal = {
      heartbeat: heart.heartbeat,
      rateHz: heart.rateHz,
      ticksPerSample: TICKS_PER_SAMPLE * heart.decimation,
      excluded,
      doubted,
    };
    study.detection = {
      key,
      found: await inTurns(detectInSteps(signal), job, 'Finding the heartbeats'),
    };
  }
  study.heartLead = lead;
  return study.detection.found;
}

/** Where a beat put near a time should stand. Throws Refusal where no beats were looked for. */
export function placeNear(study: Study, nearS: number): PlacedBeat {
  const lead = study.heartLead;
  const heart = lead ? study.signals.heart(lead) : null;
  if (!lead || !heart || !study.detection)
    throw new Refusal({
      kind: 'wrong-input',
      message: 'There is no heart lead to put a beat on.',
      place: null,
      remedy: 'Choose a heart lead first.',
    });
  const { averages, sign } = study.detection.found;
  const ticksPerSample = TICKS_PER_SAMPLE * heart.decimation;
  return placeBeat(
    { heartbeat: heart.heartbeat, rateHz: heart.rateHz, ticksPerSample, averages, sign },
    nearS,
  );
}
