import { cos, exp, log, sin } from '../../src/numeric/elementary';
import { createRandom, type Random } from '../../src/numeric/random';

/** A sinus rhythm as made up for the tests: intervals follow breathing (whose rate and depth wander) and slower waves. */
export interface SinusRhythm {
  readonly lengthS: number;
  readonly rateBpm: number;
  /** Swing of the interval with breathing, over the mean. */
  readonly breathingSwing: number;
  readonly breathsPerMinute: number;
  /** Unforeseeable part of each interval, over the mean. */
  readonly noise: number;
}

export function sinusIntervals(rhythm: SinusRhythm, random: Random): Float64Array {
  const { lengthS, rateBpm, breathingSwing, breathsPerMinute, noise } = rhythm;
  const rr: number[] = [];
  const breathHz = breathsPerMinute / 60;
  let [timeS, phase, hz, depth] = [0, 0, breathHz, 1];
  while (timeS < lengthS) {
    const slow = 0.03 * sin(2 * Math.PI * 0.1 * timeS) + 0.03 * cos(2 * Math.PI * 0.02 * timeS + 1);
    const swing = breathingSwing * depth * sin(phase);
    const seconds = Math.max(0.3, (60 / rateBpm) * (1 + swing + slow + noise * random.gaussian()));
    rr.push(1000 * seconds);
    timeS += seconds;
    hz += -0.05 * (hz - breathHz) * seconds + 0.03 * breathHz * random.gaussian();
    depth += -0.1 * (depth - 1) * seconds + 0.1 * random.gaussian();
    depth = Math.min(1.5, Math.max(0.5, depth));
    phase += 2 * Math.PI * hz * seconds;
  }
  return Float64Array.from(rr);
}

/** Intervals drawn anew each time (log-normal) on a slow swing of 5 %: a rhythm that nothing foretells. */
export function randomIntervals(
  rhythm: { readonly lengthS: number; readonly rateBpm: number; readonly spread: number },
  random: Random,
): Float64Array {
  const rr: number[] = [];
  let timeS = 0;
  while (timeS < rhythm.lengthS) {
    const slow = 1 + 0.05 * sin((2 * Math.PI * timeS) / 60);
    const seconds =
      (60 / rhythm.rateBpm) * Math.max(0.45, slow * exp(rhythm.spread * random.gaussian()));
    rr.push(1000 * seconds);
    timeS += seconds;
  }
  return Float64Array.from(rr);
}

/** The same intervals with a share of early beats (35 % early), each followed by the pause that makes up for it. */
export function withEarlyBeats(
  rrMs: Float64Array,
  share: number,
  random: Random,
): { rrMs: Float64Array; early: readonly number[] } {
  const changed = Float64Array.from(rrMs);
  const early: number[] = [];
  for (let i = 3; i < changed.length - 3; i += 1) {
    if (random.uniform() >= share) continue;
    changed[i + 1] += 0.35 * changed[i];
    changed[i] *= 0.65;
    early.push(i);
    i += 3;
  }
  return { rrMs: changed, early };
}

/** A chance that is over after so long on average, exponentially distributed. */
const waiting = (meanS: number, random: Random): number => -meanS * log(1 - random.uniform());

function until(lengthS: number, next: (timeS: number) => number): Float64Array {
  const rr: number[] = [];
  for (let timeS = 0; timeS < lengthS; ) {
    const seconds = next(timeS);
    rr.push(1000 * seconds);
    timeS += seconds;
  }
  return Float64Array.from(rr);
}

/**
 * Ventricles that answer a random bombardment: impulses come at random times, and the first after a refractory period that
 * itself varies is conducted (the idea: Cohen, Berger & Dushane 1983, IEEE Trans Biomed Eng 30:769, from memory; the numbers
 * are invented).
 */
export function bombardedIntervals(
  given: { readonly lengthS: number; readonly rateBpm: number; readonly refractoryShare: number },
  random: Random,
): Float64Array {
  const meanS = 60 / given.rateBpm;
  const refractoryS = given.refractoryShare * meanS;
  return until(
    given.lengthS,
    () => refractoryS * (1 + 0.1 * random.gaussian()) + waiting(meanS - refractoryS, random),
  );
}

/** Every second to fourth wave of a regular rapid rhythm is conducted, at random. */
export const dividedIntervals = (lengthS: number, waveS: number, random: Random): Float64Array =>
  until(lengthS, () => waveS * (2 + random.below(3)) + 0.01 * random.gaussian());

/** Three pacemakers of their own rates that take over from one another at random, every second beat or so. */
export function wanderingIntervals(
  lengthS: number,
  ratesBpm: readonly number[],
  random: Random,
): Float64Array {
  let from = 0;
  return until(lengthS, () => {
    if (random.uniform() < 0.6) from = random.below(ratesBpm.length);
    return (60 / ratesBpm[from]) * (1 + 0.04 * random.gaussian());
  });
}

/** Beats in groups: intervals that shorten within each of 3 to 5 beats, and a pause (Wenckebach 1899). */
export function groupedIntervals(lengthS: number, beatS: number, random: Random): Float64Array {
  let [left, place] = [0, 0];
  return until(lengthS, () => {
    if (left === 0) {
      left = 3 + random.below(3);
      place = 0;
    }
    left -= 1;
    place += 1;
    const seconds = left === 0 ? 1.7 * beatS : beatS * (1.15 - 0.06 * place);
    return seconds * (1 + 0.01 * random.gaussian());
  });
}

/** A pattern of intervals over the mean, repeated, with noise: bigeminy is [0.65, 1.35], trigeminy [1, 0.65, 1.35]. */
export const patternIntervals = (rrMs: Float64Array, pattern: readonly number[]): Float64Array =>
  rrMs.map((one, i) => one * pattern[i % pattern.length]);

/**
 * Beats at which the integral of a rate reaches one (integral pulse frequency modulation; Hyndman & Mohn 1975, from memory):
 * breathing at a metronome's pace, waves of 0.1 Hz, and a rate that walks like 1/f2 below; no beat knows of the one before.
 */
export function modulatedIntervals(
  given: {
    readonly lengthS: number;
    readonly rateBpm: (timeS: number) => number;
    readonly breathingSwing: number;
    readonly breathsPerMinute: number;
    readonly lowSwing: number;
  },
  random: Random,
): Float64Array {
  const rr: number[] = [];
  const stepS = 0.005;
  let [integral, beatS, walk] = [0, 0, 0];
  for (let timeS = 0; timeS < given.lengthS; timeS += stepS) {
    walk += -0.01 * walk * stepS + 0.004 * Math.sqrt(stepS) * random.gaussian();
    const swing =
      given.breathingSwing * sin((2 * Math.PI * given.breathsPerMinute * timeS) / 60) +
      given.lowSwing * sin(2 * Math.PI * 0.1 * timeS + 1);
    integral += (given.rateBpm(timeS) / 60) * (1 + swing + walk) * stepS;
    if (integral < 1) continue;
    integral -= 1;
    rr.push(1000 * (timeS - beatS));
    beatS = timeS;
  }
  return Float64Array.from(rr).subarray(1);
}

export const randomOf = (seed: number): Random => createRandom(seed);
