import { quietly } from '../numeric/in-steps';
import { BEAT_CLASSES, BEAT_ORIGINS, type BeatClass, type BeatList } from '../recording/beat';
import { type Interval, isWithin } from '../recording/span';
import { dominantSign, type ShapeAverage, withFiducials } from './beat-average';
import { measureBeats } from './beat-quality';
import { classifyBeats, meanFrequency } from './classify';
import type { HeartSignal } from './energy-pass';
import { type FoundBeats, findBeats } from './find-beats';
import { isMisread, legibleStretches } from './legible';
import { withMisfitsUnusable } from './out-of-place';
import { decidedPlaces, expectedWrong, loudPlaces } from './place-odds';
import { filterBand, LOWEST_RATE_HZ, qrsBands } from './qrs-bands';
import { rhythmOf } from './rhythm-path';
import { rhythmFromBeats } from './rhythm-track';
import type { Candidate } from './shape-pass';
import { averagesOf, timesOf } from './timed-beats';
import { NONE_UNSURE, type UnsurePlaces, unsurePlaces } from './unsure-places';
import { readFilled, type Samples, usableInSteps } from './usable-signal';

export interface DetectionInput {
  /** Heartbeat signal in uV (zero phase, about 0.5-40 Hz) at `rateHz`, from the recording's first sample on; NaN in gaps. */
  readonly heartbeat: Samples;
  /** 50 Hz or more; about 250-500 Hz is best. */
  readonly rateHz: number;
  /** Ticks (1/64 samples of the heart lead's own rate) in one sample of the heartbeat signal. */
  readonly ticksPerSample: number;
  /** Stretches in which no beat is looked for. */
  readonly excluded?: readonly Interval[];
  /** Stretches, ascending, in which beats count only where what is found there can be read. */
  readonly doubted?: readonly Interval[];
  /** Log-odds given to every place beside its evidence: above 0 more is taken for a beat, below 0 less; 0 unless given. */
  readonly eager?: number;
  /** Sign of the extreme that a beat's time is taken at; the dominant one of the usual beat unless given. */
  readonly sign?: 1 | -1;
}

/** The average of the beats of one shape, as a person may look at it. */
export interface AverageBeat {
  readonly beatClass: BeatClass;
  readonly count: number;
  /** uV at rateHz. */
  readonly samples: Float32Array;
  readonly rateHz: number;
  /** Index, between samples, of the point whose time is the beat's. */
  readonly centre: number;
}

export interface Detection {
  readonly beats: BeatList;
  /** Whether beats can be read in each doubted stretch; no beat of another one is given. Empty where no beat is found. */
  readonly legible: readonly boolean[];
  /** Ticks of the beats that little but the rhythm speaks for, ascending: a person should look. */
  readonly doubtful: Float64Array;
  /** Places, taken for beats or not, where the detector may be wrong by its own odds. */
  readonly unsure: UnsurePlaces;
  /** Sign of the dominant extreme of the usual beat. */
  readonly sign: 1 | -1;
  /** One a shape, the most frequent first. */
  readonly averages: readonly AverageBeat[];
  /** Standard deviation of the heartbeat signal between beats, uV. */
  readonly noiseUv: number;
  /** Median R height over the level before it, uV. */
  readonly heightUv: number;
  /** Standard deviation of the beats' times that the noise gives, ms. */
  readonly timingSdMs: number;
  /** What a person should know, in sentences. */
  readonly notes: readonly string[];
}

/**
 * Finds the heartbeats of a lead of any polarity: the same beats, to the tick, for a lead times -1. Beats, QRS energy, shape
 * against the study's own averages and rhythm decide together; times are those of the matched filter below the sample.
 * Classes N, S, V and Q are proposals. Ticks may be a fraction of a sample before the first or after the last sample.
 */
export function detectBeats(
  input: DetectionInput,
  onProgress: (done: number) => void = () => {},
): Detection {
  const steps = detectInSteps(input);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    onProgress(step.value);
  }
}

