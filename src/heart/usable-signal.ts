import { atOnce } from '../numeric/in-steps';
import type { Interval } from '../recording/span';

/** A stretch of samples, `from` included, `to` not. */
export interface SampleRange {
  readonly from: number;
  readonly to: number;
}

export type Samples = Float32Array | Float64Array;

/** Samples looked at between two rests. */
const SAMPLES_A_STEP = 250_000;

/**
 * The stretches of a signal that can be read: neither NaN nor excluded, ascending and apart. Excluded intervals are in
 * seconds from sample 0.
 */
export const usableRanges = (
  samples: Samples,
  rateHz: number,
  excluded: readonly Interval[],
): SampleRange[] => atOnce(usableInSteps(samples, rateHz, excluded));

/** usableRanges with a rest now and then. */
export function* usableInSteps(
  samples: Samples,
  rateHz: number,
  excluded: readonly Interval[],
): Generator<void, SampleRange[]> {
  const barred = excluded
    .map(({ fromS, toS }) => ({
      from: Math.ceil(fromS * rateHz),
      to: Math.ceil(toS * rateHz),
    }))
    .sort((a, b) => a.from - b.from);
  const ranges: SampleRange[] = [];
  let next = 0;
  let from = -1;
  for (let i = 0; i <= samples.length; i += 1) {
    if (i % SAMPLES_A_STEP === SAMPLES_A_STEP - 1) yield;
    while (next < barred.length && barred[next].to <= i) next += 1;
    const bad =
      i === samples.length ||
      Number.isNaN(samples[i]) ||
      (next < barred.length && barred[next].from <= i);
    if (bad && from >= 0) ranges.push({ from, to: i });
    if (bad) from = -1;
    else if (from < 0) from = i;
  }
  return ranges;
}

/**
 * Samples [from, to) as doubles; what lies outside the signal or the usable ranges is filled with a line from the last
 * usable sample before to the first after it (held at the ends), so that filters see no step.
 */
export function readFilled(
  samples: Samples,
  ranges: readonly SampleRange[],
  from: number,
  to: number,
): Float64Array {
  const out = new Float64Array(to - from);
  for (let r = firstRangeAfter(ranges, from); r <= ranges.length; r += 1) {
    const before = r > 0 ? ranges[r - 1] : null;
    const range = r < ranges.length ? ranges[r] : null;
    const gapFrom = Math.max(from, before ? before.to : from);
    const gapTo = Math.min(to, range ? range.from : to);
    const left = before ? samples[before.to - 1] : range ? samples[range.from] : 0;
    const right = range ? samples[range.from] : left;
    const start = before ? before.to - 1 : gapFrom;
    const span = Math.max(1, (range ? range.from : gapTo) - start);
    for (let i = gapFrom; i < gapTo; i += 1)
      out[i - from] = left + ((right - left) * (i - start)) / span;
    if (!range || range.from >= to) break;
    for (let i = Math.max(from, range.from); i < Math.min(to, range.to); i += 1)
      out[i - from] = samples[i];
  }
  return out;
}

/** Index of the first range that ends after a sample (their count where none does). */
function firstRangeAfter(ranges: readonly SampleRange[], sample: number): number {
  let low = 0;
  let high = ranges.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (ranges[middle].to <= sample) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Whether a sample lies in a usable range at least `margin` samples from what is not. */
export function isUsable(ranges: readonly SampleRange[], sample: number, margin = 0): boolean {
  const range = ranges[firstRangeAfter(ranges, sample)];
  return range !== undefined && sample >= range.from + margin && sample < range.to - margin;
}
