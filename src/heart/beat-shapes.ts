import { quietly } from '../numeric/in-steps';
import { median } from '../numeric/statistics';
import { latestWaveS } from './after-wave';
import { type Growing, type Match, matchMiddle, middle, type Rows, rms } from './beat-rows';
import { noiseByHalfSecond, SIDE_S } from './between-beats';
import { type Distinct, distinctShapes } from './distinct-shapes';
import { chunksOf, type HeartSignal } from './energy-pass';
import { filterBand, rmsAbout } from './qrs-bands';
import { likeSideWave, type SideWave, sideWaves } from './side-waves';

/** Half of the window a complex is known by, and how far a complex may lie from where it was found. */
const SHAPE_HALF_S = 0.12;
export const SHAPE_LAG_S = 0.04;
/** What is read about a beat, to each side: its T wave is to be known. */
const ROW_HALF_S = 0.58;
/** Beats that shapes are learned from, at most; spread over the study. */
const MOST_BEATS = 4000;
const MOST_SHAPES = 12;
/** Beats compared with the shapes between two steps. */
const ROWS_A_STEP = 100;
/** Rows whose noise is measured between two steps. */
const FACTORS_A_STEP = 1000;
/** Least likeness of a noiseless complex to the average of its shape. */
const LEAST_LIKENESS = 0.86;
/** A row is clear where noise lowers its likeness no more than this, or little more than usual. */
const CLEAR_FACTOR = 0.9;
const CLEAR_PART = 0.97;
/** Likeness asked of the beats of a shape that no clear row started. */
const STRICT_LIKENESS = 0.9;
/** Noise sorted by likeness is less alike than this. */
const LEAST_COHERENCE = 0.45;

/** A shape of complex: the average of its beats in the shape band, uV, 2 half + 1 samples about its middle. */
export interface Shape {
  readonly average: Float64Array;
  readonly half: number;
  /** Root of the sum of squares of the average. */
  readonly norm: number;
  readonly count: number;
  /** Mean correlation of its beats with one another, -1 to 1. */
  readonly coherence: number;
  /** The average from `before` samples ahead of the middle to the end of the T wave, falling to 0 at both ends. */
  readonly course: Float64Array;
  readonly before: number;
  /** The P and T waves its beats carry. */
  readonly waves: readonly SideWave[];
}

/**
 * Learns the shapes of the beats found so far: the most frequent first, then those that many beats share most closely, since
 * noise makes frequent shapes too, of poor likeness. Yields the part done.
 */
export function* learnShapes(
  signal: HeartSignal,
  beats: readonly number[],
): Generator<number, Shape[]> {
  const windows = yield* readWindows(signal, beats);
  const { rateHz, bands } = signal;
  const grown = yield* grow(windows);
  const distinct = yield* quietly(distinctShapes(grown, windows, rateHz, bands), 1);
  yield 1;
  const settled = yield* settle(windows, distinct, rateHz);
  const kept = settled.filter(
    (shape) =>
      shape.count >= Math.max(2, 0.001 * windows.rows.length) &&
      !settled.some((other) => isSideWaveOf(shape, other, windows.lag)),
  );
  return byWorth(kept);
}

/**
 * A shape this much rarer than another that is this much like one of its side waves, and of its size, is that wave: a beat that
 * always follows would be as frequent. P waves stand alone and are small; T waves are taken for beats in number, or not at all.
 */
const WAVE_RARER = 0.5;
const LARGE_COUNT = 0.1;
const WAVE_LIKENESS = 0.97;
const SMALL_PART = 0.5;
const SMALL_LIKENESS = 0.85;

function isSideWaveOf(shape: Shape, other: Shape, lag: number): boolean {
  if (!(shape.count < WAVE_RARER * other.count)) return false;
  const like = (kind: SideWave['kind']) =>
    likeSideWave(
      shape.average,
      shape.half,
      2 * lag,
      other.waves.filter((wave) => wave.kind === kind),
    );
  const isSmall = shape.norm < SMALL_PART * other.norm;
  if (isSmall && like('P') > SMALL_LIKENESS) return true;
  return shape.count >= LARGE_COUNT * other.count && like('T') > WAVE_LIKENESS;
}

