import { choleskySolve } from '../numeric/cholesky';
import { evenInverse } from '../numeric/even-inverse';
import type { SampleRun } from '../numeric/nan-runs';
import type { Hertz } from '../units/rate';
import type { LeadSpectra } from './lead-spectra';

/** What is looked at on each side of a stretch. */
const SIDE_S = 60;
/** Kept pieces shorter than this between two stretches are bridged with them: too short to set a level by. */
const LEAST_PIECE_S = 8;
/** What is spoiled reaches so far into what is not: the low-pass before 4 Hz rings on it. */
const SMEAR_S = 1.5;
/** Samples a second that the sides are read at. */
const READ_HZ = 1;
/** Share of the lead's variance that counts as unforeseeable, so that the equations stay well set. */
const UNFORESEEN = 1e-4;

/** Autocovariance of a lead by lag in samples, from its mean spectrum: the inverse transform of the density. */
function autocovariance({ mean, size }: LeadSpectra, rateHz: Hertz): Float64Array {
  const twoSided = mean.map(
    (density, bin) => (bin === 0 || 2 * bin === size ? 1 : 0.5) * density * rateHz,
  );
  return evenInverse(twoSided, size);
}

/** Stretches of missing samples, each longer by `smear` at both ends (not those that end the lead), those joined that only a short piece parts. */
function stretchesOf(kept: Uint8Array, leastPiece: number, smear: number): SampleRun[] {
  const runs: { from: number; to: number }[] = [];
  let from = -1;
  for (let i = 0; i <= kept.length; i += 1) {
    const missing = i < kept.length && kept[i] === 0;
    if (missing && from < 0) from = i;
    if (missing || from < 0) continue;
    const run = {
      from: Math.max(0, from - (i < kept.length ? smear : 0)),
      to: Math.min(kept.length, i + (from > 0 ? smear : 0)),
    };
    const last = runs.at(-1);
    if (last && run.from - last.to < leastPiece) last.to = run.to;
    else runs.push(run);
    from = -1;
  }
  const first = runs.at(0);
  if (first && first.from < leastPiece) first.from = 0;
  const last = runs.at(-1);
  if (last && kept.length - last.to < leastPiece) last.to = kept.length;
  return runs;
}

/** Kept samples on one side of a stretch, nearest first, every `every`-th. */
function sideOf(
  isMissing: Uint8Array,
  start: number,
  step: 1 | -1,
  every: number,
  most: number,
): number[] {
  const places: number[] = [];
  for (let k = 0; k < most; k += 1) {
    const i = start + step * k * every;
    if (i < 0 || i >= isMissing.length) break;
    if (isMissing[i] === 0) places.push(i);
  }
  return places;
}

interface Sides {
  readonly before: readonly number[];
  readonly after: readonly number[];
}

/** Mean of a lead at some places; 0 of none. */
function meanAt(lead: Float64Array, places: readonly number[]): number {
  return places.reduce((sum, i) => sum + lead[i], 0) / Math.max(1, places.length);
}

/**
 * The most likely values at `wanted` given what lies on the sides, each side having a level of its own (kriging with an
 * unknown mean a side; Matheron 1963): the values without level, and the two levels. A lead that is 0 throughout stays so.
 */
function mostLikely(
  lead: Float64Array,
  { before, after }: Sides,
  covariance: Float64Array,
  wanted: SampleRun,
) {
  const places = [...before, ...after];
  const n = places.length;
  const at = (lag: number) => (lag < covariance.length ? covariance[lag] : 0);
  const matrix = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1)
    for (let j = 0; j <= i; j += 1) matrix[i * n + j] = at(Math.abs(places[i] - places[j]));
  const power = at(0) > 0 ? at(0) : 1;
  for (let i = 0; i < n; i += 1) matrix[i * n + i] = power * (1 + UNFORESEEN);
  const [nearBefore, nearAfter] = [meanAt(lead, before), meanAt(lead, after)];
  const values = Float64Array.from(
    places,
    (place, i) => lead[place] - (i < before.length ? nearBefore : nearAfter),
  );
  const isBefore = Float64Array.from(places, (_, i) => (i < before.length ? 1 : 0));
  const isAfter = isBefore.map((one) => 1 - one);
  const [solved, solvedBefore, solvedAfter] = [values.slice(), isBefore.slice(), isAfter.slice()];
  choleskySolve(matrix, n, [solved, solvedBefore, solvedAfter]);
  const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, one, i) => sum + one * b[i], 0);
  const [bb, ba, aa] = [
    dot(isBefore, solvedBefore),
    dot(isBefore, solvedAfter),
    dot(isAfter, solvedAfter),
  ];
  const [bv, av] = [dot(isBefore, solved), dot(isAfter, solved)];
  const determinant = bb * aa - ba * ba;
  const both = before.length > 0 && after.length > 0;
  const levelBefore = both ? (bv * aa - av * ba) / determinant : bv / (bb || 1);
  const levelAfter = both ? (av * bb - bv * ba) / determinant : av / (aa || 1);
  const weights = solved.map(
    (one, i) => one - levelBefore * solvedBefore[i] - levelAfter * solvedAfter[i],
  );
  const filled = new Float64Array(wanted.to - wanted.from);
  for (let t = 0; t < filled.length; t += 1) {
    let sum = 0;
    for (let i = 0; i < n; i += 1) sum += weights[i] * at(Math.abs(places[i] - wanted.from - t));
    filled[t] = sum;
  }
  return { filled, levelBefore: levelBefore + nearBefore, levelAfter: levelAfter + nearAfter };
}

/**
 * A slow lead whose missing stretches (`kept` 0: gaps and what is spoiled) are bridged by the most likely course given the
 * minute on either side and the lead's own spectrum, and whose level goes on across them without a step, so that a filter
 * has nothing to ring on. `margin` samples are added at both ends, foretold in the same way. The level after a stretch is
 * that before it; only what lies below the band is changed by that. O(stretches), each about 240^3 / 6 multiplications; takes
 * a rest after each.
 */
export function* bridged(
  lead: Float64Array,
  kept: Uint8Array,
  rateHz: Hertz,
  spectra: LeadSpectra,
  margin: number,
): Generator<void, Float64Array> {
  const length = lead.length + 2 * margin;
  const whole = new Float64Array(length);
  whole.set(lead, margin);
  const mask = new Uint8Array(length);
  mask.set(kept, margin);
  const covariance = autocovariance(spectra, rateHz);
  const every = Math.max(1, Math.round(rateHz / READ_HZ));
  const most = Math.round((SIDE_S * rateHz) / every);
  const stretches = stretchesOf(
    mask,
    Math.round(LEAST_PIECE_S * rateHz),
    Math.round(SMEAR_S * rateHz),
  );
  const isMissing = new Uint8Array(length);
  for (const { from, to } of stretches) isMissing.fill(1, from, to);
  for (const stretch of stretches) {
    yield;
    const before = sideOf(isMissing, stretch.from - 1, -1, every, most);
    const after = sideOf(isMissing, stretch.to, 1, every, most);
    if (before.length + after.length === 0) continue;
    const { filled, levelBefore, levelAfter } = mostLikely(
      whole,
      { before, after },
      covariance,
      stretch,
    );
    const level = before.length > 0 ? levelBefore : levelAfter;
    for (let t = 0; t < filled.length; t += 1) whole[stretch.from + t] = level + filled[t];
    const shift = before.length > 0 && after.length > 0 ? levelBefore - levelAfter : 0;
    for (let i = stretch.to; i < length; i += 1) whole[i] += shift;
  }
  return whole;
}
