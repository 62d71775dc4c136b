import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { BEAT_CLASSES, type BeatList, firstBeatAt } from '../recording/beat';
import type { Interval } from '../recording/span';
import { type Decided, expectedWrong } from './place-odds';

/** Beats can be read where fewer than one in five is expected to be wrong; a short stretch counts as so many beats. */
const MOST_WRONG = 0.2;
const FEWEST = 2;
const UNUSABLE = BEAT_CLASSES.indexOf('Q');
/** A stretch as long as so many usual intervals holds at least this part of the beats that they make. */
const HOLDS_INTERVALS = 2.2;
const LEAST_BEATS = 0.5;

/** Nor can they where more than this share of what was found fits neither a shape nor the rhythm, of at least so many. */
const MOST_MISFITS = 0.35;
const FEWEST_MISFITS = 5;

/** Whether what was found in a stretch of the study is no reading of it: too much of it is class Q. */
export function isMisread({ fromS, toS }: Interval, beats: BeatList, ticksPerS: number): boolean {
  const from = firstBeatAt(beats, fromS * ticksPerS);
  const to = firstBeatAt(beats, toS * ticksPerS);
  const misfits = beats.classes.subarray(from, to).filter((one) => one === UNUSABLE).length;
  return misfits >= FEWEST_MISFITS && misfits > MOST_MISFITS * (to - from);
}

/**
 * Whether beats (s, ascending) can be read in each of some stretches, by what was found there: few are to be expected too many or
 * missed, and it is not all but empty of beats that the rhythm about it lets expect. True where there is nothing to go wrong.
 */
export function legibleStretches(
  stretches: readonly Interval[],
  beatsS: readonly number[],
  decided: Decided,
  usualRrS: (timeS: number) => number,
): boolean[] {
  return stretches.map(({ fromS, toS }) => {
    const count = Math.max(0, firstAtOrAfter(beatsS, toS) - firstAtOrAfter(beatsS, fromS));
    const expected = (toS - fromS) / usualRrS(fromS);
    if (expected > HOLDS_INTERVALS && count < LEAST_BEATS * expected) return false;
    return expectedWrong(decided, fromS, toS) < MOST_WRONG * Math.max(FEWEST, count);
  });
}
