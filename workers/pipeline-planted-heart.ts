import { detectInSteps } from '../src/heart/detect';
import {
  addAverage,
  type LeadAverage,
  leadAverage,
  withoutOwnBeats,
} from '../src/heart/heart-leftover';
import {
  type BeatScore,
  beatScore,
  plantedTimes,
  rmssdOfTimes,
  usualInterval,
} from '../src/heart/planted-beats';
import { createRandom } from '../src/numeric/random';
import { median } from '../src/numeric/statistics';
import { BEAT_CLASSES } from '../src/recording/beat';
import type { NotPlanted, PlantedBeats, PlantedHeart } from '../src/recording/evidence/planted';
import { leadKey } from '../src/recording/lead';
import { phasesOrWhole } from '../src/recording/phase';
import { type Interval, isWithin } from '../src/recording/span';
import { loadRoutes, type Routes } from '../src/separate/routes';
import { heartStretches, overStretches } from '../src/trust/stretches';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import { type Job, withRests } from './job';
import type { EvidenceInputs } from './pipeline-evidence';
import {
  ownTimes,
  type ReadStretch,
  readStretches,
  routedTogether,
} from './pipeline-planted-stretches';
import { leadChannel } from './pipeline-signals';

/** Times of the planted beats: the same each time. */
const SEED = 20_260_503;
/** Parts of the study's own height that are planted. */
const SHARES = [1, 0.25] as const;
/** Beats of class N, in the stretches looked at, that an average needs. */
const FEWEST_BEATS = 20;
const NORMAL = BEAT_CLASSES.indexOf('N');
const PICTURE_S = 10;
/** Half of the stretch in which the height of an average is read, from trough to crest. */
const QRS_HALF_S = 0.08;

const none = (reason: string): NotPlanted => ({ kind: 'not-planted', reason });

/** What is planted in and how it is taken. */
interface HeartCheck {
  readonly from: EvidenceInputs;
  readonly read: readonly ReadStretch[];
  readonly leftovers: readonly Float64Array[];
  readonly average: LeadAverage;
  /** Planted times of each stretch, in seconds of the study. */
  readonly planted: readonly (readonly number[])[];
  readonly rateHz: number;
  readonly routes: Routes;
}

/** Beats found in each stretch, in seconds of the study, with the signal they were found in. */
async function foundIn(check: HeartCheck, share: number, job: Job) {
  const { from, read, leftovers, average, planted, rateHz, routes } = check;
  const decimation = from.heart?.decimation ?? 1;
  const filled: Float64Array[] = [];
  for (const [k, leftover] of leftovers.entries()) {
    const samples = leftover.slice();
    for (const timeS of planted[k]) {
      addAverage(samples, average, timeS * rateHz - read[k].firstSample, share);
      await job.breathe();
    }
    filled.push(samples);
  }
  const { whole, starts } = await routedTogether(from, rateHz, filled, routes, job);
  const outHz = rateHz / decimation;
  const excluded = read.flatMap(({ within, firstSample, samples }, k): Interval[] => {
    const shiftS = starts[k] / outHz - firstSample / rateHz;
    const endS = (starts[k] + samples.length / decimation) / outHz;
    const inside = from.blocked
      .filter(({ fromS, toS }) => toS > within.fromS && fromS < within.toS)
      .map(({ fromS, toS }) => ({
        fromS: Math.max(starts[k] / outHz, fromS + shiftS),
        toS: Math.min(endS, toS + shiftS),
      }));
    const before = { fromS: starts[k] / outHz, toS: within.fromS + shiftS };
    return [before, ...inside, { fromS: within.toS + shiftS, toS: endS }];
  });
  const { beats } = await withRests(
    detectInSteps({
      heartbeat: whole,
      rateHz: outHz,
      ticksPerSample: TICKS_PER_SAMPLE * decimation,
      excluded: excluded.filter(({ fromS, toS }) => toS > fromS),
    }),
    job,
  );
  const times = read.map(({ firstSample, samples }, k) => {
    const shift = firstSample - starts[k] * decimation;
    const first = starts[k] * decimation;
    return Array.from(beats.ticks)
      .map((tick) => tick / TICKS_PER_SAMPLE)
      .filter((place) => place >= first && place < first + samples.length)
      .map((place) => (place + shift) / rateHz);
  });
  return { times, whole, starts, outHz };
}

function beatsOf(share: number, scores: readonly BeatScore[]): PlantedBeats {
  const over = (value: (one: BeatScore) => number | null) => overStretches(scores.map(value));
  return {
    share,
    planted: scores.reduce((sum, one) => sum + one.planted, 0),
    sensitivityPct: over((one) => one.sensitivityPct),
    predictivityPct: over((one) => one.predictivityPct),
    timingMs: over((one) => one.timingMs),
    rmssdErrorMs: over((one) => one.rmssdErrorMs),
  };
}

