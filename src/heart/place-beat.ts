import { type Alignment, align, TIMING_HALF_S, timerOf } from './align';
import type { AverageBeat } from './detect';
import { crestPlace } from './sub-sample';
import { readFilled, type Samples, usableRanges } from './usable-signal';

/** A place for a beat put by hand: `visible` where a complex was found there, else exactly where it was asked for. */
export interface BeatPlace {
  readonly tick: number;
  readonly visible: boolean;
}

/** Likeness to an average from which its fit gives the time. */
const LEAST_LIKENESS = 0.75;
/** Least size of a complex beside its average. */
const LEAST_SIZE = 0.3;
/** An extreme this many times the usual size of the signal around it is taken for an R peak. */
const LEAST_EXTREME = 3;
const AROUND_S = 1;
const MARGIN = 8;

export interface BeatSearch {
  readonly heartbeat: Samples;
  readonly rateHz: number;
  readonly ticksPerSample: number;
  readonly averages: readonly AverageBeat[];
  /** Sign of the dominant extreme. */
  readonly sign: 1 | -1;
}

/**
 * Best time for a beat put near `nearS`, within `searchS` to each side: aligned with the study's average that fits best;
 * else at the greatest extreme (of the study's sign, else of either); else exactly at `nearS`, not visible.
 */
export function placeBeat(search: BeatSearch, nearS: number, searchS = 0.12): BeatPlace {
  const { heartbeat, rateHz, ticksPerSample } = search;
  const near = Math.round(nearS * rateHz);
  const placed = { tick: Math.round(nearS * rateHz * ticksPerSample), visible: false };
  if (!(near >= 0 && near < heartbeat.length) || Number.isNaN(heartbeat[near])) return placed;
  const reach = Math.max(2, Math.round(searchS * rateHz));
  const around = Math.round(AROUND_S * rateHz);
  const from = Math.max(0, near - around);
  const part = heartbeat.subarray(from, Math.min(heartbeat.length, near + around + 1));
  const row = readFilled(
    part,
    usableRanges(part, rateHz, []),
    near - around - from,
    near + around + 1 - from,
  );
  const start = near - around;
  const place =
    fittedPlace(search, row, around, reach) ?? extremePlace(search.sign, row, around, reach);
  if (place === null) return placed;
  return { tick: Math.round((start + place) * ticksPerSample), visible: true };
}

/** Fiducial point of the best fitting average whose fiducial falls within `reach` of `near`. */
function fittedPlace(
  { averages, rateHz }: BeatSearch,
  row: Float64Array,
  near: number,
  reach: number,
): number | null {
  let best: (Alignment & { point: number }) | null = null;
  for (const average of averages) {
    const half = Math.round(TIMING_HALF_S * rateHz);
    const middle = Math.round(average.centre);
    const timer = timerOf(
      Float64Array.from(average.samples.subarray(middle - half, middle + half + 1)),
    );
    const fit = align(row, timer, near, reach);
    if (fit.likeness < LEAST_LIKENESS || fit.size < LEAST_SIZE) continue;
    if (best === null || fit.likeness > best.likeness)
      best = { ...fit, point: fit.place + average.centre - middle };
  }
  return best === null ? null : best.point;
}

/** The greatest extreme that stands out of its surroundings, of the study's sign where that one does. */
function extremePlace(sign: 1 | -1, row: Float64Array, near: number, reach: number): number | null {
  let power = 0;
  for (const value of row) power += value * value;
  const least = LEAST_EXTREME * Math.sqrt(power / row.length);
  for (const side of [sign, sign > 0 ? -1 : 1] as const) {
    let at = near - reach;
    for (let i = at; i <= near + reach; i += 1) if (side * row[i] > side * row[at]) at = i;
    const inside =
      at > near - reach && at < near + reach && at >= MARGIN && at < row.length - MARGIN;
    if (inside && side * row[at] > least) return crestPlace(row, at, side);
  }
  return null;
}
