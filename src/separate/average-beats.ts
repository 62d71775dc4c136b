import { LAGRANGE_COUNT, LAGRANGE_FIRST, lagrangeWeights } from '../numeric/lagrange';
import { BEATS_A_STEP, type BeatGroup, type PlacedBeats, windowAbout } from './beat-extents';
import { cutBeat, type Levels, levelsBefore } from './beat-snippets';

/** Samples at both ends of an average that are let down to 0. */
const TAPER = 2;
/** Parts of a microvolt that snippets are rounded to. */
const FINE = 16384;
/** An average is only as wide as at least this part of its beats. */
const WIDE_FOR = 0.5;
/** Samples that are alike in what is left beside an average: the lead's low-pass and slow changes of shape. */
const ALIKE = 4;
/** Fewer sizes tell no spread: each beat then has the usual size. */
const LEAST_SIZES = 8;
/** A beat is at most this many times its average. */
const LARGEST = 2;
/** A beat of no average of its own is given that of class N where it is as like it as this. */
const LIKE = 0.7;

/** What the averages of one class say of its beats. */
interface Averages {
  readonly group: BeatGroup;
  readonly length: number;
  /** An average a member, one after the other, in uV; single precision. */
  readonly rows: Float32Array;
  /** Size of each member beside its average, and the variance that noise gives it; NaN where it cannot be told. */
  readonly sizes: Float64Array;
  readonly noise: Float64Array;
}

/** Size of a snippet by least squares, with the variance its rest gives it. */
function sizeOf(row: Float64Array, average: Float32Array) {
  let [shared, own, rest, there] = [0, 0, 0, 0];
  for (let j = 0; j < row.length; j += 1) {
    shared += row[j] * average[j];
    own += average[j] ** 2;
    if (average[j] !== 0) there += 1;
  }
  if (!(own > 0) || there < 4) return { size: Number.NaN, noise: Number.NaN, likeness: 0 };
  const size = shared / own;
  let all = 0;
  for (let j = 0; j < row.length; j += 1) {
    rest += (row[j] - size * average[j]) ** 2;
    all += row[j] ** 2;
  }
  return {
    size,
    noise: (ALIKE * rest) / (there - 2) / own,
    likeness: all > 0 ? shared / Math.sqrt(own * all) : 0,
  };
}

interface Cutting {
  readonly beats: PlacedBeats;
  /** What is left of the lead, uV. */
  readonly samples: Float64Array;
  readonly levels: Levels;
  /** 1 where a beat may enter averages. */
  readonly usable: Uint8Array;
  readonly count: number;
  readonly centre: number;
  readonly length: number;
}

/**
 * The snippets that the averages about one member need, cut once each, and their sum. They are rounded to binary fractions so
 * that adding one and taking it off again leaves no trace: a mean does not hang on what lay before its window.
 */
function runningMean(cutting: Cutting, members: readonly number[], size: number) {
  const { beats, samples, levels, usable, centre, length } = cutting;
  const kept = new Float64Array(size * length);
  const good = new Uint8Array(size);
  const row = (m: number) => kept.subarray((m % size) * length, ((m % size) + 1) * length);
  const sum = new Float64Array(length);
  const reach = new Float64Array(length + 1);
  let [first, next, count] = [0, 0, 0];
  const add = (m: number, sign: 1 | -1): void => {
    if (good[m % size] === 0) return;
    const at = (m % size) * length;
    for (let j = 0; j < length; j += 1) sum[j] += sign * kept[at + j];
    reach[centre - beats.before[members[m]]] += sign;
    reach[centre + beats.after[members[m]] + 1] -= sign;
    count += sign;
  };
  const cut = (m: number): void => {
    const snippet = row(m);
    const isWhole = cutBeat(beats, members[m], levels, samples, snippet, centre);
    good[m % size] = isWhole && usable[members[m]] === 1 ? 1 : 0;
    for (let j = 0; j < length; j += 1) snippet[j] = Math.round(FINE * snippet[j]) / FINE;
  };
  return {
    row,
    isGood: (m: number) => good[m % size] === 1,
    /** Mean of those of members [from, to) into `average`, as wide as at least half of them; windows only move on. */
    over(from: number, to: number, average: Float32Array): void {
      for (; first < from; first += 1) add(first, -1);
      for (; next < to; next += 1) {
        cut(next);
        add(next, 1);
      }
      if (count > 0) meanOf(sum, reach, Math.max(1, WIDE_FOR * count), average);
    },
  };
}

/** Sums over their counts, given as changes from place to place, where these are at least `least`; let down at both ends. */
function meanOf(
  sum: Float64Array,
  changes: Float64Array,
  least: number,
  average: Float32Array,
): void {
  let [there, first, last] = [0, -1, -1];
  for (let j = 0; j < sum.length; j += 1) {
    there += changes[j];
    if (there < least) continue;
    if (first < 0) first = j;
    last = j;
    average[j] = sum[j] / there;
  }
  if (first < 0) return;
  for (let i = 0; i < TAPER; i += 1) {
    average[first + i] *= (i + 1) / (TAPER + 1);
    average[last - i] *= (i + 1) / (TAPER + 1);
  }
}

