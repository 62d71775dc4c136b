import { type BeatList, beatAt } from '../recording/beat';
import { gapBetween } from '../recording/lost';
import { ticksToSeconds } from '../units/ticks';
import { beatsInView, rrMsAt } from './beats-in-view';
import { intervalFits } from './interval-fit';
import { openBeats, selectedTicks } from './open-beats';
import type { PaneView } from './pane-view';
import { drawPinHead, PIN_RADIUS_PX } from './pin-shapes';
import type { TimeWindow } from './view-store';

/** Middle of the pins' heads, in CSS pixels from the pane's top. */
export const PIN_Y_PX = 13;
const LETTER_PX = 26;
/** From the middle of a pin to its letter: clear of the ring round a selected one. */
const LETTER_OFF_PX = 13;
const LEAST_APART_PX = 3;
const LEAST_RADIUS_PX = 2.5;
const LEAST_ODD_RADIUS_PX = 4;

/** A beat being dragged: where it stood and where it is now. */
export interface BeatDrag {
  readonly tick: number;
  readonly atS: number;
}

/** One pin as drawn. */
export interface Pin {
  readonly index: number;
  readonly tick: number;
  readonly atS: number;
  readonly x: number;
  readonly selected: boolean;
}

/**
 * Pins of the window with one beat to each side, so that intervals run out of the pane. None where they would stand closer
 * than 3 px.
 */
export function pinsInView(view: PaneView, drag: BeatDrag | null): readonly Pin[] {
  const open = openBeats(view.stores);
  if (!open) return [];
  const { beats } = open.state;
  const [from, to] = beatsInView(beats, view.window, open.rateHz);
  if ((to - from) * LEAST_APART_PX > view.widthPx) return [];
  const chosen = new Set(selectedTicks(view.stores));
  const first = Math.max(0, from - 1);
  const last = Math.min(beats.ticks.length, to + 1);
  return Array.from(beats.ticks.subarray(first, last), (tick, i) => {
    const atS = drag?.tick === tick ? drag.atS : ticksToSeconds(tick, open.rateHz);
    return { index: first + i, tick, atS, x: view.xOf(atS), selected: chosen.has(tick) };
  });
}

/** Paints the stretch whose beats a drag is picking out: its two ends, and what lies between a little darker. */
export function paintBand(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  { fromS, toS }: TimeWindow,
): void {
  const [left, right] = [view.xOf(fromS), view.xOf(toS)];
  brush.fillStyle = view.tokens.focus;
  brush.globalAlpha = 0.12;
  brush.fillRect(left, 0, right - left, view.bottomPx);
  brush.globalAlpha = 1;
  brush.fillRect(left - 1, 0, 2, view.bottomPx);
  brush.fillRect(right - 1, 0, 2, view.bottomPx);
}

/** Paints intervals, stems and heads of the pins in view, or says that there are too many. */
export function paintBeats(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  drag: BeatDrag | null,
): void {
  const beats = openBeats(view.stores)?.state.beats;
  const pins = pinsInView(view, drag);
  brush.font = view.over.font(11, 600);
  brush.textBaseline = 'middle';
  if (!beats || beats.ticks.length === 0) return;
  if (pins.length === 0) {
    brush.textAlign = 'center';
    brush.fillStyle = view.tokens.quiet;
    brush.fillText('Zoom in to see the beats', view.widthPx / 2, PIN_Y_PX);
    return;
  }
  paintIntervals(brush, view, pins);
  const apart = view.widthPx / pins.length;
  for (const pin of pins) paintPin(brush, view, beats, pin, apart);
}

