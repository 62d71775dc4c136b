import type { BeatList } from '../src/recording/beat';
import type { Settings } from '../src/recording/settings';
import type { MapBar } from '../src/recording/settings-map';
import { drawBand } from '../src/separate/band';
import { heartPart } from '../src/separate/heart-part';
import { type FoldedLead, slowBandResponses, slowLead } from '../src/separate/route-responses';
import { carriesBeats } from '../src/separate/wide-lead';
import { type ReadyStretch, readyStretch, scoreOf } from '../src/trust/match-score';
import { stretchProducts } from '../src/trust/stretch-products';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import { type Job, withRests } from './job';
import { MOST_AHEAD_S } from './pipeline-map-organ';

/** Beats of a study, and where the stretch begins. */
export interface BeatsHere {
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
  return { route: 'beat-average', ...scoreOf(drawn, drawn.products, one) };
}

/** Scores of the routes that have no map, on the lead that holds the target. */
export async function slowBars(
  ready: ReadyStretch,
  planted: FoldedLead,
  target: Float64Array,
  here: BeatsHere | null,
  settings: Settings,
  job: Job,
): Promise<readonly MapBar[]> {
  const gain = slowBandResponses(planted, settings, ready.products);
  await job.breathe();
  const band = scoreOf(ready, ready.products, gain);
  await job.breathe();
  const average = await beatAverageBar(planted, target, here, settings, job);
  return [{ route: 'band', ...band }, ...(average ? [average] : [])];
}
