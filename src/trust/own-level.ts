import { runningQuantile } from '../numeric/running-quantile';
import { median } from '../numeric/statistics';

/** Columns that enter the level: every so many, since neighbours say the same. */
const EVERY = 10;
/** A stretch that is spoiled for longer than the window must not become the recording's own level. */
const MOST_OVER_WHOLE = 3;

/**
 * The recording's own running level of a measure: its median within halfWindow columns of each, never below `floor` and
 * never above three times the median of the whole, NaN left out. As long as x.
 */
export function ownLevel(x: Float64Array, halfWindow: number, floor: number): Float64Array {
  const thinned = x.filter((value, i) => i % EVERY === 0 && !Number.isNaN(value));
  const whole = thinned.length > 0 ? median(thinned) : 0;
  const most = Math.max(floor, MOST_OVER_WHOLE * whole);
  const running = runningQuantile(x, 2 * halfWindow + 1, 0.5, EVERY);
  return running.map((value) =>
    Math.min(most, Math.max(floor, Number.isNaN(value) ? whole : value)),
  );
}
