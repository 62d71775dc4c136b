import type { Span } from '../recording/span';
import { type Row, spanActsOn } from './rows';
import type { ThemeTokens } from './theme-tokens';
import type { Draft, Selection, TimeWindow } from './view-store';

/** Where a row lies in its pane, in CSS pixels from the pane's top. */
export interface RowBox {
  readonly row: Row;
  readonly topPx: number;
  readonly heightPx: number;
}

/** What is needed to paint spoiled spans over a pane. */
export interface SpanScene {
  readonly spans: readonly Span[];
  readonly draft: Draft | null;
  readonly selection: Selection;
  readonly window: TimeWindow;
  readonly boxes: readonly RowBox[];
  readonly heartLead: string | null;
  readonly xOf: (atS: number) => number;
  readonly topPx: number;
  readonly bottomPx: number;
  readonly tokens: ThemeTokens;
  readonly hatch: CanvasPattern | null;
  readonly font: string;
}

const VEIL = 0.6;
const HATCH = 0.55;
const LEAST_LABEL_PX = 34;

/** A span as it stands while one of its ends is dragged. */
export function draftedSpan(span: Span, draft: Draft | null): Span {
  return draft && draft.spanId === span.id ? { ...span, fromS: draft.fromS, toS: draft.toS } : span;
}

/** Veils and hatches what spoiled spans leave out, row by row; drawn spans have solid ends, proposed ones dashed. */
export function paintSpans(brush: CanvasRenderingContext2D, scene: SpanScene): void {
  const { window, selection, draft } = scene;
  for (const one of scene.spans) {
    const span = draftedSpan(one, draft);
    if (span.toS < window.fromS || span.fromS > window.toS) continue;
    paintSpan(brush, scene, span, selection.kind === 'span' && selection.id === span.id);
  }
  if (draft && draft.spanId === null) {
    const left = scene.xOf(draft.fromS);
    brush.fillStyle = scene.tokens.ink;
    brush.globalAlpha = 0.15;
    brush.fillRect(left, scene.topPx, scene.xOf(draft.toS) - left, scene.bottomPx - scene.topPx);
    brush.globalAlpha = 1;
  }
}

function paintSpan(
  brush: CanvasRenderingContext2D,
  scene: SpanScene,
  span: Span,
  selected: boolean,
): void {
  const { tokens, hatch, topPx, bottomPx } = scene;
  const left = scene.xOf(span.fromS);
  const width = Math.max(1, scene.xOf(span.toS) - left);
  for (const box of scene.boxes) {
    if (!spanActsOn(span, box.row, scene.heartLead)) continue;
    brush.globalAlpha = VEIL;
    brush.fillStyle = tokens.paper;
    brush.fillRect(left, box.topPx, width, box.heightPx);
    if (hatch) {
      brush.globalAlpha = HATCH;
      brush.fillStyle = hatch;
      brush.fillRect(left, box.topPx, width, box.heightPx);
    }
  }
  brush.globalAlpha = 1;
  brush.strokeStyle = selected ? tokens.focus : tokens.quiet;
  brush.lineWidth = selected ? 2 : 1;
  brush.setLineDash(span.origin === 'proposed' ? [3, 3] : []);
  brush.beginPath();
  for (const x of [left, left + width]) {
    brush.moveTo(x, topPx);
    brush.lineTo(x, bottomPx);
  }
  brush.stroke();
  brush.setLineDash([]);
  if (selected) {
    brush.fillStyle = tokens.focus;
    for (const x of [left, left + width]) brush.fillRect(x - 3, (topPx + bottomPx) / 2 - 12, 6, 24);
  }
  if (width >= LEAST_LABEL_PX) labelSpan(brush, scene, span, left, width);
}

function labelSpan(
  brush: CanvasRenderingContext2D,
  { tokens, topPx, font, window, xOf }: SpanScene,
  span: Span,
  left: number,
  width: number,
): void {
  const words = span.target === 'both' ? span.cause : `${span.cause}, ${span.target}`;
  brush.font = font;
  const from = Math.max(left, xOf(window.fromS));
  const to = Math.min(left + width, xOf(window.toS));
  const text = brush.measureText(words).width <= to - from - 6 ? words : span.cause;
  const room = brush.measureText(text).width;
  if (room > to - from - 6) return;
  const middle = (from + to) / 2;
  brush.fillStyle = tokens.paper;
  brush.fillRect(middle - room / 2 - 3, topPx + 1, room + 6, 15);
  brush.fillStyle = tokens.ink;
  brush.textAlign = 'center';
  brush.textBaseline = 'middle';
  brush.fillText(text, middle, topPx + 9);
}
