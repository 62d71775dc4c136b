import type { Span } from '../recording/span';
import { dragEnd, panBy, type WindowName, zoomAt } from './navigate';
import type { Gesture } from './stage';
import { lookAtMinutes, lookAtSeconds, type ViewStore } from './view-store';

/** A drawing's way between pixels and time. */
export interface TimePlace {
  readonly xOf: (atS: number) => number;
  readonly sAt: (x: number) => number;
}

const lookAt = { minutes: lookAtMinutes, seconds: lookAtSeconds } as const;

/** Puts both windows back where they were. */
function restorer(store: ViewStore): () => void {
  const { minutes, seconds } = store.getState();
  return () => store.setState({ minutes, seconds });
}

/** Drags the time under the pointer along. */
export function panGesture(
  store: ViewStore,
  name: WindowName,
  place: TimePlace,
  startX: number,
  click: (x: number) => void,
): Gesture {
  const grabbed = place.sAt(startX);
  return {
    cursor: 'grabbing',
    move: (x) => panBy(store, name, grabbed - place.sAt(x)),
    click,
    cancel: restorer(store),
  };
}

/** Moves the window that a slot stands for. */
export function slotGesture(
  store: ViewStore,
  name: WindowName,
  place: TimePlace,
  startX: number,
  click: (x: number) => void,
): Gesture {
  const { fromS, toS } = store.getState()[name];
  const offset = (fromS + toS) / 2 - place.sAt(startX);
  return {
    cursor: 'grabbing',
    move: (x) => lookAt[name](store, place.sAt(x) + offset),
    click,
    cancel: restorer(store),
  };
}

/** Widens or narrows the window that a slot stands for. */
export function slotEdgeGesture(
  store: ViewStore,
  name: WindowName,
  end: 'left' | 'right',
  place: TimePlace,
  startX: number,
): Gesture {
  const { fromS, toS } = store.getState()[name];
  const offset = (end === 'left' ? fromS : toS) - place.sAt(startX);
  return {
    cursor: 'ew-resize',
    move: (x) => dragEnd(store, name, end, place.sAt(x) + offset),
    cancel: restorer(store),
  };
}

/** A time kept inside what a pane shows: nobody excludes what they do not see. */
function insideWindow(store: ViewStore, name: WindowName, atS: number): number {
  const { fromS, toS } = store.getState()[name];
  return Math.min(Math.max(fromS, atS), toS);
}

/** Draws a new spoiled span from where the press began. */
export function drawSpanGesture(
  store: ViewStore,
  name: WindowName,
  place: TimePlace,
  startX: number,
  done: (fromS: number, toS: number) => void,
  click: (x: number) => void,
): Gesture {
  const anchor = insideWindow(store, name, place.sAt(startX));
  const stretch = (x: number) => {
    const other = insideWindow(store, name, place.sAt(x));
    return { fromS: Math.min(anchor, other), toS: Math.max(anchor, other) };
  };
  const clear = () => store.setState({ draft: null });
  return {
    cursor: 'crosshair',
    move: (x) => store.setState({ draft: { ...stretch(x), spanId: null } }),
    drop: (x) => {
      clear();
      const { fromS, toS } = stretch(x);
      if (toS > fromS) done(fromS, toS);
    },
    click,
    cancel: clear,
  };
}

const LEAST_SPAN_S = 0.1;

/** Drags one end of a spoiled span. */
export function spanEndGesture(
  store: ViewStore,
  name: WindowName,
  place: TimePlace,
  span: Span,
  end: 'left' | 'right',
  done: (fromS: number, toS: number) => void,
): Gesture {
  const stretch = (x: number) => {
    const at = insideWindow(store, name, place.sAt(x));
    return end === 'left'
      ? { fromS: Math.min(at, span.toS - LEAST_SPAN_S), toS: span.toS }
      : { fromS: span.fromS, toS: Math.max(at, span.fromS + LEAST_SPAN_S) };
  };
  const clear = () => store.setState({ draft: null });
  return {
    cursor: 'ew-resize',
    move: (x) => store.setState({ draft: { ...stretch(x), spanId: span.id } }),
    drop: (x) => {
      clear();
      const { fromS, toS } = stretch(x);
      done(fromS, toS);
    },
    cancel: clear,
  };
}

const ZOOM_PER_PX = 0.0015;

/** Wheel: zooms about the pointer; with shift, or rolled sideways, pans. */
export function wheelOver(
  store: ViewStore,
  name: WindowName,
  place: TimePlace,
  x: number,
  event: Pick<WheelEvent, 'deltaX' | 'deltaY' | 'deltaMode' | 'shiftKey'>,
): void {
  const linePx = event.deltaMode === 1 ? 16 : event.deltaMode === 2 ? 400 : 1;
  const dx = event.deltaX * linePx;
  const dy = event.deltaY * linePx;
  if (event.shiftKey || Math.abs(dx) > Math.abs(dy)) {
    const byPx = Math.abs(dx) > Math.abs(dy) ? dx : dy;
    panBy(store, name, place.sAt(byPx) - place.sAt(0));
    return;
  }
  const turn = Math.min(400, Math.max(-400, dy)) * ZOOM_PER_PX;
  zoomAt(store, name, place.sAt(x), turn >= 0 ? 1 + turn : 1 / (1 - turn));
}
