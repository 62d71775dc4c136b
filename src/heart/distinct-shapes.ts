import { type Growing, likeness, matchMiddle, middle, type Rows, rms } from './beat-rows';
import { meanFrequency } from './classify';
import { filterBand, type QrsBands, rmsAbout } from './qrs-bands';

/** Averages more alike than this are one shape. */
const SAME_SHAPE = 0.92;
/** A wave carried along by a more frequent shape is this much like what is found beside that one. */
const CARRIED_LIKENESS = 0.78;
/** The same where it overlaps the beat itself: the same beat, cut out elsewhere. */
const SHIFTED_LIKENESS = 0.85;
/** T and P waves have at most this part of their beat's energy in the QRS band; a beat that always follows has more. */
const CARRIED_PART = 0.75;
/** P waves begin at most this long before the middle of their beat (common practice, no source). */
const EARLIEST_P_S = 0.26;
/** What every beat of a shape carries but was taken for a beat far less often is no beat, with this part of the energy even. */
const RARE_PART = 0.5;
const CARRIED_PART_IF_RARE = 1.1;
const ENERGY_S = 0.1;
/** A P wave never has more than this part of its beat's energy in the QRS band. */
const MOST_P_PART = 1.5;

/** P waves that were taken for beats are not so many times as frequent as their complexes. */
const LEAST_COMPLEXES = 0.3;
/** The complexes carry it, this alike and with this part of its size. */
const P_LIKENESS = 0.9;
const LEAST_P_SIZE = 0.7;
/** It is slower than its complex by so much. */
const P_SLOWER = 0.9;
/** Its middle lies at least so long before that of the complex: nearer it may be a part of it. */
const LATEST_P_S = 0.11;

/** T waves crest in this time after the middle of their complex (common practice, no source). */
const EARLIEST_T_S = 0.18;
const LATEST_T_S = 0.42;
/** A shape that is a T wave is carried by its complexes this alike, with this part of its size, and slower by so much. */
const T_LIKENESS = 0.95;
const LEAST_T_SIZE = 0.6;
const T_SLOWER = 0.6;
/** Where a beat and what follows take longer together, an early beat and its pause may be meant (common practice, no source). */
const LONGEST_PAIR_S = 1.1;

/** A shape learned from what was taken for beats. */
export interface Distinct {
  readonly shape: Growing;
  /** It is the T wave of another, and no beat. */
  readonly isTallT: boolean;
}

interface Weighted {
  readonly shape: Growing;
  /** Energy of its average in the QRS band. */
  readonly energy: number;
}

/**
 * Leaves out shapes nearly alike to a stronger one, and those that most beats of a stronger shape carry with them: T and P
 * waves. T waves as tall as their complexes stay, named so: what is like them is to join no shape of beats. Takes a rest
 * after each shape.
 */
export function* distinctShapes(
  shapes: readonly Growing[],
  rows: Rows,
  rateHz: number,
  bands: QrsBands,
): Generator<void, Distinct[]> {
  const { half, rowHalf } = rows;
  const kept: Weighted[] = [];
  const strength = ({ sum }: Growing) => rms(middle(sum, half));
  for (const shape of [...shapes].sort((a, b) => strength(b) - strength(a))) {
    const energy = qrsEnergy(shape, rowHalf, rateHz, bands);
    const known = kept.some(
      (other) =>
        matchMiddle(other.shape.sum, shape.sum, rows, 1).value > SAME_SHAPE ||
        isCarried(shape, other.shape, rows, energy / other.energy, rateHz),
    );
    if (!known) kept.push({ shape, energy });
    yield;
  }
  const complexes = kept.filter((one) => !kept.some((other) => isTallP(one, other, rows, rateHz)));
  return complexes.map((one) => ({
    shape: one.shape,
    isTallT: complexes.some((other) => isTallT(one, other, rows, rateHz)),
  }));
}

