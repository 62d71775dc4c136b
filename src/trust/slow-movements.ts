import { runningMedian } from '../numeric/running-quantile';
import type { BaseColumns } from './base-columns';
import { type Excursion, excursionsAbove } from './excursions';
import { ownLevel } from './own-level';
import { settlingTimeS } from './settling';
import { slidingRange } from './sliding-range';
import { LEVEL_HALF_S } from './sudden-bursts';
import { unforeseen } from './unforeseen';

/** Swings are measured over this long: more than a slow wave's rise, less than its cycle. */
export const SWING_S = 8;
/** Times the own level at which a movement begins and ends; set on simulated studies (test/trust). */
const SWING = { enter: 3.2, leave: 1.8 };
/** A step rises within 0.6 s and stays for two; it is this much over the usual change in that time. */
const STEP_HALF_S = 0.3;
const STEP_STAYS_S = 2;
const STEP_OVER_USUAL = 8;
const STEP_KEEPS = 0.5;
/** And this share of all that the lead swings meanwhile. */
const STEP_SHARE = 0.6;
/** After a step the lead has settled when what is left of it is less than this share of a usual swing. */
const SETTLED_SHARE = 0.1;
/** Times its own level at which a surprise begins and ends, and the least share of a usual swing that does harm. */
const SURPRISE = { enter: 9, leave: 4.5 };
const SURPRISE_SHARE = 0.2;
const SURPRISE_HALF_S = 0.8;
const TRIM_SHARE = 0.1;

/** An excursion of the slow part of the lead, and whether it begins as a step does. */
export interface SlowMovement extends Excursion {
  /** Column of the highest jump; null where the lead only swings. */
  readonly stepAt: number | null;
}

/** Mean of the columns with QRS complexes taken out: the median of half a second. */
export function slowTrack(mean: Float64Array, columnS: number): Float64Array {
  return runningMedian(mean, 2 * Math.max(0, Math.round(0.2 / columnS)) + 1);
}

/** Change across 2 half-widths about each column; NaN at the ends and where a value is missing. */
function changeAcross(track: Float64Array, half: number): Float64Array {
  return track.map((_, i) =>
    i - half >= 0 && i + half < track.length ? track[i + half] - track[i - half] : Number.NaN,
  );
}

function meanOf(track: Float64Array, from: number, to: number): number {
  let [sum, count] = [0, 0];
  for (let i = Math.max(0, from); i < Math.min(track.length, to); i += 1) {
    if (Number.isNaN(track[i])) continue;
    sum += track[i];
    count += 1;
  }
  return sum / count;
}

/** Slow part of the lead with its measures, each by column. */
interface SlowPart {
  readonly columnS: number;
  readonly track: Float64Array;
  readonly swing: Float64Array;
  readonly usualSwing: Float64Array;
  readonly change: Float64Array;
  readonly usualChange: Float64Array;
}

function greatest(x: Float64Array, { from, to }: Excursion): number {
  let most = 0;
  for (let i = from; i < to; i += 1) if (x[i] > most) most = x[i];
  return most;
}

/** Column of the sharpest lasting jump of an excursion, or null. */
function stepWithin(slow: SlowPart, found: Excursion): number | null {
  const { track, change, usualChange, columnS } = slow;
  let at = -1;
  for (let i = found.from; i < found.to; i += 1) {
    const over = Math.abs(change[i]) > STEP_OVER_USUAL * usualChange[i];
    if (over && (at < 0 || Math.abs(change[i]) > Math.abs(change[at]))) at = i;
  }
  if (at < 0 || Math.abs(change[at]) < STEP_SHARE * greatest(slow.swing, found)) return null;
  const near = Math.round((2 * STEP_HALF_S) / columnS);
  const long = Math.round(STEP_STAYS_S / columnS);
  const kept = meanOf(track, at + near, at + long) - meanOf(track, at - long, at - near);
  return Math.abs(kept) > STEP_KEEPS * Math.abs(change[at]) ? at : null;
}

/** First column after a step from which on the lead has settled. */
function settledFrom({ track, usualSwing, columnS }: SlowPart, stepAt: number): number {
  const from = stepAt + Math.max(1, Math.round(STEP_HALF_S / columnS));
  const settlingS = settlingTimeS(track, from, columnS, SETTLED_SHARE * usualSwing[stepAt]);
  return Math.min(track.length, from + Math.round(settlingS / columnS));
}

