import type { Hertz } from '../units/rate';
import { type Change, createChange, nextChange } from './mean-change';
import { createRuns, type Run, type Runs } from './runs';
import { followStop, type Stop, type Stopping } from './stops';

/** What is kept of a lead: columns of about 0.1 s, and the runs of samples that say something by themselves. */
export interface BaseColumns {
  readonly samplesPerColumn: number;
  readonly columnS: number;
  readonly count: number;
  /** Least, greatest and mean value of each column in uV; NaN where a sample of it is missing. */
  readonly low: Float32Array;
  readonly high: Float32Array;
  readonly mean: Float32Array;
  /** Root mean square of the steps from sample to sample in uV. */
  readonly roughness: Float32Array;
  /**
   * Root mean square in uV of the change from each mean of about 18 ms to the next: what disturbs the reading of beats as far
   * as it is like a QRS complex; hardly any mains hum.
   */
  readonly likeQrs: Float32Array;
  readonly sampleCount: number;
  readonly missing: readonly Run[];
  readonly railed: readonly Run[];
  /** Runs of 20 ms or more that begin with a jump and stay within a step of their first value. */
  readonly stopped: readonly Stop[];
  /** Runs of exactly equal samples of half a second or more. */
  readonly constant: readonly Run[];
}

export interface ColumnOptions {
  readonly rateHz: Hertz;
  readonly railsUv: readonly [low: number, high: number] | null;
  /** One digital step in uV, 0 where not known. */
  readonly stepUv: number;
}

const COLUMN_S = 0.1;
const LEAST_CONSTANT_S = 0.5;
const LEAST_RAILED_S = 0.02;
/** A jump into a stop is this many steps from one sample to the next. */
const STOP_JUMP_STEPS = 8;
/** Means over a period of 55 Hz keep less than a tenth of hum at 50 or 60 Hz, and most of what a QRS complex is made of. */
const MEANS_HZ = 55;

type Growable = ReturnType<typeof growable>;

/** Float32Array that grows by doubling. */
function growable() {
  let values = new Float32Array(1024);
  return {
    put(index: number, value: number): void {
      if (index >= values.length) {
        const longer = new Float32Array(2 * values.length);
        longer.set(values);
        values = longer;
      }
      values[index] = value;
    },
    take: (count: number): Float32Array => values.slice(0, count),
  };
}

