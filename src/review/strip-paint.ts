import type { Phase } from '../recording/phase';
import { isMeal } from '../recording/phase';
import type { Span } from '../recording/span';
import type { RateColumns } from './heart-rate';
import { draftedSpan } from './span-paint';
import { joinedBlocks, type StomachBlock } from './stomach-blocks';
import type { ThemeTokens } from './theme-tokens';
import { clockText } from './time-ticks';
import type { Draft, Selection } from './view-store';

/** Rows of the strip in CSS pixels from its top; the gutter's names stand beside them. */
export const PHASE_BOX = { topPx: 4, bottomPx: 22 } as const;
/** Flag of a bookmark: its head reaches from its time to the right. */
export const FLAG = { topPx: 1, widthPx: 8, heightPx: 8 } as const;
const STOMACH_Y_PX = 37;
const BLOCK_PX = 4;
const REACH_PX = 8;
const RATE_BOX = { topPx: 50, bottomPx: 76 } as const;

/** What the strip shows. */
export interface StripScene {
  readonly widthPx: number;
  readonly phases: readonly Phase[];
  readonly blocks: readonly StomachBlock[];
  readonly rate: (RateColumns & { readonly limits: readonly [number, number] }) | null;
  readonly spans: readonly Span[];
  /** Times of the bookmarks in s. */
  readonly bookmarksS: readonly number[];
  readonly draft: Draft | null;
  readonly selection: Selection;
  readonly xOf: (atS: number) => number;
  readonly tokens: ThemeTokens;
  readonly hatch: CanvasPattern | null;
  readonly font: string;
}

type Brush = CanvasRenderingContext2D;

/** Paints the strip over the whole study. */
export function paintStrip(brush: Brush, scene: StripScene): void {
  paintPhases(brush, scene);
  paintRate(brush, scene);
  paintSpans(brush, scene);
  paintBlocks(brush, scene);
  paintFlags(brush, scene);
}

function paintPhases(brush: Brush, { phases, xOf, tokens, font }: StripScene): void {
  const { topPx, bottomPx } = PHASE_BOX;
  const height = bottomPx - topPx;
  brush.font = font;
  brush.textBaseline = 'middle';
  brush.textAlign = 'left';
  for (const phase of phases) {
    const left = Math.round(xOf(phase.fromS)) + 0.5;
    const width = Math.round(xOf(phase.toS)) + 0.5 - left;
    brush.fillStyle = isMeal(phase) ? tokens.rule : tokens.panel;
    brush.fillRect(left, topPx, width, height);
    brush.strokeStyle = tokens.quiet;
    brush.lineWidth = 1;
    brush.strokeRect(left, topPx + 0.5, width, height - 1);
    const clock = `${clockText(phase.fromS, 60, 'h:mm')}-${clockText(phase.toS, 60, 'h:mm')}`;
    const words = [`${phase.name} ${clock}`, phase.name].find(
      (text) => brush.measureText(text).width < width - 10,
    );
    if (!words) continue;
    brush.fillStyle = tokens.ink;
    brush.fillText(words, left + 6, topPx + height / 2 + 0.5);
  }
}

function paintBlocks(brush: Brush, { blocks, xOf, tokens, hatch }: StripScene): void {
  const [first] = blocks;
  if (!first) return;
  const narrow = xOf(first.toS) - xOf(first.fromS) < 3;
  brush.lineWidth = 1;
  for (const block of narrow ? joinedBlocks(blocks) : blocks) {
    const left = xOf(block.fromS) + (narrow ? 0 : 0.5);
    const width = Math.max(0.75, xOf(block.toS) - left - (narrow ? 0 : 0.5));
    paintBlock(brush, block.kind, left, width, tokens, hatch);
  }
}

/**
 * One block: normo low and solid on the line, brady hangs below it with a notch, tachy stands above it with a notch, none
 * hollow, mixed half solid and half hollow, not decidable dotted, spoiled hatched.
 */
