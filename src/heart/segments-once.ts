import type { BeatList } from '../recording/beat';
import type { RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { intervalsWithin, type RhythmFlags, rhythmFlags } from './rr-series';
import { type Laid, layOut, type SegmentInput, type SegmentResult, segmentOf } from './segments';

/** A segment worked out before, with the intervals it was worked out from. */
interface Held {
  readonly timesS: Float64Array;
  readonly rrMs: Float64Array;
  readonly nn: Uint8Array;
  readonly rhythm: RhythmFlags;
  readonly result: SegmentResult;
}

/** Enough for the phases of a day and pieces of them; a cache is emptied when it holds more. */
const MOST_HELD = 2000;
const held = new Map<string, Held>();

export interface SegmentsAsked {
  readonly rr: RrSeries;
  readonly beats: BeatList;
  readonly rateHz: Hertz;
  readonly part: Phase;
  readonly blocked: readonly Interval[];
  readonly settings: Settings;
}

function keyOf({ fromS, toS, full }: Laid, alone: boolean, { variability }: Settings): string {
  const { segmentS, lfHz, hfHz, minNnShare } = variability;
  return [fromS, toS, full, alone, segmentS, ...lfHz, ...hfHz, minNnShare].join(' ');
}

function sameFrom(x: Float64Array | Uint8Array, first: number, was: ArrayLike<number>): boolean {
  for (let i = 0; i < was.length; i += 1) if (x[first + i] !== was[i]) return false;
  return true;
}

/** What is held under a key, where it stands on the very same intervals; with their places as they are now. */
function recall(
  key: string,
  { rr, rhythm }: SegmentInput,
  first: number,
  end: number,
): SegmentResult | null {
  const one = held.get(key);
  if (!one || one.rrMs.length !== end - first) return null;
  const same =
    sameFrom(rr.rrMs, first, one.rrMs) &&
    sameFrom(rr.timesS, first, one.timesS) &&
    sameFrom(rr.nn, first, one.nn) &&
    sameFrom(rhythm.tells, first, one.rhythm.tells) &&
    sameFrom(rhythm.ectopic, first, one.rhythm.ectopic);
  return same ? { ...one.result, first, end } : null;
}

function remember(key: string, { rr, rhythm }: SegmentInput, result: SegmentResult): void {
  if (held.size >= MOST_HELD) held.clear();
  const { first, end } = result;
  held.set(key, {
    timesS: rr.timesS.slice(first, end),
    rrMs: rr.rrMs.slice(first, end),
    nn: rr.nn.slice(first, end),
    rhythm: {
      tells: rhythm.tells.slice(first, end),
      ectopic: rhythm.ectopic.slice(first, end),
    },
    result,
  });
}

/** The flags of the last series asked for: the parts of a study ask for the same ones. */
const rhythms = new WeakMap<RrSeries, RhythmFlags>();

function rhythmOf({ rr, beats, rateHz, blocked }: SegmentsAsked): RhythmFlags {
  const known = rhythms.get(rr) ?? rhythmFlags(beats, rateHz, blocked);
  rhythms.set(rr, known);
  return known;
}

/**
 * The segments of a part of the study. Phases and pieces of them share segments ("fed" and "fed 0-30") and an edit changes
 * one or two of a day's 288, so a segment is worked out anew only when its intervals differ from the last time. Takes a rest
 * after each such segment.
 */
export function* segmentsOnce(asked: SegmentsAsked): Generator<void, readonly SegmentResult[]> {
  const { rr, part, settings } = asked;
  const input = { rr, rhythm: rhythmOf(asked), settings: settings.variability };
  const laid = layOut(part, settings.variability.segmentS);
  const alone = laid.length === 1;
  const results: SegmentResult[] = [];
  for (const one of laid) {
    const key = keyOf(one, alone, settings);
    const { first, end } = intervalsWithin(rr, one.fromS, one.toS);
    const known = recall(key, input, first, end);
    const result = known ?? segmentOf(input, part.name, one, alone);
    results.push({ ...result, shown: { ...result.shown, phase: part.name } });
    if (known) continue;
    remember(key, input, result);
    yield;
  }
  return results;
}
