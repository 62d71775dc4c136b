import { removeLine } from '../numeric/detrend';
import { cos } from '../numeric/elementary';
import { addShifted } from './sub-sample';

/** How far an average beat reaches from R, and less where beats come close: so much of a usual interval. */
const REACH_S = { before: 0.3, after: 0.5 };
const REACH_SHARE = { before: 0.35, after: 0.6 };
/** The average falls to 0 at its ends within this; the level before and after a beat is read there. */
const END_S = 0.04;
/** Beats an average is made of, at most; spread over all of them. */
const MOST_BEATS = 600;
/** A beat is taken out at no more than so many times the average's size. */
const LARGEST = 2;
/** Half of the stretch in which a beat's size is read. */
const QRS_HALF_S = 0.08;
/** Beats looked at between turns for others. */
const BEATS_A_TURN = 40;
/** Samples that interpolation needs beside a row. */
const SIDE = 10;

/** A stretch of a lead with its beats: places in samples of it, between samples, ascending. */
export interface BeatStretch {
  readonly samples: Float64Array;
  readonly places: readonly number[];
  /** Class of each beat, any number. */
  readonly classes: readonly number[];
}

/** The average of some beats of one class. */
export interface LeadAverage {
  /** uV; 0 at both ends. */
  readonly samples: Float64Array;
  /** Index of R. */
  readonly centre: number;
  readonly count: number;
}

/** Samples about a place as if R were at `centre`, less the line between its ends; null where they reach beyond the stretch. */
function rowAt(
  { samples }: BeatStretch,
  place: number,
  centre: number,
  length: number,
  end: number,
): Float64Array | null {
  const from = place - centre;
  if (from < SIDE || from + length + SIDE > samples.length) return null;
  const row = new Float64Array(length);
  addShifted(row, samples, from);
  for (const value of row) if (Number.isNaN(value)) return null;
  let [before, after] = [0, 0];
  for (let i = 0; i < end; i += 1) {
    before += row[i] / end;
    after += row[length - 1 - i] / end;
  }
  const slope = (after - before) / (length - end);
  return row.map((value, i) => value - before - slope * (i - (end - 1) / 2));
}

/** Average of the beats of one class over some stretches, with a rest now and then; null where none can be read. */
export function* leadAverage(
  stretches: readonly BeatStretch[],
  beatClass: number,
  rateHz: number,
  usualRrS: number,
): Generator<void, LeadAverage | null> {
  const reach = (side: 'before' | 'after') =>
    Math.round(Math.min(REACH_S[side], REACH_SHARE[side] * usualRrS) * rateHz);
  const centre = reach('before');
  const length = centre + reach('after') + 1;
  const end = Math.max(1, Math.round(END_S * rateHz));
  const beats = stretches.flatMap((stretch) =>
    stretch.places.flatMap((place, k) =>
      stretch.classes[k] === beatClass ? [{ stretch, place }] : [],
    ),
  );
  const sum = new Float64Array(length);
  let count = 0;
  const every = Math.max(1, beats.length / MOST_BEATS);
  for (let k = 0; Math.floor(k) < beats.length; k += every) {
    const { stretch, place } = beats[Math.floor(k)];
    const row = rowAt(stretch, place, centre, length, end);
    if (!row) continue;
    for (let i = 0; i < length; i += 1) sum[i] += row[i];
    count += 1;
    if (count % BEATS_A_TURN === 0) yield;
  }
  if (count === 0) return null;
  const samples = sum.map((value, i) => {
    const fromEnd = Math.min(i, length - 1 - i);
    const weight = fromEnd >= end ? 1 : 0.5 - 0.5 * cos((Math.PI * fromEnd) / end);
    return (weight * value) / count;
  });
  return { samples, centre, count };
}

/** Adds an average, `size` times, with its R at a place between samples; what lies outside is left out. */
export function addAverage(
  samples: Float64Array,
  average: LeadAverage,
  place: number,
  size: number,
): void {
  const first = Math.floor(place) - average.centre - SIDE;
  const shifted = new Float64Array(average.samples.length + 2 * SIDE);
  addShifted(shifted, average.samples, first - (place - average.centre));
  for (let i = 0; i < shifted.length; i += 1)
    if (first + i >= 0 && first + i < samples.length) samples[first + i] += size * shifted[i];
}

/**
 * How large a beat is beside its average, by least squares over the QRS complex, lines taken off both, so that a beat close
 * behind it has no say; 1 where it reaches beyond the stretch.
 */
function sizeOf(
  { samples }: BeatStretch,
  place: number,
  { samples: average, centre }: LeadAverage,
  half: number,
): number {
  const from = place - half;
  if (from < SIDE || from + 2 * half + 1 + SIDE > samples.length) return 1;
  const beat = new Float64Array(2 * half + 1);
  addShifted(beat, samples, from);
  if (beat.some(Number.isNaN)) return 1;
  const row = removeLine(beat);
  const own = removeLine(average.slice(centre - half, centre + half + 1));
  let [power, both] = [0, 0];
  for (let i = 0; i < row.length; i += 1) {
    power += own[i] * own[i];
    both += own[i] * row[i];
  }
  return power > 0 ? Math.max(0, Math.min(LARGEST, both / power)) : 0;
}

/**
 * A stretch of the heart lead less its beats: each less the average of its class in its own size (the local average beat).
 * What an average leaves of a beat stays, so the places of beats are left out where anything is scored.
 */
export function* withoutOwnBeats(
  stretch: BeatStretch,
  averages: ReadonlyMap<number, LeadAverage>,
  rateHz: number,
): Generator<void, Float64Array> {
  const half = Math.round(QRS_HALF_S * rateHz);
  const out = stretch.samples.slice();
  for (const [k, place] of stretch.places.entries()) {
    const average = averages.get(stretch.classes[k]);
    if (average) addAverage(out, average, place, -sizeOf(stretch, place, average, half));
    if (k % BEATS_A_TURN === BEATS_A_TURN - 1) yield;
  }
  return out;
}
