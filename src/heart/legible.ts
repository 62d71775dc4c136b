import type { Interval } from '../recording/span';
import { type Decided, expectedWrong } from './place-odds';

/** Beats can be read where fewer than one in twenty is expected to be wrong; a short stretch counts as so many beats. */
const MOST_WRONG = 0.2;
const FEWEST = 2;

/**
 * Whether beats (s) can be read in each of some stretches, by what was found there: few are to be expected too many or
 * missed. True where there is nothing to go wrong.
 */
export function legibleStretches(
  stretches: readonly Interval[],
  beatsS: readonly number[],
  decided: Decided,
): boolean[] {
  return stretches.map(({ fromS, toS }) => {
    const count = beatsS.filter((s) => s >= fromS && s < toS).length;
    return expectedWrong(decided, fromS, toS) < MOST_WRONG * Math.max(FEWEST, count);
  });
}
