import { leadKey } from '../recording/lead';
import { type Phase, phasesOrWhole } from '../recording/phase';
import { bookmarkAtS } from '../session/bookmark-edits';
import type { Bookmark, SessionState } from '../session/document';
import { drawsDiffer } from './analysis-store';
import { bookmarkWords, goToBookmark } from './bookmarks';
import { boxOf, CanvasLayer, watchSize } from './canvas-layer';
import { FrameLoop } from './frame-loop';
import { panGesture, phaseEdgeGesture, slotEdgeGesture, slotGesture, wheelOver } from './gestures';
import { Hatch } from './hatch';
import { heartRateLine, rateColumns, rateLimits } from './heart-rate';
import { slotPart } from './hit';
import type { PaneActs } from './pane-acts';
import { changePhases } from './phase-commands';
import { edgeNear, type PhaseEdge } from './phase-edges';
import { pointing } from './pointed-time';
import type { PaneStores } from './row-view';
import type { Gesture, StageActs } from './stage';
import { Staleness } from './staleness';
import { stomachBlocks } from './stomach-blocks';
import { FLAG, PHASE_BOX, paintStrip, type StripScene } from './strip-paint';
import { stripSpans } from './strip-spans';
import type { ThemeTokens } from './theme-tokens';
import { clockText, widthText } from './time-ticks';
import { lookAtMinutes, lookAtSeconds } from './view-store';

/** The elements of the strip. */
export interface StripDom {
  readonly stage: HTMLElement;
  readonly canvas: HTMLCanvasElement;
  readonly slot: HTMLElement;
  readonly innerSlot: HTMLElement;
  readonly cursorLine: HTMLElement;
  readonly summary: HTMLElement;
}

/** The strip over the whole study: phases, stomach row, heart rate, spoiled spans, the Minutes slot. */
export class StripView {
  private readonly loop = new FrameLoop(() => this.draw());
  private readonly layer: CanvasLayer;
  private readonly hatch = new Hatch();
  private readonly stops: (() => void)[] = [];
  private rate: { source: object; columns: StripScene['rate'] } | null = null;
  private readonly staleness: Staleness;
  private widthPx = 1;

  constructor(
    private readonly dom: StripDom,
    private readonly stores: PaneStores,
    private readonly act: PaneActs,
    private tokens: ThemeTokens,
    private readonly scale = 1,
  ) {
    this.layer = new CanvasLayer(dom.canvas, scale);
    this.staleness = new Staleness(stores, this.loop.ask);
    const { view, analysis, session } = stores;
    this.stops.push(
      watchSize(dom.stage, () => this.layout()),
      analysis.subscribe((now, before) => {
        if (drawsDiffer(now, before)) this.loop.ask();
      }),
      session.subscribe((now, before) => {
        if (now.session?.state !== before.session?.state) this.loop.ask();
      }),
      view.subscribe((now, before) => {
        if (now.durationS !== before.durationS || now.draft !== before.draft) this.loop.ask();
        if (now.selection !== before.selection || now.phaseDraft !== before.phaseDraft)
          this.loop.ask();
        if (now.minutes !== before.minutes || now.seconds !== before.seconds) this.placeSlots();
        if (now.cursorS !== before.cursorS) this.placeCursor();
      }),
    );
  }

  readonly xOf = (atS: number): number =>
    (atS / Math.max(1e-9, this.stores.view.getState().durationS)) * this.widthPx;

  readonly sAt = (x: number): number => (x / this.widthPx) * this.stores.view.getState().durationS;

  retheme(tokens: ThemeTokens): void {
    this.tokens = tokens;
    this.loop.ask();
  }

  private layout(): void {
    const { width, height } = boxOf(this.dom.stage, this.scale);
    if (width < 2) return;
    this.widthPx = width;
    this.rate = null;
    this.layer.resize(width, height);
    this.loop.ask();
    this.placeSlots();
    this.placeCursor();
  }

  private state(): SessionState | null {
    return this.stores.session.getState().session?.state ?? null;
  }

  phases(): readonly Phase[] {
    return this.stores.view.getState().phaseDraft?.phases ?? this.state()?.phases ?? [];
  }

  private bookmarks(): readonly Bookmark[] {
    return this.state()?.bookmarks ?? [];
  }

  /** The bookmark whose flag is under a place. */
  bookmarkAt(x: number, y: number): Bookmark | null {
    if (y > FLAG.topPx + FLAG.heightPx + 2) return null;
    const near = this.bookmarks().filter(
      (one) => Math.abs(x - this.xOf(bookmarkAtS(one))) <= FLAG.widthPx,
    );
    return near.at(-1) ?? null;
  }

  private rateNow(durationS: number): StripScene['rate'] {
    const rr = this.stores.analysis.getState().heart?.rr;
    if (!rr || !(durationS > 0)) return null;
    if (this.rate?.source !== rr) {
      const line = heartRateLine(rr);
      const limits = rateLimits(line.perMinute);
      const columns = Math.max(1, Math.round(this.widthPx / 2));
      const found = limits && { ...rateColumns(line, durationS, columns), limits };
      this.rate = { source: rr, columns: found };
    }
    return this.rate.columns;
  }

