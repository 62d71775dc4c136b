import { firstAtOrAfter } from '../numeric/first-at-or-after';
import type { RrSeries } from '../recording/heart-series';
import type { Interval } from '../recording/span';

/** Figures of the NN intervals that end in one minute; null where there are none to make them of. */
export interface MinuteOfHeart {
  readonly heartRateBpm: number | null;
  readonly rmssdMs: number | null;
}

/**
 * Heart rate (60000 / mean NN) and RMSSD (Task Force 1996) of the intervals that end in [fromS, fromS + 60). A pair counts
 * for RMSSD where both are NN, both end in the minute and outside the `irregular` stretches, and they share a beat.
 */
export function minuteOfHeart(
  rr: RrSeries,
  fromS: number,
  irregular: readonly Interval[],
): MinuteOfHeart {
  const near = irregular.filter((one) => one.fromS < fromS + 60 && one.toS > fromS);
  const lies = (timeS: number) => near.some((one) => one.fromS <= timeS && timeS < one.toS);
  let sum = 0;
  let count = 0;
  let squares = 0;
  let pairs = 0;
  for (let i = firstAtOrAfter(rr.timesS, fromS); i < rr.timesS.length; i += 1) {
    if (rr.timesS[i] >= fromS + 60) break;
    if (rr.nn[i] !== 1) continue;
    sum += rr.rrMs[i];
    count += 1;
    if (i === 0 || rr.nn[i - 1] !== 1 || rr.timesS[i - 1] < fromS || !shareBeat(rr, i)) continue;
    if (lies(rr.timesS[i]) || lies(rr.timesS[i - 1])) continue;
    squares += (rr.rrMs[i] - rr.rrMs[i - 1]) ** 2;
    pairs += 1;
  }
  return {
    heartRateBpm: count > 0 ? 60000 / (sum / count) : null,
    rmssdMs: pairs > 0 ? Math.sqrt(squares / pairs) : null,
  };
}

/** Whether interval i begins at the beat that ends the one before; times are compared to the microsecond. */
const shareBeat = (rr: RrSeries, i: number): boolean =>
  Math.abs(rr.timesS[i] - rr.timesS[i - 1] - rr.rrMs[i] / 1000) < 1e-6;
