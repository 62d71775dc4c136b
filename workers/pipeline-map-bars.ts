import type { BeatList } from '../src/recording/beat';
import type { Settings } from '../src/recording/settings';
import type { MapBar } from '../src/recording/settings-map';
import { drawBand } from '../src/separate/band';
import { heartPart } from '../src/separate/heart-part';
import { type FoldedLead, slowLead } from '../src/separate/route-responses';
import { carriesBeats } from '../src/separate/wide-lead';
import { readyStretch, scoreOf } from '../src/trust/match-score';
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

/** A lead at the slow rate, drawn by route `band`. */
async function bandOf({ samples, rateHz }: FoldedLead, settings: Settings, job: Job) {
  const kept = new Uint8Array(samples.length).fill(1);
  const { slowWave } = await withRests(
    drawBand(samples, rateHz, settings, { kept, breathing: null }),
    job,
  );
  return slowWave;
}

/** A stretch at the slow rate without its average heartbeats; null where none can be taken out. */
export async function withoutBeats(
  planted: FoldedLead,
  slow: FoldedLead,
  here: BeatsHere,
  settings: Settings,
  job: Job,
): Promise<FoldedLead | null> {
  if (!carriesBeats(planted.rateHz)) return null;
  const part = await withRests(
    heartPart({
      wide: { rateHz: planted.rateHz, samples: Float32Array.from(planted.samples) },
      beats: beatsFrom(here, planted.samples.length / planted.rateHz),
      beatRateHz: here.beatRateHz,
      kept: new Uint8Array(slow.samples.length).fill(1),
      settings: settings.beatAverage,
    }),
    job,
  );
  if (part.beats === 0) return null;
  return { ...slow, samples: slow.samples.map((value, i) => value - (part.uv[i] ?? 0)) };
}

/**
 * Scores of the routes that have no map, on the lead that holds the target. Each is run once in time, as it draws a study:
 * `beat-average` is not linear, and the filter fitted to a lead is longer than the ramps of a stretch. Breathing is not taken
 * out.
 */
export async function slowBars(
  planted: FoldedLead,
  target: Float64Array,
  here: BeatsHere,
  settings: Settings,
  job: Job,
): Promise<readonly MapBar[]> {
  const slow = slowLead(planted);
  await job.breathe();
  const known = slowLead({ samples: target, rateHz: planted.rateHz }).samples;
  await job.breathe();
  const scoreIn = async (lead: FoldedLead) => {
    const drawn = await bandOf(lead, settings, job);
    const products = stretchProducts(known, drawn, lead.rateHz);
    const one = new Float64Array(products.freqsHz.length).fill(1);
    return scoreOf(readyStretch(products, MOST_AHEAD_S.slow), products, one);
  };
  const band: MapBar = { route: 'band', ...(await scoreIn(slow)) };
  const bare = await withoutBeats(planted, slow, here, settings, job);
  return bare ? [band, { route: 'beat-average', ...(await scoreIn(bare)) }] : [band];
}
