import type { Annotation } from '../recording/recording';
import type { TimedNote } from '../session/document';

/** A time that edges of phases and spans take when they are moved near it, and what happened there. */
export interface SnapPlace {
  readonly atS: number;
  readonly text: string;
}

/** Begin and end of the file's annotations, and the reviewers' events: each once, in the order of time. */
export function snapPlaces(
  annotations: readonly Annotation[],
  events: readonly Pick<TimedNote, 'atS' | 'text'>[],
): readonly SnapPlace[] {
  const all = [
    ...annotations.flatMap(({ onsetS, durationS, text }) => [
      { atS: onsetS, text },
      ...(durationS ? [{ atS: onsetS + durationS, text: `end of ${text}` }] : []),
    ]),
    ...events.map(({ atS, text }) => ({ atS, text })),
  ];
  const known = new Set<string>();
  return all
    .filter(({ atS, text }) => {
      const key = `${atS} ${text}`;
      return !known.has(key) && known.add(key);
    })
    .sort((a, b) => a.atS - b.atS);
}

/** The place nearest to a time within `reachS`, the earlier of two as near; null where none is. */
export function snapTo(
  places: readonly SnapPlace[],
  atS: number,
  reachS: number,
): SnapPlace | null {
  return places.reduce<SnapPlace | null>((best, one) => {
    const away = Math.abs(one.atS - atS);
    const nearer = best === null || away < Math.abs(best.atS - atS);
    return away <= reachS && nearer ? one : best;
  }, null);
}

/** The next place after a time (`way` 1) or before it (-1); null where there is none. */
export function nextPlace(
  places: readonly SnapPlace[],
  atS: number,
  way: 1 | -1,
): SnapPlace | null {
  const beyond = places.filter((one) => (one.atS - atS) * way > 1e-6);
  return (way > 0 ? beyond.at(0) : beyond.at(-1)) ?? null;
}
