import { sin } from '../src/numeric/elementary';
import { createRandom } from '../src/numeric/random';
import { cubicSpline } from '../src/numeric/spline';
import { NO_BEATS } from '../src/recording/beat';
import { leadKey } from '../src/recording/lead';
import type { Epoch } from '../src/recording/rhythm';
import type { Settings } from '../src/recording/settings';
import type { NoMap, OrganMap } from '../src/recording/settings-map';
import type { Interval } from '../src/recording/span';
import { type FoldedLead, slowLead } from '../src/separate/route-responses';
import { usualCpm } from '../src/stomach/usual-cpm';
import { cpmToHz } from '../src/units/rate';
import type { Job } from './job';
import { leftoverOfLead } from './pipeline-leftover';
import { type BeatsHere, slowBars, withoutBeats } from './pipeline-map-bars';
import {
  foldedStretch,
  type KnownStretch,
  type MapWork,
  mapStretch,
  NO_STRETCH,
  noMap,
  organMap,
} from './pipeline-map-organ';
import { slowCheckOf } from './pipeline-planted';
import { ownHeight } from './pipeline-planted-slow';
import { leadChannel } from './pipeline-signals';

/** Generator of the noise that is added: the same for the same study. */
const SEED = 20_260_511;
/** The frequency up to which added noise is as strong as the planted wave: what a lead at 4 Hz can hold. */
const NOISE_TO_HZ = 2;
/** The study's usual wave. */
interface OwnWave {
  readonly cpm: number;
  readonly uv: number;
}

/**
 * What takes the study's own wave out of a stretch and puts its noise in the place: read off the stretch without its
 * heartbeats, so that what they leave inside the band stays in it; at the rate of the folded stretch. Null where too little
 * of it is there.
 */
async function changeOf(
  folded: FoldedLead,
  epochs: readonly Epoch[],
  { here, settings }: { readonly here: BeatsHere & Interval; readonly settings: Settings },
  job: Job,
): Promise<Float64Array | null> {
  const slow = slowLead(folded);
  await job.breathe();
  const bare = (await withoutBeats(folded, slow, here, settings, job)) ?? slow;
  const inside = epochs.filter(({ fromS, toS }) => fromS >= here.fromS && toS <= here.toS);
  const shifted = inside.map((epoch) => ({
    ...epoch,
    fromS: epoch.fromS - here.fromS,
    toS: epoch.toS - here.fromS,
  }));
  const leftover = await leftoverOfLead(
    {
      slow: { recorded: bare.samples, rateHz: bare.rateHz },
      spoiled: [],
      rhythm: { epochs: shifted },
    },
    job,
  );
  if (!leftover) return null;
  const { change } = leftover;
  const times = change.map((_, i) => i / bare.rateHz);
  return cubicSpline(times, change)(folded.samples.map((_, i) => i / folded.rateHz));
}

/** The stretch with a wave in place of its own, and the noise that is added for the second map. */
function plantedIn(
  folded: FoldedLead,
  change: Float64Array,
  { cpm, uv }: OwnWave,
): KnownStretch & Pick<OrganMap, 'noiseUv' | 'noiseToHz'> {
  const { rateHz, samples } = folded;
  const turn = (2 * Math.PI * cpmToHz(cpm)) / rateHz;
  const target = change.map((_, i) => uv * sin(turn * i));
  const noiseToHz = Math.min(NOISE_TO_HZ, rateHz / 2);
  const noiseUv = uv / Math.SQRT2;
  const size = noiseUv * Math.sqrt(rateHz / 2 / noiseToHz);
  const random = createRandom(SEED);
  return {
    lead: { rateHz, samples: target.map((value, i) => value + change[i] + samples[i]) },
    target,
    noise: target.map(() => size * random.gaussian()),
    noiseUv,
    noiseToHz,
  };
}

/** The map of the slow wave: a wave of the study's usual rate and height planted in a stretch of the reported lead's leftover. */
export async function slowMap(work: MapWork): Promise<OrganMap | NoMap> {
  const { study, from, job } = work;
  const { roles, settings, spans, beats } = from.inputs;
  const { recording } = study.source;
  const lead = roles.slow[roles.reported];
  if (!lead) return noMap('No lead is read for the slow wave.');
  const stretch = mapStretch('slow', lead, study.source, spans);
  if (!stretch) return noMap(NO_STRETCH);
  const check = await slowCheckOf({ ...from, study, open: [] }, job);
  const height = check && (await ownHeight(check, job));
  if (!check || !height) return noMap('No epoch of the reported lead is kept.');
  const own = { cpm: usualCpm(check), uv: height.ownUv };
  await job.breathe();
  const folded = await foldedStretch(work, 'slow', lead, stretch);
  if (!folded) return noMap('Samples are missing in the longest clean stretch.');
  const { rateHz } = leadChannel(recording, lead);
  const here = {
    beats: roles.heart ? beats : NO_BEATS,
    beatRateHz: leadChannel(recording, roles.heart ?? lead).rateHz,
    fromS: folded.firstSample / rateHz,
    toS: stretch.toS,
  };
  const change = await changeOf(folded, check.epochs, { here, settings }, job);
  if (!change) return noMap('No epoch of the reported lead is kept.');
  const known = plantedIn(folded, change, own);
  await job.breathe();
  return organMap(
    known,
    {
      organ: 'slow',
      rateHz,
      settings,
      barsOf: (_, planted) => slowBars(planted, known.target, here, settings, job),
    },
    {
      lead: leadKey(lead),
      ...stretch,
      target: { kind: 'wave', ...own },
      noiseUv: known.noiseUv,
      noiseToHz: known.noiseToHz,
    },
    job,
  );
}
