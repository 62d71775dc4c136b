import { sin } from '../src/numeric/elementary';
import { createRandom } from '../src/numeric/random';
import { cubicSpline } from '../src/numeric/spline';
import { median } from '../src/numeric/statistics';
import type { BeatList } from '../src/recording/beat';
import { leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import type { Epoch } from '../src/recording/rhythm';
import type { Settings } from '../src/recording/settings';
import type { MapBar, NoMap, OrganMap } from '../src/recording/settings-map';
import type { Interval } from '../src/recording/span';
import { drawBand } from '../src/separate/band';
import { heartPart } from '../src/separate/heart-part';
import {
  type FoldedLead,
  foldedNoise,
  slowBandResponses,
  slowLead,
} from '../src/separate/route-responses';
import { carriesBeats } from '../src/separate/wide-lead';
import { keptSamples } from '../src/stomach/kept-samples';
import { hasRhythm } from '../src/stomach/rhythm-class';
import { usualCpm } from '../src/stomach/usual-cpm';
import { windowSpectra } from '../src/stomach/window-spectrum';
import type { Leftover } from '../src/trust/leftover';
import { filtered, type ReadyStretch, readyStretch, scoreOf } from '../src/trust/match-score';
import { stretchProducts } from '../src/trust/stretch-products';
import { cpmToHz } from '../src/units/rate';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import { type Job, withRests } from './job';
import { leftoverOfLead } from './pipeline-leftover';
import {
  foldedStretch,
  type MapWork,
  MOST_AHEAD_S,
  mapStretch,
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

interface BeatsHere {
  readonly beats: BeatList;
  readonly beatRateHz: number;
  readonly fromS: number;
}

/** The beats of a stretch in ticks from its start on. */
function beatsFrom({ beats, beatRateHz, fromS }: BeatsHere, lengthS: number): BeatList {
  const perSecond = beatRateHz * TICKS_PER_SAMPLE;
  const start = Math.round(fromS * perSecond);
  const inside = (tick: number) => tick >= start && tick < start + lengthS * perSecond;
  const at = Array.from(beats.ticks.keys()).filter((i) => inside(beats.ticks[i]));
  return {
    ticks: Float64Array.from(at, (i) => beats.ticks[i] - start),
    classes: Uint8Array.from(at, (i) => beats.classes[i]),
    origins: Uint8Array.from(at, (i) => beats.origins[i]),
  };
}

/**
 * Score of route `beat-average`, which is not linear: run once in time on the very lead, and what it draws held against the
 * target by the same measure. Null where the lead has too few samples a second or there is no heart lead.
 */
async function beatAverageBar(
  planted: FoldedLead,
  target: Float64Array,
  here: BeatsHere | null,
  settings: Settings,
  job: Job,
): Promise<MapBar | null> {
  if (!here || !carriesBeats(planted.rateHz)) return null;
  const slow = slowLead(planted);
  const kept = new Uint8Array(slow.samples.length).fill(1);
  const part = await withRests(
    heartPart({
      wide: { rateHz: planted.rateHz, samples: Float32Array.from(planted.samples) },
      beats: beatsFrom(here, planted.samples.length / planted.rateHz),
      beatRateHz: here.beatRateHz,
      kept,
      settings: settings.beatAverage,
    }),
    job,
  );
  if (part.beats === 0) return null;
  const without = slow.samples.map((value, i) => value - (part.uv[i] ?? 0));
  const { slowWave } = await withRests(
    drawBand(without, slow.rateHz, settings, { kept, breathing: null }),
    job,
  );
  const known = slowLead({ samples: target, rateHz: planted.rateHz }).samples;
  const drawn = readyStretch(stretchProducts(known, slowWave, slow.rateHz), MOST_AHEAD_S.slow);
  const one = new Float64Array(drawn.products.freqsHz.length).fill(1);
  const zero = one.map(() => 0);
  return { route: 'beat-average', ...scoreOf(drawn, filtered(drawn.products, one, zero), one) };
}

/** The map of the slow wave: a wave of the study's usual rate and height planted in a stretch of the reported lead's leftover. */
export async function slowMap(work: MapWork): Promise<OrganMap | NoMap> {
  const { study, from, job } = work;
  const { roles, settings, spans, beats } = from.inputs;
  const { recording } = study.source;
  const lead = roles.slow[roles.reported];
  if (!lead) return noMap('No lead is read for the slow wave.');
  const lost = lostOn(lead, 'stomach', spans, recording.gaps);
  const stretch = mapStretch('slow', lead, study.source, spans);
  if (!stretch) return noMap('No four minutes in a row are free of spoiled stretches.');
  const slow = study.signals.recorded(lead);
  const { rhythm } = from.computed.stomach[roles.reported];
  const leftover = await leftoverOfLead({ slow, spoiled: lost, rhythm }, job);
  const own = leftover && ownWave(slow, leftover, lost, rhythm.epochs, settings.epoch.lengthS);
  if (!leftover || !own) return noMap('No epoch of the reported lead is kept.');
  await job.breathe();
  const folded = await foldedStretch(work, 'slow', lead, stretch);
  if (!folded) return noMap('Samples are missing in the longest clean stretch.');
  const { rateHz } = folded;
  const ownHz = leadChannel(recording, lead).rateHz;
  const fromS = folded.firstSample / ownHz;
  const change = changeAt(leftover, slow.rateHz, fromS, folded);
  const turn = (2 * Math.PI * cpmToHz(own.cpm)) / rateHz;
  const target = change.map((_, i) => own.uv * sin(turn * i));
  const samples = target.map((value, i) => value + change[i] + folded.samples[i]);
  const noiseToHz = Math.min(NOISE_TO_HZ, rateHz / 2);
  const noiseUv = own.uv / Math.SQRT2;
  const size = noiseUv * Math.sqrt(rateHz / 2 / noiseToHz);
  const noise = foldedNoise('slow', samples.length, ownHz, createRandom(SEED)).map(
    (value) => size * value,
  );
  await job.breathe();
  const here = roles.heart
    ? { beats, beatRateHz: leadChannel(recording, roles.heart).rateHz, fromS }
    : null;
  const barsOf = async (ready: ReadyStretch, planted: FoldedLead): Promise<readonly MapBar[]> => {
    const { freqsHz } = ready.products;
    const zero = new Float64Array(freqsHz.length);
    const one = zero.map(() => 1);
    const gain = slowBandResponses(planted, settings, { freqsHz });
    const band = scoreOf(ready, filtered(ready.products, one, zero), gain);
    await job.breathe();
    const average = await beatAverageBar(planted, target, here, settings, job);
    return [{ route: 'band', ...band }, ...(average ? [average] : [])];
  };
  return organMap(
    { lead: { samples, rateHz }, target, noise },
    { organ: 'slow', rateHz: ownHz, settings, barsOf },
    {
      lead: leadKey(lead),
      ...stretch,
      target: { kind: 'wave', ...own },
      noiseUv,
      noiseToHz,
    },
    job,
  );
}