/**
 * Whether a shape is the P wave of another, however tall: nearer before it than two beats ever are, and slower. A QRS complex
 * is the quicker of the two.
 */
function isTallP(one: Weighted, other: Weighted, rows: Rows, rateHz: number): boolean {
  const { half, rowHalf } = rows;
  if (one === other || other.shape.count < LEAST_COMPLEXES * one.shape.count) return false;
  if (one.energy > MOST_P_PART * other.energy) return false;
  const own = middle(one.shape.sum, half);
  const start = rowHalf - half;
  const earliest = Math.max(0, start - Math.round(EARLIEST_P_S * rateHz));
  const { value, at } = likeness(
    other.shape.sum,
    own,
    earliest,
    start - Math.round(LATEST_P_S * rateHz),
    1,
  );
  const there = rms(other.shape.sum.subarray(at, at + own.length)) / other.shape.count;
  return (
    value > P_LIKENESS &&
    there > (LEAST_P_SIZE * rms(own)) / one.shape.count &&
    meanFrequency(own) < P_SLOWER * meanFrequency(middle(other.shape.sum, half))
  );
}

/**
 * Whether a shape is the T wave of another, however tall: it follows each of its beats at a delay that blurs nothing, and is far
 * slower. A ventricular beat that follows every beat is quicker, or comes later and brings a pause.
 */
function isTallT(one: Weighted, other: Weighted, rows: Rows, rateHz: number): boolean {
  const { half, rowHalf, pairRr } = rows;
  if (one === other || other.shape.count < LEAST_COMPLEXES * one.shape.count) return false;
  if (!(pairRr <= LONGEST_PAIR_S * rateHz)) return false;
  const own = middle(one.shape.sum, half);
  const start = rowHalf - half;
  const { value, at } = likeness(
    other.shape.sum,
    own,
    start + Math.round(EARLIEST_T_S * rateHz),
    start + Math.round(LATEST_T_S * rateHz),
    1,
  );
  const there = rms(other.shape.sum.subarray(at, at + own.length)) / other.shape.count;
  return (
    value > T_LIKENESS &&
    there > (LEAST_T_SIZE * rms(own)) / one.shape.count &&
    meanFrequency(own) < T_SLOWER * meanFrequency(middle(other.shape.sum, half))
  );
}

/** Energy of an average in the QRS band: the greatest root mean square over 100 ms near its middle. */
function qrsEnergy(
  { sum, count }: Growing,
  centre: number,
  rateHz: number,
  bands: QrsBands,
): number {
  const rmsAt = rmsAbout(filterBand(sum, bands.energy), Math.round(ENERGY_S * rateHz));
  const reach = Math.round(0.06 * rateHz);
  let greatest = 1e-12;
  for (let i = centre - reach; i <= centre + reach; i += 1) greatest = Math.max(greatest, rmsAt(i));
  return greatest / count;
}

/** Whether a shape is found beside the beats of another, of like size: before it as a P wave, or after it as a T wave. */
function isCarried(
  shape: Growing,
  other: Growing,
  { half, rowHalf, lag, latest }: Rows,
  energyPart: number,
  rateHz: number,
): boolean {
  const own = middle(shape.sum, half);
  const start = rowHalf - half;
  const earliest = Math.max(0, start - Math.round(EARLIEST_P_S * rateHz));
  const after = likeness(other.sum, own, start + lag, start + latest, 1);
  const before = likeness(other.sum, own, earliest, start - lag, 1);
  const match = after.value > before.value ? after : before;
  const there = rms(other.sum.subarray(match.at, match.at + own.length)) / other.count;
  if (there < rms(own) / shape.count / 2) return false;
  if (Math.abs(match.at - start) < half) return match.value > SHIFTED_LIKENESS;
  const rare = shape.count < RARE_PART * other.count;
  return (
    match.value > CARRIED_LIKENESS && energyPart < (rare ? CARRIED_PART_IF_RARE : CARRIED_PART)
  );
}
