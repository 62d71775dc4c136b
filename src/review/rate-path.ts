import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { type PathSink, type PlotScale, traceColumns } from './column-path';

/** A line of values against time; NaN breaks it. `apartS(i)` is the longest time to the point before that still joins. */
export interface ValueLine {
  readonly timesS: ArrayLike<number>;
  readonly values: ArrayLike<number>;
  readonly apartS: (index: number) => number;
}

const POINT_PX = 0.75;
const DENSE = 3;

/**
 * Draws a line of values over [fromS, toS] into `widthPx` pixels: joined points, or, where more than three fall on a pixel,
 * one vertical line a pixel from the least to the greatest. A point without neighbours is a short dash.
 */
export function ratePath(
  sink: PathSink,
  line: ValueLine,
  window: { readonly fromS: number; readonly toS: number },
  widthPx: number,
  scale: PlotScale,
): void {
  const { timesS } = line;
  const from = Math.max(0, firstAtOrAfter(timesS, window.fromS) - 1);
  const to = Math.min(timesS.length, firstAtOrAfter(timesS, window.toS) + 1);
  if (to - from > DENSE * widthPx) densePath(sink, line, from, to, window, widthPx, scale);
  else pointPath(sink, line, from, to, scale);
}

function pointPath(
  sink: PathSink,
  { timesS, values, apartS }: ValueLine,
  from: number,
  to: number,
  { x0, perS, y0, perUv }: PlotScale,
): void {
  const joins = (i: number) =>
    i > from &&
    i < to &&
    !Number.isNaN(values[i]) &&
    !Number.isNaN(values[i - 1]) &&
    timesS[i] - timesS[i - 1] <= apartS(i);
  for (let i = from; i < to; i += 1) {
    if (Number.isNaN(values[i])) continue;
    const x = x0 + perS * timesS[i];
    const y = y0 - perUv * values[i];
    if (joins(i)) sink.lineTo(x, y);
    else if (joins(i + 1)) sink.moveTo(x, y);
    else {
      sink.moveTo(x - POINT_PX, y);
      sink.lineTo(x + POINT_PX, y);
    }
  }
}

function densePath(
  sink: PathSink,
  { timesS, values }: ValueLine,
  from: number,
  to: number,
  { fromS, toS }: { readonly fromS: number; readonly toS: number },
  widthPx: number,
  scale: PlotScale,
): void {
  const columns = Math.max(1, Math.round(widthPx));
  const low = new Float32Array(columns).fill(Number.NaN);
  const high = new Float32Array(columns).fill(Number.NaN);
  const perColumn = (toS - fromS) / columns;
  for (let i = from; i < to; i += 1) {
    const value = values[i];
    const column = Math.floor((timesS[i] - fromS) / perColumn);
    if (Number.isNaN(value) || column < 0 || column >= columns) continue;
    if (!(value >= low[column])) low[column] = value;
    if (!(value <= high[column])) high[column] = value;
  }
  const centres = Float64Array.from(low, (_, i) => fromS + (i + 0.5) * perColumn);
  traceColumns(sink, centres, low, high, 0, columns, scale);
}
