import type { BeatList } from '../recording/beat';
import type { BeatAverageSettings } from '../recording/settings';
import type { Hertz } from '../units/rate';
import { averageBeats } from './average-beats';
import { type PlacedBeats, placeBeats } from './beat-extents';
import { carryLevel } from './beat-free';
import type { HeartPart } from './route';
import { createSlowSampler, slowRateHz } from './slow-rate';
import type { WideLead } from './wide-lead';

/** Samples handed to the low-pass between two yields. */
const PIECE = 8192;

export interface HeartPartInput {
  readonly wide: WideLead;
  /** Beats of the study in ticks of a lead of `beatRateHz`, its first sample that of this lead. */
  readonly beats: BeatList;
  readonly beatRateHz: Hertz;
  /** 0 where a sample of the lead at the slow rate is missing or spoiled, else 1. */
  readonly kept: Uint8Array;
  readonly settings: BeatAverageSettings;
}

/** Beats that may enter an average: with room, and nothing spoiled about them. */
function usableBeats(beats: PlacedBeats, kept: Uint8Array): Uint8Array {
  const ratio = slowRateHz(beats.rateHz) / beats.rateHz;
  return beats.hasRoom.map((room, k) => {
    const from = Math.floor((beats.at[k] - beats.before[k]) * ratio);
    const to = Math.ceil((beats.at[k] + beats.after[k]) * ratio);
    if (from < 0 || to >= kept.length) return 0;
    for (let i = from; i <= to; i += 1) if (kept[i] === 0) return 0;
    return room;
  });
}

/**
 * What the heartbeats leave in a lead at the slow wave's rate: its local average beats (numbers.md's `beat-average`), laid at
 * every beat and taken through the same low-pass as the lead itself. Of each beat only its area is left below 0.8 Hz, which
 * comes more or less often as the heart's rate changes. Nothing where there are no beats. Yields the part done.
 */
export function* heartPart(input: HeartPartInput): Generator<number, HeartPart> {
  const { wide, beats, beatRateHz, kept, settings } = input;
  const placed = yield* quietly(placeBeats(beats, beatRateHz, wide.rateHz, settings), 0);
  const usable = usableBeats(placed, kept);
  const averaged = yield* quietly(averageBeats(wide.samples, placed, usable, settings.beats), 0.2);
  carryLevel(averaged.uv, placed);
  const sampler = createSlowSampler(wide.rateHz);
  for (let from = 0; from < averaged.uv.length; from += PIECE) {
    sampler.push(averaged.uv.subarray(from, from + PIECE));
    yield 0.8 + (0.2 * from) / averaged.uv.length;
  }
  return { uv: sampler.finish(), beats: averaged.beats };
}

function* quietly<T>(work: Generator<void, T>, done: number): Generator<number, T> {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
    yield done;
  }
}
