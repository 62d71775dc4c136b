import type { BeatClass } from '../recording/beat';

/** Radius of a pin's head where there is room. */
export const PIN_RADIUS_PX = 5;

/** Colours of a pin. */
export interface PinInk {
  readonly colour: string;
  readonly paper: string;
  readonly radiusPx: number;
}

/**
 * Draws the head of a pin: N filled round, V filled diamond, S half-filled round, F hollow square, Q hollow round with a bar.
 * The class can be told without colour.
 */
export function drawPinHead(
  brush: CanvasRenderingContext2D,
  beatClass: BeatClass,
  x: number,
  y: number,
  { colour, paper, radiusPx }: PinInk,
): void {
  brush.fillStyle = colour;
  brush.strokeStyle = colour;
  brush.lineWidth = 1.5;
  brush.beginPath();
  if (beatClass === 'V') {
    const reach = radiusPx + 1.5;
    brush.moveTo(x, y - reach);
    brush.lineTo(x + reach, y);
    brush.lineTo(x, y + reach);
    brush.lineTo(x - reach, y);
    brush.closePath();
    brush.fill();
    return;
  }
  if (beatClass === 'F')
    brush.rect(x - radiusPx + 0.5, y - radiusPx + 0.5, 2 * radiusPx - 1, 2 * radiusPx - 1);
  else brush.arc(x, y, radiusPx - (beatClass === 'N' ? 0 : 0.5), 0, 2 * Math.PI);
  if (beatClass === 'N') {
    brush.fill();
    return;
  }
  brush.fillStyle = paper;
  brush.fill();
  brush.stroke();
  if (beatClass === 'S') {
    brush.fillStyle = colour;
    brush.beginPath();
    brush.arc(x, y, radiusPx - 0.5, Math.PI / 2, 1.5 * Math.PI);
    brush.fill();
  }
  if (beatClass === 'Q') {
    brush.beginPath();
    brush.moveTo(x - radiusPx + 1, y);
    brush.lineTo(x + radiusPx - 1, y);
    brush.stroke();
  }
}
