import { median, medianAbsoluteDeviation } from '../numeric/statistics';
import type { Timer } from './align';
import { baseline, type ShapeAverage } from './beat-average';
import type { HeartSignal } from './energy-pass';
import { isUsable, readFilled } from './usable-signal';

/** Normal standard deviation over the median absolute deviation. */
const SD_PER_MAD = 1.4826;
/** Place between two beats where the heart is electrically quiet: this part of the RR interval, past the T wave. */
const QUIET_PART = 0.62;
/** Quiet places looked at, at most; spread over the study. */
const MOST_PLACES = 2000;
/** Beats between two rests. */
const BEATS_A_STEP = 300;

/** What the beats measure on the heartbeat signal. */
export interface BeatQuality {
  /** Median height of the fiducial point over the level just before the complex, uV, 0 or more. */
  readonly heightUv: number;
  /** Standard deviation of the signal between beats, uV: robust, about a line over 0.2 s. */
  readonly noiseUv: number;
  /** Standard deviation of the times of beats that this noise gives, ms. */
  readonly timingSdMs: number;
}

/**
 * Measures height, noise and timing error. The timing error is the matched filter's to first order (Kay 1993, chapter 3): its
 * answer to the slope of the noise over its bend at a beat. The noise is taken where it is, between the beats, so it need not
 * be white. `times` in samples, ascending.
 */
export function* measureBeats(
  signal: HeartSignal,
  main: ShapeAverage,
  times: ArrayLike<number>,
): Generator<void, BeatQuality> {
  const bend = bendOf(main);
  const every = Math.max(1, times.length / MOST_PLACES);
  const errors: number[] = [];
  const noise: number[] = [];
  const heights: number[] = [];
  const { half } = main.timer;
  for (let k = 0; Math.floor(k) < times.length - 1; k += every) {
    const i = Math.floor(k);
    const rr = times[i + 1] - times[i];
    const at = Math.round(times[i] + QUIET_PART * rr);
    if (rr < 2.2 * signal.rateHz && isUsable(signal.usable, at, half)) {
      const row = readFilled(signal.samples, signal.usable, at - half - 1, at + half + 2);
      errors.push(slopeUnder(main.timer, row) / bend);
      noise.push(rmsAboutLine(row));
    }
    heights.push(heightAt(signal, times[i]));
    if (heights.length % BEATS_A_STEP === 0) yield;
  }
  if (heights.length === 0) return { heightUv: 0, noiseUv: Number.NaN, timingSdMs: Number.NaN };
  return {
    heightUv: Math.abs(median(heights)),
    noiseUv: median(noise),
    timingSdMs: (1000 * SD_PER_MAD * medianAbsoluteDeviation(errors)) / signal.rateHz,
  };
}

/** How much the average bends under its own filter: what a slope of noise is divided by to give a shift in samples. */
function bendOf({ timer, samples, middle }: ShapeAverage): number {
  const from = middle - timer.half;
  let bend = 0;
  for (let i = 0; i < timer.weights.length; i += 1) {
    const at = from + i;
    bend -= timer.weights[i] * (samples[at + 1] - 2 * samples[at] + samples[at - 1]);
  }
  return bend;
}

/** The filter's answer to the slope of a row that reaches one sample beyond its window. */
function slopeUnder({ weights }: Timer, row: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < weights.length; i += 1) sum += (weights[i] * (row[i + 2] - row[i])) / 2;
  return sum;
}

function heightAt({ samples, usable, rateHz }: HeartSignal, time: number): number {
  const before = Math.round(0.3 * rateHz);
  const at = Math.round(time);
  const row = readFilled(samples, usable, at - before, at + 2);
  return row[before] - baseline(row, before, rateHz);
}

/** Standard deviation of a row about its own line. */
export function rmsAboutLine(row: Float64Array): number {
  const half = (row.length - 1) / 2;
  let mean = 0;
  let slope = 0;
  let spread = 0;
  let power = 0;
  for (let i = 0; i < row.length; i += 1) {
    mean += row[i];
    slope += row[i] * (i - half);
    spread += (i - half) ** 2;
    power += row[i] * row[i];
  }
  const rest = power - (mean * mean) / row.length - (slope * slope) / spread;
  return Math.sqrt(Math.max(0, rest) / (row.length - 2));
}