function paintPin(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  beats: BeatList,
  pin: Pin,
  apartPx: number,
): void {
  const { tokens, boxes } = view;
  const recorded = boxes.find((box) => box.row.kind === 'signal');
  const stemTo = recorded ? recorded.topPx + 6 : view.topPx;
  const { beatClass, origin } = beatAt(beats, pin.index);
  const least = beatClass === 'N' ? LEAST_RADIUS_PX : LEAST_ODD_RADIUS_PX;
  const radiusPx = Math.min(PIN_RADIUS_PX, Math.max(least, 0.4 * apartPx));
  brush.strokeStyle = tokens.heart;
  brush.lineWidth = pin.selected ? 2 : 1;
  brush.globalAlpha = pin.selected || apartPx >= LETTER_PX ? 1 : 0.35;
  brush.setLineDash(origin === 'placed' ? [2, 3] : []);
  brush.beginPath();
  brush.moveTo(pin.x, PIN_Y_PX + radiusPx);
  brush.lineTo(pin.x, pin.selected ? view.bottomPx : stemTo);
  brush.stroke();
  brush.setLineDash([]);
  brush.globalAlpha = 1;
  if (pin.selected) ringPin(brush, pin.x, tokens.focus);
  drawPinHead(brush, beatClass, pin.x, PIN_Y_PX, {
    colour: tokens.heart,
    paper: tokens.paper,
    radiusPx,
  });
  if (pin.x < 0 || pin.x > view.widthPx) return;
  const crowded = apartPx < LETTER_PX;
  if (crowded && beatClass === 'N') return;
  const left = pin.x + LETTER_PX > view.widthPx;
  brush.fillStyle = tokens.ink;
  brush.textAlign = crowded ? 'center' : left ? 'right' : 'left';
  if (crowded) brush.fillText(beatClass, pin.x, PIN_Y_PX + 11);
  else brush.fillText(beatClass, pin.x + (left ? -LETTER_OFF_PX : LETTER_OFF_PX), PIN_Y_PX + 0.5);
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
  const { beats, roles } = open.state;
  const { heart } = roles;
  const gaps = view.stores.analysis.getState().recording?.gaps ?? [];
  const yOf = (rrMs: number) => {
    const share = (Math.min(HIGH_MS, Math.max(LOW_MS, rrMs)) - LOW_MS) / (HIGH_MS - LOW_MS);
    return box.topPx + box.heightPx - 3 - share * (box.heightPx - 8);
  };
  const first = Math.max(1, pins[0].index - 3);
  const last = Math.min(beats.ticks.length - 1, pins[pins.length - 1].index + 3);
  const rrMs = Array.from({ length: last - first + 1 }, (_, i) =>
    rrMsAt(beats, first + i, open.rateHz),
  );
  brush.textAlign = 'center';
  let writtenTo = 0;
  for (let i = 1; i < pins.length; i += 1) {
    const [before, pin] = [pins[i - 1], pins[i]];
    if (heart && gapBetween(heart, gaps, before.atS, pin.atS)) continue;
    const shown = (pin.atS - before.atS) * 1000;
    const y = yOf(shown);
    const odd = !intervalFits(rrMs, pin.index - first);
    brush.strokeStyle = odd ? tokens.ink : tokens.quiet;
    brush.lineWidth = odd ? 2 : 1;
    brush.beginPath();
    brush.moveTo(before.x, y);
    brush.lineTo(pin.x, y);
    brush.stroke();
    if (odd || pin.selected || before.selected)
      writtenTo = writeInterval(brush, view, [before, pin], { y, rrMs: shown, writtenTo });
  }
}

/** Writes an interval's length on its line where there is room; returns how far to the right is written now. */
function writeInterval(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  [before, pin]: readonly [Pin, Pin],
  { y, rrMs, writtenTo }: { readonly y: number; readonly rrMs: number; readonly writtenTo: number },
): number {
  const text = `${Math.round(rrMs)} ms`;
  const half = brush.measureText(text).width / 2;
  if (pin.x < 0 || before.x > view.widthPx) return writtenTo;
  const left = Math.max(0, before.x);
  const right = Math.min(view.widthPx, pin.x);
  const x = Math.min(Math.max((left + right) / 2, half + 2), view.widthPx - half - 2);
  if (x - half < writtenTo) return writtenTo;
  brush.fillStyle = view.tokens.paper;
  brush.fillRect(x - half - 3, y - 7, 2 * half + 6, 14);
  brush.fillStyle = view.tokens.ink;
  brush.fillText(text, x, y + 0.5);
  return x + half + 4;
}
