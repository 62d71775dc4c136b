import { log } from '../numeric/elementary';
import { mean, medianInPlace } from '../numeric/statistics';
import { isBrokenByJumps, isPatterned } from './broken-rhythm';

/** Two measures of how little of a rhythm can be foreseen; a rhythm is irregular where both are high. */
export interface Irregularity {
  /**
   * Coefficient of sample entropy, with two intervals to match and a tolerance of 8 % of the mean interval (Lake &
   * Moorman 2011, Am J Physiol Heart Circ Physiol 300:H319, from memory): high where intervals like the last two are
   * followed by anything.
   */
  readonly entropy: number;
  /**
   * Median distance of the intervals from what the four before them foretell by a linear (Burg) predictor, over their
   * median distance from the median: near 1 where nothing foretells the next one, low for respiratory arrhythmia however
   * strong.
   */
  readonly unforeseen: number;
}

/** Fewest intervals that are judged. */
export const FEWEST_FOR_RHYTHM = 48;
const TOLERANCE = 0.08;
/** Both limits were set on simulated rhythms (test/heart/irregularity.test.ts), not on patients. */
interface Limits {
  readonly entropy: number;
  readonly unforeseen: number;
}
const WHOLE_LIMITS: Limits = { entropy: -1.05, unforeseen: 0.82 };
/** Fewer intervals scatter more, so a half must be clearer. */
const HALF_LIMITS: Limits = { entropy: -0.9, unforeseen: 0.85 };
const PREDICTOR_ORDER = 4;

/** Sample entropy for runs of two, as a density over the mean interval: - ln(A / B) + ln(2 r / mean). */
function entropyOf(rr: Float64Array): number {
  const level = mean(rr);
  const tolerance = TOLERANCE * level;
  const runs = rr.length - 2;
  let [twoAlike, threeAlike] = [0, 0];
  for (let i = 0; i < runs; i += 1) {
    const [first, second, third] = [rr[i], rr[i + 1], rr[i + 2]];
    for (let j = i + 1; j < runs; j += 1) {
      if (Math.abs(rr[j] - first) >= tolerance) continue;
      if (Math.abs(rr[j + 1] - second) >= tolerance) continue;
      twoAlike += 1;
      if (Math.abs(rr[j + 2] - third) < tolerance) threeAlike += 1;
    }
  }
  const width = log(2 * TOLERANCE);
  if (twoAlike === 0) return 0;
  return threeAlike === 0 ? log(twoAlike) + width : Math.min(0, log(twoAlike / threeAlike) + width);
}

function medianDistance(values: Float64Array): number {
  const middle = medianInPlace(Float64Array.from(values));
  return medianInPlace(values.map((value) => Math.abs(value - middle)));
}

/** Errors of the Burg predictor (Burg 1975), one a value after the first `order`. */
function predictionErrors(values: Float64Array, order: number): Float64Array {
  let forward = values;
  let backward = values;
  for (let k = 0; k < order; k += 1) {
    const ahead = forward.subarray(1);
    const behind = backward.subarray(0, backward.length - 1);
    let [product, energy] = [0, 0];
    for (let i = 0; i < ahead.length; i += 1) {
      product += ahead[i] * behind[i];
      energy += ahead[i] * ahead[i] + behind[i] * behind[i];
    }
    const reflection = energy > 0 ? (-2 * product) / energy : 0;
    forward = ahead.map((value, i) => value + reflection * behind[i]);
    backward = behind.map((value, i) => value + reflection * ahead[i]);
  }
  return forward;
}

/** Share of the spread that is not foretold; values are held within 0.5 and 1.6 medians so that one ectopic pair has no say. */
function unforeseenOf(rr: Float64Array): number {
  const middle = medianInPlace(Float64Array.from(rr));
  const held = rr.map((value) => Math.min(1.6, Math.max(0.5, value / middle)) - 1);
  const spread = medianDistance(held);
  return spread > 0 ? medianDistance(predictionErrors(held, PREDICTOR_ORDER)) / spread : 0;
}

/** Measures of a run of intervals in ms, in order; null for fewer than 48 of them. O(n^2). */
export function irregularityOf(rrMs: Float64Array): Irregularity | null {
  if (rrMs.length < FEWEST_FOR_RHYTHM) return null;
  return { entropy: entropyOf(rrMs), unforeseen: unforeseenOf(rrMs) };
}

/**
 * True where most intervals follow the one before within 5 % of the mean: random intervals that do so spread by 4 % at
 * most, far below either limit, so that a calm rhythm needs no closer look.
 */
function isCalm(rrMs: Float64Array): boolean {
  const near = 0.05 * mean(rrMs);
  let calm = 0;
  for (let i = 1; i < rrMs.length; i += 1) if (Math.abs(rrMs[i] - rrMs[i - 1]) < near) calm += 1;
  return calm >= 0.6 * (rrMs.length - 1);
}

/** The cheap measure first: most rhythms need no more. */
function isIrregular(limits: Limits, rrMs: Float64Array): boolean {
  if (rrMs.length < FEWEST_FOR_RHYTHM || isCalm(rrMs)) return false;
  return unforeseenOf(rrMs) > limits.unforeseen && entropyOf(rrMs) > limits.entropy;
}

/**
 * True where a stretch of intervals in ms is irregular: nothing foretells its intervals, in the whole or in either half (a
 * bout of half the stretch is enough to spoil its figures; halves are split by count), or it is broken by jumps, or repeats a
 * pattern of early beats. False for fewer than 48 intervals.
 */
export function isIrregularStretch(rrMs: Float64Array): boolean {
  if (rrMs.length < FEWEST_FOR_RHYTHM) return false;
  const half = Math.floor(rrMs.length / 2);
  return (
    isIrregular(WHOLE_LIMITS, rrMs) ||
    isIrregular(HALF_LIMITS, rrMs.subarray(0, half)) ||
    isIrregular(HALF_LIMITS, rrMs.subarray(half)) ||
    isBrokenByJumps(rrMs) ||
    isPatterned(rrMs)
  );
}
