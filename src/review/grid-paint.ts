import type { Phase } from '../recording/phase';
import type { NotedEvent } from './noted-events';
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
  /** What was noted at a time, ascending; marked above the rows where there is room. */
  readonly events: readonly NotedEvent[];
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
  paintEvents(brush, scene);
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
      brush.fillText(name, left, topPx - headPx + NAME_Y_PX);
  }
}

const EVENT_TEXT_PX = 120;
/** Names of phases stand in the upper half of the head, events in the lower one. */
const NAME_Y_PX = 8;
const EVENT_UP_PX = 6;

/** Events: a dotted line over all rows, and the text beside it as far as it reaches before the next one; symptoms: dashed. */
function paintEvents(brush: CanvasRenderingContext2D, scene: GridScene): void {
  const { window, topPx, bottomPx, headPx, xOf, tokens, widthPx } = scene;
  if (headPx === 0) return;
  const seen = scene.events.filter(({ atS }) => atS >= window.fromS && atS <= window.toS);
  brush.strokeStyle = tokens.quiet;
  brush.fillStyle = tokens.quiet;
  brush.textAlign = 'left';
  seen.forEach(({ atS, text, score }, i) => {
    const x = Math.round(xOf(atS)) + 0.5;
    brush.setLineDash(score === null ? [1, 4] : [5, 3]);
    brush.beginPath();
    brush.moveTo(x, topPx - 8);
    brush.lineTo(x, bottomPx);
    brush.stroke();
    const next = seen.at(i + 1);
    const room = Math.min(next ? xOf(next.atS) : widthPx, x + EVENT_TEXT_PX) - x - 8;
    brush.fillText(fitted(brush, text, room), x + 3, topPx - EVENT_UP_PX);
  });
  brush.setLineDash([]);
}

/** A text cut to a width, with an ellipsis where something is left out; '' where nothing fits. */
function fitted(brush: CanvasRenderingContext2D, text: string, widthPx: number): string {
  if (brush.measureText(text).width <= widthPx) return text;
  for (let length = text.length - 1; length > 1; length -= 1) {
    const part = `${text.slice(0, length)}…`;
    if (brush.measureText(part).width <= widthPx) return part;
  }
  return '';
}
