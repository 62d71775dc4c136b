/** Part of a framed slot under the pointer. */
export type SlotPart = 'left' | 'right' | 'body';

const EDGE_PX = 6;

/**
 * Which part of a slot from `leftPx` to `rightPx` lies under x, or null. Edges reach 6 px to both sides; of a slot too narrow
 * for that, the inside (with 2 px around) moves it and the 6 px beyond widen it.
 */
export function slotPart(x: number, leftPx: number, rightPx: number): SlotPart | null {
  const narrow = rightPx - leftPx < 4 * EDGE_PX;
  const inner = narrow ? 2 : -EDGE_PX;
  const outer = narrow ? 2 + EDGE_PX : EDGE_PX;
  if (x < leftPx - outer || x > rightPx + outer) return null;
  if (x < leftPx - inner) return 'left';
  if (x > rightPx + inner) return 'right';
  return 'body';
}

/** Index of the place nearest to x within `reachPx`, or null; the earlier one of two equally near. */
export function nearestWithin(
  x: number,
  places: ArrayLike<number>,
  reachPx: number,
): number | null {
  let best: number | null = null;
  let distance = reachPx;
  for (let i = 0; i < places.length; i += 1) {
    const away = Math.abs(places[i] - x);
    if (away < distance || (away === distance && best === null)) {
      best = i;
      distance = away;
    }
  }
  return best;
}

/** Which end of a stretch lies within 6 px of x, or null; of two, the nearer. */
export function endNear(x: number, leftPx: number, rightPx: number): 'left' | 'right' | null {
  const left = Math.abs(x - leftPx);
  const right = Math.abs(x - rightPx);
  if (Math.min(left, right) > EDGE_PX) return null;
  return left <= right ? 'left' : 'right';
}
