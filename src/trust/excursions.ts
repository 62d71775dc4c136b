import { type Interval, joinIntervals } from '../recording/span';

/** Columns [from, to). */
export interface Excursion {
  readonly from: number;
  readonly to: number;
}

/**
 * Stretches where x rises above `enter` and stays above `leave` (hysteresis; leave <= enter), both given for each column;
 * NaN of x is neither above nor below: it carries a stretch on but begins none.
 */
export function excursionsAbove(
  x: ArrayLike<number>,
  enter: ArrayLike<number>,
  leave: ArrayLike<number>,
): readonly Excursion[] {
  const found: Excursion[] = [];
  let from = -1;
  let entered = false;
  for (let i = 0; i <= x.length; i += 1) {
    const isUp = i < x.length && (x[i] > leave[i] || (from >= 0 && Number.isNaN(x[i])));
    if (isUp) {
      if (from < 0) from = i;
      if (x[i] > enter[i]) entered = true;
      continue;
    }
    if (from >= 0 && entered) found.push({ from, to: i });
    from = -1;
    entered = false;
  }
  return found;
}

/** Intervals made longer by `padS` at both ends (shorter where negative) and joined where less than `nearS` parts them. */
export function paddedAndJoined(
  intervals: readonly Interval[],
  padS: number,
  nearS: number,
): readonly Interval[] {
  const reach = padS + nearS / 2;
  return joinIntervals(
    intervals
      .filter((one) => one.toS - one.fromS + 2 * padS > 0)
      .map(({ fromS, toS }) => ({ fromS: fromS - reach, toS: toS + reach })),
  ).map(({ fromS, toS }) => ({ fromS: fromS + nearS / 2, toS: toS - nearS / 2 }));
}
