import uPlot from 'uplot';

/** What one trace row draws. Paths and hooks work in canvas pixels (`u.bbox`). */
export interface PlotParts {
  readonly stroke: () => string;
  /** Line width in CSS pixels. */
  readonly width: number;
  /** How much larger than CSS pixels the plot is shown. */
  readonly scale: number;
  readonly path: (u: uPlot) => Path2D | null;
  readonly before?: (u: uPlot) => void;
  readonly after?: (u: uPlot) => void;
}

const NOTHING: uPlot.AlignedData = [
  [0, 1],
  [null, null],
];

/**
 * A uPlot that fills its host with one trace and nothing around it: no axes, legend or cursor of its own. Scales are set by
 * showWindow, never found from the data.
 */
export function makePlot(host: HTMLElement, parts: PlotParts): uPlot {
  const { before, after } = parts;
  return new uPlot(
    {
      width: Math.max(1, host.clientWidth),
      height: Math.max(1, host.clientHeight),
      padding: [0, 0, 0, 0],
      legend: { show: false },
      cursor: { show: false },
      axes: [{ show: false }, { show: false }],
      scales: { x: { time: false, auto: false }, y: { auto: false } },
      series: [
        {},
        {
          stroke: parts.stroke,
          width: parts.width * parts.scale,
          points: { show: false },
          pxAlign: 0,
          paths: (u) => {
            const stroke = parts.path(u);
            return stroke ? { stroke, fill: null, clip: null, flags: 0 } : null;
          },
        },
      ],
      hooks: {
        drawClear: before ? [before] : [],
        draw: after ? [after] : [],
      },
    },
    NOTHING,
    host,
  );
}

/** Gives a plot the size of its host in CSS pixels, as fine as it is shown. */
export function resizePlot(u: uPlot, widthPx: number, heightPx: number, scale: number): void {
  u.setSize({ width: Math.max(1, widthPx * scale), height: Math.max(1, heightPx * scale) });
}

/** Shows [fromS, toS) and [low, high] and draws at once; the path is made anew only where scales or data changed. */
export function showWindow(
  u: uPlot,
  { fromS, toS }: { readonly fromS: number; readonly toS: number },
  [low, high]: readonly [number, number],
): void {
  u.batch(() => {
    u.setScale('x', { min: fromS, max: toS });
    u.setScale('y', { min: low, max: high });
  });
}

/** Pixels of the plot's scales: x = x0 + perS * s, y = y0 - perUv * value, in canvas pixels. */
export function plotScale(u: uPlot): { x0: number; perS: number; y0: number; perUv: number } {
  const { left, top, width, height } = u.bbox;
  const { x, y } = u.scales;
  const [fromS, toS] = [x.min ?? 0, x.max ?? 1];
  const [low, high] = [y.min ?? 0, y.max ?? 1];
  const perS = width / (toS - fromS);
  const perUv = height / (high - low);
  return { x0: left - fromS * perS, perS, y0: top + height + low * perUv, perUv };
}
