import type { BeatList } from '../src/recording/beat';
import { leadKey } from '../src/recording/lead';
import { spansOf } from '../src/recording/span';
import { heartPart } from '../src/separate/heart-part';
import type { HeartPart } from '../src/separate/route';
import { keptSamples } from '../src/stomach/kept-samples';
import type { ReviewInputs } from './analysis-api';
import { inTurns, type Job } from './job';
import { leadChannel } from './pipeline-signals';
import type { Study } from './pipeline-study';
import { identity } from './remember';
import { sameBeats } from './same-series';

/** What heartbeats leave in a lead, with what it was made of. */
export interface KeptHeartPart {
  readonly key: string;
  readonly beats: BeatList;
  readonly part: HeartPart;
}

/**
 * What the heartbeats of a review leave in each slow-wave lead, by its key, made again where the lead, its spoiled spans, the
 * beats or the settings are others; without a heart lead, or for a lead of too few samples a second, there is none.
 */
export async function heartPartsOf(
  study: Study,
  { roles, settings, spans, beats }: ReviewInputs,
  job: Job,
): Promise<ReadonlyMap<string, HeartPart>> {
  const parts = new Map<string, HeartPart>();
  if (!roles.heart) return parts;
  const beatRateHz = leadChannel(study.source.recording, roles.heart).rateHz;
  for (const lead of roles.slow) {
    const { recorded, rateHz, wide } = study.signals.recorded(lead);
    if (!wide) continue;
    const name = leadKey(lead);
    const spoiled = spansOf(spans, name, 'stomach');
    const key = JSON.stringify([identity(recorded), beatRateHz, spoiled, settings.beatAverage]);
    const known = study.heartParts.get(name);
    const isKnown = known?.key === key && sameBeats(known.beats, beats);
    const part = isKnown
      ? known.part
      : await inTurns(
          heartPart({
            wide,
            beats,
            beatRateHz,
            kept: keptSamples(recorded, rateHz, spoiled),
            settings: settings.beatAverage,
          }),
          job,
          'Averaging the heartbeats',
        );
    study.heartParts.set(name, { key, beats, part });
    parts.set(name, part);
  }
  return parts;
}
