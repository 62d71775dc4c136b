import type { Phase } from '../recording/phase';
import type { Span } from '../recording/span';
import { dragEnd, panBy, type WindowName, zoomAt } from './navigate';
import { movePhaseEdge, type PhaseEdge } from './phase-edges';
import type { Pointing } from './pointed-time';
import { moveSpanEnd, type SpanEnd } from './span-ends';
import type { Gesture } from './stage';
import { type Draft, lookAtMinutes, lookAtSeconds, type ViewStore } from './view-store';

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

/** Draws a new spoiled span from where the press began. */
export function drawSpanGesture(
  store: ViewStore,
  pointed: Pointing,
  startX: number,
  done: (fromS: number, toS: number) => void,
  click: (x: number) => void,
): Gesture {
  const anchor = pointed(startX, true).atS;
  const draft = (x: number, free: boolean): Draft => {
    const moved = pointed(x, free);
    const [fromS, toS] = [Math.min(anchor, moved.atS), Math.max(anchor, moved.atS)];
    return { fromS, toS, spanId: null, moved };
  };
  const clear = () => store.setState({ draft: null });
  return {
    cursor: 'crosshair',
    move: (x, _, free) => store.setState({ draft: draft(x, free) }),
    drop: (x, _, free) => {
      clear();
      const { fromS, toS } = draft(x, free);
      if (toS > fromS) done(fromS, toS);
    },
    click,
    cancel: clear,
  };
}

/** Drags one end of a spoiled span. */
export function spanEndGesture(
  store: ViewStore,
  pointed: Pointing,
  span: Span,
  end: SpanEnd,
  done: (fromS: number, toS: number) => void,
): Gesture {
  const clear = () => store.setState({ draft: null });
  return {
    cursor: 'ew-resize',
    move: (x, _, free) => store.setState({ draft: moveSpanEnd(span, end, pointed(x, free)) }),
    drop: (x, _, free) => {
      clear();
      const { fromS, toS } = moveSpanEnd(span, end, pointed(x, free));
      done(fromS, toS);
    },
    cancel: clear,
  };
}

/** Drags a border of a phase; the phases are changed in one step when it is let go. */
export function phaseEdgeGesture(
  store: ViewStore,
  pointed: Pointing,
  phases: readonly Phase[],
  edge: PhaseEdge,
  done: (phases: readonly Phase[]) => void,
): Gesture {
  const { durationS } = store.getState();
  const moved = (x: number, free: boolean) =>
    movePhaseEdge(phases, edge, pointed(x, free), durationS);
  const clear = () => store.setState({ phaseDraft: null });
  return {
    cursor: 'ew-resize',
    move: (x, _, free) => store.setState({ phaseDraft: moved(x, free) }),
    drop: (x, _, free) => {
      clear();
      done(moved(x, free).phases);
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
