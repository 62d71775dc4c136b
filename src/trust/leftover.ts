import { exp, log10 } from '../numeric/elementary';
import { quietly } from '../numeric/in-steps';
import type { Random } from '../numeric/random';
import type { Epoch } from '../recording/rhythm';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import {
  type LineFrame,
  lineFrame,
  narrowOf,
  noiseAbout,
  type Placed,
  turnedBack,
} from './line-band';
import { harmonicOf, type LineTrack, lineTracks, trackCpm } from './line-tracks';
import {
  backgroundSlope,
  type LevelWindows,
  levelWindows,
  neighbourLevel,
} from './neighbour-level';

/** Harmonics of a line that are looked for, and how far each must stand over the background (mean over its windows). */
const HARMONICS = [2, 3] as const;
const STANDS_OUT = 4;
const HIGHEST_CPM = 10;
/** A line of fewer windows tells no harmonic. */
const FEWEST_WINDOWS = 3;
/** What is left of a line is measured within this of it. */
const REST_CPM = 0.25;
/** The level of a refill is told again so often. */
const LEVEL_STEP_S: Seconds = 60;
/** Windows looked at between turns for others. */
const WINDOWS_A_TURN = 16;

export interface LeftoverInputs {
  /** The lead at the slow wave's rate in uV, NaN in gaps. */
  readonly recorded: Float64Array;
  /** The same without holes, with `margin` samples foretold before and after it. */
  readonly whole: Float64Array;
  readonly margin: number;
  /** 0 where a sample is missing or spoiled for the stomach, else 1. */
  readonly kept: Uint8Array;
  readonly rateHz: Hertz;
  /** The lead's epochs as the figures have them. */
  readonly epochs: readonly Epoch[];
  readonly random: Random;
}

export interface Leftover {
  /** The lead less its lines, refilled; NaN in gaps. */
  readonly lead: Float64Array;
  /** The same less the recorded lead, without holes: what has to be added to the recording. */
  readonly change: Float64Array;
  readonly tracks: readonly LineTrack[];
  /** Power left at the lines over that of the neighbouring bands, dB; 0 is a perfect refill. Null where no line was found. */
  readonly restDb: number | null;
}

/** Mean over the windows of a line's stretch of its density near a multiple over the level there; null of too few. */
function* standing(
  windows: LevelWindows,
  track: LineTrack,
  density: (atS: Seconds) => number,
): Generator<void, { readonly mean: number; readonly count: number }> {
  const { centresS, logs, binCpm } = windows;
  let [sum, count] = [0, 0];
  for (const [w, atS] of centresS.entries()) {
    if (atS < track.fromS || atS > track.toS) continue;
    const cpm = trackCpm(track, atS);
    const level = density(atS);
    const first = Math.max(1, Math.round((cpm - REST_CPM) / binCpm));
    const last = Math.min(logs[w].length - 1, Math.round((cpm + REST_CPM) / binCpm));
    let power = 0;
    for (let k = first; k <= last; k += 1) power += exp(logs[w][k]);
    sum += power / (last - first + 1) / level;
    count += 1;
    if (w % WINDOWS_A_TURN === WINDOWS_A_TURN - 1) yield;
  }
  return { mean: sum / count, count };
}

/** Takes what lies about a line out of a lead that has margins. */
function* takeOut(
  whole: Float64Array,
  frame: LineFrame,
  { rateHz, margin, recorded }: LeftoverInputs,
): Generator<void, void> {
  const narrow = yield* narrowOf(whole, frame, { rateHz, margin, length: recorded.length });
  const line = turnedBack(narrow, frame, 2);
  const at = frame.first + margin;
  for (let i = 0; i < line.length; i += 1) whole[at + i] -= frame.weight[i] * line[i];
}

interface Line {
  readonly track: LineTrack;
  readonly frame: LineFrame;
}

/** Lines among the samples of a lead; those that do not touch it are left out. */
function* placed(tracks: readonly LineTrack[], place: Placed): Generator<void, Line[]> {
  const lines: Line[] = [];
  for (const track of tracks) {
    const frame = yield* lineFrame(track, place);
    if (frame) lines.push({ track, frame });
  }
  return lines;
}

/** The harmonics of lines that stand out of the lead without the lines, or were flagged. */
function* standingHarmonics(
  windows: LevelWindows,
  { tracks, doubled }: ReturnType<typeof lineTracks>,
): Generator<void, readonly LineTrack[]> {
  const slope = backgroundSlope(windows, tracks);
  const found: LineTrack[] = [];
  for (const [t, track] of tracks.entries())
    for (const multiple of HARMONICS) {
      const harmonic = harmonicOf(track, multiple);
      if (trackCpm(harmonic, track.fromS) > HIGHEST_CPM) continue;
      const level = (atS: Seconds) =>
        neighbourLevel(windows, harmonic, tracks, slope, atS)?.density ?? Number.NaN;
      const { mean, count } = yield* standing(windows, harmonic, level);
      const standsOut = count >= FEWEST_WINDOWS && mean > STANDS_OUT;
      if (standsOut || (multiple === 2 && doubled[t])) found.push(harmonic);
    }
  return found;
}