function byWorth([main, ...others]: readonly Shape[]): Shape[] {
  const worth = ({ count, coherence }: Shape) => count * coherence ** 2 * coherence ** 2;
  return main ? [main, ...others.sort((a, b) => worth(b) - worth(a))] : [];
}

function* readWindows(signal: HeartSignal, beats: readonly number[]): Generator<number, Rows> {
  const { rateHz, bands, samples } = signal;
  const half = Math.round(SHAPE_HALF_S * rateHz);
  const lag = Math.round(SHAPE_LAG_S * rateHz);
  const rowHalf = Math.round(ROW_HALF_S * rateHz);
  const every = Math.max(1, beats.length / MOST_BEATS);
  const margin = bands.reach + half + Math.ceil(SIDE_S * rateHz);
  const rows: Float64Array[] = [];
  const noise: number[] = [];
  let taken = 0;
  for (const { from, to, stretch, start } of chunksOf(signal, margin)) {
    if (Math.floor(taken) >= beats.length) break;
    if (beats[Math.floor(taken)] >= to) continue;
    const shape = filterBand(stretch, bands.shape);
    const level = rmsAbout(shape, 2 * half + 1);
    const quiet = noiseByHalfSecond(level, shape.length, rateHz, from - start, to - start, 0.2);
    for (; Math.floor(taken) < beats.length; taken += every) {
      const at = beats[Math.floor(taken)];
      if (at >= to) break;
      rows.push(shape.slice(at - start - rowHalf, at - start + rowHalf + 1));
      noise.push(quiet[Math.floor((2 * (at - from)) / rateHz)]);
    }
    yield to / samples.length;
  }
  const rr = beats.map((at, i) => (i > 0 ? at - beats[i - 1] : rowHalf));
  const usualRr = Math.round(median(rr));
  const latest = Math.min(rowHalf - half, Math.round(latestWaveS(usualRr / rateHz) * rateHz));
  const step = Math.max(1, Math.floor(rateHz / 120));
  const pairRr = median(beats.slice(2).map((at, i) => at - beats[i]));
  return { rows, noise, half, rowHalf, lag, latest, usualRr, pairRr, step };
}

/** Noise lowers the likeness of a complex to its average by this factor. */
function noiseFactor(rmsUv: number, noiseUv: number): number {
  return Math.sqrt(Math.max(0.1, 1 - (noiseUv / Math.max(rmsUv, 1e-12)) ** 2));
}

/** Sorts the rows into shapes in order of time: each joins the shape it is most like, or starts one. */
function* grow(windows: Rows): Generator<number, Growing[]> {
  const { rows, noise, half } = windows;
  const factors: number[] = [];
  for (const row of rows) {
    factors.push(noiseFactor(rms(middle(row, half)), noise[factors.length]));
    if (factors.length % FACTORS_A_STEP === 0) yield 1;
  }
  const clear = Math.min(CLEAR_FACTOR, CLEAR_PART * median(factors));
  let shapes: Growing[] = [];
  for (let i = 0; i < rows.length; i += 1) {
    if (i % ROWS_A_STEP === 0) yield 1;
    const row = rows[i];
    const factor = factors[i];
    let best: Growing | null = null;
    let bestMatch: Match = { value: 0, at: 0 };
    for (const shape of shapes) {
      const match = matchMiddle(row, shape.sum, windows, windows.step);
      const young = shape.count < 4 ? Math.sqrt(factor) : 1;
      const wanted = shape.strict ? STRICT_LIKENESS : LEAST_LIKENESS * factor * young;
      if (match.value < wanted || match.value <= bestMatch.value) continue;
      best = shape;
      bestMatch = match;
    }
    if (best) {
      addRow(best, row, bestMatch.at, windows);
      continue;
    }
    if (shapes.length >= 2 * MOST_SHAPES)
      shapes = [...shapes].sort((a, b) => b.count - a.count).slice(0, MOST_SHAPES);
    shapes.push({ sum: row.slice(), count: 1, strict: factor < clear });
  }
  return shapes.sort((a, b) => b.count - a.count).slice(0, MOST_SHAPES);
}

