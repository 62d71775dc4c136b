import type uPlot from 'uplot';
import { heartRateLine, rateLimits } from './heart-rate';
import { makePlot, plotScale, resizePlot, showWindow } from './plot';
import { ratePath, type ValueLine } from './rate-path';
import type { RowContext, RowView } from './row-view';
import type { ResultRow } from './rows';
import type { TimeWindow } from './view-store';

const JOIN_SPARE_S = 0.05;
const BREATH_JOIN_S = 90;

/** A row of a rate over time: heart rate beat by beat, or breathing. Its limits are those of the whole study. */
export class RateRowView implements RowView {
  private readonly u: uPlot;
  private window: TimeWindow = { fromS: 0, toS: 0 };
  private line: ValueLine | null = null;
  private limits: readonly [number, number] | null = null;
  private source: object | null = null;
  private widthPx = 1;

  constructor(
    readonly row: ResultRow,
    host: HTMLElement,
    private readonly context: RowContext,
    private readonly labels: HTMLElement | null,
  ) {
    this.u = makePlot(host, {
      stroke: () => context.tokens()[context.stale() ? 'quiet' : row.hue],
      width: 1,
      scale: context.scale,
      path: (u) => this.path(u),
    });
  }

  resize(widthPx: number, heightPx: number): void {
    this.widthPx = widthPx;
    resizePlot(this.u, widthPx, heightPx, this.context.scale);
  }

  draw(window: TimeWindow): void {
    this.window = window;
    this.read();
    showWindow(this.u, window, this.limits ?? [0, 1]);
  }

  private read(): void {
    const { heart, breathing } = this.context.stores.analysis.getState();
    const rr = this.row.kind === 'heart-rate' ? (heart?.rr ?? null) : null;
    const breaths = this.row.kind === 'breathing' ? breathing : null;
    const source = rr ?? breaths;
    if (source === this.source) return;
    this.source = source;
    this.line = null;
    if (rr) {
      const { timesS, perMinute } = heartRateLine(rr);
      const apartS = (i: number) => 60 / perMinute[i] + JOIN_SPARE_S;
      this.line = { timesS, values: perMinute, apartS };
    } else if (breaths) {
      const { centresS, perMinute } = breaths;
      this.line = { timesS: centresS, values: perMinute, apartS: () => BREATH_JOIN_S };
    }
    this.limits = this.line && rateLimits(this.line.values);
    if (this.line)
      this.u.setData([this.line.timesS, this.line.values] as unknown as uPlot.AlignedData, false);
    if (this.labels) {
      const [low, high] = this.limits ?? ['', ''];
      this.labels.replaceChildren(edgeLabel(String(high)), edgeLabel(String(low)));
    }
  }

  private path(u: uPlot): Path2D | null {
    if (!this.line || !this.limits) return null;
    const path = new Path2D();
    ratePath(path, this.line, this.window, this.widthPx * this.context.scale, plotScale(u));
    return path;
  }

  describe(): string {
    const limits = this.limits ? `, scale ${this.limits[0]} to ${this.limits[1]} a minute` : '';
    return this.line ? `${this.row.name}${limits}` : `${this.row.name}: none`;
  }

  destroy(): void {
    this.u.destroy();
  }
}

function edgeLabel(text: string): HTMLElement {
  const label = document.createElement('span');
  label.textContent = text;
  return label;
}