function paintBlock(
  brush: Brush,
  kind: StomachBlock['kind'],
  left: number,
  width: number,
  tokens: ThemeTokens,
  hatch: CanvasPattern | null,
): void {
  const top = STOMACH_Y_PX - BLOCK_PX / 2;
  const notch = width >= 4 ? width / 3 : 0;
  brush.fillStyle = tokens.stomach;
  brush.strokeStyle = tokens.stomach;
  if (kind === 'normo') brush.fillRect(left, top, width, BLOCK_PX);
  if (kind === 'brady') {
    brush.fillRect(left, top, width, BLOCK_PX + REACH_PX);
    brush.clearRect(left + notch, top + REACH_PX, notch, BLOCK_PX);
  }
  if (kind === 'tachy') {
    brush.fillRect(left, top - REACH_PX, width, BLOCK_PX + REACH_PX);
    brush.clearRect(left + notch, top - REACH_PX, notch, BLOCK_PX);
  }
  if (kind === 'none' || kind === 'mixed')
    brush.strokeRect(left + 0.5, top - 0.5, Math.max(0.5, width - 1), BLOCK_PX + 1);
  if (kind === 'mixed') brush.fillRect(left, top - 1, width / 2, BLOCK_PX + 2);
  if (kind === 'undecided')
    for (let x = left + 1; x < left + width - 1; x += 4) brush.fillRect(x, STOMACH_Y_PX - 1, 2, 2);
  if (kind === 'spoiled' && hatch) {
    brush.fillStyle = hatch;
    brush.fillRect(left, top - 3, width, BLOCK_PX + 6);
  }
}

function paintRate(brush: Brush, { rate, widthPx, tokens }: StripScene): void {
  if (!rate) return;
  const [least, most] = rate.limits;
  const { topPx, bottomPx } = RATE_BOX;
  const yOf = (value: number) => {
    const inside = Math.min(most, Math.max(least, value));
    return bottomPx - ((inside - least) / (most - least)) * (bottomPx - topPx);
  };
  const perColumn = widthPx / rate.low.length;
  const line = new Path2D();
  brush.fillStyle = tokens.heartSoft;
  let joins = false;
  for (let i = 0; i < rate.low.length; i += 1) {
    const mean = rate.mean[i];
    const x = (i + 0.5) * perColumn;
    if (!Number.isNaN(mean)) {
      const top = yOf(rate.high[i]);
      brush.fillRect(x - perColumn / 2, top, perColumn, Math.max(1, yOf(rate.low[i]) - top));
      if (joins) line.lineTo(x, yOf(mean));
      else line.moveTo(x, yOf(mean));
    }
    joins = !Number.isNaN(mean);
  }
  brush.strokeStyle = tokens.heart;
  brush.lineWidth = 1.25;
  brush.stroke(line);
}

function paintSpans(brush: Brush, scene: StripScene): void {
  const { xOf, tokens, hatch, draft, selection } = scene;
  const [top, bottom] = [PHASE_BOX.bottomPx + 4, RATE_BOX.bottomPx];
  for (const one of scene.spans) {
    const span = draftedSpan(one, draft);
    const left = xOf(span.fromS);
    const width = Math.max(1.5, xOf(span.toS) - left);
    const from = span.target === 'heart' ? RATE_BOX.topPx - 2 : top;
    const to = span.target === 'stomach' ? RATE_BOX.topPx - 2 : bottom;
    brush.globalAlpha = 0.6;
    brush.fillStyle = tokens.paper;
    brush.fillRect(left, from, width, to - from);
    brush.globalAlpha = 0.7;
    brush.fillStyle = hatch ?? tokens.quiet;
    brush.fillRect(left, from, width, to - from);
    brush.globalAlpha = 1;
    if (selection.kind !== 'span' || selection.id !== span.id) continue;
    brush.strokeStyle = tokens.focus;
    brush.lineWidth = 2;
    brush.strokeRect(left - 1, from, width + 2, to - from);
  }
  if (draft && draft.spanId === null) {
    brush.globalAlpha = 0.15;
    brush.fillStyle = tokens.ink;
    brush.fillRect(
      xOf(draft.fromS),
      top,
      Math.max(1, xOf(draft.toS) - xOf(draft.fromS)),
      bottom - top,
    );
    brush.globalAlpha = 1;
  }
}

/** A bookmark: a small flag on a staff over the phases. */
function paintFlags(brush: Brush, { bookmarksS, xOf, widthPx, tokens }: StripScene): void {
  for (const atS of bookmarksS) {
    const x = Math.round(xOf(atS));
    const way = x + FLAG.widthPx > widthPx ? -1 : 1;
    brush.beginPath();
    brush.moveTo(x, FLAG.topPx);
    brush.lineTo(x + way * FLAG.widthPx, FLAG.topPx + FLAG.heightPx / 2);
    brush.lineTo(x, FLAG.topPx + FLAG.heightPx);
    brush.closePath();
    brush.strokeStyle = tokens.paper;
    brush.lineWidth = 2;
    brush.stroke();
    brush.fillStyle = tokens.ink;
    brush.fill();
    brush.fillRect(x - 0.5, FLAG.topPx, 1, PHASE_BOX.bottomPx - FLAG.topPx);
  }
}
