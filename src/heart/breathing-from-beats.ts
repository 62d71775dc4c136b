import { removeLine } from '../numeric/detrend';
import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { atOnce } from '../numeric/in-steps';
import { medianAbsoluteDeviation, medianInPlace } from '../numeric/statistics';
import { BEAT_CLASSES, type BeatList } from '../recording/beat';
import type { BreathingSeries, RrSeries } from '../recording/heart-series';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { NO_BREATHING } from './breathing';
import {
  BREATHING_WINDOW_S,
  type BreathingSpectrum,
  breathingCentres,
  breathingPeak,
  breathingSpectrum,
  shareNear,
} from './breathing-peak';
import { beatTimes } from './rr-series';

const RESAMPLED_RATE_HZ = 4;
const SAMPLES = BREATHING_WINDOW_S * RESAMPLED_RATE_HZ;
/** Windows looked at between two rests. */
const WINDOWS_A_STEP = 10;
/** Share of a window's time that NN intervals must fill. */
const LEAST_KEPT = 0.75;
/** Values further from the median than this many spreads are drawn in: one odd beat is no breath. */
const MOST_SPREADS = 3.5;

/**
 * Below this rate the intervals have waves of their own (about 6 a minute) that are not breathing, so that R height must show
 * it too: more of its power near the rate than noise alone has.
 */
const ALONE_FROM_PER_MINUTE = 9;
const SEEN_IN_HEIGHT = 0.5;

export interface BreathingFromBeatsInput {
  readonly rr: RrSeries;
  readonly beats: BeatList;
  /** Rate that the beats' ticks count in. */
  readonly rateHz: Hertz;
  /** One height a beat, from beatHeights; NaN where there is none. */
  readonly heightsUv: Float64Array;
  readonly durationS: Seconds;
}

interface Points {
  readonly timesS: Float64Array;
  readonly values: Float64Array;
}

function pointsWhere(
  timesS: Float64Array,
  values: Float64Array,
  isGood: (i: number) => boolean,
): Points {
  const good = Array.from(timesS.keys()).filter((i) => isGood(i) && !Number.isNaN(values[i]));
  return {
    timesS: Float64Array.from(good, (i) => timesS[i]),
    values: Float64Array.from(good, (i) => values[i]),
  };
}

/** The points of one window on an even grid, by straight lines between them; null for fewer than 20 points. */
function resampled(points: Points, fromS: Seconds): Float64Array | null {
  const first = firstAtOrAfter(points.timesS, fromS);
  const end = firstAtOrAfter(points.timesS, fromS + BREATHING_WINDOW_S);
  if (end - first < 20) return null;
  const values = points.values.slice(first, end);
  const middle = medianInPlace(Float64Array.from(values));
  const most = MOST_SPREADS * 1.4826 * medianAbsoluteDeviation(values);
  const held = values.map((value) => Math.min(most, Math.max(-most, value - middle)));
  const out = new Float64Array(SAMPLES);
  let i = 0;
  for (let k = 0; k < SAMPLES; k += 1) {
    const timeS = fromS + k / RESAMPLED_RATE_HZ;
    while (i < held.length - 2 && points.timesS[first + i + 1] <= timeS) i += 1;
    const [left, right] = [points.timesS[first + i], points.timesS[first + i + 1]];
    const part = Math.min(1, Math.max(0, (timeS - left) / (right - left)));
    out[k] = held[i] + part * (held[i + 1] - held[i]);
  }
  return removeLine(out);
}

/** Spectrum scaled to a sum of 1; each value times its frequency where the background is like 1/f. Null where it is 0. */
function shapeOf(window: Float64Array | null, whiten: boolean): BreathingSpectrum | null {
  if (window === null) return null;
  const { power, stepPerMinute } = breathingSpectrum(window, RESAMPLED_RATE_HZ);
  let sum = 0;
  for (let k = 0; k < power.length; k += 1) {
    if (whiten) power[k] *= k;
    sum += power[k];
  }
  return sum > 0 ? { power: power.map((value) => value / sum), stepPerMinute } : null;
}