/** detectBeats in small steps, each a few ms; yields the part done, so that a worker can answer in between or stop. */
export function* detectInSteps(input: DetectionInput): Generator<number, Detection> {
  const { heartbeat, rateHz, ticksPerSample, excluded = [], doubted = [], eager = 0 } = input;
  if (!(rateHz >= LOWEST_RATE_HZ))
    return nothing(`No heartbeat can be read at ${rateHz} samples a second.`);
  const usable = yield* quietly(usableInSteps(heartbeat, rateHz, excluded), 0);
  yield 0;
  const signal: HeartSignal = { samples: heartbeat, rateHz, usable, bands: qrsBands(rateHz) };
  yield 0;
  const { shapes, places, beats: all } = yield* findBeats(signal, eager);
  yield 0.93;
  const allS = all.map(({ sample }) => sample / rateHz);
  const rhythm = yield* quietly(rhythmBy(all, rateHz), 0.93);
  const decided = yield* quietly(decidedPlaces(all, places, rateHz, rhythm), 0.93);
  yield 0.93;
  const isLoud = loudPlaces(all, places, decided, rateHz, doubted);
  yield 0.93;
  const legible = legibleStretches(doubted, allS, decided, (s) => rhythm(s).rrS);
  const barred = doubted.filter((_, k) => !legible[k]);
  const found = { shapes, beats: all.filter((_, i) => !isWithin(allS[i], barred)) };
  if (found.beats.length < 2) return nothing('No heartbeat was found in this lead.');
  const averages = yield* averagesOf(signal, found.beats);
  const sign = input.sign ?? (averages.length > 0 ? dominantSign(averages[0], rateHz) : 1);
  const timed = withFiducials(averages, sign, rateHz, input.sign && LEAST_ASKED);
  const times = yield* timesOf(signal, found.beats, timed, sign);
  yield 0.99;
  const classes = yield* quietly(classesOf(signal, found), 0.99);
  yield 0.99;
  const measured =
    timed.length > 0 ? yield* quietly(measureBeats(signal, timed[0], times), 0.99) : null;
  yield 0.99;
  const list = listOf(times, classes, ticksPerSample);
  const isDoubtful = (fromS: number, toS: number) =>
    expectedWrong(decided, fromS, toS) > LEAST_DOUBT || isLoud(fromS, toS);
  const judged = yield* quietly(
    withMisfitsUnusable(list, signal, ticksPerSample, isDoubtful),
    0.99,
  );
  yield 0.99;
  const ticksPerS = ticksPerSample * rateHz;
  const misread = doubted.filter((one, k) => legible[k] && isMisread(one, judged, ticksPerS));
  return {
    beats: outside(judged, misread, ticksPerS),
    legible: legible.map((reads, k) => reads && !misread.includes(doubted[k])),
    doubtful: Float64Array.from(
      times.filter((_, i) => found.beats[i].score < SURE_EVIDENCE),
      (time) => Math.round(time * ticksPerSample),
    ).sort(),
    unsure: unsurePlaces({ places, decided }, { beats: found.beats, times }, timed, ticksPerSample),
    sign,
    averages: timed.map((average) => shown(average, found.beats, classes, rateHz)),
    noiseUv: measured?.noiseUv ?? Number.NaN,
    heightUv: measured?.heightUv ?? Number.NaN,
    timingSdMs: measured?.timingSdMs ?? Number.NaN,
    notes: [],
  };
}

/** The beats that lie in none of the stretches. */
function outside(beats: BeatList, stretches: readonly Interval[], ticksPerS: number): BeatList {
  if (stretches.length === 0) return beats;
  const isOutside = (_: number, i: number) => !isWithin(beats.ticks[i] / ticksPerS, stretches);
  return {
    ticks: beats.ticks.filter(isOutside),
    classes: beats.classes.filter(isOutside),
    origins: beats.origins.filter(isOutside),
  };
}

function nothing(note: string): Detection {
  return {
    beats: { ticks: new Float64Array(0), classes: new Uint8Array(0), origins: new Uint8Array(0) },
    legible: [],
    doubtful: new Float64Array(0),
    unsure: NONE_UNSURE,
    sign: 1,
    averages: [],
    noiseUv: Number.NaN,
    heightUv: Number.NaN,
    timingSdMs: Number.NaN,
    notes: [note],
  };
}

/** Log-odds from which a beat needs no rhythm to be believed: ten to one. */
const SURE_EVIDENCE = 2.3;
/** Beats too many and missed to be expected about a beat that is not in doubt, at most. */
const LEAST_DOUBT = 0.03;
/** Part of the opposite extreme from which an extreme that was asked for is taken. */
const LEAST_ASKED = 0.1;
/** Rhythm of beats found; of fewer than tell it one that says little. */
const rhythmBy = (beats: readonly Candidate[], rateHz: number) =>
  rhythmFromBeats(
    beats.map(({ sample }) => sample / rateHz),
    () => rhythmOf(1, 0.3, 0.1),
  );

function* classesOf(
  signal: HeartSignal,
  { beats, shapes }: Pick<FoundBeats, 'beats' | 'shapes'>,
): Generator<void, BeatClass[]> {
  const { rateHz, bands, samples, usable } = signal;
  const rhythm = yield* rhythmBy(beats, rateHz);
  const half = Math.round(0.12 * rateHz);
  const meanHz = ({ sample }: Candidate) => {
    const margin = half + bands.reach;
    const row = filterBand(
      readFilled(samples, usable, sample - margin, sample + margin + 1),
      bands.shape,
    );
    return meanFrequency(row.subarray(bands.reach, row.length - bands.reach));
  };
  const rhythmAt = (sample: number) => {
    const { rrS, ...rest } = rhythm(sample / rateHz);
    return { rrS: rrS * rateHz, ...rest };
  };
  return yield* classifyBeats(beats, shapes, rhythmAt, meanHz);
}

/** Beats at whole ticks, strictly ascending: of two at one tick the first stays. */
function listOf(
  times: readonly number[],
  classes: readonly BeatClass[],
  ticksPerSample: number,
): BeatList {
  const rows = times
    .map((time, i) => ({ tick: Math.round(time * ticksPerSample), beatClass: classes[i] }))
    .sort((a, b) => a.tick - b.tick)
    .filter((row, i, all) => i === 0 || row.tick > all[i - 1].tick);
  return {
    ticks: Float64Array.from(rows, (row) => row.tick),
    classes: Uint8Array.from(rows, (row) => BEAT_CLASSES.indexOf(row.beatClass)),
    origins: new Uint8Array(rows.length).fill(BEAT_ORIGINS.indexOf('detected')),
  };
}

/** An average as it is shown, under the class most of its beats have. */
function shown(
  average: ShapeAverage,
  beats: readonly Candidate[],
  classes: readonly BeatClass[],
  rateHz: number,
): AverageBeat {
  const counts = new Map<BeatClass, number>();
  beats.forEach((beat, i) => {
    if (beat.shape === average.shape) counts.set(classes[i], (counts.get(classes[i]) ?? 0) + 1);
  });
  const [beatClass] = [...counts].sort((a, b) => b[1] - a[1])[0] ?? ['Q'];
  return {
    beatClass,
    count: average.count,
    samples: Float32Array.from(average.samples),
    rateHz,
    centre: average.fiducial,
  };
}
