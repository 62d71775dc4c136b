import { cos } from '../numeric/elementary';
import { median } from '../numeric/statistics';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { addShifted } from './sub-sample';

/** An average reaches so far before and after R, and never farther than this part of the median RR interval. */
const BEFORE_S: Seconds = 0.3;
const AFTER_S: Seconds = 0.5;
const BEFORE_PART = 0.35;
const AFTER_PART = 0.6;
/** Its ends fall to 0 over so long. */
const EDGE_S: Seconds = 0.04;
/** The size of a beat is read off its complex. */
const SIZE_HALF_S: Seconds = 0.08;
const SIZE_LIMITS = [0.5, 1.5] as const;
/** A class of fewer beats has no average. */
const FEWEST = 5;

/** Beats of one lead, in its samples (between samples), ascending, with the class of each. */
export interface PlacedBeats {
  readonly places: Float64Array;
  readonly classes: Uint8Array;
}

export interface BeatTrain {
  /** The averages at the beats' own times, each scaled to its beat; as long as the lead. */
  readonly samples: Float64Array;
  /** Beats that are in it. */
  readonly beats: number;
  /** Height of the most frequent class's average, crest to trough of its complex, uV. */
  readonly heightUv: number;
}

interface Shape {
  readonly before: number;
  readonly length: number;
  readonly edge: number;
}

function shapeFor(places: Float64Array, rateHz: Hertz): Shape {
  const intervals = places.slice(1).map((place, k) => place - places[k]);
  const rr = intervals.length > 0 ? median(intervals) : rateHz;
  const before = Math.round(Math.min(BEFORE_S * rateHz, BEFORE_PART * rr));
  const after = Math.round(Math.min(AFTER_S * rateHz, AFTER_PART * rr));
  const edge = Math.max(1, Math.round(EDGE_S * rateHz));
  return { before, length: before + after + 1, edge };
}

/** Samples of a lead about a beat, less the line between its ends. */
function rowOf(lead: Float64Array, place: number, { before, length, edge }: Shape): Float64Array {
  const row = new Float64Array(length);
  addShifted(row, lead, place - before);
  const endOf = (from: number) => {
    let sum = 0;
    for (let i = from; i < from + edge; i += 1) sum += row[i];
    return sum / edge;
  };
  const [first, last] = [endOf(0), endOf(length - edge)];
  return row.map((value, i) => value - first - ((last - first) * i) / (length - 1));
}

/** Cosine fall to both ends. */
function edged(average: Float64Array, edge: number): Float64Array {
  return average.map((value, i) => {
    const fromEnd = Math.min(i, average.length - 1 - i);
    return fromEnd >= edge ? value : value * (0.5 - 0.5 * cos((Math.PI * fromEnd) / edge));
  });
}

/** Size of a beat, the average's being 1, from the complex alone. */
function sizeOf(row: Float64Array, average: Float64Array, middle: number, half: number): number {
  let [both, own] = [0, 0];
  const to = Math.min(average.length - 1, middle + half);
  for (let i = Math.max(0, middle - half); i <= to; i += 1) {
    both += row[i] * average[i];
    own += average[i] * average[i];
  }
  const size = own > 0 ? both / own : 1;
  return Math.max(SIZE_LIMITS[0], Math.min(SIZE_LIMITS[1], size));
}

/**
 * What the beats of a lead have in common: the average of each class at the beats' own times, scaled beat by beat. What
 * is left of the lead without it is what a drawn heartbeat should not hold. Classes of under five beats are left out; null
 * where none has an average.
 */
export function beatTrain(
  lead: Float64Array,
  rateHz: Hertz,
  { places, classes }: PlacedBeats,
): BeatTrain | null {
  const shape = shapeFor(places, rateHz);
  const half = Math.round(SIZE_HALF_S * rateHz);
  const samples = new Float64Array(lead.length);
  let beats = 0;
  let main = { count: 0, heightUv: 0 };
  for (const one of new Set(classes)) {
    const own = places.filter(
      (place, k) =>
        classes[k] === one &&
        place >= shape.before &&
        place + shape.length - shape.before < lead.length,
    );
    if (own.length < FEWEST) continue;
    const rows = Array.from(own, (place) => rowOf(lead, place, shape));
    const mean = new Float64Array(shape.length);
    for (const row of rows) for (let i = 0; i < mean.length; i += 1) mean[i] += row[i];
    const average = edged(
      mean.map((sum) => sum / rows.length),
      shape.edge,
    );
    rows.forEach((row, k) => {
      const size = sizeOf(row, average, shape.before, half);
      addBeat(samples, average, own[k] - shape.before, size);
    });
    beats += rows.length;
    if (rows.length > main.count)
      main = { count: rows.length, heightUv: heightOf(average, shape.before, half) };
  }
  return beats > 0 ? { samples, beats, heightUv: main.heightUv } : null;
}

/** Adds an average whose first sample lies at `from`, between samples. */
function addBeat(samples: Float64Array, average: Float64Array, from: number, size: number): void {
  const first = Math.ceil(from) - 1;
  const placed = new Float64Array(average.length + 2);
  addShifted(placed, average, first - from);
  for (let i = 0; i < placed.length; i += 1) {
    const at = first + i;
    if (at >= 0 && at < samples.length) samples[at] += size * placed[i];
  }
}

function heightOf(average: Float64Array, middle: number, half: number): number {
  const complex = average.subarray(Math.max(0, middle - half), middle + half + 1);
  return Math.max(...complex) - Math.min(...complex);
}
