import { atOnce } from '../numeric/in-steps';
import {
  coveredSeconds,
  type Interval,
  joinIntervals,
  type SpanCause,
  type SpanTarget,
} from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { type BaseColumns, createBaseColumns } from './base-columns';
import { type Excursion, paddedAndJoined } from './excursions';
import { flatLines } from './flat-line';
import { flatTops } from './flat-tops';
import type { ProposedSpan } from './proposed-span';
import type { Run } from './runs';
import { slowMovements } from './slow-movements';
import { jumpStretches, roughStretches } from './sudden-bursts';

export interface SpoilWatchOptions {
  /** Key of the lead, written into each span. */
  readonly lead: string;
  readonly rateHz: Hertz;
  readonly railsUv: readonly [number, number] | null;
  /** One digital step in uV; 0 where not known. */
  readonly stepUv: number;
  /** Time of the first sample; 0 unless given. */
  readonly startS?: Seconds;
}

/** Watches one lead stream by and proposes what is spoiled. */
export interface SpoilWatch {
  /** Takes the next samples in uV, NaN where there are none. */
  push(block: Float64Array): void;
  /** The proposals, ascending, after the last sample. */
  finish(): readonly ProposedSpan[];
  /** The same with a rest now and then. */
  finishInSteps(): Generator<void, readonly ProposedSpan[]>;
}

/** A heartbeat cannot be judged below this rate, nor spoiled. */
const HEART_NEEDS_HZ = 50;
/** What spoils the heart is made longer by this, and joined where less than the second parts it: a beat hardly fits. */
const HEART_PAD_S = 0.15;
const HEART_NEAR_S = 1.2;
/** Columns this near to a gap, flat line or rail do not count for what else is found. */
const NEAR_S = 0.5;
/** At the edge of a rail this long the low-pass before 4 Hz rings for so long. */
const LONG_RAIL_S = 0.5;
const RAIL_RINGS_S = 2;

interface Found {
  readonly target: SpanTarget;
  readonly cause: SpanCause;
  readonly intervals: readonly Interval[];
}

const runIntervals = (runs: readonly Run[], rateHz: Hertz): readonly Interval[] =>
  runs.map(({ from, to }) => ({ fromS: from / rateHz, toS: to / rateHz }));

const columnIntervals = (found: readonly Excursion[], columnS: number): readonly Interval[] =>
  found.map(({ from, to }) => ({ fromS: from * columnS, toS: to * columnS }));

/** What of an interval list lies outside another, both joined. */
function without(intervals: readonly Interval[], taken: readonly Interval[]): readonly Interval[] {
  return intervals.filter(
    ({ fromS, toS }) => coveredSeconds(taken, fromS, toS) < 0.5 * (toS - fromS),
  );
}

/** Values by column as doubles, NaN where a column lies in or near one of the intervals. */
function outside(values: Float32Array, columnS: number, taken: readonly Interval[]): Float64Array {
  const left = Float64Array.from(values);
  for (const { fromS, toS } of taken)
    left.fill(
      Number.NaN,
      Math.max(0, Math.floor((fromS - NEAR_S) / columnS)),
      Math.ceil((toS + NEAR_S) / columnS),
    );
  return left;
}

/** Gaps, rails and flat lines: the lead carries nothing there. */
function emptyStretches(columns: BaseColumns, options: SpoilWatchOptions): readonly Found[] {
  const { rateHz, stepUv } = options;
  const gaps = runIntervals(columns.missing, rateHz);
  const railed = [...columns.railed, ...flatTops(columns)];
  const found = runIntervals(railed, rateHz);
  const long = found.filter(({ fromS, toS }) => toS - fromS >= LONG_RAIL_S);
  const rails = joinIntervals([
    ...paddedAndJoined(found, NEAR_S, 2),
    ...paddedAndJoined(long, RAIL_RINGS_S, 2),
  ]);
  const flats = without(joinIntervals(flatLines(columns, rateHz, stepUv)), rails);
  return [
    { target: 'both', cause: 'gap', intervals: gaps },
    { target: 'both', cause: 'rail', intervals: rails },
    { target: 'both', cause: 'flat', intervals: paddedAndJoined(flats, 0.2, 1) },
  ];
}

/** Stretches that spoil the heart: muscle bursts, and jumps that a detector would take for beats. */
function* heartBursts(
  columns: BaseColumns,
  taken: readonly Interval[],
  options: SpoilWatchOptions,
): Generator<void, readonly Interval[]> {
  if (options.rateHz < HEART_NEEDS_HZ) return [];
  const { columnS } = columns;
  const roughness = outside(columns.roughness, columnS, taken);
  const likeQrs = outside(columns.likeQrs, columnS, taken);
  const rough = yield* roughStretches(columns, roughness, likeQrs, options.stepUv);
  const low = outside(columns.low, columnS, taken);
  const high = outside(columns.high, columnS, taken);
  const mean = outside(columns.mean, columnS, taken);
  yield;
  const jumps = jumpStretches(columns, low, high, mean, options.stepUv);
  return paddedAndJoined(columnIntervals([...rough, ...jumps], columnS), HEART_PAD_S, HEART_NEAR_S);
}

