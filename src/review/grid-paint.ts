import type { Phase } from '../recording/phase';
import type { ThemeTokens } from './theme-tokens';
import { timeTicks } from './time-ticks';
import type { TimeWindow } from './view-store';

/** What lies behind the traces of a pane: lines of the time axis, its text, borders of phases. */
export interface GridScene {
  readonly window: TimeWindow;
  readonly widthPx: number;
  readonly topPx: number;
  readonly bottomPx: number;
  readonly axisPx: number;
  readonly coarsest: 'h:mm' | 'h:mm:ss';
  readonly phases: readonly Phase[];
  /** Room for names of phases above the rows, 0 for none. */
  readonly headPx: number;
  readonly xOf: (atS: number) => number;
  readonly tokens: ThemeTokens;
  readonly font: string;
}

const LEAST_PX = { 'h:mm': 64, 'h:mm:ss': 78 } as const;

/** Paints the grid of a pane. The axis text keeps inside the pane at both ends. */
export function paintGrid(brush: CanvasRenderingContext2D, scene: GridScene): void {
  const { window, widthPx, topPx, bottomPx, axisPx, xOf, tokens } = scene;
  const ticks = timeTicks(window, widthPx, LEAST_PX[scene.coarsest], scene.coarsest);
  brush.strokeStyle = tokens.rule;
  brush.lineWidth = 1;
  brush.beginPath();
  for (const { atS } of ticks) {
    const x = Math.round(xOf(atS)) + 0.5;
    brush.moveTo(x, topPx);
    brush.lineTo(x, bottomPx + 3);
  }
  brush.moveTo(0, bottomPx + 0.5);
  brush.lineTo(widthPx, bottomPx + 0.5);
  brush.stroke();
  brush.fillStyle = tokens.quiet;
  brush.font = scene.font;
  brush.textBaseline = 'middle';
  brush.textAlign = 'center';
  for (const { atS, text } of ticks) {
    const half = brush.measureText(text).width / 2;
    const x = Math.min(Math.max(xOf(atS), half), widthPx - half);
    brush.fillText(text, x, bottomPx + 3 + (axisPx - 3) / 2);
  }
  paintPhases(brush, scene);
}

function paintPhases(brush: CanvasRenderingContext2D, scene: GridScene): void {
  const { window, topPx, bottomPx, headPx, xOf, tokens, widthPx } = scene;
  brush.strokeStyle = tokens.quiet;
  brush.lineWidth = 1;
  brush.beginPath();
  for (const { fromS, toS } of scene.phases)
    for (const atS of [fromS, toS])
      if (atS > window.fromS && atS < window.toS) {
        const x = Math.round(xOf(atS)) + 0.5;
        brush.moveTo(x, topPx - headPx);
        brush.lineTo(x, bottomPx);
      }
  brush.stroke();
  if (headPx === 0) return;
  brush.fillStyle = tokens.quiet;
  brush.textAlign = 'left';
  for (const { name, fromS, toS } of scene.phases) {
    const left = Math.max(0, xOf(fromS)) + 5;
    const room = Math.min(widthPx, xOf(toS)) - left;
    if (room > brush.measureText(name).width)
      brush.fillText(name, left, topPx - headPx + headPx / 2 + 1);
  }
}