/** Ten seconds from the middle of the middle stretch. */
function pictureOf(
  { read, planted, rateHz }: HeartCheck,
  { times, whole, starts, outHz }: Awaited<ReturnType<typeof foundIn>>,
): PlantedHeart['picture'] {
  const k = read.length >> 1;
  const { within, firstSample } = read[k];
  const fromS = (within.fromS + within.toS - PICTURE_S) / 2;
  const toS = fromS + PICTURE_S;
  const first = starts[k] + Math.max(0, Math.round((fromS - firstSample / rateHz) * outHz));
  const inside = (all: readonly number[]) => all.filter((one) => one >= fromS && one < toS);
  return {
    fromS,
    stepS: 1 / outHz,
    heartbeatUv: whole.slice(first, first + Math.round(PICTURE_S * outHz)),
    plantedS: inside(planted[k]),
    foundS: inside(times[k]),
    leftOutS: inside(ownTimes(read[k], rateHz)),
  };
}

/** From trough to crest of an average's QRS complex. */
function heightOf({ samples, centre }: LeadAverage, rateHz: number): number {
  const half = Math.round(QRS_HALF_S * rateHz);
  const near = samples.subarray(Math.max(0, centre - half), centre + half + 1);
  return Math.max(...near) - Math.min(...near);
}

/** Averages of the classes, and the usual interval between beats; null where the normal ones are too few. */
async function averagesOf(read: readonly ReadStretch[], rateHz: number, job: Job) {
  const normal = read.reduce(
    (sum, { classes }) => sum + classes.filter((one) => one === NORMAL).length,
    0,
  );
  if (normal < FEWEST_BEATS) return null;
  const rrS = median(
    read
      .filter(({ places }) => places.length > 2)
      .map((stretch) => usualInterval(ownTimes(stretch, rateHz))),
  );
  const averages = new Map<number, LeadAverage>();
  for (const [beatClass, name] of BEAT_CLASSES.entries()) {
    if (name === 'Q') continue;
    const average = await withRests(leadAverage(read, beatClass, rateHz, rrS), job);
    if (average) averages.set(beatClass, average);
  }
  const average = averages.get(NORMAL);
  return average ? { averages, average, rrS } : null;
}

/** Plants heartbeats of the study's own average shape in the heart lead's leftover, and scores what is found of them. */
export async function plantedHeart(
  from: EvidenceInputs,
  job: Job,
): Promise<PlantedHeart | NotPlanted> {
  const { inputs, recording, heart } = from;
  const lead = inputs.roles.heart;
  if (!lead) return none('There is no heart lead.');
  if (!heart) return none('No heartbeat can be read in this recording.');
  const phases = phasesOrWhole(inputs.phases, recording.durationS);
  const stretches = heartStretches(phases, recording.durationS);
  if (stretches.length === 0) return none('No minute of the study lies in a phase.');
  const { rateHz } = leadChannel(recording, lead);
  const read = await readStretches(from, lead, stretches, job);
  const found = await averagesOf(read, rateHz, job);
  if (!found)
    return none(`Fewer than ${FEWEST_BEATS} normal beats stand in the stretches looked at.`);
  const { averages, average, rrS } = found;
  const random = createRandom(SEED);
  const known = read.map(({ within }) => plantedTimes(within.fromS, within.toS, rrS, random));
  const planted = known.map((times) => times.filter((timeS) => !isWithin(timeS, from.blocked)));
  const leftovers: Float64Array[] = [];
  for (const stretch of read)
    leftovers.push(await withRests(withoutOwnBeats(stretch, averages, rateHz), job));
  const routes = await loadRoutes([inputs.settings.heartRoute]);
  const check = { from, read, leftovers, average, planted, rateHz, routes };
  const results: PlantedBeats[] = [];
  let picture: PlantedHeart['picture'] | null = null;
  for (const [s, share] of SHARES.entries()) {
    const one = await foundIn(check, share, job);
    picture ??= pictureOf(check, one);
    results.push(
      beatsOf(
        share,
        read.map((stretch, k) => beatScore(planted[k], one.times[k], ownTimes(stretch, rateHz))),
      ),
    );
    job.progress('Planting known heartbeats', (s + 1) / SHARES.length);
  }
  if (!picture) throw new Error('beats of some height were planted');
  return {
    kind: 'planted',
    lead: leadKey(lead),
    stretches: read.length,
    stretchS: median(stretches.map(({ fromS, toS }) => toS - fromS)),
    ownUv: heightOf(average, rateHz),
    averaged: average.count,
    rmssdMs: median(known.map(rmssdOfTimes)),
    meanRrMs: 1000 * rrS,
    beats: results,
    picture,
  };
}
