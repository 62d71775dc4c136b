import { median } from '../numeric/statistics';
import { align, TIMING_HALF_S, type Timer, timerOf } from './align';
import type { HeartSignal } from './energy-pass';
import { addShifted, crestPlace } from './sub-sample';
import { readFilled } from './usable-signal';

/** What an average beat shows before and after its fiducial point. */
const BEFORE_S = 0.3;
const AFTER_S = 0.5;
/** How far a beat may lie from where it was found. */
const SEARCH_S = 0.03;
/** Beats an average is made of, at most; spread over the study. */
const MOST_BEATS = 600;
const ROUNDS = 3;
/** Beats added up or aligned between two rests. */
const ROWS_A_STEP = 50;
/** Where the dominant extreme is looked for, about the middle of the complex. */
const EXTREME_HALF_S = 0.09;
/** Below this part of the opposite extreme the extreme of the study's sign is no landmark. */
const LEAST_EXTREME = 0.6;
/** What stands out is measured over so much to both sides: wide T waves hardly do. */
const OUT_S = 0.05;
/** How far a crest may lie from where the average stands out most. */
const CLIMB_S = 0.025;
/** The level before the complex: the middle value of this stretch ahead of its middle. */
const LEVEL_S = [0.28, 0.13] as const;

/** An average of beats of one shape on the heartbeat signal. */
export interface ShapeAverage {
  readonly shape: number;
  /** Beats of this shape. */
  readonly count: number;
  /** uV, from BEFORE_S before the middle to AFTER_S after it. */
  readonly samples: Float64Array;
  /** Index of the middle, where the timer sits. */
  readonly middle: number;
  /** Index, between samples, of the dominant extreme: where the time of a beat is read. */
  readonly fiducial: number;
  readonly timer: Timer;
}

/** Samples about a place, with where the place lies in them. */
function rowAbout(signal: HeartSignal, sample: number, before: number, after: number) {
  return readFilled(signal.samples, signal.usable, sample - before, sample + after + 1);
}

const searchOf = (rateHz: number) => Math.max(2, Math.round(SEARCH_S * rateHz));

/** Averages the beats found at whole samples, aligned to one another between samples. Takes a rest now and then. */
export function* averageBeats(
  signal: HeartSignal,
  shape: number,
  beats: readonly number[],
): Generator<void, Omit<ShapeAverage, 'fiducial'>> {
  const { rateHz } = signal;
  const middle = Math.round(BEFORE_S * rateHz);
  const length = middle + Math.round(AFTER_S * rateHz) + 1;
  const half = Math.round(TIMING_HALF_S * rateHz);
  const search = searchOf(rateHz);
  const margin = search + 16;
  const every = Math.max(1, beats.length / MOST_BEATS);
  const rows: Float64Array[] = [];
  for (let k = 0; Math.floor(k) < beats.length; k += every)
    rows.push(rowAbout(signal, beats[Math.floor(k)], middle + margin, length - middle + margin));
  let places = rows.map(() => middle + margin);
  let samples = new Float64Array(length);
  let timer = timerOf(samples.slice(middle - half, middle + half + 1));
  for (let round = 0; round < ROUNDS; round += 1) {
    samples = new Float64Array(length);
    for (let r = 0; r < rows.length; r += 1) {
      addShifted(samples, rows[r], places[r] - middle);
      if (r % ROWS_A_STEP === ROWS_A_STEP - 1) yield;
    }
    for (let i = 0; i < length; i += 1) samples[i] /= rows.length;
    timer = timerOf(samples.slice(middle - half, middle + half + 1));
    places = [];
    for (const row of rows) {
      places.push(align(row, timer, middle + margin, search).place);
      if (places.length % ROWS_A_STEP === 0) yield;
    }
  }
  return { shape, count: beats.length, samples, middle, timer };
}

