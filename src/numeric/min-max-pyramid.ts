import { emptyColumns, type MinMaxColumns, setColumn } from './min-max-columns';

/** Base of the pyramid in seconds; each level above joins LEVEL_FACTOR columns of the one below. */
export const PYRAMID_BASE_S = 0.1;
const LEVEL_FACTOR = 4;

interface Level {
  readonly columnS: number;
  readonly low: Float32Array;
  readonly high: Float32Array;
}

/** Least and greatest values of a long signal at several widths, so that hours draw as fast as minutes. */
export interface MinMaxPyramid {
  readonly baseS: number;
  /** Columns for [fromS, toS) from the coarsest level at most half as wide as the columns asked for. */
  columns(fromS: number, toS: number, columns: number): MinMaxColumns;
}

/** Builds a pyramid from blocks of samples pushed in order; NaN samples are left out. */
export interface PyramidBuilder {
  push(block: ArrayLike<number>): void;
  finish(): MinMaxPyramid;
}

/** A builder for a signal at `rateHz` (above 0) with a base column of `baseS` seconds or one sample, whichever is longer. */
export function createPyramidBuilder(rateHz: number, baseS = PYRAMID_BASE_S): PyramidBuilder {
  if (!(rateHz > 0)) throw new RangeError('a pyramid wants a rate above 0');
  const columnS = Math.max(baseS, 1 / rateHz);
  const lows: number[] = [];
  const highs: number[] = [];
  let sample = 0;
  let column = 0;
  let nextSample = Math.ceil(columnS * rateHz - 1e-9);
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  const close = () => {
    lows.push(low <= high ? low : Number.NaN);
    highs.push(low <= high ? high : Number.NaN);
    low = Number.POSITIVE_INFINITY;
    high = Number.NEGATIVE_INFINITY;
    column += 1;
    nextSample = Math.ceil((column + 1) * columnS * rateHz - 1e-9);
  };
  return {
    push(block) {
      for (let i = 0; i < block.length; i += 1) {
        if (sample >= nextSample) close();
        const value = block[i];
        if (value < low) low = value;
        if (value > high) high = value;
        sample += 1;
      }
    },
    finish() {
      close();
      return pyramidOf({ columnS, low: Float32Array.from(lows), high: Float32Array.from(highs) });
    },
  };
}

function pyramidOf(base: Level): MinMaxPyramid {
  const levels = [base];
  for (let below = base; below.low.length > LEVEL_FACTOR; below = levels[levels.length - 1])
    levels.push(levelAbove(below));
  return {
    baseS: base.columnS,
    columns(fromS, toS, columns) {
      const widthS = (toS - fromS) / columns;
      const level = levels.findLast((one) => 2 * one.columnS <= widthS) ?? base;
      return joinColumns(level, fromS, toS, columns);
    },
  };
}

function levelAbove(below: Level): Level {
  const length = Math.ceil(below.low.length / LEVEL_FACTOR);
  const above = {
    columnS: below.columnS * LEVEL_FACTOR,
    low: new Float32Array(length),
    high: new Float32Array(length),
  };
  for (let i = 0; i < length; i += 1) {
    const range = rangeOver(below, i * LEVEL_FACTOR, (i + 1) * LEVEL_FACTOR);
    above.low[i] = range.low <= range.high ? range.low : Number.NaN;
    above.high[i] = range.low <= range.high ? range.high : Number.NaN;
  }
  return above;
}

function rangeOver(level: Level, from: number, to: number): { low: number; high: number } {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = Math.max(0, from); i < Math.min(level.low.length, to); i += 1) {
    if (level.low[i] < low) low = level.low[i];
    if (level.high[i] > high) high = level.high[i];
  }
  return { low, high };
}

function joinColumns(level: Level, fromS: number, toS: number, columns: number): MinMaxColumns {
  const out = emptyColumns(fromS, toS, columns);
  const widthS = (toS - fromS) / columns;
  const startingAfter = (seconds: number) => Math.ceil(seconds / level.columnS - 1e-9);
  const holding = (seconds: number) => Math.floor(seconds / level.columnS + 1e-9);
  for (let i = 0; i < columns; i += 1) {
    const leftS = fromS + i * widthS;
    const to = Math.max(startingAfter(leftS + widthS), holding(leftS) + 1);
    const from = i === 0 ? holding(leftS) : Math.min(startingAfter(leftS), to - 1);
    const { low, high } = rangeOver(level, from, to);
    setColumn(out, i, low, high);
  }
  return out;
}
