import type { Interval } from '../recording/span';
import { formatClock } from '../units/time';

/** One thing that two states hold differently, in words. */
export interface Difference {
  /** What it is: "fed", "heart lead", "beat V at 0:12:31.204". */
  readonly what: string;
  /** How it was and how it is; null where it was not there, or is there no more. */
  readonly from: string | null;
  readonly to: string | null;
  /** Where the panes show it; null where it has no place. */
  readonly place: Interval | null;
}

/** "epoch: 240 s → 300 s", "beat N at 0:00:12.204 added", "event removed: 0:30:00 “drank 200 ml”". */
export function differenceWords({ what, from, to }: Difference): string {
  const after = (words: string | null) => (words ? `: ${words}` : '');
  if (from === null) return `${what} added${after(to)}`;
  if (to === null) return `${what} removed${after(from)}`;
  return `${what}: ${from} → ${to}`;
}

/** The difference seen from the other side. */
export const turned = ({ from, to, ...rest }: Difference): Difference => ({
  ...rest,
  from: to,
  to: from,
});

/** From the start of the first place to the end of the last; null where none has a place. */
export function placeOfAll(differences: readonly Difference[]): Interval | null {
  const places = differences.flatMap(({ place }) => (place ? [place] : []));
  if (places.length === 0) return null;
  return {
    fromS: places.reduce((least, { fromS }) => Math.min(least, fromS), places[0].fromS),
    toS: places.reduce((most, { toS }) => Math.max(most, toS), places[0].toS),
  };
}

/** "0:18:00–0:18:40", with tenths where whole seconds would say something else. */
export function stretchOf({ fromS, toS }: Interval): string {
  const decimals = Number.isInteger(fromS) && Number.isInteger(toS) ? 0 : 1;
  return `${formatClock(fromS, decimals)}–${formatClock(toS, decimals)}`;
}

/** A text as it is quoted in a line: cut where it is long, "empty" where there is none. */
export function quoted(text: string): string {
  const line = text.replaceAll(/\s+/g, ' ').trim();
  if (line === '') return 'empty';
  return `“${line.length > 160 ? `${line.slice(0, 159)}…` : line}”`;
}

/** How the rows of a list are told apart and put in words. */
interface RowWords<T> {
  /** The same for one row before and after. */
  readonly key: (row: T) => string | number;
  readonly what: (row: T) => string;
  /** All that is said of it beside that. */
  readonly words: (row: T) => string;
  readonly place: (row: T) => Interval;
  /** Where a row that is there before and after differs; its place after where left out. */
  readonly moved?: (was: T, row: T) => Interval;
}

/** Rows of two lists that are there only before, only after, or read otherwise. */
export function listDifferences<T>(
  before: readonly T[],
  after: readonly T[],
  { key, what, words, place, moved }: RowWords<T>,
): readonly Difference[] {
  const old = new Map(before.map((row) => [key(row), row]));
  const left = new Map(after.map((row) => [key(row), row]));
  const gone = before.filter((row) => !left.has(key(row)));
  const others = after.flatMap((row): readonly Difference[] => {
    const was = old.get(key(row));
    const to = words(row);
    if (!was) return [{ what: what(row), from: null, to, place: place(row) }];
    const from = words(was);
    const where = moved ? moved(was, row) : place(row);
    return from === to ? [] : [{ what: what(row), from, to, place: where }];
  });
  return [
    ...gone.map((row) => ({ what: what(row), from: words(row), to: null, place: place(row) })),
    ...others,
  ];
}
