import { LAGRANGE_COUNT, LAGRANGE_FIRST, lagrangeWeights } from '../numeric/lagrange';
import type { PlacedBeats } from './beat-extents';

/** Neighbouring beats this far apart tell the level between them by a cubic; else a straight line has to do. */
const NEAREST_S = 0.3;
const FARTHEST_S = 1.8;
/** A level this part of the beat before's own stretch behind it is clear of its waves. */
const CLEAR_AFTER = 0.75;

/** The level of the lead just before a beat's own stretch, where no heart wave stands: place in samples and uV. */
export interface Levels {
  readonly at: Float64Array;
  readonly uv: Float64Array;
  /** 0 where the beat before is so near that its own waves stand there. */
  readonly isClear: Uint8Array;
}

/** Six-point weights of a beat: all samples at whole distances from it lie between the lead's in the same way. */
function readerAt(samples: Float64Array, place: number) {
  const base = Math.floor(place);
  const weights = lagrangeWeights(place - base);
  return (offset: number): number => {
    const first = base + offset + LAGRANGE_FIRST;
    if (first < 0 || first + LAGRANGE_COUNT > samples.length) return Number.NaN;
    let sum = 0;
    for (let q = 0; q < LAGRANGE_COUNT; q += 1) sum += weights[q] * samples[first + q];
    return sum;
  };
}

const levelOf = (read: (offset: number) => number, offset: number): number =>
  (read(offset - 1) + read(offset) + read(offset + 1)) / 3;

/** The level before each beat, some tenth of a second long. */
export function levelsBefore(beats: PlacedBeats, samples: Float64Array): Levels {
  const at = beats.at.map((place, k) => place - beats.before[k]);
  const uv = beats.at.map((place, k) => levelOf(readerAt(samples, place), -beats.before[k]));
  const isClear = Uint8Array.from(at, (start, k) =>
    k > 0 && start - beats.at[k - 1] < CLEAR_AFTER * beats.after[k - 1] ? 0 : 1,
  );
  return { at, uv, isClear };
}

/** The next beat in a direction whose level is clear, among three; one that is not there where there is none. */
function clearFrom({ isClear }: Levels, k: number, step: -1 | 1): number {
  for (let i = k + step; Math.abs(i - k) <= 3; i += step) if (isClear[i] === 1) return i;
  return -1;
}

/** Newton's divided differences: the coefficients of the polynomial through some points. */
function dividedDifferences(x: readonly number[], y: readonly number[]): number[] {
  const steps = [...y];
  for (let order = 1; order < x.length; order += 1)
    for (let i = x.length - 1; i >= order; i -= 1)
      steps[i] = (steps[i] - steps[i - 1]) / (x[i] - x[i - order]);
  return steps;
}

/** What the lead would be without the heart about a beat: by the levels before it and its neighbours. */
function courseAbout(beats: PlacedBeats, levels: Levels, k: number, endUv: number) {
  const { at, uv } = levels;
  const next = clearFrom(levels, k, 1);
  const near = [clearFrom(levels, k, -1), k, next, clearFrom(levels, next, 1)];
  const apart = near.slice(1).map((i) => (at[i] - at[i - 1]) / beats.rateHz);
  const regular = apart.every((s) => s >= NEAREST_S && s <= FARTHEST_S);
  if (regular && near.every((i) => Number.isFinite(uv[i]))) {
    const [a, b, c] = near.map((i) => at[i]);
    const steps = dividedDifferences(
      near.map((i) => at[i]),
      near.map((i) => uv[i]),
    );
    return (x: number): number =>
      steps[0] + (x - a) * (steps[1] + (x - b) * (steps[2] + (x - c) * steps[3]));
  }
  const slope = (endUv - uv[k]) / (beats.at[k] + beats.after[k] - at[k]);
  return (x: number): number => uv[k] + slope * (x - at[k]);
}

/**
 * Cuts a beat out of a lead, from `before` to `after` samples about its R peak, and takes off what the lead would be without
 * the heart; `row[centre]` is the R peak, and what lies outside the beat's own stretch is 0. False where a sample is missing.
 */
export function cutBeat(
  beats: PlacedBeats,
  k: number,
  levels: Levels,
  samples: Float64Array,
  row: Float64Array,
  centre: number,
): boolean {
  const read = readerAt(samples, beats.at[k]);
  const [before, after] = [beats.before[k], beats.after[k]];
  const courseAt = courseAbout(beats, levels, k, levelOf(read, after));
  row.fill(0);
  let sum = 0;
  for (let offset = -before; offset <= after; offset += 1) {
    const value = read(offset) - courseAt(beats.at[k] + offset);
    row[centre + offset] = value;
    sum += value;
  }
  return Number.isFinite(sum);
}