function* slowPart(
  columns: BaseColumns,
  mean: Float64Array,
  stepUv: number,
): Generator<void, SlowPart> {
  const { columnS } = columns;
  const levelHalf = Math.round(LEVEL_HALF_S / columnS);
  const track = slowTrack(mean, columnS);
  yield;
  const swing = slidingRange(track, track, swingWidth(columnS));
  yield;
  const change = changeAcross(track, Math.max(1, Math.round(STEP_HALF_S / columnS)));
  const changes = change.map((value) => Math.abs(value));
  return {
    columnS,
    track,
    swing,
    usualSwing: ownLevel(swing, levelHalf, 4 * stepUv),
    change,
    usualChange: ownLevel(changes, levelHalf, 4 * stepUv),
  };
}

const swingWidth = (columnS: number): number => Math.max(3, Math.round(SWING_S / columnS));

/** Swings far over the usual, a step where one begins so. */
function swings(slow: SlowPart, count: number): readonly SlowMovement[] {
  const edge = Math.floor(swingWidth(slow.columnS) / 2) - Math.round(1 / slow.columnS);
  return excursionsAbove(
    slow.swing,
    slow.usualSwing.map((value) => SWING.enter * value),
    slow.usualSwing.map((value) => SWING.leave * value),
  ).map((found) => {
    const stepAt = stepWithin(slow, found);
    const from = found.from === 0 ? 0 : found.from + edge;
    const swung = found.to === count ? found.to : found.to - edge;
    const to = stepAt === null ? swung : Math.max(swung, settledFrom(slow, stepAt));
    return { from: Math.min(from, to - 1), to: Math.max(to, from + 1), stepAt };
  });
}

/** Steps too small to be a swing of the lead, yet far sharper than anything usual. */
function smallSteps(slow: SlowPart): readonly SlowMovement[] {
  const sharpness = slow.change.map((value) => Math.abs(value));
  const limit = slow.usualChange.map((value) => STEP_OVER_USUAL * value);
  const reach = Math.round(1 / slow.columnS);
  return excursionsAbove(sharpness, limit, limit).flatMap((found) => {
    const near = {
      from: Math.max(0, found.from - reach),
      to: Math.min(slow.track.length, found.to + reach),
    };
    const stepAt = stepWithin(slow, near);
    return stepAt === null ? [] : [{ from: near.from, to: settledFrom(slow, stepAt), stepAt }];
  });
}

/** An excursion without what is small beside its greatest value at its ends, which is the filter's own. */
function trimmed({ from, to }: Excursion, x: Float64Array): Excursion {
  const least = TRIM_SHARE * greatest(x, { from, to });
  let [first, last] = [from, to - 1];
  while (x[first] < least) first += 1;
  while (x[last] < least) last -= 1;
  return { from: first, to: last + 1 };
}

/**
 * Pops, coughs and talk: what nothing about it foretells, of a size that a filter would make a wave of, from the first to the
 * last such half second.
 */
function* surprises(slow: SlowPart, mean: Float64Array): Generator<void, readonly SlowMovement[]> {
  const { columnS, usualSwing } = slow;
  const found = yield* unforeseen(mean, columnS);
  if (!found) return [];
  const { sizeUv, every } = found;
  yield;
  const level = ownLevel(sizeUv, Math.round(LEVEL_HALF_S / columnS / every), 0);
  const limit = (times: number, share: number) =>
    level.map((value, i) =>
      Math.max(times * value, share * SURPRISE_SHARE * usualSwing[i * every]),
    );
  const margin = Math.round(SURPRISE_HALF_S / columnS);
  const raised = excursionsAbove(sizeUv, limit(SURPRISE.enter, 1), limit(SURPRISE.leave, 0.5));
  return raised
    .map((found) => trimmed(found, sizeUv))
    .map(({ from, to }) => ({
      from: Math.max(0, from * every - margin),
      to: Math.min(mean.length, to * every + margin),
      stepAt: null,
    }));
}

/**
 * Stretches where the slow part of the lead swings far more within 8 s than is usual about that time: movements, and steps
 * (an electrode's jump) until they have settled. A window that only reaches the movement with its edge is not counted.
 * `mean` is each column's, NaN where it does not count. Those found may overlap. Takes a rest now and then.
 */
export function* slowMovements(
  columns: BaseColumns,
  mean: Float64Array,
  stepUv: number,
): Generator<void, readonly SlowMovement[]> {
  const slow = yield* slowPart(columns, mean, stepUv);
  yield;
  const apartFrom = (others: readonly SlowMovement[]) => (one: SlowMovement) =>
    !others.some((other) => other.from < one.to && one.from < other.to);
  const large = swings(slow, columns.count);
  const steps = [...large, ...smallSteps(slow).filter(apartFrom(large))];
  yield;
  return [...steps, ...(yield* surprises(slow, mean)).filter(apartFrom(steps))];
}