/** The running averages of a class and the size of each of its beats beside its own. */
function* averagesOf(cutting: Cutting, group: BeatGroup): Generator<void, Averages> {
  const { count, length } = cutting;
  const { members } = group;
  const n = members.length;
  const rows = new Float32Array(n * length);
  const sizes = new Float64Array(n).fill(Number.NaN);
  const noise = new Float64Array(n).fill(Number.NaN);
  const mean = runningMean(cutting, members, Math.min(n, 2 * Math.floor(count / 2) + 1));
  for (let m = 0; m < n; m += 1) {
    if (m % BEATS_A_STEP === 0) yield;
    const [from, to] = windowAbout(m, n, count);
    const average = rows.subarray(m * length, (m + 1) * length);
    mean.over(from, to, average);
    if (!mean.isGood(m)) continue;
    const fitted = sizeOf(mean.row(m), average);
    sizes[m] = fitted.size;
    noise[m] = fitted.noise;
  }
  return { group, length, rows, sizes, noise };
}

/**
 * How large a beat is taken to be beside its average: its own size, drawn towards the usual one nearby as far as noise alone
 * would spread sizes (James & Stein 1961, in the form for one number among many).
 */
function believedSize({ sizes, noise }: Averages, m: number, count: number): number {
  const [from, to] = windowAbout(m, sizes.length, count);
  let [sum, squares, byNoise, known] = [0, 0, 0, 0];
  for (let i = from; i < to; i += 1) {
    if (Number.isNaN(sizes[i])) continue;
    sum += sizes[i];
    byNoise += noise[i];
    known += 1;
  }
  if (known < LEAST_SIZES) return 1;
  const mean = sum / known;
  for (let i = from; i < to; i += 1) if (!Number.isNaN(sizes[i])) squares += (sizes[i] - mean) ** 2;
  const variance = squares / (known - 1);
  const believed = variance > 0 ? Math.max(0, 1 - byNoise / known / variance) : 0;
  const size = Number.isNaN(sizes[m]) ? mean : mean + believed * (sizes[m] - mean);
  return Math.min(LARGEST, Math.max(0, size));
}

/** Adds an average, `size` times, at a beat's place. */
function addAverage(
  sum: Float64Array,
  average: Float32Array,
  size: number,
  place: number,
  centre: number,
): void {
  const base = Math.ceil(place);
  const weights = lagrangeWeights(base - place);
  const reach = LAGRANGE_FIRST + LAGRANGE_COUNT;
  const from = Math.max(0, base - centre - reach);
  const to = Math.min(sum.length, base - centre + average.length + reach);
  for (let i = from; i < to; i += 1) {
    const j = i - base + centre + LAGRANGE_FIRST;
    for (let q = 0; q < LAGRANGE_COUNT; q += 1)
      if (j + q >= 0 && j + q < average.length) sum[i] += size * weights[q] * average[j + q];
  }
}

/** Adds the average of class N at beats that have none of their own, where they are like it. */
function addOthers(sum: Float64Array, cutting: Cutting, { group, rows, length }: Averages): number {
  const { beats, centre, levels, samples } = cutting;
  const row = new Float64Array(length);
  let added = 0;
  for (const k of beats.others) {
    if (!cutBeat(beats, k, levels, samples, row, centre)) continue;
    const next = group.members.findIndex((other) => other > k);
    const m = next < 0 ? group.members.length - 1 : next;
    const average = rows.subarray(m * length, (m + 1) * length);
    const { size, likeness } = sizeOf(row, average);
    if (!(likeness > LIKE)) continue;
    addAverage(sum, average, Math.min(LARGEST, size), beats.at[k], centre);
    added += 1;
  }
  return added;
}

/** The sum of the average heartbeats of a lead at its own rate, uV, and how many of its beats are in it. */
export interface AveragedBeats {
  readonly uv: Float64Array;
  readonly beats: number;
}

/**
 * The sum of the local average heartbeats of a lead: each beat stands for the mean of `count` beats of its class about it,
 * aligned at R below the sample, in the size it has itself. Classes come one after the other, each averaged on what those
 * before leave, so that the T wave under an early beat counts once. `usable` is 0 for beats that may not enter an average.
 * Yields now and then.
 */
export function* averageBeats(
  lead: Float32Array | Float64Array,
  beats: PlacedBeats,
  usable: Uint8Array,
  count: number,
): Generator<void, AveragedBeats> {
  const uv = new Float64Array(lead.length);
  const left = Float64Array.from(lead);
  const centre = Math.max(0, ...extremes(beats.before));
  const length = centre + Math.max(0, ...extremes(beats.after)) + 1;
  let added = 0;
  for (const group of beats.groups) {
    for (let i = 0; i < lead.length; i += 1) left[i] = lead[i] - uv[i];
    const levels = levelsBefore(beats, left);
    yield;
    const cutting = { beats, samples: left, levels, usable, count, centre, length };
    const averages = yield* averagesOf(cutting, group);
    for (let m = 0; m < group.members.length; m += 1) {
      if (m % BEATS_A_STEP === 0) yield;
      const size = believedSize(averages, m, count);
      const average = averages.rows.subarray(m * length, (m + 1) * length);
      addAverage(uv, average, size, beats.at[group.members[m]], centre);
    }
    added += group.members.length;
    if (group.beatClass === 'N') added += addOthers(uv, cutting, averages);
  }
  return { uv, beats: added };
}

/** Largest value, as a list of one or none. */
const extremes = (x: Int32Array): readonly number[] =>
  x.length > 0 ? [x.reduce((most, one) => Math.max(most, one))] : [];
