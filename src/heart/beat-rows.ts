/** The rows shapes are learned from: the shape band about each beat, and how two are compared. */

/** The shape band about each beat, with room to both sides. */
export interface Rows {
  readonly rows: readonly Float64Array[];
  /** RMS of the window between beats, per row. */
  readonly noise: readonly number[];
  /** Half of the window compared, half of a row, and how far a window may be moved. */
  readonly half: number;
  readonly rowHalf: number;
  readonly lag: number;
  /** Latest place of a T wave after its beat, in samples. */
  readonly latest: number;
  /** Median RR in samples. */
  readonly usualRr: number;
  /** Median of two RR intervals together, in samples. */
  readonly pairRr: number;
  /** Samples stepped over when two windows are compared. */
  readonly step: number;
}

export interface Match {
  readonly value: number;
  readonly at: number;
}

/**
 * Likeness (normalised correlation, -1 to 1) of a row to an average, greatest over the places from `first` to `last` of the
 * average's start in the row.
 */
export function likeness(
  row: Float64Array,
  average: Float64Array,
  first: number,
  last: number,
  step: number,
): Match {
  let value = -1;
  let at = first;
  for (let place = first; place <= last; place += step) {
    let product = 0;
    let rowPower = 1e-30;
    let power = 1e-30;
    for (let i = 0, j = place; i < average.length; i += step, j += step) {
      product += average[i] * row[j];
      rowPower += row[j] * row[j];
      power += average[i] * average[i];
    }
    const here = product / Math.sqrt(rowPower * power);
    if (here > value) {
      value = here;
      at = place;
    }
  }
  return { value, at };
}

/** A shape while it is learned: the sum of its beats' rows, aligned. */
export interface Growing {
  readonly sum: Float64Array;
  count: number;
  /** Started by a beat that was not clear of noise: only beats very like it may join. */
  readonly strict: boolean;
}

/** The 2 half + 1 samples in the middle of a row. */
export const middle = (row: Float64Array, half: number) =>
  row.subarray((row.length - 1) / 2 - half, (row.length + 1) / 2 + half);

/** The middle of a sum, found in a row near the row's middle. */
export function matchMiddle(row: Float64Array, sum: Float64Array, rows: Rows, step: number): Match {
  const { half, rowHalf, lag } = rows;
  return likeness(row, middle(sum, half), rowHalf - half - lag, rowHalf - half + lag, step);
}

/** Root of the mean of squares. */
export function rms(x: Float64Array): number {
  let sum = 0;
  for (const value of x) sum += value * value;
  return Math.sqrt(sum / x.length);
}
