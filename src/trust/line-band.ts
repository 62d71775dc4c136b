import { cos, exp, log, sin } from '../numeric/elementary';
import { firResponse, lowPassTaps } from '../numeric/fir';
import type { Random } from '../numeric/random';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { type LineTrack, trackCpm } from './line-tracks';

/** What lies within this of a line is taken out whole; beyond twice that all is left. */
export const LINE_HALF_CPM = 0.5;
export const LINE_EDGE_CPM = 1;
const ATTENUATION_DB = 44;
/** A line comes and goes within this. */
const FADE_S = 30;
/** Seconds between the points at which what lies about a line is kept, turned to 0 Hz. */
const POINT_S = 2;
/** Points of the transform that shapes the noise about a line. */
const NOISE_POINTS = 256;
/** Below this share of the line's own frequency a background rises no further. */
const LOWEST_SHARE = 0.2;
/** Points, and samples, between turns for others. */
const TURN = 200;
const SAMPLES_A_TURN = 4000;
const BINS_A_TURN = 8;

/** Where a track lies among the samples of a lead that begins `margin` samples before time 0. */
export interface Placed {
  readonly rateHz: Hertz;
  readonly margin: number;
  /** Samples of the lead itself, without margins. */
  readonly length: number;
}

/** A narrow stretch of a lead's spectrum that follows a line: complex points every 2 s, turned to 0 Hz. */
interface Narrow {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** The low-pass that parts what lies about a line from the rest, at a lead's rate; half a length of 150 s. */
export const lineTaps = (rateHz: Hertz): Float64Array =>
  lowPassTaps({
    rateHz,
    passHz: cpmToHz(LINE_HALF_CPM),
    stopHz: cpmToHz(LINE_EDGE_CPM),
    attenuationDb: ATTENUATION_DB,
  });

/** How far before and after a lead's ends samples are needed, in seconds. */
export const LINE_REACH_S: Seconds = 170;

/** A line's phase by sample over where it acts, its weight, and the points between. */
export interface LineFrame {
  /** First sample on which it acts, without margin, and how many there are. */
  readonly first: number;
  readonly count: number;
  /** cos and sin of its phase, `before` samples earlier to as many later. */
  readonly before: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** 0 to 1: it fades in and out unless it reaches the lead's end. */
  readonly weight: Float64Array;
  /** Samples from one point to the next. */
  readonly every: number;
  readonly points: number;
}

function weightsOf(first: number, count: number, length: number, fade: number): Float64Array {
  const weight = new Float64Array(count).fill(1);
  for (let i = 0; i < Math.min(fade, count); i += 1) {
    const rise = 0.5 - 0.5 * cos((Math.PI * (i + 0.5)) / fade);
    if (first > 0) weight[i] *= rise;
    if (first + count < length) weight[count - 1 - i] *= rise;
  }
  return weight;
}

/** The frame of a line among the samples of a lead; null where it does not touch the lead. */
export function* lineFrame(
  track: LineTrack,
  { rateHz, margin, length }: Placed,
): Generator<void, LineFrame | null> {
  const first = Math.max(0, Math.floor(track.fromS * rateHz));
  const end = Math.min(length, Math.ceil(track.toS * rateHz));
  if (end <= first) return null;
  const every = Math.max(1, Math.round(POINT_S * rateHz));
  const half = (lineTaps(rateHz).length - 1) / 2;
  const before = half + 2 * every;
  if (before > margin) throw new Error(`a margin of ${margin} samples is less than ${before}`);
  const count = end - first;
  const points = Math.ceil(count / every) + 4;
  const total = points * every + 2 * before;
  const [re, im] = [new Float64Array(total), new Float64Array(total)];
  let cycles = 0;
  for (let i = 0; i < total; i += 1) {
    const angle = 2 * Math.PI * (cycles - Math.floor(cycles));
    re[i] = cos(angle);
    im[i] = sin(angle);
    cycles += cpmToHz(trackCpm(track, (first + i - before) / rateHz)) / rateHz;
    if (i % SAMPLES_A_TURN === SAMPLES_A_TURN - 1) yield;
  }
  const weight = weightsOf(first, count, length, Math.round(FADE_S * rateHz));
  return { first, count, before, re, im, weight, every, points };
}

/** What of a lead (with its margins) lies about a line, turned to 0 Hz. */
export function* narrowOf(
  whole: Float64Array,
  frame: LineFrame,
  { rateHz, margin }: Placed,
): Generator<void, Narrow> {
  const taps = lineTaps(rateHz);
  const half = (taps.length - 1) / 2;
  const { first, before, every, points } = frame;
  const [re, im] = [new Float64Array(points), new Float64Array(points)];
  for (let p = 0; p < points; p += 1) {
    const at = before + (p - 1) * every;
    const from = first - before + at - half + margin;
    for (let j = 0; j < taps.length; j += 1) {
      const value = taps[j] * (whole[from + j] ?? 0);
      re[p] += value * frame.re[at - half + j];
      im[p] -= value * frame.im[at - half + j];
    }
    if (p % TURN === TURN - 1) yield;
  }
  return { re, im };
}

/** A value between points by a cubic through its four neighbours (Catmull & Rom 1974). */
function between(x: Float64Array, at: number, part: number): number {
  const [a, b, c, d] = [x[at - 1], x[at], x[at + 1], x[at + 2]];
  return (
    b + 0.5 * part * (c - a + part * (2 * a - 5 * b + 4 * c - d + part * (3 * (b - c) + d - a)))
  );
}

/** Turns what lies about a line back to its frequency, by sample over the frame: `size` times its real part. */
export function turnedBack({ re, im }: Narrow, frame: LineFrame, size: number): Float64Array {
  const { count, every, before } = frame;
  return Float64Array.from({ length: count }, (_, i) => {
    const at = 1 + Math.floor(i / every);
    const part = (i % every) / every;
    return (
      size *
      (between(re, at, part) * frame.re[before + i] - between(im, at, part) * frame.im[before + i])
    );
  });
}

interface NoiseShape {
  /** By bin: how much of what lies there is taken out with a line. */
  readonly taken: Float64Array;
  readonly cos: Float64Array;
  readonly sin: Float64Array;
}
const shapes = new Map<string, NoiseShape>();

function* noiseShape(rateHz: Hertz, pointS: Seconds): Generator<void, NoiseShape> {
  const key = `${rateHz} ${pointS}`;
  const known = shapes.get(key);
  if (known) return known;
  const taps = lineTaps(rateHz);
  const taken = new Float64Array(NOISE_POINTS);
  for (let bin = 0; bin <= NOISE_POINTS / 2; bin += 1) {
    const share = firResponse(taps, bin / (NOISE_POINTS * pointS), rateHz).re;
    taken[bin] = Math.min(1, Math.max(0, share));
    taken[(NOISE_POINTS - bin) % NOISE_POINTS] = taken[bin];
    if (bin % BINS_A_TURN === BINS_A_TURN - 1) yield;
  }
  const byBin = (value: (bin: number) => number) =>
    Float64Array.from({ length: NOISE_POINTS }, (_, m) =>
      value(m < NOISE_POINTS / 2 ? m : m - NOISE_POINTS),
    );
  const made = {
    taken,
    cos: byBin((bin) => cos((2 * Math.PI * bin) / NOISE_POINTS)),
    sin: byBin((bin) => sin((2 * Math.PI * bin) / NOISE_POINTS)),
  };
  shapes.set(key, made);
  return made;
}

/** A background about a line. */
export interface LineBackground {
  readonly cpm: Cpm;
  /** It falls like 1 / f^slope. */
  readonly slope: number;
}

/**
 * Taps, about their centre, that give white noise the shape of what has to be put where a line was taken out, so that a
 * background keeps its level: all where all was taken, falling with it, along the background's slope.
 */
function refillTaps(
  { taken, ...turn }: NoiseShape,
  { cpm, slope }: LineBackground,
  pointS: number,
) {
  const response = taken.map((share, m) => {
    const bin = m < NOISE_POINTS / 2 ? m : m - NOISE_POINTS;
    const ratio = Math.max(LOWEST_SHARE, 1 + bin / (NOISE_POINTS * pointS) / cpmToHz(cpm));
    return Math.sqrt(2 * share - share * share) * exp((-slope / 2) * log(ratio));
  });
  const half = NOISE_POINTS / 2 - 1;
  const [re, im] = [new Float64Array(2 * half + 1), new Float64Array(2 * half + 1)];
  for (let n = -half; n <= half; n += 1)
    for (let m = 0; m < NOISE_POINTS; m += 1) {
      const at = (m * (n + NOISE_POINTS)) % NOISE_POINTS;
      re[n + half] += (response[m] * turn.cos[at]) / NOISE_POINTS;
      im[n + half] += (response[m] * turn.sin[at]) / NOISE_POINTS;
    }
  return { re, im, half };
}

/**
 * Gaussian noise of random phase about a line: 1 uV2/Hz at the line once turned back with size 1, along a background's
 * slope, with the edges of what was taken out.
 */
export function* noiseAbout(
  frame: LineFrame,
  rateHz: Hertz,
  background: LineBackground,
  random: Random,
): Generator<void, Narrow> {
  const { points, every } = frame;
  const pointS = every / rateHz;
  const taps = refillTaps(yield* noiseShape(rateHz, pointS), background, pointS);
  yield;
  const total = points + 2 * taps.half;
  const white = Float64Array.from({ length: 2 * total }, () => random.gaussian());
  const [re, im] = [new Float64Array(points), new Float64Array(points)];
  const scale = Math.sqrt(1 / pointS);
  for (let p = 0; p < points; p += 1) {
    for (let j = 0; j <= 2 * taps.half; j += 1) {
      const [a, b] = [white[2 * (p + j)], white[2 * (p + j) + 1]];
      re[p] += scale * (a * taps.re[j] - b * taps.im[j]);
      im[p] += scale * (a * taps.im[j] + b * taps.re[j]);
    }
    if (p % TURN === TURN - 1) yield;
  }
  return { re, im };
}
