import type { BaseColumns } from './base-columns';
import type { Run } from './runs';

/** A lead stops at an end when it stays within this share of its whole range from it. */
const AT_END = 0.002;
/** So many stops at one value make it an end of the amplifier's range, or one of so many columns of 0.1 s (more is a flat line). */
const LEAST_STOPS = 2;
const LEAST_COLUMNS = 2;
const MOST_COLUMNS = 50;

/**
 * Runs at which an amplifier was driven to its limit within the digitiser's range: the lead jumps to its own greatest or
 * least value and stops dead there. One short stop may be chance.
 */
export function flatTops({ low, high, stopped, samplesPerColumn }: BaseColumns): readonly Run[] {
  let [least, most] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (let i = 0; i < low.length; i += 1) {
    if (low[i] < least) least = low[i];
    if (high[i] > most) most = high[i];
  }
  const near = AT_END * (most - least);
  return [least, most].flatMap((end) => {
    const at = stopped.filter(({ valueUv }) => Math.abs(valueUv - end) <= near);
    const isLong = at.some(({ from, to }) => {
      const columns = (to - from) / samplesPerColumn;
      return columns >= LEAST_COLUMNS && columns <= MOST_COLUMNS;
    });
    return at.length >= LEAST_STOPS || isLong ? at : [];
  });
}
