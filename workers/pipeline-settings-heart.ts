import { beatTrain } from '../src/heart/beat-train';
import { createRandom } from '../src/numeric/random';
import { BEAT_CLASSES, type BeatList } from '../src/recording/beat';
import { leadKey } from '../src/recording/lead';
import type { MapBar, NoMap, OrganMap } from '../src/recording/settings-map';
import { heartBandResponses, heartNoise } from '../src/separate/route-responses';
import { type ReadyStretch, scoreOf } from '../src/trust/match-score';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import {
  foldedStretch,
  type MapWork,
  mapStretch,
  NO_STRETCH,
  noMap,
  organMap,
} from './pipeline-map-organ';

/** Generator of the noise that is added: the same for the same study. */
const SEED = 20_260_512;
const UNUSABLE = BEAT_CLASSES.indexOf('Q');

/** The beats of a stretch in its folded samples; those that are not usable are left out. */
function placedIn(
  { ticks, classes }: BeatList,
  firstSample: number,
  samplesPerOne: number,
  length: number,
) {
  const places = ticks.map((tick) => (tick / TICKS_PER_SAMPLE - firstSample) / samplesPerOne);
  const inside = (place: number, i: number) =>
    place >= 0 && place < length && classes[i] !== UNUSABLE;
  return {
    places: places.filter(inside),
    classes: classes.filter((_, i) => inside(places[i], i)),
  };
}

/** The map of the heartbeat: the beats' own averages at their own times, in what else the heart lead holds there. */
export async function heartMap(work: MapWork): Promise<OrganMap | NoMap> {
  const { study, from, job } = work;
  const { inputs, heart, heartRateHz } = from;
  const { roles, settings, beats } = inputs;
  if (!roles.heart || !heart) return noMap('No lead is read for the heartbeat.');
  const stretch = mapStretch('heart', roles.heart, study.source, inputs.spans);
  if (!stretch) return noMap(NO_STRETCH);
  const folded = await foldedStretch(work, 'heart', roles.heart, stretch);
  if (!folded) return noMap('Samples are missing in the longest clean stretch.');
  const { samples, rateHz, firstSample } = folded;
  const placed = placedIn(beats, firstSample, heartRateHz / rateHz, samples.length);
  const train = beatTrain(samples, rateHz, placed);
  if (!train) return noMap('Too few beats stand in the longest clean stretch.');
  await job.breathe();
  const noiseUv = Math.sqrt(
    train.samples.reduce((sum, value) => sum + value * value, 0) / train.samples.length,
  );
  const noise = heartNoise(samples.length, heartRateHz, createRandom(SEED)).map(
    (value) => noiseUv * value,
  );
  await job.breathe();
  const barsOf = (ready: ReadyStretch): readonly MapBar[] => {
    const { freqsHz } = ready.products;
    const gain = heartBandResponses(settings, { rateHz: heartRateHz, freqsHz });
    return gain ? [{ route: 'band', ...scoreOf(ready, ready.products, gain) }] : [];
  };
  return organMap(
    { lead: { samples, rateHz }, target: train.samples, noise },
    { organ: 'heart', rateHz: heartRateHz, settings, barsOf },
    {
      lead: leadKey(roles.heart),
      ...stretch,
      target: { kind: 'beats', beats: train.beats, uv: train.heightUv },
      noiseUv,
      noiseToHz: rateHz / 2,
    },
    job,
  );
}
