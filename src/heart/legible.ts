import type { Interval } from '../recording/span';
import { type Decided, expectedWrong } from './place-odds';

/** Beats can be read where fewer than one in twenty is expected to be wrong; a short stretch counts as so many beats. */
const MOST_WRONG = 0.2;
const FEWEST = 2;
/** An interval this much longer than the usual one is a pause, in which a beat may be hidden. */
const PAUSE = 1.4;

/**
 * Whether beats (s) can be read in each of some stretches, by what was found there: few are to be expected too many or
 * missed, and no pause reaches into it in which something loud (`isLoud` between two times) may hide a beat. True where there
 * is nothing to go wrong.
 */
export function legibleStretches(
  stretches: readonly Interval[],
  beatsS: readonly number[],
  decided: Decided,
  usualRrS: (timeS: number) => number,
  isLoud: (fromS: number, toS: number) => boolean,
): boolean[] {
  return stretches.map(({ fromS, toS }) => {
    const count = beatsS.filter((s) => s >= fromS && s < toS).length;
    if (expectedWrong(decided, fromS, toS) >= MOST_WRONG * Math.max(FEWEST, count)) return false;
    return !beatsS.some((endS, i) => {
      const startS = i > 0 ? beatsS[i - 1] : endS;
      const meets = startS < toS && endS > fromS;
      return meets && endS - startS > PAUSE * usualRrS(startS) && isLoud(startS, endS);
    });
  });
}
