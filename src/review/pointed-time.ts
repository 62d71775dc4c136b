import type { TimePlace } from './gestures';
import type { PaneStores } from './row-view';
import { type SnapPlace, snapPlaces, snapTo } from './snap';
import type { Moved } from './view-store';

const SNAP_PX = 6;

/** What the open study offers to snap to. */
export function placesOf({ analysis, session }: PaneStores): readonly SnapPlace[] {
  return snapPlaces(
    analysis.getState().recording?.annotations ?? [],
    session.getState().session?.state.events ?? [],
  );
}

/** The time that a pointer means; `free` while a key is held that keeps it from snapping. */
export type Pointing = (x: number, free: boolean) => Moved;

/**
 * A way to read a pointer over a drawing: the time of an annotation or event within 6 px, else the time under it as `round` makes
 * it.
 */
export function pointing(
  stores: PaneStores,
  place: TimePlace,
  round: (atS: number) => number,
): Pointing {
  return (x, free) => {
    const atS = place.sAt(x);
    const reachS = place.sAt(SNAP_PX) - place.sAt(0);
    const found = free ? null : snapTo(placesOf(stores), atS, reachS);
    return found ? { atS: found.atS, snap: found.text } : { atS: round(atS), snap: null };
  };
}
