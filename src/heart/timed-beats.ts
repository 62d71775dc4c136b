import { quietly } from '../numeric/in-steps';
import { averageBeats, type ShapeAverage, timeBeat } from './beat-average';
import { isOfShape } from './classify';
import type { HeartSignal } from './energy-pass';
import type { Candidate } from './shape-pass';
import { crestPlace } from './sub-sample';
import { readFilled } from './usable-signal';

/** Beats an average is made of, at least. */
const FEWEST = 3;

/** Averages of the shapes that beats were found of, the most frequent first. */
export function* averagesOf(
  signal: HeartSignal,
  beats: readonly Candidate[],
): Generator<number, Omit<ShapeAverage, 'fiducial'>[]> {
  const groups = new Map<number, number[]>();
  for (const beat of beats) {
    if (!isOfShape(beat)) continue;
    const group = groups.get(beat.shape);
    if (group) group.push(beat.sample);
    else groups.set(beat.shape, [beat.sample]);
  }
  const averages: Omit<ShapeAverage, 'fiducial'>[] = [];
  for (const [shape, group] of groups) {
    if (group.length >= FEWEST)
      averages.push(yield* quietly(averageBeats(signal, shape, group), 0.94));
    yield 0.94;
  }
  return averages.sort((a, b) => b.count - a.count);
}

/** Half of the stretch in which the extreme of a beat of no known shape is looked for. */
const ODD_HALF_S = 0.06;
/** Samples beside it that the place between samples is read from. */
const MARGIN = 9;

/** Beats timed between two steps. */
const BEATS_A_STEP = 250;

/** Times of the beats below the sample, in samples. */
export function* timesOf(
  signal: HeartSignal,
  beats: readonly Candidate[],
  averages: readonly ShapeAverage[],
  sign: 1 | -1,
): Generator<number, number[]> {
  const byShape = new Map(averages.map((average) => [average.shape, average]));
  const times: number[] = [];
  for (const beat of beats) {
    const average = isOfShape(beat) ? byShape.get(beat.shape) : undefined;
    times.push(
      average
        ? timeBeat(signal, average, beat.sample).time
        : extremeNear(signal, beat.sample, sign),
    );
    if (times.length % BEATS_A_STEP === 0) yield 0.95 + (0.04 * times.length) / beats.length;
  }
  return times;
}

/** Time of the extreme of a beat of no known shape, in samples. */
function extremeNear({ samples, usable, rateHz }: HeartSignal, near: number, sign: 1 | -1): number {
  const reach = Math.round(ODD_HALF_S * rateHz);
  const start = near - reach - MARGIN;
  const row = readFilled(samples, usable, start, near + reach + MARGIN + 1);
  let at = reach + MARGIN;
  for (let i = MARGIN; i < row.length - MARGIN; i += 1) if (sign * row[i] > sign * row[at]) at = i;
  return start + crestPlace(row, at, sign);
}