  private draw(): void {
    const brush = this.layer.begin();
    const { durationS, draft, selection } = this.stores.view.getState();
    const state = this.state();
    this.dom.slot.hidden = !state || !(durationS > 0);
    this.dom.innerSlot.hidden = this.dom.slot.hidden;
    if (!brush || this.dom.slot.hidden) {
      this.dom.summary.textContent = '';
      return;
    }
    const reported = state?.roles.slow[state.roles.reported];
    const { stomach } = this.stores.analysis.getState();
    const key = reported && leadKey(reported);
    const epochs = stomach.find((one) => one.lead === key)?.epochs ?? [];
    const scene: StripScene = {
      widthPx: this.widthPx,
      phases: phasesOrWhole(this.phases(), durationS),
      blocks: stomachBlocks(epochs, state?.settings.epoch.stepS ?? 60),
      rate: this.rateNow(durationS),
      spans: stripSpans(state?.spans ?? [], {
        stomach: key ?? null,
        heart: state?.roles.heart ? leadKey(state.roles.heart) : null,
      }),
      bookmarksS: this.bookmarks().map(bookmarkAtS),
      draft,
      selection,
      xOf: this.xOf,
      tokens: this.staleness.stale ? greyed(this.tokens) : this.tokens,
      hatch: this.hatch.for(brush, this.tokens.quiet, this.layer.ratio, true),
      font: this.layer.font(11),
    };
    paintStrip(brush, scene);
    this.describe(scene, durationS);
  }

  private describe(scene: StripScene, durationS: number): void {
    const clock = (atS: number) => clockText(atS, 1, 'h:mm:ss');
    const phases = scene.phases.map(
      (one) => `${one.name} ${clock(one.fromS)} to ${clock(one.toS)}`,
    );
    const count = (kind: string) => scene.blocks.filter((one) => one.kind === kind).length;
    const kinds = ['brady', 'normo', 'tachy', 'none', 'mixed', 'undecided', 'spoiled']
      .filter((kind) => count(kind) > 0)
      .map((kind) => `${count(kind)} ${kind}`);
    const limits = scene.rate?.limits;
    const rate = limits ? ` Heart rate on a scale of ${limits[0]} to ${limits[1]} a minute.` : '';
    const spans = `${scene.spans.length} spoiled ${scene.spans.length === 1 ? 'span' : 'spans'}.`;
    const flags = this.bookmarks().map(
      (one, i, all) => ` ${bookmarkWords(one, i + 1, all.length)}.`,
    );
    const told = `Whole study, ${widthText(durationS)}. ${phases.join(', ')}. Stomach row, epochs: ${
      kinds.join(', ') || 'none yet'
    }.${rate} ${spans}${flags.join('')}`;
    if (this.dom.summary.textContent !== told) this.dom.summary.textContent = told;
  }

  private placeSlots(): void {
    const { minutes, seconds } = this.stores.view.getState();
    for (const [slot, { fromS, toS }] of [
      [this.dom.slot, minutes],
      [this.dom.innerSlot, seconds],
    ] as const) {
      const left = this.xOf(fromS);
      slot.style.transform = `translateX(${left}px)`;
      slot.style.width = `${Math.max(1, this.xOf(toS) - left)}px`;
    }
  }

  private placeCursor(): void {
    const { cursorS } = this.stores.view.getState();
    this.dom.cursorLine.hidden = cursorS === null;
    if (cursorS !== null)
      this.dom.cursorLine.style.transform = `translateX(${this.xOf(cursorS)}px)`;
  }

  /** The border of a phase under a place in the phases' row. */
  edgeAt(x: number, y: number): PhaseEdge | null {
    if (y > PHASE_BOX.bottomPx) return null;
    return edgeNear(this.phases(), x, this.xOf);
  }

  edgeGesture(edge: PhaseEdge): Gesture {
    const { stores } = this;
    const pointed = pointing(stores, this, Math.round);
    return phaseEdgeGesture(stores.view, pointed, this.phases(), edge, (phases) =>
      changePhases(stores, this.act, phases),
    );
  }

  destroy(): void {
    for (const stop of this.stops) stop();
    this.staleness.stop();
    this.loop.stop();
  }
}

/** A theme with the organs' hues taken out, for results that are being computed again. */
const greyed = (tokens: ThemeTokens): ThemeTokens => ({
  ...tokens,
  stomach: tokens.quiet,
  heart: tokens.quiet,
  heartSoft: tokens.rule,
});

/** How the strip answers the pointer. */
export function stripActs(strip: StripView, { view }: PaneStores): StageActs {
  const click = (x: number) => {
    lookAtMinutes(view, strip.sAt(x));
    lookAtSeconds(view, strip.sAt(x));
  };
  const clickInSlot = (x: number) => lookAtSeconds(view, strip.sAt(x));
  const slotAt = (x: number) => {
    const { minutes } = view.getState();
    return slotPart(x, strip.xOf(minutes.fromS), strip.xOf(minutes.toS));
  };
  return {
    press: (x, y) => {
      const flag = strip.bookmarkAt(x, y);
      if (flag) return { click: () => goToBookmark(view, flag) };
      const edge = strip.edgeAt(x, y);
      if (edge) return strip.edgeGesture(edge);
      const part = slotAt(x);
      if (part === 'body') return slotGesture(view, 'minutes', strip, x, clickInSlot);
      if (part) return slotEdgeGesture(view, 'minutes', part, strip, x);
      return stripPan(strip, view, x, click);
    },
    hover: (x, y) => {
      if (strip.bookmarkAt(x, y)) return 'pointer';
      if (strip.edgeAt(x, y)) return 'ew-resize';
      const part = slotAt(x);
      if (part === 'body') return 'grab';
      return part ? 'ew-resize' : 'pointer';
    },
    point: (x) => view.setState({ cursorS: x === null ? null : strip.sAt(x) }),
    wheel: (x, event) => wheelOver(view, 'minutes', strip, x, event),
  };
}

/** Outside the slot a press brings the slot there and a drag takes it along. */
function stripPan(
  strip: StripView,
  view: PaneStores['view'],
  x: number,
  click: (x: number) => void,
): Gesture {
  const still = panGesture(view, 'minutes', strip, x, click);
  return { ...still, move: (to) => lookAtMinutes(view, strip.sAt(to)) };
}
