import { leadKey } from '../recording/lead';
import { drawsDiffer, type SignalAccess } from './analysis-store';
import { boxOf, CanvasLayer, watchSize } from './canvas-layer';
import { paintDoubt } from './doubt-paint';
import { FrameLoop } from './frame-loop';
import { paintGrid } from './grid-paint';
import { Hatch } from './hatch';
import { beginWork, endWork } from './idle';
import { makeRowView } from './make-row';
import { notedEvents, notedWords } from './noted-events';
import type { PaneDom } from './pane-dom';
import type { PaneStores, RowContext, RowView } from './row-view';
import type { Row } from './rows';
import { SignalRowView } from './signal-row';
import { paintSpans, type RowBox } from './span-paint';
import { Staleness } from './staleness';
import type { ThemeTokens } from './theme-tokens';
import { clockText, widthText } from './time-ticks';
import type { TimeWindow, ViewState } from './view-store';

/** How one pane differs from another. */
export interface PaneKind {
  readonly name: 'minutes' | 'seconds';
  readonly title: string;
  readonly coarsest: 'h:mm' | 'h:mm:ss';
  readonly showsPhaseNames: boolean;
  /** Paints above rows and spans. */
  readonly paintOver?: (brush: CanvasRenderingContext2D, view: PaneView) => void;
  /** After a draw: places what is no canvas. */
  readonly drawn?: (view: PaneView) => void;
}

const DESCRIBE_MS = 250;

/** A pane with stacked trace rows on one time axis: lays out, draws and keeps its words up to date, without React. */
export class PaneView {
  readonly loop = new FrameLoop(() => this.draw());
  readonly rows: readonly RowView[];
  boxes: readonly RowBox[] = [];
  widthPx = 1;
  topPx = 0;
  bottomPx = 1;
  private axisPx = 18;
  private readonly under: CanvasLayer;
  readonly over: CanvasLayer;
  private readonly hatch = new Hatch();
  private readonly stops: (() => void)[] = [];
  private readonly staleness: Staleness;
  private describing = 0;
  private drawnAt = 0;

  constructor(
    readonly dom: PaneDom,
    readonly stores: PaneStores,
    signals: SignalAccess,
    readonly kind: PaneKind,
    rows: readonly Row[],
    public tokens: ThemeTokens,
    private readonly scale = 1,
  ) {
    this.under = new CanvasLayer(dom.under, scale);
    this.over = new CanvasLayer(dom.over, scale);
    this.staleness = new Staleness(stores, this.loop.ask);
    const context: RowContext = {
      stores,
      signals,
      tokens: () => this.tokens,
      stale: () => this.staleness.stale,
      scale,
      redraw: this.loop.ask,
    };
    this.rows = rows.map((row) => makeRowView(row, dom, context));
    this.listen();
    this.stops.push(watchSize(dom.body, () => this.layout()));
  }

  get window(): TimeWindow {
    return this.stores.view.getState()[this.kind.name];
  }

  readonly xOf = (atS: number): number => {
    const { fromS, toS } = this.window;
    return ((atS - fromS) / (toS - fromS)) * this.widthPx;
  };

  readonly sAt = (x: number): number => {
    const { fromS, toS } = this.window;
    return fromS + (x / this.widthPx) * (toS - fromS);
  };

  /** Uses the colours of a theme from the next frame on. */
  retheme(tokens: ThemeTokens): void {
    this.tokens = tokens;
    this.loop.ask();
  }

  private listen(): void {
    const { view, analysis, session } = this.stores;
    const { name } = this.kind;
    const drawnFrom = (state: ViewState) =>
      [
        state[name],
        state.gainsUv,
        state.levelsDb,
        state.selection,
        state.draft,
        state.doubt,
        state.preview,
        state.phaseDraft,
        state.identityHidden,
      ] as const;
    this.stops.push(
      view.subscribe((now, before) => {
        const [a, b] = [drawnFrom(now), drawnFrom(before)];
        if (a.some((part, i) => part !== b[i])) this.loop.ask();
        else if (now.seconds !== before.seconds) this.kind.drawn?.(this);
        if (now.cursorS !== before.cursorS || now[name] !== before[name]) this.placeCursor();
      }),
      analysis.subscribe((now, before) => {
        if (now.signalVersion !== before.signalVersion)
          for (const row of this.rows) if (row instanceof SignalRowView) row.refetch();
        if (drawsDiffer(now, before)) this.loop.ask();
      }),
      session.subscribe((now, before) => {
        if (now.session?.state !== before.session?.state) this.loop.ask();
      }),
    );
  }

