import { quantileInPlace } from '../numeric/statistics';
import { filterBand, type QrsBands, rmsAbout } from './qrs-bands';
import { isUsable, readFilled, type SampleRange, type Samples } from './usable-signal';

/** A signal with what the passes over it need to know. */
export interface HeartSignal {
  readonly samples: Samples;
  readonly rateHz: number;
  readonly usable: readonly SampleRange[];
  readonly bands: QrsBands;
}

/** Samples read at once; with margins, and small enough for a worker to stay answerable between two of them. */
const CHUNK = 16384;
/** Width of the energy's running mean: about that of a narrow to middling QRS complex. */
const ENERGY_S = 0.1;
/** Two crests of the energy nearer than this count once. */
export const CREST_APART_S = 0.1;
const ENVELOPE_HZ = 50;

/** The crests of the QRS energy, and the energy itself at a coarse rate. */
export interface Energy {
  readonly crests: readonly Crest[];
  readonly envelope: Float32Array;
  readonly envelopeHz: number;
}

export interface Crest {
  readonly sample: number;
  readonly energyUv: number;
}

/** Chunks of a signal with a margin to both sides that filters may spoil. */
export function* chunksOf(signal: HeartSignal, margin: number) {
  const { samples, usable } = signal;
  for (let from = 0; from < samples.length; from += CHUNK) {
    const to = Math.min(samples.length, from + CHUNK);
    const stretch = readFilled(samples, usable, from - margin, to + margin);
    yield { from, to, stretch, start: from - margin };
  }
}

/** Finds the crests of the QRS energy; yields the part done after each chunk. */
export function* energyPass(signal: HeartSignal): Generator<number, Energy> {
  const { samples, rateHz, bands, usable } = signal;
  const step = Math.max(1, Math.round(rateHz / ENVELOPE_HZ));
  const apart = Math.round(CREST_APART_S * rateHz);
  const width = Math.round(ENERGY_S * rateHz);
  const envelope = new Float32Array(Math.ceil(samples.length / step)).fill(Number.NaN);
  const crests: Crest[] = [];
  for (const { from, to, stretch, start } of chunksOf(signal, bands.reach + width + apart)) {
    const rms = rmsAbout(filterBand(stretch, bands.energy), width);
    const energy = stretch;
    for (let i = 0; i < energy.length; i += 1) energy[i] = rms(i);
    for (let i = Math.ceil(from / step) * step; i < to; i += step)
      if (isUsable(usable, i)) envelope[i / step] = energy[i - start];
    for (const at of crestsIn(energy, from - start, to - start, apart))
      if (isUsable(usable, at + start)) crests.push({ sample: at + start, energyUv: energy[at] });
    yield to / samples.length;
  }
  return { crests, envelope, envelopeHz: rateHz / step };
}

/** Places in [from, to) that are the first greatest within `apart` samples, and above 0. */
export function crestsIn(x: Float64Array, from: number, to: number, apart: number): number[] {
  const found: number[] = [];
  for (let i = Math.max(from, 1); i < Math.min(to, x.length - 1); i += 1) {
    if (!(x[i] > x[i - 1] && x[i] >= x[i + 1] && x[i] > 0)) continue;
    let greatest = true;
    const last = Math.min(x.length - 1, i + apart);
    for (let j = Math.max(0, i - apart); j <= last && greatest; j += 1)
      greatest = j < i ? x[j] < x[i] : x[j] <= x[i];
    if (greatest) found.push(i);
  }
  return found;
}

/** What is usual about each second of the study. */
export interface Levels {
  /** Energy between beats: the 20 % point of the second and its neighbours. */
  readonly noise: Float64Array;
  /** Energy of a usual beat: the median, over some 20 s, of the greatest crest in 2 s. */
  readonly beat: Float64Array;
}

const LEVEL_HALF_S = 9;
/** A stretch differs from the study's usual beat energy by at most this factor, as after a change of posture. */
const LEVEL_RANGE = 4;

/** Seconds looked at between two rests. */
const SECONDS_A_STEP = 200;

/** The same where the beats' level is made of those of a few seconds. */
const LEVELS_A_STEP = 2000;

/** Levels by second; NaN where nothing is usable near. Takes a rest now and then. */
export function* levelsOf(energy: Energy, seconds: number): Generator<void, Levels> {
  const noise = new Float64Array(seconds);
  const few = new Float64Array(Math.ceil(3 * energy.envelopeHz) + 2);
  for (let s = 0; s < seconds; s += 1) {
    const from = Math.max(0, Math.ceil((s - 1) * energy.envelopeHz));
    const to = Math.min(energy.envelope.length, Math.ceil((s + 2) * energy.envelopeHz));
    let count = 0;
    for (let i = from; i < to; i += 1)
      if (!Number.isNaN(energy.envelope[i])) few[count++] = energy.envelope[i];
    noise[s] = count > energy.envelopeHz / 4 ? quantileInPlace(few, 0.2, count) : Number.NaN;
    if (s % SECONDS_A_STEP === 0) yield;
  }
  yield;
  return { noise, beat: yield* beatLevels(energy, seconds, few) };
}

function* beatLevels(
  energy: Energy,
  seconds: number,
  few: Float64Array,
): Generator<void, Float64Array> {
  const greatest = new Float64Array(seconds + 1);
  const rate = energy.envelopeHz;
  for (let i = 0; i < energy.envelope.length; i += 1) {
    const s = Math.floor(i / rate);
    if (energy.envelope[i] > greatest[s]) greatest[s] = energy.envelope[i];
  }
  const pairs = new Float64Array(seconds);
  for (let s = 0; s < seconds; s += 1) pairs[s] = Math.max(greatest[s], greatest[s + 1]);
  yield;
  const level = new Float64Array(seconds);
  for (let s = 0; s < seconds; s += 1) {
    let count = 0;
    const last = Math.min(seconds - 1, s + LEVEL_HALF_S);
    for (let j = Math.max(0, s - LEVEL_HALF_S); j <= last; j += 1)
      if (pairs[j] > 0) few[count++] = pairs[j];
    level[s] = count > 0 ? quantileInPlace(few, 0.5, count) : Number.NaN;
    if (s % LEVELS_A_STEP === LEVELS_A_STEP - 1) yield;
  }
  const known = level.filter((value) => !Number.isNaN(value));
  const usual = quantileInPlace(known, 0.5);
  return level.map((value) => Math.min(LEVEL_RANGE * usual, Math.max(usual / LEVEL_RANGE, value)));
}
