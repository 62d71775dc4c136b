import type { Hertz } from '../units/rate';
import type { Run } from './runs';
import { createRuns } from './runs';

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
  readonly sampleCount: number;
  readonly missing: readonly Run[];
  readonly railed: readonly Run[];
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

/**
 * Turns a lead that streams by into base columns. Memory: 16 bytes a column of 0.1 s (at low rates a column is one
 * sample), whatever the rate. A last column that is not full is left out.
 */
export function createBaseColumns(options: ColumnOptions): {
  push(block: Float64Array): void;
  finish(): BaseColumns;
} {
  const { rateHz } = options;
  const samplesPerColumn = Math.max(1, Math.round(COLUMN_S * rateHz));
  const [railLow, railHigh] = railLimits(options);
  const lows = growable();
  const highs = growable();
  const means = growable();
  const roughs = growable();
  const missing = createRuns(1);
  const railed = createRuns(Math.max(3, Math.round(LEAST_RAILED_S * rateHz)));
  const constant = createRuns(Math.max(2, Math.round(LEAST_CONSTANT_S * rateHz)));
  let [index, column, inColumn] = [0, 0, 0];
  let previous = Number.NaN;
  let [low, high, sum, squares] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 0, 0];

  function closeColumn(): void {
    const whole = !Number.isNaN(sum);
    lows.put(column, whole ? low : Number.NaN);
    highs.put(column, whole ? high : Number.NaN);
    means.put(column, sum / samplesPerColumn);
    roughs.put(column, whole ? Math.sqrt(squares / samplesPerColumn) : Number.NaN);
    column += 1;
    inColumn = 0;
    [low, high, sum, squares] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 0, 0];
  }

  return {
    push(block) {
      for (let i = 0; i < block.length; i += 1) {
        const value = block[i];
        const step = value - previous;
        if (value < low) low = value;
        if (value > high) high = value;
        sum += value;
        if (!Number.isNaN(step)) squares += step * step;
        if (Number.isNaN(value)) missing.open(index);
        else if (missing.isOpen) missing.close(index);
        if (value <= railLow || value >= railHigh) railed.open(index);
        else if (railed.isOpen) railed.close(index);
        if (step === 0) constant.open(index);
        else if (constant.isOpen) constant.close(index);
        previous = value;
        index += 1;
        inColumn += 1;
        if (inColumn === samplesPerColumn) closeColumn();
      }
    },
    finish() {
      return {
        samplesPerColumn,
        columnS: samplesPerColumn / rateHz,
        count: column,
        low: lows.take(column),
        high: highs.take(column),
        mean: means.take(column),
        roughness: roughs.take(column),
        sampleCount: index,
        missing: missing.finish(index),
        railed: railed.finish(index),
        constant: constant.finish(index),
      };
    },
  };
}
