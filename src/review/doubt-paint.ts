import type { PaneView } from './pane-view';

const TAB_PX = 18;
const PAD_PX = 6;
/** Tabs stand beside the pins' heads; where a pin stands in their place, below the intervals written on either side of it. */
const HIGH_PX = 4;
const BELOW_HEAD_PX = 2;

/** Paints the doubt in front: a dashed line where the act is proposed, or round the stretch, under a yellow tab. */
export function paintDoubt(brush: CanvasRenderingContext2D, view: PaneView): void {
  const { doubt } = view.stores.view.getState();
  const { window, kind, widthPx } = view;
  const inside = doubt && doubt.toS >= window.fromS && doubt.fromS <= window.toS;
  const stretch = doubt?.atS.length === 0;
  if (!inside || (kind.name === 'minutes' && !stretch)) return;
  const places = stretch ? [doubt.fromS, doubt.toS] : doubt.atS;
  const xs = places.map(view.xOf);
  const high = kind.name === 'seconds' && !doubt.onPins;
  const topPx = high ? HIGH_PX : belowIntervals(view);
  brush.save();
  brush.strokeStyle = view.tokens.ink;
  brush.lineWidth = 1.5;
  brush.setLineDash([3, 3]);
  brush.beginPath();
  for (const x of xs) {
    brush.moveTo(x, topPx + TAB_PX);
    brush.lineTo(x, view.bottomPx);
  }
  brush.stroke();
  brush.restore();
  const middles = stretch ? [(Math.max(0, xs[0]) + Math.min(widthPx, xs[1])) / 2] : xs;
  for (const x of middles) paintTab(brush, view, doubt.words, [x, topPx]);
}

function belowIntervals({ boxes, topPx }: PaneView): number {
  const interval = boxes.find(({ row }) => row.kind === 'interval');
  return interval ? interval.topPx + interval.heightPx : topPx + BELOW_HEAD_PX;
}

function paintTab(
  brush: CanvasRenderingContext2D,
  { over, tokens, widthPx }: PaneView,
  words: string,
  [x, topPx]: readonly [x: number, topPx: number],
): void {
  brush.font = over.font(12, 600);
  const width = brush.measureText(words).width + 2 * PAD_PX;
  const left = Math.min(Math.max(0, x - width / 2), widthPx - width);
  brush.fillStyle = tokens.doubt;
  brush.fillRect(left, topPx, width, TAB_PX);
  brush.fillStyle = tokens.doubtInk;
  brush.textAlign = 'center';
  brush.textBaseline = 'middle';
  brush.fillText(words, left + width / 2, topPx + TAB_PX / 2 + 0.5);
}
