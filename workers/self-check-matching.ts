import { matchBeats } from '../src/session/match-beats';
import { type CheckValue, EXACT } from './check-value';

/** Matched beats and those of one list only, of one beat at 1 s and another. */
function countsOf(atS: number): number[] {
  const { pairs, onlyFirst, onlySecond } = matchBeats([1], [atS]);
  return [pairs.length, onlyFirst.length, onlySecond.length];
}

/** How beats of two lists are matched. */
export const MATCHING_CHECKS: readonly CheckValue[] = [
  {
    id: 'CV-45',
    what: 'A beat at 1.000 s and one at 1.149 s, at 1.151 s: matched, only in the first, only in the second',
    source: 'ANSI/AAMI EC57 (150 ms)',
    expected: [1, 0, 0, 0, 1, 1],
    tolerance: EXACT,
    got: () => [...countsOf(1.149), ...countsOf(1.151)],
  },
];