function addRow(shape: Growing, row: Float64Array, at: number, { half, rowHalf }: Rows): void {
  const shift = at - (rowHalf - half);
  const from = Math.max(0, -shift);
  const to = Math.min(row.length, row.length - shift);
  for (let i = from; i < to; i += 1) shape.sum[i] += row[i + shift];
  shape.count += 1;
}

/** Mean correlation of the beats of a shape with one another; 1 for a single beat. */
function coherence({ sum, count, power }: Growing & { power: number }, half: number): number {
  if (count < 2) return 1;
  const shared = (rms(middle(sum, half)) / count) ** 2 / (power / count);
  return (count * shared - 1) / (count - 1);
}

/** How far the energy of a sum has its middle from that of the row, in samples; at most twice the lag. */
function offCentre(sum: Float64Array, half: number, lag: number): number {
  let power = 1e-30;
  let moment = 0;
  middle(sum, half).forEach((value, i) => {
    power += value * value;
    moment += (i - half) * value * value;
  });
  return Math.max(-2 * lag, Math.min(2 * lag, Math.round(moment / power)));
}

/** Shares the rows out once more among the shapes, and averages those that fit. */
function* settle(
  windows: Rows,
  shapes: readonly Distinct[],
  rateHz: number,
): Generator<number, Shape[]> {
  const { rows, noise, half, rowHalf } = windows;
  const sums = shapes.map(({ shape: { strict }, isTallT }) => ({
    sum: new Float64Array(2 * rowHalf + 1),
    count: 0,
    power: 0,
    strict,
    isTallT,
  }));
  for (let i = 0; i < rows.length; i += 1) {
    if (i % ROWS_A_STEP === 0) yield 1;
    const row = rows[i];
    const matches = shapes.map(({ shape }) => matchMiddle(row, shape.sum, windows, windows.step));
    let best = 0;
    matches.forEach((match, k) => {
      if (match.value > matches[best].value) best = k;
    });
    if (matches.length === 0) continue;
    const factor = noiseFactor(rms(middle(row, half)), noise[i]);
    const wanted = shapes[best].shape.strict ? STRICT_LIKENESS : LEAST_LIKENESS * factor;
    if (matches[best].value < wanted) continue;
    const { at } = matchMiddle(row, shapes[best].shape.sum, windows, 1);
    addRow(sums[best], row, at, windows);
    sums[best].power += rms(row.subarray(at, at + 2 * half + 1)) ** 2;
  }
  const settled: Shape[] = [];
  for (const group of sums) {
    yield 1;
    if (!(group.count > 0) || group.isTallT) continue;
    const alike = coherence(group, half);
    if (alike > LEAST_COHERENCE) settled.push(shapeOf(group, alike, windows, rateHz));
  }
  return settled.sort((a, b) => b.count - a.count);
}

/** A shape from the sum of its beats' rows, cut out about the middle of their energy. */
function shapeOf(group: Growing, alike: number, windows: Rows, rateHz: number): Shape {
  const { half, rowHalf, lag, latest, usualRr } = windows;
  const { sum, count, strict } = group;
  const centre = rowHalf + offCentre(sum, half, lag);
  const average = sum.slice(centre - half, centre + half + 1).map((value) => value / count);
  const norm = rms(average) * Math.sqrt(average.length);
  const after = Math.max(half, Math.min(rowHalf - 2 * lag, latest + half, usualRr - half));
  const before = Math.max(half, Math.min(rowHalf - 2 * lag, half + 3 * lag, usualRr - after));
  const course = sum.slice(centre - before, centre + after + 1);
  for (let i = 0; i < course.length; i += 1)
    course[i] *= Math.min(1, i / lag, (course.length - 1 - i) / lag) / count;
  return {
    average,
    half,
    norm,
    count,
    course,
    before,
    waves: sideWaves({ sum, count, strict }, centre, half, rateHz),
    coherence: alike,
  };
}
