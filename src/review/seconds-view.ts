import { ticksWithin } from './beat-choosing';
import { panGesture, wheelOver } from './gestures';
import { nearestWithin } from './hit';
import { selectedEndAt, selectSpanAt, spanGesture } from './minutes-view';
import { openBeats } from './open-beats';
import type { PaneCommands } from './pane-commands';
import type { PaneKind, PaneView } from './pane-view';
import type { PinButtons } from './pin-buttons';
import { paintPreview } from './preview-paint';
import {
  type BeatDrag,
  PIN_Y_PX,
  type Pin,
  paintBand,
  paintBeats,
  pinsInView,
} from './seconds-paint';
import type { Gesture, StageActs } from './stage';
import type { TimeWindow } from './view-store';

const REACH_PX = 12;

/** What Seconds keeps beside the stores. */
export interface SecondsParts {
  readonly buttons: PinButtons;
  drag: BeatDrag | null;
  /** The stretch whose beats a drag is picking out. */
  band: TimeWindow | null;
}

/** Seconds: pins above the rows, the interval line, stems through the recorded trace. */
export function secondsKind(parts: SecondsParts): PaneKind {
  return {
    name: 'seconds',
    title: 'Seconds',
    coarsest: 'h:mm:ss',
    showsPhaseNames: false,
    paintOver: (brush, view) => {
      if (parts.band) paintBand(brush, view, parts.band);
      paintBeats(brush, view, parts.drag);
      paintPreview(brush, view);
    },
    drawn: (view) => parts.buttons.place(view),
  };
}

/** How Seconds answers the pointer. */
export function secondsActs(
  view: PaneView,
  commands: PaneCommands,
  parts: SecondsParts,
): StageActs {
  const store = view.stores.view;
  const pinAt = (x: number, y: number): Pin | null => {
    if (y > 2 * PIN_Y_PX) return null;
    const pins = pinsInView(view, null);
    const found = nearestWithin(
      x,
      pins.map((pin) => pin.x),
      REACH_PX,
    );
    return found === null ? null : pins[found];
  };
  const click = (x: number) => selectSpanAt(view, commands, x);
  return {
    press: (x, y, event) => {
      const pin = pinAt(x, y);
      const overPins = y <= 2 * PIN_Y_PX;
      if (event.shiftKey || (overPins && !pin))
        return bandGesture(view, commands, parts, x, () =>
          pin ? commands.selectBeat(pin.tick, true) : click(x),
        );
      if (pin) return pinGesture(view, commands, parts, pin, x);
      const excludes = event.altKey || store.getState().tool === 'exclude';
      return (
        spanGesture(view, commands, x, excludes, click) ??
        panGesture(store, 'seconds', view, x, click)
      );
    },
    hover: (x, y) => {
      if (pinAt(x, y)) return 'pointer';
      if (y <= 2 * PIN_Y_PX) return 'text';
      if (selectedEndAt(view, x)) return 'ew-resize';
      return store.getState().tool === 'exclude' ? 'crosshair' : 'default';
    },
    point: (x) => store.setState({ cursorS: x === null ? null : view.sAt(x) }),
    wheel: (x, event) => wheelOver(store, 'seconds', view, x, event),
    doubleClick: (x, y) => {
      if (!pinAt(x, y)) commands.addBeatNear(view.sAt(x));
    },
  };
}

function pinGesture(
  view: PaneView,
  commands: PaneCommands,
  parts: SecondsParts,
  pin: Pin,
  startX: number,
): Gesture {
  const offset = pin.atS - view.sAt(startX);
  const drag = (next: BeatDrag | null) => {
    parts.drag = next;
    view.loop.ask();
  };
  return {
    cursor: 'ew-resize',
    move: (x) => drag({ tick: pin.tick, atS: view.sAt(x) + offset }),
    drop: (x) => {
      drag(null);
      commands.selectBeat(pin.tick, false);
      commands.moveBeatTo(pin.tick, view.sAt(x) + offset);
    },
    click: () => {
      commands.selectBeat(pin.tick, false);
      parts.buttons.focus(pin.tick);
    },
    cancel: () => drag(null),
  };
}

/** Picks out the beats of a stretch drawn over the pins, or anywhere with Shift. */
function bandGesture(
  view: PaneView,
  commands: PaneCommands,
  parts: SecondsParts,
  startX: number,
  click: () => void,
): Gesture {
  const store = view.stores.view;
  const before = store.getState().selection;
  const anchorS = view.sAt(startX);
  const bandTo = (x: number): TimeWindow => {
    const { fromS, toS } = view.window;
    const otherS = Math.min(Math.max(fromS, view.sAt(x)), toS);
    return { fromS: Math.min(anchorS, otherS), toS: Math.max(anchorS, otherS) };
  };
  const show = (band: TimeWindow | null) => {
    parts.band = band;
    view.loop.ask();
  };
  return {
    cursor: 'text',
    move: (x) => {
      const open = openBeats(view.stores);
      const band = bandTo(x);
      if (open) store.setState({ selection: { kind: 'beats', ticks: ticksWithin(open, band) } });
      show(band);
    },
    drop: (x) => {
      show(null);
      commands.selectBeatsWithin(bandTo(x));
    },
    click,
    cancel: () => {
      show(null);
      store.setState({ selection: before });
    },
  };
}

/**
 * What an arrow key does on a pin or on the Seconds drawing while beats are selected; true where it was taken. All other keys
 * are those of the command table.
 */
export function pinKey(commands: PaneCommands, event: KeyboardEvent): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey) return false;
  if (event.key !== 'ArrowLeft' && event.key !== 'ArrowRight') return false;
  const way = event.key === 'ArrowLeft' ? -1 : 1;
  if (event.shiftKey) commands.moveSelected(10 * way);
  else commands.moveSelectedBySamples(way);
  return true;
}
