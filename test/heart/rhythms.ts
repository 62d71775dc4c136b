import { cos, exp, sin } from '../../src/numeric/elementary';
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

export const randomOf = (seed: number): Random => createRandom(seed);
