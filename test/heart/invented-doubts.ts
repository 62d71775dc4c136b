import { beatDoubts } from '../../src/heart/beat-doubts';
import { type Detection, detectBeats } from '../../src/heart/detect';
import { type Beat, type BeatList, beatAt, changeBeats } from '../../src/recording/beat';
import type { Doubt } from '../../src/recording/doubt';
import { heartbeatOf } from './record208';
import {
  addBeats,
  addNoise,
  type HeartPlan,
  NARROW,
  planBeats,
  type TrueBeat,
} from './simulated-heart';

export const RATE_HZ = 250;
const SECONDS = 240;
const HEIGHT_UV = 200;

/** An invented heart with a few ventricular and early beats, found by the detector. */
export interface InventedHeart {
  readonly truth: readonly TrueBeat[];
  readonly heartbeat: Float64Array;
  readonly detection: Detection;
  readonly beats: BeatList;
}

export function inventedHeart(
  plan: Partial<HeartPlan> = {},
  change: (signal: Float64Array, truth: readonly TrueBeat[]) => void = () => undefined,
): InventedHeart {
  const truth = planBeats({
    seed: 5,
    seconds: SECONDS,
    meanRrS: 0.8,
    ventricular: 0.03,
    supraventricular: 0.02,
    ...plan,
  });
  const raw = addBeats(new Float64Array(SECONDS * RATE_HZ), RATE_HZ, truth, HEIGHT_UV, NARROW);
  change(raw, truth);
  addNoise(raw, RATE_HZ, { seed: 9, whiteUv: 2, breathUv: 40 });
  const heartbeat = heartbeatOf(raw, RATE_HZ);
  const detection = detectBeats({ heartbeat, rateHz: RATE_HZ, ticksPerSample: 64 });
  return { truth, heartbeat, detection, beats: detection.beats };
}

/** The doubts of a list of beats on that heart. */
export const doubtsOf = (
  { heartbeat, detection }: InventedHeart,
  beats: BeatList,
): readonly Doubt[] =>
  beatDoubts({
    beats,
    rateHz: RATE_HZ,
    heartbeat,
    heartbeatHz: RATE_HZ,
    ticksPerSample: 64,
    blocked: [],
    detection,
  });

/** Index of the n-th beat of a class with normal beats about it. */
export function nthOf(beats: BeatList, beatClass: Beat['beatClass'], n: number): number {
  let left = n;
  for (let i = 3; i < beats.ticks.length - 4; i += 1) {
    const about = [-2, -1, 1, 2, 3].every((k) => beatAt(beats, i + k).beatClass === 'N');
    if (beatAt(beats, i).beatClass !== beatClass || !about) continue;
    if (left === 0) return i;
    left -= 1;
  }
  throw new Error(`no beat ${n} of class ${beatClass}`);
}

/** The list as it stands once a doubt is mended. */
export function mended(beats: BeatList, { mend }: Doubt): BeatList {
  if (mend?.kind !== 'beats') throw new Error('nothing is proposed');
  return changeBeats(beats, mend.removed, mend.added);
}

export const without = (beats: BeatList, index: number): BeatList =>
  changeBeats(beats, [beatAt(beats, index)], []);

export const withBeat = (beats: BeatList, tick: number, parts: Partial<Beat> = {}): BeatList =>
  changeBeats(beats, [], [{ tick, beatClass: 'N', origin: 'detected', ...parts }]);

export function classed(beats: BeatList, index: number, beatClass: Beat['beatClass']): BeatList {
  const beat = beatAt(beats, index);
  return changeBeats(beats, [beat], [{ ...beat, beatClass }]);
}
