import type { Seconds } from '../units/time';

/** Beats within this time of each other can be the same beat (ANSI/AAMI EC57). */
export const MATCH_WITHIN_S: Seconds = 0.15;

/** What two lists of beats have in common, by index. */
export interface BeatMatching {
  /** Pairs [first, second] in ascending order of the first. */
  readonly pairs: readonly (readonly [first: number, second: number])[];
  readonly onlyFirst: readonly number[];
  readonly onlySecond: readonly number[];
}

/** A rounding of times read from ticks must not part what lies exactly at the limit. */
const ROUNDING_S = 1e-9;

/**
 * Beats of two lists matched one to one, nearest first, within `withinS` (times in s, ascending; ANSI/AAMI EC57). Of pairs
 * equally near the one whose first beat is earlier counts.
 */
export function matchBeats(
  first: ArrayLike<Seconds>,
  second: ArrayLike<Seconds>,
  withinS: Seconds = MATCH_WITHIN_S,
): BeatMatching {
  const reach = withinS + ROUNDING_S;
  const near: { readonly a: number; readonly b: number; readonly apart: Seconds }[] = [];
  for (let a = 0, from = 0; a < first.length; a += 1) {
    while (from < second.length && second[from] < first[a] - reach) from += 1;
    for (let b = from; b < second.length && second[b] <= first[a] + reach; b += 1)
      near.push({ a, b, apart: Math.abs(second[b] - first[a]) });
  }
  near.sort((x, y) => x.apart - y.apart || x.a - y.a || x.b - y.b);
  const partners = new Map<number, number>();
  const taken = new Set<number>();
  for (const { a, b } of near) {
    if (partners.has(a) || taken.has(b)) continue;
    partners.set(a, b);
    taken.add(b);
  }
  return {
    pairs: [...partners].sort(([x], [y]) => x - y),
    onlyFirst: indexesWithout(first.length, partners),
    onlySecond: indexesWithout(second.length, taken),
  };
}

const indexesWithout = (
  length: number,
  left: { readonly has: (index: number) => boolean },
): readonly number[] => Array.from({ length }, (_, i) => i).filter((i) => !left.has(i));
