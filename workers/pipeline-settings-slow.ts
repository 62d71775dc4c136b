import { sin } from '../src/numeric/elementary';
import { createRandom } from '../src/numeric/random';
import { cubicSpline } from '../src/numeric/spline';
import { leadKey } from '../src/recording/lead';
import type { NoMap, OrganMap } from '../src/recording/settings-map';
import type { FoldedLead } from '../src/separate/route-responses';
import { usualCpm } from '../src/stomach/usual-cpm';
import { cpmToHz } from '../src/units/rate';
import { slowBars } from './pipeline-map-bars';
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

/** What the leftover's lines are to the recording, brought from the slow rate to that of a folded stretch. */
function changeAt(
  change: Float64Array,
  slowHz: number,
  fromS: number,
  { samples, rateHz }: FoldedLead,
): Float64Array {
  const first = Math.max(0, Math.floor(fromS * slowHz) - 8);
  const last = Math.min(change.length, Math.ceil((fromS + samples.length / rateHz) * slowHz) + 8);
  const times = Float64Array.from({ length: last - first }, (_, i) => (first + i) / slowHz);
  return cubicSpline(
    times,
    change.subarray(first, last),
  )(Float64Array.from({ length: samples.length }, (_, i) => fromS + i / rateHz));
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
  const fromS = folded.firstSample / rateHz;
  const slowHz = check.lead.slow.rateHz;
  const known = plantedIn(folded, changeAt(check.leftover.change, slowHz, fromS, folded), own);
  await job.breathe();
  const beatRateHz = roles.heart ? leadChannel(recording, roles.heart).rateHz : null;
  const here = beatRateHz === null ? null : { beats, beatRateHz, fromS };
  return organMap(
    known,
    {
      organ: 'slow',
      rateHz,
      settings,
      barsOf: (ready, planted) => slowBars(ready, planted, known.target, here, settings, job),
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