/** Steps and movements of the slow part of the lead. */
function* stomachMovements(
  columns: BaseColumns,
  taken: readonly Interval[],
  stepUv: number,
): Generator<void, { readonly steps: readonly Interval[]; readonly swings: readonly Interval[] }> {
  const { columnS } = columns;
  const found = yield* slowMovements(columns, outside(columns.mean, columnS, taken), stepUv);
  const isStep = (one: { stepAt: number | null }) => one.stepAt !== null;
  const pick = (list: typeof found) => paddedAndJoined(columnIntervals(list, columnS), 1, 6);
  const steps = pick(found.filter(isStep));
  return { steps, swings: without(pick(found.filter((one) => !isStep(one))), steps) };
}

/** Heart and stomach spans whose ends differ by no more than this are one. */
const SAME_END_S = 1;

const near = (a: Interval, b: Interval): boolean =>
  Math.abs(a.fromS - b.fromS) <= SAME_END_S && Math.abs(a.toS - b.toS) <= SAME_END_S;

/**
 * Heart and stomach spans of one event: a stomach span that a heart's fills by half takes its ends in too, and where the
 * ends agree the two become one for both. The heart's never grow by the stomach's, so that a long settling does not cost
 * beats that can be read.
 */
function unite(
  heart: readonly Interval[],
  stomach: readonly Interval[],
): { both: Interval[]; heart: Interval[]; stomach: Interval[] } {
  const left = new Set(heart);
  const both: Interval[] = [];
  const alone: Interval[] = [];
  for (const one of stomach) {
    const meeting = heart.filter((h) => h.fromS < one.toS && h.toS > one.fromS);
    const spread = meeting.reduce(
      (sum, h) => ({ fromS: Math.min(sum.fromS, h.fromS), toS: Math.max(sum.toS, h.toS) }),
      one,
    );
    const shared = coveredSeconds(meeting, one.fromS, one.toS);
    const event = shared < 0.5 * (spread.toS - spread.fromS) ? one : spread;
    const same = meeting.length === 1 && near(meeting[0], event) ? meeting[0] : null;
    if (same) left.delete(same);
    (same ? both : alone).push(event);
  }
  return { both: [...joinIntervals(both)], heart: [...left], stomach: [...joinIntervals(alone)] };
}

function* movements(
  columns: BaseColumns,
  taken: readonly Interval[],
  options: SpoilWatchOptions,
): Generator<void, readonly Found[]> {
  const bursts = yield* heartBursts(columns, taken, options);
  yield;
  const { steps, swings } = yield* stomachMovements(columns, taken, options.stepUv);
  const step = unite(bursts, steps);
  const burst = unite(step.heart, swings);
  return [
    { target: 'both', cause: 'step', intervals: step.both },
    { target: 'stomach', cause: 'step', intervals: step.stomach },
    { target: 'both', cause: 'burst', intervals: burst.both },
    { target: 'stomach', cause: 'burst', intervals: burst.stomach },
    { target: 'heart', cause: 'burst', intervals: burst.heart },
  ];
}

const NOTES: Readonly<Partial<Record<SpanCause, string>>> = {
  gap: 'no samples',
  rail: 'at the end of the digitiser’s or the amplifier’s range',
  flat: 'no change in the lead',
  step: 'a jump, until it has settled',
  burst: 'far over the recording’s own level',
};

/**
 * Proposes the spoiled spans of one lead while it streams by: gaps, flat lines, rails, steps and bursts. Every limit is a
 * multiple of the recording's own running level (median of 10 min), so that a large QRS, a strong slow wave or a slow
 * drift is none; the rules are this program's, set on simulated studies. What memory it needs is 20 bytes for each 0.1 s.
 */
export function createSpoilWatch(options: SpoilWatchOptions): SpoilWatch {
  const base = createBaseColumns(options);
  const startS = options.startS ?? 0;
  const finishInSteps = function* (): Generator<void, readonly ProposedSpan[]> {
    const columns = base.finish();
    const endS = columns.sampleCount / options.rateHz;
    const empty = emptyStretches(columns, options);
    const taken = empty.flatMap((found) => found.intervals);
    yield;
    const all = [...empty, ...(yield* movements(columns, taken, options))];
    return all
      .flatMap(({ target, cause, intervals }) =>
        intervals.map(
          ({ fromS, toS }): ProposedSpan => ({
            fromS: startS + Math.max(0, fromS),
            toS: startS + Math.min(endS, toS),
            lead: options.lead,
            target,
            cause,
            origin: 'proposed',
            note: NOTES[cause] ?? '',
          }),
        ),
      )
      .filter((span) => span.toS > span.fromS)
      .sort((a, b) => a.fromS - b.fromS || a.toS - b.toS);
  };
  return {
    push: (block) => base.push(block),
    finish: () => atOnce(finishInSteps()),
    finishInSteps,
  };
}
