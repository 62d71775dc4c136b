import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** Rows laid on an even grid of samples. */
export interface EvenGrid {
  readonly rateHz: Hertz;
  /** Grid place of each row, ascending from 0; null where rows follow one another without a jump. */
  readonly places: Float64Array | null;
  readonly length: number;
  /** Largest distance of a row from its place. */
  readonly jitterS: Seconds;
}

/** Why times lie on no even grid; `row` is an index from 0. */
export type GridFault =
  | { readonly kind: 'not-rising'; readonly row: number }
  | {
      readonly kind: 'uneven';
      readonly row: number;
      readonly stepS: Seconds;
      readonly usualS: Seconds;
    }
  | { readonly kind: 'huge-jump'; readonly row: number; readonly jumpS: Seconds }
  | { readonly kind: 'too-few' };

/** Gaps may hold at most this many times the rows that are there. */
const MOST_GAP = 20;
const SPARE_PLACES = 100_000;
/** Share of rows that may follow a jump before spacing counts as uneven. */
const MOST_JUMPS = 0.02;

/**
 * The even grid that ascending times lie on. The step is the mean of the steps that are within half of their median; a rate
 * within the times' own scatter of a whole number of hertz becomes that number; a longer step is a jump, filled with empty
 * places. Returns what is wrong where there is no such grid.
 */
export function evenGrid(timesS: Float64Array): EvenGrid | GridFault {
  if (timesS.length < 3) return { kind: 'too-few' };
  for (let row = 1; row < timesS.length; row += 1)
    if (!(timesS[row] > timesS[row - 1])) return { kind: 'not-rising', row };
  const usualS = usualStep(timesS);
  const exact = layOut(timesS, 1 / usualS);
  if ('kind' in exact) return exact;
  const spanS = timesS[timesS.length - 1] - timesS[0];
  const tolerance = Math.max(1e-9, (2 * exact.jitterS) / spanS);
  const whole = Math.round(exact.rateHz);
  const isWhole = whole > 0 && Math.abs(exact.rateHz - whole) <= tolerance * whole;
  const snapped = isWhole ? layOut(timesS, whole) : exact;
  return 'kind' in snapped ? exact : snapped;
}

export function isGridFault(grid: EvenGrid | GridFault): grid is GridFault {
  return 'kind' in grid;
}

/** Mean of the steps up to one and a half times their median. */
function usualStep(timesS: Float64Array): Seconds {
  const first = timesS.subarray(0, Math.min(timesS.length, 10_001));
  const steps = Float64Array.from(first.subarray(1), (time, i) => time - first[i]).sort();
  const median = steps[Math.floor(steps.length / 2)];
  let sum = 0;
  let count = 0;
  for (let row = 1; row < timesS.length; row += 1) {
    const step = timesS[row] - timesS[row - 1];
    if (step > 1.5 * median) continue;
    sum += step;
    count += 1;
  }
  return sum / count;
}

/** Lays rows on places of a rate; after a jump the places count on from the nearest one. */
function layOut(timesS: Float64Array, rateHz: Hertz): EvenGrid | GridFault {
  const places = new Float64Array(timesS.length);
  let jumps = 0;
  let jitter = 0;
  for (let row = 1; row < timesS.length; row += 1) {
    const exact = (timesS[row] - timesS[0]) * rateHz;
    places[row] = Math.round(exact);
    const stepS = timesS[row] - timesS[row - 1];
    const advance = places[row] - places[row - 1];
    if (advance < 1) return { kind: 'uneven', row, stepS, usualS: 1 / rateHz };
    if (advance > 1) jumps += 1;
    if (places[row] > MOST_GAP * timesS.length + SPARE_PLACES)
      return { kind: 'huge-jump', row, jumpS: stepS };
    if (jumps > Math.max(3, MOST_JUMPS * timesS.length))
      return { kind: 'uneven', row, stepS, usualS: 1 / rateHz };
    jitter = Math.max(jitter, Math.abs(exact - places[row]));
  }
  return {
    rateHz,
    places: jumps > 0 ? places : null,
    length: places[places.length - 1] + 1,
    jitterS: jitter / rateHz,
  };
}
