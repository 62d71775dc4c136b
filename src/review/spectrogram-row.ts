import type uPlot from 'uplot';
import type { SlowWaveRhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import { dfPieces } from './df-line';
import { Hatch } from './hatch';
import { asWork } from './idle';
import { makePlot, plotScale, resizePlot, showWindow } from './plot';
import { colourLevels, fittedLevels, rampTable } from './ramp';
import type { RowContext, RowView } from './row-view';
import type { ResultRow } from './rows';
import { missingStretches, type SpectrogramRun, spectrogramRuns } from './spectrogram-image';
import type { ThemeTokens } from './theme-tokens';
import type { TimeWindow } from './view-store';

interface Picture {
  readonly rhythm: SlowWaveRhythm;
  readonly tokens: ThemeTokens;
  readonly levels: readonly [number, number];
}

/** Least and greatest rate shown: 1-9 cpm, wider where the band limits are. */
export function shownCpm(settings: Settings | null): readonly [number, number] {
  const bands = settings?.rhythmBands;
  return [Math.min(1, bands?.lowCpm ?? 1), Math.max(9, bands?.highCpm ?? 9)];
}

/** The running spectrum of the reported lead with the DF line over it. */
export class SpectrogramRowView implements RowView {
  private readonly u: uPlot;
  private window: TimeWindow = { fromS: 0, toS: 0 };
  private picture: Picture | null = null;
  private bitmap: ImageBitmap | null = null;
  private runs: readonly SpectrogramRun[] = [];
  private missing: readonly TimeWindow[] = [];
  private fitted: readonly [number, number] = [0, 60];
  private ratio = 1;
  private readonly hatch = new Hatch();
  private scaleShown = '';
  private gone = false;

  constructor(
    readonly row: ResultRow,
    host: HTMLElement,
    private readonly context: RowContext,
    private readonly scale: {
      readonly bar: HTMLCanvasElement;
      readonly labels: HTMLElement;
    } | null,
  ) {
    this.u = makePlot(host, {
      stroke: () => context.tokens().dfLine,
      width: 1,
      scale: context.scale,
      path: () => null,
      before: (u) => this.paint(u),
      after: (u) => this.drawDf(u),
    });
  }

  resize(widthPx: number, heightPx: number): void {
    resizePlot(this.u, widthPx, heightPx, this.context.scale);
    this.ratio = this.u.bbox.width / Math.max(1, widthPx);
  }

  draw(window: TimeWindow): void {
    this.window = window;
    this.refresh();
    showWindow(this.u, window, shownCpm(this.settings()));
    this.showScale();
  }

  private settings(): Settings | null {
    return this.context.stores.session.getState().session?.state.settings ?? null;
  }

  private rhythm(): SlowWaveRhythm | null {
    const { stomach } = this.context.stores.analysis.getState();
    return stomach.find((one) => one.lead === this.row.leadKey) ?? null;
  }

  /** Ends of the level scale in force. */
  levels(): readonly [number, number] {
    return this.context.stores.view.getState().levelsDb ?? this.fitted;
  }

  private refresh(): void {
    const rhythm = this.rhythm();
    const tokens = this.context.tokens();
    const { levelsDb } = this.context.stores.view.getState();
    if (rhythm && rhythm !== this.picture?.rhythm) {
      this.fitted = fittedLevels(rhythm.spectrogram.levelDb);
      this.runs = spectrogramRuns(rhythm.spectrogram);
      this.missing = missingStretches(rhythm.spectrogram);
    }
    const levels = levelsDb ?? this.fitted;
    const { picture } = this;
    const same =
      picture?.rhythm === rhythm &&
      picture?.tokens === tokens &&
      picture?.levels[0] === levels[0] &&
      picture?.levels[1] === levels[1];
    if (same) return;
    if (!rhythm) {
      this.picture = null;
      this.bitmap = null;
      this.missing = [];
      return;
    }
    this.picture = { rhythm, tokens, levels };
    void asWork(this.colour(this.picture));
  }

  private async colour(picture: Picture): Promise<void> {
    const { centresS, binCount, levelDb } = picture.rhythm.spectrogram;
    if (centresS.length === 0 || binCount === 0) {
      this.bitmap = null;
      return;
    }
    const table = rampTable(picture.tokens.ramp);
    const pixels = colourLevels(levelDb, centresS.length, binCount, picture.levels, table);
    const bitmap = await createImageBitmap(new ImageData(pixels, centresS.length, binCount));
    if (this.picture !== picture || this.gone) bitmap.close();
    else {
      this.bitmap?.close();
      this.bitmap = bitmap;
      this.context.redraw();
    }
  }

  private paint(u: uPlot): void {
    const { picture, bitmap } = this;
    const { ctx, bbox } = u;
    const { x0, perS, y0, perUv } = plotScale(u);
    ctx.save();
    ctx.beginPath();
    ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height);
    ctx.clip();
    if (picture && bitmap) {
      const { firstCpm, stepCpm, binCount } = picture.rhythm.spectrogram;
      const top = y0 - perUv * (firstCpm + stepCpm * (binCount - 0.5));
      const height = perUv * stepCpm * binCount;
      for (const { first, count, fromS, toS } of this.runs)
        if (toS > this.window.fromS && fromS < this.window.toS)
          ctx.drawImage(
            bitmap,
            first,
            0,
            count,
            binCount,
            x0 + perS * fromS,
            top,
            perS * (toS - fromS),
            height,
          );
    }
    this.hatchMissing(u);
    this.drawLimits(u);
    ctx.restore();
  }

  private hatchMissing(u: uPlot): void {
    const pattern = this.hatch.for(u.ctx, this.context.tokens().quiet, this.ratio, false);
    if (!pattern || this.missing.length === 0) return;
    const { x0, perS } = plotScale(u);
    u.ctx.fillStyle = pattern;
    u.ctx.globalAlpha = 0.45;
    for (const { fromS, toS } of this.missing)
      if (toS > this.window.fromS && fromS < this.window.toS)
        u.ctx.fillRect(x0 + perS * fromS, u.bbox.top, perS * (toS - fromS), u.bbox.height);
    u.ctx.globalAlpha = 1;
  }

  private drawLimits(u: uPlot): void {
    const bands = this.settings()?.rhythmBands;
    if (!bands) return;
    const { y0, perUv } = plotScale(u);
    const { tokens } = this.context;
    u.ctx.setLineDash([5 * this.ratio, 4 * this.ratio]);
    for (const [colour, width] of [
      [tokens().dfHalo, 3],
      [tokens().quiet, 1],
    ] as const) {
      u.ctx.strokeStyle = colour;
      u.ctx.lineWidth = width * this.ratio;
      u.ctx.globalAlpha = width === 3 ? 0.5 : 1;
      u.ctx.beginPath();
      for (const cpm of [bands.normoLowCpm, bands.normoHighCpm]) {
        const y = y0 - perUv * cpm;
        u.ctx.moveTo(u.bbox.left, y);
        u.ctx.lineTo(u.bbox.left + u.bbox.width, y);
      }
      u.ctx.stroke();
    }
    u.ctx.globalAlpha = 1;
    u.ctx.setLineDash([]);
  }

  private drawDf(u: uPlot): void {
    const rhythm = this.rhythm();
    const stepS = this.settings()?.epoch.stepS;
    if (!rhythm || stepS === undefined) return;
    const { x0, perS, y0, perUv } = plotScale(u);
    const line = new Path2D();
    const marks = new Path2D();
    const radius = 3 * this.ratio;
    for (const piece of dfPieces(rhythm.epochs, stepS)) {
      piece.forEach((point, i) => {
        const x = x0 + perS * point.atS;
        const y = y0 - perUv * point.dfCpm;
        if (i === 0) line.moveTo(x - (piece.length === 1 ? radius : 0), y);
        if (i > 0 || piece.length === 1) line.lineTo(x + (piece.length === 1 ? radius : 0), y);
        if (point.flagged) {
          marks.moveTo(x + radius, y);
          marks.arc(x, y, radius, 0, 2 * Math.PI);
        }
      });
    }
    this.strokeWithHalo(u.ctx, line, marks);
  }

  private strokeWithHalo(ctx: CanvasRenderingContext2D, line: Path2D, marks: Path2D): void {
    const { dfHalo, dfLine } = this.context.tokens();
    ctx.save();
    ctx.globalAlpha = this.context.stale() ? 0.4 : 1;
    ctx.lineJoin = 'round';
    ctx.strokeStyle = dfHalo;
    ctx.lineWidth = 4.5 * this.ratio;
    ctx.stroke(line);
    ctx.stroke(marks);
    ctx.strokeStyle = dfLine;
    ctx.lineWidth = 1.5 * this.ratio;
    ctx.stroke(line);
    ctx.fillStyle = dfHalo;
    ctx.fill(marks);
    ctx.stroke(marks);
    ctx.restore();
  }

  private showScale(): void {
    if (!this.scale) return;
    const { bar, labels } = this.scale;
    const { ramp } = this.context.tokens();
    const [low, high] = this.levels();
    const shown = `${low} ${high} ${ramp[0]} ${this.picture !== null}`;
    if (shown === this.scaleShown) return;
    this.scaleShown = shown;
    const [highest, lowest] = labels.children;
    if (highest) highest.textContent = `${high} dB`;
    if (lowest) lowest.textContent = String(low);
    bar.width = 1;
    bar.height = 64;
    const brush = bar.getContext('2d');
    if (!brush) return;
    const table = rampTable(ramp);
    for (let y = 0; y < 64; y += 1) {
      const [red, green, blue] = table.subarray((255 - y * 4) * 4);
      brush.fillStyle = `rgb(${red} ${green} ${blue})`;
      brush.fillRect(0, y, 1, 1);
    }
  }

  describe(): string {
    const rhythm = this.rhythm();
    if (!rhythm) return 'Spectrogram: none yet';
    const [from, to] = shownCpm(this.settings());
    const [low, high] = this.levels();
    const found = rhythm.epochs.filter(
      (one) =>
        one.kept &&
        one.dfCpm !== null &&
        one.toS > this.window.fromS &&
        one.fromS < this.window.toS,
    );
    const rates = found.flatMap((one) => (one.dfCpm === null ? [] : [one.dfCpm]));
    const range = (values: readonly number[]) =>
      `${Math.min(...values).toFixed(2)} to ${Math.max(...values).toFixed(2)} cpm`;
    const df = rates.length > 0 ? `, DF ${range(rates)}` : '';
    return `Spectrogram ${from} to ${to} cpm, ${low} to ${high} dB${df}`;
  }

  destroy(): void {
    this.gone = true;
    this.bitmap?.close();
    this.bitmap = null;
    this.u.destroy();
  }
}
