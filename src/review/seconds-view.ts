import { BEAT_CLASSES } from '../recording/beat';
import { panGesture, wheelOver } from './gestures';
import { nearestWithin } from './hit';
import { selectedEndAt, selectSpanAt, spanGesture } from './minutes-view';
import type { PaneCommands } from './pane-commands';
import type { PaneKind, PaneView } from './pane-view';
import type { PinButtons } from './pin-buttons';
import { type BeatDrag, PIN_Y_PX, type Pin, paintBeats, pinsInView } from './seconds-paint';
import type { Gesture, StageActs } from './stage';

const REACH_PX = 12;

/** What Seconds keeps beside the stores. */
export interface SecondsParts {
  readonly buttons: PinButtons;
  drag: BeatDrag | null;
}

/** Seconds: pins above the rows, the interval line, stems through the recorded trace. */
export function secondsKind(parts: SecondsParts): PaneKind {
  return {
    name: 'seconds',
    title: 'Seconds',
    coarsest: 'h:mm:ss',
    showsPhaseNames: false,
    paintOver: (brush, view) => paintBeats(brush, view, parts.drag),
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
      if (pin) return pinGesture(view, commands, parts, pin, x, event.shiftKey);
      const excludes = event.altKey || store.getState().tool === 'exclude';
      return (
        spanGesture(view, commands, x, excludes, click) ??
        panGesture(store, 'seconds', view, x, click)
      );
    },
    hover: (x, y) => {
      if (pinAt(x, y)) return 'pointer';
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
  extend: boolean,
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
      commands.selectBeat(pin.tick, extend);
      parts.buttons.focus(pin.tick);
    },
    cancel: () => drag(null),
  };
}

/** What a key does on a pin or on the Seconds drawing while beats are selected; true where it was taken. */
export function pinKey(commands: PaneCommands, event: KeyboardEvent): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey) return false;
  const beatClass = BEAT_CLASSES.find((one) => one === event.key.toUpperCase());
  if (beatClass && !event.shiftKey) commands.classSelected(beatClass);
  else if (event.key === 'Delete' || event.key === 'Backspace') commands.deleteSelectedBeats();
  else if (event.key === 'ArrowLeft' || event.key === 'ArrowRight') {
    const way = event.key === 'ArrowLeft' ? -1 : 1;
    if (event.shiftKey) commands.moveSelected(10 * way);
    else commands.moveSelectedBySamples(way);
  } else if (event.key === ',') commands.selectPreviousBeat();
  else if (event.key === '.') commands.selectNextBeat();
  else return false;
  return true;
}