/** Sign of the dominant extreme of an average: of what stands out of its surroundings most. */
export function dominantSign(
  { samples, middle }: Pick<ShapeAverage, 'samples' | 'middle'>,
  rateHz: number,
): 1 | -1 {
  const { up, down } = extremes(samples, middle, rateHz);
  return up >= down ? 1 : -1;
}

/** Level before the complex. */
export function baseline(samples: ArrayLike<number>, middle: number, rateHz: number): number {
  const from = Math.max(0, Math.round(middle - LEVEL_S[0] * rateHz));
  const to = Math.round(middle - LEVEL_S[1] * rateHz);
  return median(Float64Array.from({ length: to - from + 1 }, (_, i) => samples[from + i]));
}

/** Where an average stands out most, upwards and downwards, of the line from OUT_S before each place to OUT_S after it. */
function extremes(samples: Float64Array, middle: number, rateHz: number) {
  const reach = Math.round(EXTREME_HALF_S * rateHz);
  const out = Math.round(OUT_S * rateHz);
  let [high, low, up, down] = [middle, middle, 0, 0];
  for (let i = middle - reach; i <= middle + reach; i += 1) {
    const over = samples[i] - (samples[i - out] + samples[i + out]) / 2;
    if (over > up) [high, up] = [i, over];
    if (-over > down) [low, down] = [i, -over];
  }
  return { high, low, up, down };
}

/** The crest that the samples climb to from a place, within CLIMB_S. */
function climb(samples: Float64Array, from: number, sign: 1 | -1, rateHz: number): number {
  const most = Math.round(CLIMB_S * rateHz);
  let at = from;
  for (let k = 0; k < most; k += 1) {
    if (sign * samples[at + 1] > sign * samples[at]) at += 1;
    else if (sign * samples[at - 1] > sign * samples[at]) at -= 1;
  }
  return at;
}

/** Where the time of a beat is read: the extreme of the study's sign, or the other where that is no landmark. */
function fiducialOf(
  average: Omit<ShapeAverage, 'fiducial'>,
  sign: 1 | -1,
  rateHz: number,
  least: number,
): number {
  const { samples, middle } = average;
  const { high, low, up, down } = extremes(samples, middle, rateHz);
  const [own, other] = sign > 0 ? [up, down] : [down, up];
  const use = own >= least * other ? sign : sign > 0 ? -1 : 1;
  return crestPlace(samples, climb(samples, use > 0 ? high : low, use, rateHz), use);
}

/** Averages this much like the main one take their fiducial point from it. */
const SAME_COURSE = 0.9;

/**
 * Averages with their fiducial points, those like the first one with the same point of the course. The extreme of `sign` is
 * taken where it is at least `least` of the opposite one.
 */
export function withFiducials(
  averages: readonly Omit<ShapeAverage, 'fiducial'>[],
  sign: 1 | -1,
  rateHz: number,
  least = LEAST_EXTREME,
): ShapeAverage[] {
  if (averages.length === 0) return [];
  const [main] = averages;
  const point = fiducialOf(main, sign, rateHz, least);
  const search = Math.round(EXTREME_HALF_S * rateHz);
  return averages.map((average, k) => {
    if (k === 0) return { ...average, fiducial: point };
    const { place, likeness } = align(average.samples, main.timer, average.middle, search);
    const same = likeness > SAME_COURSE;
    return {
      ...average,
      fiducial: same ? place + point - main.middle : fiducialOf(average, sign, rateHz, least),
    };
  });
}

/** Time of a beat found at a whole sample, in samples: where its average's fiducial point falls. */
export function timeBeat(
  signal: HeartSignal,
  average: ShapeAverage,
  sample: number,
  search = searchOf(signal.rateHz),
) {
  const { timer, fiducial, middle } = average;
  const before = timer.half + search + 8;
  const row = rowAbout(signal, sample, before, before);
  const { place, likeness, size } = align(row, timer, before, search);
  return { time: sample + place - before + (fiducial - middle), likeness, size };
}