/** What both spectra share: their geometric mean, so that a peak of one alone counts less; the one there is, else. */
function shared(
  a: BreathingSpectrum | null,
  b: BreathingSpectrum | null,
): BreathingSpectrum | null {
  if (a === null || b === null) return a ?? b;
  return {
    power: a.power.map((value, k) => Math.sqrt(value * b.power[k])),
    stepPerMinute: a.stepPerMinute,
  };
}

/** A spectrum with nothing below a rate. */
function without({ power, stepPerMinute }: BreathingSpectrum, below: number): BreathingSpectrum {
  return {
    power: power.map((value, k) => (k * stepPerMinute < below ? 0 : value)),
    stepPerMinute,
  };
}

function rateOf(
  ofHeight: BreathingSpectrum | null,
  ofIntervals: BreathingSpectrum | null,
  ceilingPerMinute: number,
): number {
  const both = shared(ofHeight, ofIntervals);
  if (both === null) return Number.NaN;
  const rate = breathingPeak(both, ceilingPerMinute);
  if (!(rate < ALONE_FROM_PER_MINUTE)) return rate;
  const seen = ofHeight !== null && shareNear(ofHeight, rate, ceilingPerMinute) >= SEEN_IN_HEIGHT;
  return seen ? rate : breathingPeak(without(both, ALONE_FROM_PER_MINUTE), ceilingPerMinute);
}

/** NN seconds up to the end of each interval, to know how much of a window they fill. */
function nnSecondsUpTo({ rrMs, nn }: RrSeries): Float64Array {
  const sums = new Float64Array(rrMs.length + 1);
  for (let i = 0; i < rrMs.length; i += 1) sums[i + 1] = sums[i] + (nn[i] * rrMs[i]) / 1000;
  return sums;
}

/**
 * Breathing rate over time derived from the heartbeat: the spectral peak that R height (Moody 1985) and NN intervals
 * share in 60 s windows every 30 s. Nothing above half the window's heart rate can be seen (45 % of it is the ceiling);
 * NaN where NN fill under three quarters of a window or no peak is clear; one below 9 a minute must be seen in R height too.
 */
export const breathingFromBeats = (input: BreathingFromBeatsInput): BreathingSeries =>
  atOnce(breathingFromBeatsInSteps(input));

/** breathingFromBeats with a rest now and then. */
export function* breathingFromBeatsInSteps(
  input: BreathingFromBeatsInput,
): Generator<void, BreathingSeries> {
  const { rr, beats, rateHz, heightsUv, durationS } = input;
  if (rr.rrMs.length < 20) return NO_BREATHING;
  const normal = BEAT_CLASSES.indexOf('N');
  const touchesNn = (beat: number) => rr.nn[beat] === 1 || rr.nn[beat - 1] === 1;
  const heights = pointsWhere(
    beatTimes(beats, rateHz),
    heightsUv,
    (beat) => beats.classes[beat] === normal && touchesNn(beat),
  );
  const intervals = pointsWhere(rr.timesS, rr.rrMs, (i) => rr.nn[i] === 1);
  const upTo = nnSecondsUpTo(rr);
  const centresS = breathingCentres(durationS);
  const rateAbout = (centreS: Seconds): number => {
    const fromS = centreS - BREATHING_WINDOW_S / 2;
    const first = firstAtOrAfter(rr.timesS, fromS);
    const end = firstAtOrAfter(rr.timesS, fromS + BREATHING_WINDOW_S);
    if (upTo[end] - upTo[first] < LEAST_KEPT * BREATHING_WINDOW_S) return Number.NaN;
    const beatsPerMinute = (60 * (end - first)) / BREATHING_WINDOW_S;
    const ofHeight = shapeOf(resampled(heights, fromS), false);
    const ofIntervals = shapeOf(resampled(intervals, fromS), true);
    return rateOf(ofHeight, ofIntervals, 0.45 * beatsPerMinute);
  };
  const perMinute = new Float64Array(centresS.length);
  for (let k = 0; k < perMinute.length; k += 1) {
    if (k % WINDOWS_A_STEP === 0) yield;
    perMinute[k] = rateAbout(centresS[k]);
  }
  return { centresS, perMinute, from: 'derived' };
}
