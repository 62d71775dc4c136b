import type { Span } from '../recording/span';
import {
  drawSpanGesture,
  panGesture,
  phaseEdgeGesture,
  slotEdgeGesture,
  slotGesture,
  spanEndGesture,
  wheelOver,
} from './gestures';
import { endNear, slotPart } from './hit';
import type { PaneCommands } from './pane-commands';
import type { PaneKind, PaneView } from './pane-view';
import { edgeNear, type PhaseEdge } from './phase-edges';
import { type Pointing, pointing } from './pointed-time';
import { selectedSpan } from './span-commands';
import type { Gesture, StageActs } from './stage';
import { lookAtSeconds } from './view-store';

/** Minutes: phase names above, the Seconds slot inside. */
export const MINUTES: PaneKind = {
  name: 'minutes',
  title: 'Minutes',
  coarsest: 'h:mm',
  showsPhaseNames: true,
  drawn: placeSlot,
};

function placeSlot(view: PaneView): void {
  const { slot } = view.dom;
  if (!slot) return;
  const { seconds } = view.stores.view.getState();
  const left = view.xOf(seconds.fromS);
  slot.style.transform = `translateX(${left}px)`;
  slot.style.width = `${Math.max(2, view.xOf(seconds.toS) - left)}px`;
  slot.style.height = `${view.bottomPx}px`;
}

/** The spoiled span under a place, the shortest where several overlap. */
export function spanAt(view: PaneView, x: number): Span | null {
  const spans = view.stores.session.getState().session?.state.spans ?? [];
  const under = spans.filter((one) => view.xOf(one.fromS) - 1 <= x && x <= view.xOf(one.toS) + 1);
  return under.reduce<Span | null>(
    (best, one) => (best && best.toS - best.fromS <= one.toS - one.fromS ? best : one),
    null,
  );
}

/** Which end of the selected span lies under a place. */
export function selectedEndAt(view: PaneView, x: number): 'left' | 'right' | null {
  const span = selectedSpan(view.stores);
  return span && endNear(x, view.xOf(span.fromS), view.xOf(span.toS));
}

/** Rounds a drawn stretch to what the pointer can tell: whole seconds where a pixel is half a second or more, else tenths. */
export function roundStretch(view: PaneView, atS: number): number {
  const perPx = view.sAt(1) - view.sAt(0);
  const { durationS } = view.stores.view.getState();
  const rounded = perPx >= 0.5 ? Math.round(atS) : Math.round(atS * 10) / 10;
  return Math.min(rounded, durationS);
}

/** Reads the pointer over a pane: nobody excludes what they do not see, so a time stays inside what is shown. */
function pointedIn(view: PaneView): Pointing {
  const { fromS, toS } = view.window;
  return pointing(view.stores, view, (atS) =>
    roundStretch(view, Math.min(Math.max(fromS, atS), toS)),
  );
}

/** What a press does in any pane before its own drags: an end of the selected span, or a new span. */
export function spanGesture(
  view: PaneView,
  commands: PaneCommands,
  x: number,
  excludes: boolean,
  click: (x: number) => void,
): Gesture | null {
  const store = view.stores.view;
  const span = selectedSpan(view.stores);
  const end = selectedEndAt(view, x);
  if (span && end)
    return spanEndGesture(store, pointedIn(view), span, end, (fromS, toS) =>
      commands.changeSelectedSpan(end === 'left' ? { fromS } : { toS }),
    );
  if (!excludes) return null;
  return drawSpanGesture(store, pointedIn(view), x, commands.excludeRange, click);
}

/** The border of a phase under a place in the head of Minutes, where the phases' names stand. */
function borderAt(view: PaneView, x: number, y: number): PhaseEdge | null {
  const phases = view.stores.session.getState().session?.state.phases ?? [];
  return y < view.topPx ? edgeNear(phases, x, view.xOf) : null;
}

function borderGesture(view: PaneView, commands: PaneCommands, edge: PhaseEdge): Gesture {
  const phases = view.stores.session.getState().session?.state.phases ?? [];
  const pointed = pointing(view.stores, view, (atS) => roundStretch(view, atS));
  return phaseEdgeGesture(view.stores.view, pointed, phases, edge, commands.changePhases);
}

/** Selects the spoiled span under a place, or nothing. */
export function selectSpanAt(view: PaneView, commands: PaneCommands, x: number): void {
  const span = spanAt(view, x);
  if (span) commands.selectSpan(span.id);
  else commands.clearSelection();
}

/** How Minutes answers the pointer. */
export function minutesActs(view: PaneView, commands: PaneCommands): StageActs {
  const store = view.stores.view;
  const click = (x: number) => {
    selectSpanAt(view, commands, x);
    lookAtSeconds(store, view.sAt(x));
  };
  const slotAt = (x: number) => {
    const { seconds } = store.getState();
    return slotPart(x, view.xOf(seconds.fromS), view.xOf(seconds.toS));
  };
  return {
    press: (x, y, event) => {
      const edge = borderAt(view, x, y);
      if (edge) return borderGesture(view, commands, edge);
      const excludes = event.altKey || store.getState().tool === 'exclude';
      const spoiled = spanGesture(view, commands, x, excludes, click);
      if (spoiled) return spoiled;
      const part = slotAt(x);
      if (part === 'body') return slotGesture(store, 'seconds', view, x, click);
      if (part) return slotEdgeGesture(store, 'seconds', part, view, x);
      return panGesture(store, 'minutes', view, x, click);
    },
    hover: (x, y) => {
      if (selectedEndAt(view, x) || borderAt(view, x, y)) return 'ew-resize';
      if (store.getState().tool === 'exclude') return 'crosshair';
      const part = slotAt(x);
      if (part === 'body') return 'grab';
      return part ? 'ew-resize' : 'default';
    },
    point: (x) => store.setState({ cursorS: x === null ? null : view.sAt(x) }),
    wheel: (x, event) => wheelOver(store, 'minutes', view, x, event),
  };
}
