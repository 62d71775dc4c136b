/** What a path is drawn on: Path2D, or a test's own. */
export interface PathSink {
  moveTo(x: number, y: number): void;
  lineTo(x: number, y: number): void;
}

/** How times and values fall on pixels: x = x0 + perS * s, y = y0 - perUv * uV. */
export interface PlotScale {
  readonly x0: number;
  readonly perS: number;
  readonly y0: number;
  readonly perUv: number;
}

/**
 * Draws columns [from, to): one vertical line a column from its low to its high, stretched to meet the column before so that
 * the trace has no holes, and broken where values are NaN. Where low and high agree (samples) it is a plain line.
 */
export function traceColumns(
  sink: PathSink,
  timesS: ArrayLike<number>,
  low: ArrayLike<number>,
  high: ArrayLike<number>,
  from: number,
  to: number,
  { x0, perS, y0, perUv }: PlotScale,
): void {
  let lowBefore = Number.NaN;
  let highBefore = Number.NaN;
  for (let i = from; i < to; i += 1) {
    const bottom = low[i];
    const top = high[i];
    if (Number.isNaN(bottom) || Number.isNaN(top)) {
      lowBefore = Number.NaN;
      highBefore = Number.NaN;
      continue;
    }
    const x = x0 + perS * timesS[i];
    if (Number.isNaN(lowBefore)) {
      sink.moveTo(x, y0 - perUv * top);
      sink.lineTo(x, y0 - perUv * bottom + (top === bottom ? 0.01 : 0));
    } else if (top === bottom && lowBefore === highBefore) {
      sink.lineTo(x, y0 - perUv * top);
    } else {
      sink.moveTo(x, y0 - perUv * Math.max(top, lowBefore));
      sink.lineTo(x, y0 - perUv * Math.min(bottom, highBefore));
      if (top === bottom) sink.moveTo(x, y0 - perUv * top);
    }
    lowBefore = bottom;
    highBefore = top;
  }
}
