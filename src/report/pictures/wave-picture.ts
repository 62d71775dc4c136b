import {
  at,
  GUTTER,
  label,
  pathThrough,
  picture,
  QUIET,
  STOMACH,
  timeAxis,
  timeScale,
  valueScale,
} from './svg';

/** Columns of a drawn signal: least and greatest value at each time. */
export interface DrawnSignal {
  readonly timesS: ArrayLike<number>;
  readonly low: ArrayLike<number>;
  readonly high: ArrayLike<number>;
}

const PLOT = 56;

/** A stretch of the slow wave for the eye: is there a wave, and how tall is it? `reachUv` is the same for all stretches shown together. */
export function wavePicture(
  signal: DrawnSignal,
  name: string,
  fromS: number,
  toS: number,
  reachUv: number,
): string {
  const x = timeScale(fromS, toS);
  const y = valueScale(-reachUv, reachUv, 2, PLOT);
  const points: (readonly [number, number])[] = [];
  for (let i = 0; i < signal.timesS.length; i += 1) {
    const time = signal.timesS[i];
    if (time < fromS || time > toS) continue;
    points.push([x(time), y(signal.low[i])]);
    if (signal.high[i] !== signal.low[i]) points.push([x(time), y(signal.high[i])]);
  }
  const barUv = niceBar(reachUv);
  return picture(PLOT + 20, `Slow wave, ${name}`, [
    label(2, 12, name),
    `<path d="${pathThrough(points)}" stroke="${STOMACH}" stroke-width="1"/>`,
    `<path d="M${GUTTER - 6} ${at(y(barUv / 2))}V${at(y(-barUv / 2))}" stroke="${STOMACH}" stroke-width="2"/>`,
    label(GUTTER - 10, y(0) + 3, `${barUv} µV`, 'end', QUIET),
    timeAxis(fromS, toS, PLOT),
  ]);
}

const BARS_UV = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10000];

/** A round bar of about half the height of the picture. */
export function niceBar(reachUv: number): number {
  return BARS_UV.findLast((bar) => bar <= reachUv) ?? BARS_UV[0];
}

/** The reach that shows all but the rarest hundredth of a signal's columns, at least 1 uV. */
export function reachOf(signals: readonly DrawnSignal[]): number {
  const heights = signals
    .flatMap(({ low, high }) =>
      Array.from({ length: low.length }, (_, i) => Math.max(-low[i], high[i])),
    )
    .filter((height) => Number.isFinite(height))
    .sort((a, b) => a - b);
  return Math.max(1, 1.15 * (heights.at(Math.floor(0.99 * (heights.length - 1))) ?? 1));
}