/** Values at or past which a sample counts as at the digitiser's end; infinite where the ends are not known. */
function railLimits({ railsUv, stepUv }: ColumnOptions): readonly [number, number] {
  if (railsUv === null) return [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  const low = Math.min(...railsUv);
  const high = Math.max(...railsUv);
  const slack = Math.max(0.5 * stepUv, 1e-6 * (high - low));
  return [low + slack, high - slack];
}

/** Sums of a column before its first sample. */
const EMPTY = {
  low: Number.POSITIVE_INFINITY,
  high: Number.NEGATIVE_INFINITY,
  sum: 0,
  squares: 0,
  changes: 0,
};

function follow(runs: Runs, index: number, isIn: boolean): void {
  if (isIn) runs.open(index);
  else if (runs.isOpen) runs.close(index);
}

/** The columns and runs in the making. */
interface Making {
  readonly samplesPerColumn: number;
  readonly rails: readonly [low: number, high: number];
  readonly lows: Growable;
  readonly highs: Growable;
  readonly means: Growable;
  readonly roughs: Growable;
  readonly likeQrs: Growable;
  readonly missing: Runs;
  readonly railed: Runs;
  readonly constant: Runs;
  readonly change: Change;
  readonly stopping: Stopping;
  index: number;
  column: number;
  inColumn: number;
  previous: number;
  low: number;
  high: number;
  sum: number;
  squares: number;
  changes: number;
}

function begin(options: ColumnOptions): Making {
  const { rateHz } = options;
  const atLeast = (samples: number, seconds: number) =>
    createRuns(Math.max(samples, Math.round(seconds * rateHz)));
  return {
    samplesPerColumn: Math.max(1, Math.round(COLUMN_S * rateHz)),
    rails: railLimits(options),
    lows: growable(),
    highs: growable(),
    means: growable(),
    roughs: growable(),
    likeQrs: growable(),
    missing: createRuns(1),
    railed: atLeast(3, LEAST_RAILED_S),
    constant: atLeast(2, LEAST_CONSTANT_S),
    change: createChange(Math.max(1, Math.round(rateHz / MEANS_HZ))),
    stopping: {
      withinUv: 1.01 * options.stepUv,
      least: Math.max(4, Math.round(LEAST_RAILED_S * rateHz)),
      kept: [],
      from: -1,
      valueUv: Number.NaN,
    },
    index: 0,
    column: 0,
    inColumn: 0,
    previous: Number.NaN,
    ...EMPTY,
  };
}

/** The runs' share of samples [from, to) of a block; only called where one may be open or begin. */
function followRuns(making: Making, block: Float64Array, from: number, to: number): void {
  const [railLow, railHigh] = making.rails;
  let previous = from > 0 ? block[from - 1] : making.previous;
  for (let i = from; i < to; i += 1) {
    const value = block[i];
    const at = making.index + i - from;
    follow(making.missing, at, Number.isNaN(value));
    follow(making.railed, at, value <= railLow || value >= railHigh);
    follow(making.constant, at, value === previous);
    previous = value;
  }
}

function closeColumn(making: Making): void {
  const { column, low, high, sum, squares, changes, samplesPerColumn } = making;
  const whole = !Number.isNaN(sum);
  making.lows.put(column, whole ? low : Number.NaN);
  making.highs.put(column, whole ? high : Number.NaN);
  making.means.put(column, sum / samplesPerColumn);
  making.roughs.put(column, whole ? Math.sqrt(squares / samplesPerColumn) : Number.NaN);
  making.likeQrs.put(column, whole ? Math.sqrt(changes / samplesPerColumn) : Number.NaN);
  Object.assign(making, EMPTY);
  making.column += 1;
  making.inColumn = 0;
}

/** Samples [from, to) of a block, all of the open column. Plain local sums: this loop meets every sample. */
function take(making: Making, block: Float64Array, from: number, to: number): void {
  let { low, high, sum, squares, changes } = making;
  let previous = from > 0 ? block[from - 1] : making.previous;
  let still = 0;
  const { change, stopping } = making;
  const jumpUv = STOP_JUMP_STEPS * stopping.withinUv;
  for (let i = from; i < to; i += 1) {
    const value = block[i];
    const step = value - previous;
    const apart = nextChange(change, value);
    if (value < low) low = value;
    if (value > high) high = value;
    if (step === 0) still += 1;
    const jumped = Math.abs(step) > jumpUv;
    if (jumped || stopping.from >= 0) followStop(stopping, making.index + i - from, value, jumped);
    sum += value;
    if (!Number.isNaN(step)) squares += step * step;
    changes += apart * apart;
    previous = value;
  }
  const { missing, railed, constant, rails } = making;
  const mayRun = still > 0 || Number.isNaN(sum) || low <= rails[0] || high >= rails[1];
  if (mayRun || missing.isOpen || railed.isOpen || constant.isOpen)
    followRuns(making, block, from, to);
  making.low = low;
  making.high = high;
  making.sum = sum;
  making.squares = squares;
  making.changes = changes;
  making.index += to - from;
  making.inColumn += to - from;
  if (making.inColumn === making.samplesPerColumn) closeColumn(making);
}

/**
 * Turns a lead that streams by into base columns. Memory: 20 bytes a column of 0.1 s (at low rates a column is one
 * sample), whatever the rate. A last column that is not full is left out.
 */
export function createBaseColumns(options: ColumnOptions): {
  push(block: Float64Array): void;
  finish(): BaseColumns;
} {
  const making = begin(options);
  const { samplesPerColumn } = making;
  return {
    push(block) {
      for (let from = 0; from < block.length; ) {
        const to = Math.min(block.length, from + samplesPerColumn - making.inColumn);
        take(making, block, from, to);
        from = to;
      }
      if (block.length > 0) making.previous = block[block.length - 1];
    },
    finish() {
      const { column, index, stopping } = making;
      followStop(stopping, index, Number.NaN, false);
      return {
        samplesPerColumn,
        columnS: samplesPerColumn / options.rateHz,
        count: column,
        low: making.lows.take(column),
        high: making.highs.take(column),
        mean: making.means.take(column),
        roughness: making.roughs.take(column),
        likeQrs: making.likeQrs.take(column),
        sampleCount: index,
        missing: making.missing.finish(index),
        railed: making.railed.finish(index),
        stopped: stopping.kept,
        constant: making.constant.finish(index),
      };
    },
  };
}
