import { sin } from '../src/numeric/elementary';
import { createRandom } from '../src/numeric/random';
import { cubicSpline } from '../src/numeric/spline';
import { median } from '../src/numeric/statistics';
import { leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import type { Epoch } from '../src/recording/rhythm';
import type { NoMap, OrganMap } from '../src/recording/settings-map';
import type { Interval } from '../src/recording/span';
import type { FoldedLead } from '../src/separate/route-responses';
import { keptSamples } from '../src/stomach/kept-samples';
import { hasRhythm } from '../src/stomach/rhythm-class';
import { usualCpm } from '../src/stomach/usual-cpm';
import { windowSpectra } from '../src/stomach/window-spectrum';
import type { Leftover } from '../src/trust/leftover';
import { cpmToHz } from '../src/units/rate';
import { leftoverOfLead } from './pipeline-leftover';
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
import { leadChannel } from './pipeline-signals';

/** Generator of the noise that is added: the same for the same study. */
const SEED = 20_260_511;
/** The frequency up to which added noise is as strong as the planted wave: what a lead at 4 Hz can hold. */
const NOISE_TO_HZ = 2;
/** A wave's power lies within this of its frequency in an epoch. */
const LOBE_CPM = 0.5;
const MOST_EPOCHS = 100;

interface OwnWave {
  readonly cpm: number;
  readonly uv: number;
}

/** The study's usual wave: median DF, and median height over what the leftover holds there. */
function ownWave(
  { recorded, rateHz }: { readonly recorded: Float64Array; readonly rateHz: number },
  leftover: Leftover,
  spoiled: readonly Interval[],
  epochs: readonly Epoch[],
  lengthS: number,
): OwnWave | null {
  const powerIn = (signal: Float64Array) => {
    const kept = keptSamples(signal, rateHz, spoiled);
    const spectra = windowSpectra({ signal, kept, rateHz, lengthS, powerResponse: null });
    return (fromS: number, cpm: number) => {
      const density = spectra.density(
        spectra.prepare(Math.max(0, Math.ceil(fromS * rateHz - 1e-6))),
      );
      const from = Math.max(1, Math.round((cpm - LOBE_CPM) / spectra.binCpm));
      const to = Math.min(density.length - 1, Math.round((cpm + LOBE_CPM) / spectra.binCpm));
      let power = 0;
      for (let k = from; k <= to; k += 1) power += (density[k] * spectra.binCpm) / 60;
      return power;
    };
  };
  const own = powerIn(recorded);
  const rest = powerIn(leftover.lead);
  const rhythmic = epochs.filter(hasRhythm);
  const kept = rhythmic.length > 0 ? rhythmic : epochs.filter((one) => one.kept);
  const every = Math.max(1, kept.length / MOST_EPOCHS);
  const some = kept.filter((_, k) => Math.floor(k / every) !== Math.floor((k - 1) / every));
  const heights = some.map(({ fromS, dfCpm }) => {
    const cpm = dfCpm ?? usualCpm({ epochs });
    const beside = rhythmic.length > 0 ? rest(fromS, cpm) : 0;
    return Math.sqrt(2 * Math.max(0, own(fromS, cpm) - beside));
  });
  const uv = heights.length > 0 ? median(heights) : 0;
  return uv > 0 ? { cpm: usualCpm({ epochs }), uv } : null;
}

/** What the leftover's lines are to the recording, brought from the slow rate to that of a folded stretch. */
function changeAt(
  { change }: Leftover,
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
  const lost = lostOn(lead, 'stomach', spans, recording.gaps);
  const slow = study.signals.recorded(lead);
  const { rhythm } = from.computed.stomach[roles.reported];
  const leftover = await leftoverOfLead({ slow, spoiled: lost, rhythm }, job);
  const own = leftover && ownWave(slow, leftover, lost, rhythm.epochs, settings.epoch.lengthS);
  if (!leftover || !own) return noMap('No epoch of the reported lead is kept.');
  await job.breathe();
  const folded = await foldedStretch(work, 'slow', lead, stretch);
  if (!folded) return noMap('Samples are missing in the longest clean stretch.');
  const { rateHz } = leadChannel(recording, lead);
  const fromS = folded.firstSample / rateHz;
  const known = plantedIn(folded, changeAt(leftover, slow.rateHz, fromS, folded), own);
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
