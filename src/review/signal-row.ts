import type uPlot from 'uplot';
import type { Columns } from '../../workers/analysis-api';
import { firstAtOrAfter } from '../numeric/first-at-or-after';
import type { Interval } from '../recording/span';
import { traceColumns } from './column-path';
import { ColumnsFeed } from './columns-feed';
import { crestsPerMinute } from './crest-counts';
import { wholeStudyGain } from './fit';
import { middleUv } from './gain';
import { asWork } from './idle';
import { makePlot, plotScale, resizePlot, showWindow } from './plot';
import type { RowContext, RowView } from './row-view';
import type { SignalRow } from './rows';
import type { TimeWindow } from './view-store';

const CREST_ROOM_PX = 17;
const TICK_ROOM_PX = 7;
/** Rows lower than this show the ticks of the crests without their counts. */
const LEAST_COUNTED_PX = 36;
const LEAST_CREST_PX = 3;
const LEAST_DIGIT_PX = 12;

/** A row of one drawn signal: recorded lead, slow wave with its crests, or heartbeat. */
export class SignalRowView implements RowView {
  private readonly u: uPlot;
  private readonly feed: ColumnsFeed;
  private window: TimeWindow = { fromS: 0, toS: 0 };
  private widthPx = 0;
  private heightPx = 0;
  private family = 'sans-serif';
  private fitting = false;
  /** Counts the fits asked for, so that one of signals that are no more is not taken. */
  private fitNumber = 0;
  private gone = false;

  constructor(
    readonly row: SignalRow,
    host: HTMLElement,
    private readonly context: RowContext,
  ) {
    const { lead, signal } = row;
    this.feed = new ColumnsFeed(
      (span) => context.signals.columns({ lead, signal, ...span }),
      () => this.take(),
    );
    this.u = makePlot(host, {
      stroke: () => context.tokens()[row.hue],
      width: row.hue === 'quiet' ? 1 : 1.25,
      scale: context.scale,
      path: (u) => this.path(u),
      before: (u) => this.shadeUnclean(u),
      after: (u) => this.markCrests(u),
    });
  }

  private take(): void {
    const { held } = this.feed;
    if (!held || this.gone) return;
    this.u.setData([held.timesS, held.low, held.high] as unknown as uPlot.AlignedData, false);
    this.context.redraw();
  }

  /** Forgets the columns: what they show has changed. */
  refetch(): void {
    this.feed.drop();
    this.fitting = false;
    this.fitNumber += 1;
    this.u.setData(
      [
        [0, 1],
        [null, null],
      ],
      false,
    );
  }

  resize(widthPx: number, heightPx: number): void {
    this.widthPx = widthPx;
    this.heightPx = heightPx;
    this.family = getComputedStyle(this.u.root).fontFamily;
    resizePlot(this.u, widthPx, heightPx, this.context.scale);
  }

  draw(window: TimeWindow): void {
    const { view, analysis } = this.context.stores;
    const { durationS, gainsUv } = view.getState();
    this.window = window;
    if (analysis.getState().fileAtHand) {
      this.feed.see(window, durationS, this.widthPx * this.context.scale);
      if (gainsUv[this.row.key] === undefined) this.fit(window);
    }
    const gain = gainsUv[this.row.key] ?? 100;
    const centre = this.row.centred ? this.centreUv(window) : 0;
    const room = this.row.signal === 'slow-wave' ? this.crestRoomUv(gain) : 0;
    showWindow(this.u, window, [centre - gain, centre + gain + room]);
  }

  private crestRoomPx(): number {
    return this.heightPx < LEAST_COUNTED_PX ? TICK_ROOM_PX : CREST_ROOM_PX;
  }

  private crestRoomUv(gain: number): number {
    const roomPx = this.crestRoomPx();
    return (2 * gain * roomPx) / Math.max(1, this.heightPx - roomPx);
  }

  private fit(window: TimeWindow): void {
    if (this.fitting) return;
    this.fitting = true;
    const { fitNumber } = this;
    const { view } = this.context.stores;
    const { durationS } = view.getState();
    const wanted = wholeStudyGain(this.context.signals, this.row, window, durationS);
    const store = (gain: number | null): void => {
      if (fitNumber !== this.fitNumber) return;
      this.fitting = gain === null;
      if (gain === null || view.getState().gainsUv[this.row.key] !== undefined) return;
      view.setState((now) => ({ gainsUv: { ...now.gainsUv, [this.row.key]: gain } }));
    };
    void asWork(wanted.then(store));
  }

