import { ticksToSeconds } from '../units/ticks';
import { openBeats } from './open-beats';
import type { PaneView } from './pane-view';
import { PIN_Y_PX } from './seconds-paint';

const ARM_PX = 5;

/**
 * Paints what finding the beats of a stretch again would change: its two ends, a dashed line with a plus for a beat gained, a
 * cross over a beat lost, an arrow to where a beat moves.
 */
export function paintPreview(brush: CanvasRenderingContext2D, view: PaneView): void {
  const { preview } = view.stores.view.getState();
  const open = openBeats(view.stores);
  if (!preview || !open) return;
  const xOf = (tick: number) => view.xOf(ticksToSeconds(tick, open.rateHz));
  const { tokens } = view;
  brush.lineWidth = 2;
  brush.strokeStyle = tokens.focus;
  for (const atS of [preview.fromS, preview.toS]) line(brush, view.xOf(atS), 0, view.bottomPx);
  for (const tick of preview.gained) {
    brush.strokeStyle = tokens.ink;
    brush.setLineDash([4, 3]);
    line(brush, xOf(tick), PIN_Y_PX + 10, view.bottomPx);
    brush.setLineDash([]);
    sign(brush, view, xOf(tick), [
      [-ARM_PX, 0, ARM_PX, 0],
      [0, -ARM_PX, 0, ARM_PX],
    ]);
  }
  for (const tick of preview.lost)
    sign(brush, view, xOf(tick), [
      [-ARM_PX, -ARM_PX, ARM_PX, ARM_PX],
      [-ARM_PX, ARM_PX, ARM_PX, -ARM_PX],
    ]);
  for (const [from, to] of preview.moved) {
    const way = Math.sign(xOf(to) - xOf(from));
    brush.strokeStyle = tokens.ink;
    brush.setLineDash([1, 3]);
    line(brush, xOf(to), PIN_Y_PX + 10, view.bottomPx);
    brush.setLineDash([]);
    sign(brush, view, xOf(to), [
      [-ARM_PX * way, 0, ARM_PX * way, 0],
      [ARM_PX * way, 0, 0, -ARM_PX],
      [ARM_PX * way, 0, 0, ARM_PX],
    ]);
  }
}

function line(brush: CanvasRenderingContext2D, x: number, fromY: number, toY: number): void {
  brush.beginPath();
  brush.moveTo(x, fromY);
  brush.lineTo(x, toY);
  brush.stroke();
}

type Stroke = readonly [fromX: number, fromY: number, toX: number, toY: number];

/** A sign on a yellow tab over a pin's place. */
function sign(
  brush: CanvasRenderingContext2D,
  view: PaneView,
  x: number,
  strokes: readonly Stroke[],
): void {
  brush.fillStyle = view.tokens.doubt;
  brush.fillRect(x - 9, PIN_Y_PX - 9, 18, 18);
  brush.strokeStyle = view.tokens.doubtInk;
  brush.lineWidth = 2;
  brush.beginPath();
  for (const [fromX, fromY, toX, toY] of strokes) {
    brush.moveTo(x + fromX, PIN_Y_PX + fromY);
    brush.lineTo(x + toX, PIN_Y_PX + toY);
  }
  brush.stroke();
}