/**
 * Noise in the place of a line, at the level of its neighbouring bands. What was put in the place of another line is taken out
 * first, so that where two overlap the level is that of one.
 */
function* refill(
  noise: Float64Array,
  { track, frame }: Line,
  { windows, tracks }: { readonly windows: LevelWindows; readonly tracks: readonly LineTrack[] },
  from: LeftoverInputs,
): Generator<void, void> {
  const { rateHz, random, margin } = from;
  yield* takeOut(noise, frame, from);
  const others = tracks.filter((one) => one !== track);
  const slope = backgroundSlope(windows, tracks);
  const levels: { readonly size: number; readonly slope: number }[] = [];
  const step = LEVEL_STEP_S * rateHz;
  for (let k = 0; k * step < frame.count + step; k += 1) {
    const atS = (frame.first + Math.min(k * step, frame.count)) / rateHz;
    const level = neighbourLevel(windows, track, others, slope, atS);
    levels.push({ size: Math.sqrt(level?.density ?? 0), slope: level?.slope ?? slope });
    yield;
  }
  const middleS = (track.fromS + track.toS) / 2;
  const mean = levels.reduce((sum, one) => sum + one.slope, 0) / levels.length;
  const background = { cpm: trackCpm(track, middleS), slope: mean };
  const narrow = yield* noiseAbout(frame, rateHz, background, random);
  const line = turnedBack(narrow, frame, 1);
  for (let i = 0; i < line.length; i += 1) {
    const at = i / step;
    const k = Math.floor(at);
    const size = levels[k].size + (at - k) * (levels[k + 1].size - levels[k].size);
    const weight = Math.sqrt(2 * frame.weight[i] - frame.weight[i] ** 2);
    noise[margin + frame.first + i] += weight * size * line[i];
  }
}

function* restOf(
  change: Float64Array,
  from: LeftoverInputs,
  lines: readonly Line[],
  empty: LevelWindows,
): Generator<void, number | null> {
  const { whole, margin, kept, rateHz } = from;
  const tracks = lines.map(({ track }) => track);
  const slope = backgroundSlope(empty, tracks);
  const filled = change.map((value, i) => value + whole[margin + i]);
  const windows = yield* levelWindows(filled, kept, rateHz);
  let [sum, count] = [0, 0];
  for (const track of tracks) {
    const others = tracks.filter((one) => one !== track);
    const level = (atS: Seconds) =>
      neighbourLevel(empty, track, others, slope, atS)?.density ?? Number.NaN;
    const found = yield* standing(windows, track, level);
    if (!(found.count > 0 && Number.isFinite(found.mean))) continue;
    sum += found.mean * found.count;
    count += found.count;
    yield;
  }
  return count > 0 ? sum / count : null;
}

/**
 * The leftover of a lead: the recorded lead with only its own lines (within 0.5 cpm of DF, all gone by 1 cpm, following DF
 * from epoch to epoch, with flagged harmonics and those that stand 6 dB out) taken out, and noise of random phase put in
 * their place at the level of the neighbouring bands. Every line is turned to 0 Hz along its own course, low-passed and
 * turned back (zero phase, 300 s), so that nothing rings and a wandering line is followed; breathing, drift and what lies
 * inside the band beside the lines stay. Yields the part done.
 */
export function* leftoverOf(from: LeftoverInputs): Generator<number, Leftover> {
  const { recorded, whole, margin, kept, rateHz, epochs } = from;
  const { length } = recorded;
  const found = lineTracks(epochs);
  const bare = whole.slice();
  const lines = yield* quietly(placed(found.tracks, { rateHz, margin, length }), 0.1);
  for (const { frame } of lines) yield* quietly(takeOut(bare, frame, from), 0.2);
  const inside = bare.subarray(margin, margin + length);
  const first = yield* quietly(levelWindows(inside, kept, rateHz), 0.4);
  const standing = yield* quietly(standingHarmonics(first, found), 0.4);
  const harmonics = yield* quietly(placed(standing, { rateHz, margin, length }), 0.45);
  for (const { frame } of harmonics) yield* quietly(takeOut(bare, frame, from), 0.5);
  lines.push(...harmonics);
  const windows =
    harmonics.length > 0 ? yield* quietly(levelWindows(inside, kept, rateHz), 0.6) : first;
  const tracks = lines.map(({ track }) => track);
  const noise = new Float64Array(whole.length);
  for (const line of lines) yield* quietly(refill(noise, line, { windows, tracks }, from), 0.8);
  const change = inside.map((value, i) => value - whole[margin + i] + noise[margin + i]);
  const rest = yield* quietly(restOf(change, from, lines, windows), 0.9);
  return {
    lead: recorded.map((value, i) => value + change[i]),
    change,
    tracks,
    restDb: rest === null ? null : 10 * log10(rest),
  };
}