  private visible(columns: Columns): readonly [number, number] {
    const from = Math.max(0, firstAtOrAfter(columns.timesS, this.window.fromS) - 1);
    const to = Math.min(columns.timesS.length, firstAtOrAfter(columns.timesS, this.window.toS) + 1);
    return [from, to];
  }

  private centreUv(window: TimeWindow): number {
    const { held } = this.feed;
    if (!held) return 0;
    const { timesS } = held;
    return middleUv(held, firstAtOrAfter(timesS, window.fromS), firstAtOrAfter(timesS, window.toS));
  }

  private path(u: uPlot): Path2D | null {
    const { held } = this.feed;
    if (!held) return null;
    const path = new Path2D();
    const [from, to] = this.visible(held);
    traceColumns(path, held.timesS, held.low, held.high, from, to, plotScale(u));
    return path;
  }

  private unclean(): readonly Interval[] {
    const { separation } = this.context.stores.analysis.getState();
    return separation.find((one) => one.lead === this.row.leadKey)?.unclean ?? [];
  }

  private shadeUnclean(u: uPlot): void {
    if (this.row.signal === 'recorded') return;
    const unclean = this.unclean();
    if (unclean.length === 0) return;
    const { x0, perS } = plotScale(u);
    u.ctx.save();
    u.ctx.globalAlpha = 0.6;
    u.ctx.fillStyle = this.context.tokens().rule;
    for (const { fromS, toS } of unclean)
      if (toS > this.window.fromS && fromS < this.window.toS)
        u.ctx.fillRect(x0 + fromS * perS, u.bbox.top, (toS - fromS) * perS, u.bbox.height);
    u.ctx.restore();
  }

  private markCrests(u: uPlot): void {
    if (this.row.signal !== 'slow-wave') return;
    const { stomach } = this.context.stores.analysis.getState();
    const crests = stomach.find((one) => one.lead === this.row.leadKey)?.crestsS;
    if (!crests) return;
    const { x0, perS } = plotScale(u);
    const ratio = u.bbox.width / Math.max(1, this.widthPx);
    const from = firstAtOrAfter(crests, this.window.fromS);
    const to = firstAtOrAfter(crests, this.window.toS);
    u.ctx.save();
    if ((this.widthPx * ratio) / Math.max(1, to - from) >= LEAST_CREST_PX * ratio) {
      u.ctx.strokeStyle = this.context.tokens().stomach;
      u.ctx.lineWidth = ratio;
      u.ctx.beginPath();
      for (let i = from; i < to; i += 1) {
        const x = x0 + crests[i] * perS;
        u.ctx.moveTo(x, u.bbox.top + (this.crestRoomPx() - 6) * ratio);
        u.ctx.lineTo(x, u.bbox.top + (this.crestRoomPx() - 1) * ratio);
      }
      u.ctx.stroke();
    }
    const counted = this.crestRoomPx() === CREST_ROOM_PX && perS * 60 >= LEAST_DIGIT_PX * ratio;
    if (counted) this.writeCounts(u, crests, ratio);
    u.ctx.restore();
  }

  private writeCounts(u: uPlot, crests: Float64Array, ratio: number): void {
    const { x0, perS } = plotScale(u);
    u.ctx.fillStyle = this.context.tokens().quiet;
    u.ctx.font = `${11 * ratio}px ${this.family}`;
    u.ctx.textAlign = 'center';
    u.ctx.textBaseline = 'top';
    const { durationS } = this.context.stores.view.getState();
    for (const { atS, count } of crestsPerMinute(crests, this.window, durationS, this.unclean()))
      u.ctx.fillText(String(count), x0 + atS * perS, u.bbox.top + ratio);
  }

  describe(): string {
    const { held } = this.feed;
    const gain = this.context.stores.view.getState().gainsUv[this.row.key];
    const name = `${this.row.name}, ${this.row.note}`;
    if (!held) return `${name}: not drawn`;
    const [from, to] = this.visible(held);
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (let i = from; i < to; i += 1) {
      if (held.low[i] < low) low = held.low[i];
      if (held.high[i] > high) high = held.high[i];
    }
    if (low > high) return `${name}: nothing recorded here`;
    const size = gain === undefined ? '' : `, ${gain} uV from middle to edge`;
    return `${name}: ${Math.round(low)} to ${Math.round(high)} uV${size}`;
  }

  destroy(): void {
    this.gone = true;
    this.feed.drop();
    this.u.destroy();
  }
}