  private layout(): void {
    const { dom } = this;
    const stage = boxOf(dom.stage, this.scale);
    if (stage.width < 2 || stage.height < 2) return;
    this.widthPx = stage.width;
    this.boxes = this.rows.map((view) => {
      const host = dom.hosts.get(view.row.key);
      const box = host ? boxOf(host, this.scale) : stage;
      view.resize(box.width, box.height);
      return { row: view.row, topPx: box.top - stage.top, heightPx: box.height };
    });
    const last = this.boxes[this.boxes.length - 1];
    this.topPx = this.boxes[0]?.topPx ?? 0;
    this.bottomPx = last ? last.topPx + last.heightPx : stage.height;
    this.axisPx = stage.height - this.bottomPx;
    this.under.resize(stage.width, stage.height);
    this.over.resize(stage.width, stage.height);
    this.loop.ask();
    this.placeCursor();
  }

  private draw(): void {
    const { window } = this;
    if (!(window.toS > window.fromS)) {
      this.under.begin();
      this.over.begin();
      return;
    }
    for (const row of this.rows) row.draw(window);
    this.drawUnder(window);
    this.drawOver(window);
    this.kind.drawn?.(this);
    this.describeSoon();
  }

  private drawUnder(window: TimeWindow): void {
    const brush = this.under.begin();
    if (!brush) return;
    paintGrid(brush, {
      window,
      widthPx: this.widthPx,
      topPx: this.topPx,
      bottomPx: this.bottomPx,
      axisPx: this.axisPx,
      coarsest: this.kind.coarsest,
      phases:
        this.stores.view.getState().phaseDraft?.phases ??
        this.stores.session.getState().session?.state.phases ??
        [],
      events: notedEvents(this.stores),
      headPx: this.kind.showsPhaseNames ? this.topPx : 0,
      xOf: this.xOf,
      tokens: this.tokens,
      font: this.under.font(11),
    });
  }

  private drawOver(window: TimeWindow): void {
    const brush = this.over.begin();
    if (!brush) return;
    const state = this.stores.session.getState().session?.state;
    const { draft, selection } = this.stores.view.getState();
    const heart = state?.roles.heart ?? null;
    paintSpans(brush, {
      spans: state?.spans ?? [],
      draft,
      selection,
      window,
      boxes: this.boxes,
      heartLead: heart && leadKey(heart),
      xOf: this.xOf,
      topPx: this.kind.showsPhaseNames ? 0 : this.topPx,
      bottomPx: this.bottomPx,
      tokens: this.tokens,
      hatch: this.hatch.for(brush, this.tokens.quiet, this.over.ratio, true),
      font: this.over.font(11),
    });
    this.kind.paintOver?.(brush, this);
    paintDoubt(brush, this);
  }

  private placeCursor(): void {
    const { cursorLine, cursorText } = this.dom;
    const { cursorS } = this.stores.view.getState();
    const { fromS, toS } = this.window;
    const inside = cursorS !== null && cursorS >= fromS && cursorS <= toS;
    cursorLine.hidden = !inside;
    cursorText.hidden = !inside;
    if (!inside) return;
    const x = this.xOf(cursorS);
    cursorLine.style.transform = `translateX(${x}px)`;
    cursorText.textContent = clockText(cursorS, this.kind.name === 'minutes' ? 1 : 0.01, 'h:mm:ss');
    const half = this.kind.name === 'minutes' ? 30 : 38;
    const middle = Math.min(Math.max(x, half), this.widthPx - half);
    cursorText.style.transform = `translateX(${middle}px) translateX(-50%)`;
  }

  private describeSoon(): void {
    this.drawnAt = performance.now();
    if (this.describing !== 0) return;
    beginWork();
    this.describing = window.setTimeout(() => this.describe(), DESCRIBE_MS);
  }

  private describe(): void {
    const restMs = this.drawnAt + DESCRIBE_MS - performance.now();
    if (restMs > 1) {
      this.describing = window.setTimeout(() => this.describe(), restMs);
      return;
    }
    this.describing = 0;
    const { fromS, toS } = this.window;
    const clock = (atS: number) => clockText(atS, 1, 'h:mm:ss');
    const from = `${this.kind.title}, ${widthText(toS - fromS)} from ${clock(fromS)} to ${clock(toS)}.`;
    const rows = this.rows.map((row) => `${row.describe()}.`).join(' ');
    this.dom.summary.textContent = `${from} ${rows}${notedWords(this.stores, fromS, toS)}`;
    endWork();
  }

  /** Ends the drawing and leaves nothing of the study behind. */
  destroy(): void {
    for (const stop of this.stops) stop();
    this.staleness.stop();
    this.loop.stop();
    if (this.describing !== 0) {
      clearTimeout(this.describing);
      endWork();
    }
    for (const row of this.rows) row.destroy();
    this.under.begin();
    this.over.begin();
    this.dom.summary.textContent = '';
    this.dom.cursorLine.hidden = true;
    this.dom.cursorText.hidden = true;
    if (this.dom.slot) this.dom.slot.style.width = '0';
  }
}
