import { BEAT_CLASSES, beatAt } from '../recording/beat';
import { ticksToSeconds } from '../units/ticks';
import { openBeats, selectedTicks } from './beat-commands';
import { beatsInView, rrMsAt } from './beats-in-view';
import { panGesture, wheelOver } from './gestures';
import { nearestWithin } from './hit';
import { intervalFits } from './interval-fit';
import { selectedEndAt, selectSpanAt, spanGesture } from './minutes-view';
import type { PaneCommands } from './pane-commands';
import type { PaneKind, PaneView } from './pane-view';
import type { PinButtons } from './pin-buttons';
import { drawPinHead } from './pin-shapes';
import type { Gesture, StageActs } from './stage';

/** Height of the pins' room above the rows. */
export const PIN_Y_PX = 13;
const REACH_PX = 12;
const LETTER_PX = 22;

/** A beat being dragged: where it stood and where it is now. */
export interface BeatDrag {
  readonly tick: number;
  readonly atS: number;
}

/** One pin as drawn. */
interface Pin {
  readonly index: number;
  readonly tick: number;
  readonly atS: number;
  readonly x: number;
  readonly selected: boolean;
}

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
    paintOver: (brush, view) => paintBeats(brush, view, parts),
    drawn: (view) => parts.buttons.place(view),
  };
}

/** Pins of the window with one beat to each side, so that intervals run out of the pane. */
export function pinsInView(view: PaneView, drag: BeatDrag | null): readonly Pin[] {
  const open = openBeats(view.stores);
  if (!open) return [];
  const { beats } = open.state;
  const [from, to] = beatsInView(beats, view.window, open.rateHz);
  const chosen = new Set(selectedTicks(view.stores));
  const pins: Pin[] = [];
  for (
    let index = Math.max(0, from - 1);
    index < Math.min(beats.ticks.length, to + 1);
    index += 1
  ) {
    const tick = beats.ticks[index];
    const atS = drag?.tick === tick ? drag.atS : ticksToSeconds(tick, open.rateHz);
    pins.push({ index, tick, atS, x: view.xOf(atS), selected: chosen.has(tick) });
  }
  return pins;
}

function paintBeats(brush: CanvasRenderingContext2D, view: PaneView, parts: SecondsParts): void {
  const open = openBeats(view.stores);
  const pins = pinsInView(view, parts.drag);
  if (!open || pins.length === 0) return;
  paintIntervals(brush, view, pins);
  const { tokens, boxes } = view;
  const recorded = boxes.find((box) => box.row.kind === 'signal');
  const stemTo = recorded ? recorded.topPx + 6 : view.topPx;
  const apart = view.widthPx / Math.max(1, pins.length);
  brush.font = view.over.font(11, 600);
  brush.textBaseline = 'middle';
  brush.textAlign = 'left';
  for (const pin of pins) {
    if (pin.x < -REACH_PX || pin.x > view.widthPx + REACH_PX) continue;
    const { beatClass, origin } = beatAt(open.state.beats, pin.index);
    brush.strokeStyle = tokens.heart;
    brush.lineWidth = pin.selected ? 2 : 1;
    brush.setLineDash(origin === 'placed' ? [2, 3] : []);
    brush.beginPath();
    brush.moveTo(pin.x, PIN_Y_PX + 5);
    brush.lineTo(pin.x, pin.selected ? view.bottomPx : stemTo);
    brush.stroke();
    brush.setLineDash([]);
    if (pin.selected) ringPin(brush, pin.x, tokens.focus);
    drawPinHead(brush, beatClass, pin.x, PIN_Y_PX, { colour: tokens.heart, paper: tokens.paper });
    if (pin.x < 0 || pin.x > view.widthPx) continue;
    if (apart < LETTER_PX && beatClass === 'N' && !pin.selected) continue;
    brush.fillStyle = tokens.ink;
    const left = pin.x + LETTER_PX > view.widthPx;
    brush.textAlign = left ? 'right' : 'left';
    brush.fillText(beatClass, pin.x + (left ? -10 : 10), PIN_Y_PX + 0.5);
  }
}

function ringPin(brush: CanvasRenderingContext2D, x: number, colour: string): void {
  brush.strokeStyle = colour;
  brush.lineWidth = 2;
  brush.beginPath();
  brush.arc(x, PIN_Y_PX, 9, 0, 2 * Math.PI);
  brush.stroke();
}

const LOW_MS = 300;
const HIGH_MS = 2000;

function paintIntervals(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  pins: readonly Pin[],
): void {
  const box = view.boxes.find(({ row }) => row.kind === 'interval');
  const open = openBeats(view.stores);
  if (!box || !open) return;
  const { tokens } = view;
  const { beats } = open.state;
  const yOf = (rrMs: number) => {
    const share = (Math.min(HIGH_MS, Math.max(LOW_MS, rrMs)) - LOW_MS) / (HIGH_MS - LOW_MS);
    return box.topPx + box.heightPx - 3 - share * (box.heightPx - 8);
  };
  const first = Math.max(1, pins[0].index - 3);
  const last = Math.min(beats.ticks.length - 1, pins[pins.length - 1].index + 3);
  const rrMs = Array.from({ length: last - first + 1 }, (_, i) =>
    rrMsAt(beats, first + i, open.rateHz),
  );
  brush.font = view.over.font(11, 600);
  brush.textAlign = 'center';
  brush.textBaseline = 'middle';
  for (let i = 1; i < pins.length; i += 1) {
    const [before, pin] = [pins[i - 1], pins[i]];
    const shown = (pin.atS - before.atS) * 1000;
    const y = yOf(shown);
    const odd = !intervalFits(rrMs, pin.index - first);
    brush.strokeStyle = odd ? tokens.ink : tokens.quiet;
    brush.lineWidth = odd ? 2 : 1;
    brush.beginPath();
    brush.moveTo(before.x, y);
    brush.lineTo(pin.x, y);
    brush.stroke();
    if (odd || pin.selected || before.selected) writeInterval(brush, view, before, pin, y, shown);
  }
}

function writeInterval(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  before: Pin,
  pin: Pin,
  y: number,
  rrMs: number,
): void {
  const text = `${Math.round(rrMs)} ms`;
  const half = brush.measureText(text).width / 2;
  if (pin.x < 0 || before.x > view.widthPx) return;
  const left = Math.max(0, before.x);
  const right = Math.min(view.widthPx, pin.x);
  const x = Math.min(Math.max((left + right) / 2, half + 2), view.widthPx - half - 2);
  brush.fillStyle = view.tokens.paper;
  brush.fillRect(x - half - 3, y - 7, 2 * half + 6, 14);
  brush.fillStyle = view.tokens.ink;
  brush.fillText(text, x, y + 0.5);
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
