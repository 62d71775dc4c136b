import { runningMedian } from '../numeric/running-quantile';
import { medianInPlace } from '../numeric/statistics';

/** Intervals to each side that foretell one, and intervals that tell how well they do so. */
const NEIGHBOURS = 3;
const LEARNED_FROM = 41;
/** Normal standard deviation over the median absolute deviation. */
const SD_PER_MAD = 1.4826;
/** A rhythm is never believed to keep time better than this (logarithm of RR). */
const LEAST_SPREAD = 0.03;

/** One way to foretell an interval from those about it, and the spread of how far off it is. */
export interface Foretelling {
  /** Logarithm of the interval expected in place of intervals first to last. NaN where too few are about. */
  readonly expected: (first: number, last: number) => number;
  readonly spread: Float64Array;
}

type Expected = Foretelling['expected'];

/** The middle of three before and three after: whatever breathing does, a single odd neighbour has no say. */
function byMiddle(logRr: Float64Array): Expected {
  const few = new Float64Array(2 * NEIGHBOURS);
  return (first, last) => {
    let count = 0;
    for (let k = 1; k <= NEIGHBOURS; k += 1)
      for (const i of [first - k, last + k]) {
        if (!(i >= 0 && i < logRr.length) || Number.isNaN(logRr[i])) continue;
        few[count] = logRr[i];
        count += 1;
      }
    return count > NEIGHBOURS ? medianInPlace(few, count) : Number.NaN;
  };
}

/** The mean of the one before and the one after: follows a strong respiratory arrhythmia. */
const byNearest =
  (logRr: Float64Array): Expected =>
  (first, last) =>
    first > 0 && last < logRr.length - 1 ? (logRr[first - 1] + logRr[last + 1]) / 2 : Number.NaN;

function foretelling(logRr: Float64Array, expected: Expected): Foretelling {
  const off = logRr.map((value, i) => Math.abs(value - expected(i, i)));
  const spread = runningMedian(off, LEARNED_FROM).map((value) =>
    Number.isNaN(value) ? Number.NaN : Math.max(LEAST_SPREAD, SD_PER_MAD * value),
  );
  return { expected, spread };
}

/**
 * The ways in which intervals (logarithm of RR, NaN where something unusable lies between) are foretold from those about
 * them. The spread is the rhythm's own: how far its intervals are off (median absolute deviation of 41). Both read `logRr`
 * as it stands when they are asked.
 */
export const foretellings = (logRr: Float64Array): readonly Foretelling[] =>
  [byMiddle(logRr), byNearest(logRr)].map((way) => foretelling(logRr, way));
