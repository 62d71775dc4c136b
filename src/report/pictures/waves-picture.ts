import type { Interval } from '../../recording/span';
import { formatClock } from '../../units/time';
import {
  at,
  GUTTER,
  hatched,
  INK,
  label,
  line,
  PLOT_END,
  pathThrough,
  picture,
  QUIET,
  RULE,
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

/** A stretch of the slow wave to show. */
export interface WaveExcerpt {
  readonly name: string;
  readonly fromS: number;
  readonly toS: number;
  readonly signal: DrawnSignal;
}

const TITLE = 14;
const PLOT = 64;
const ROW = TITLE + PLOT + 20;
const BETWEEN = 56;

/**
 * Stretches of the slow wave for the eye, two in a row: is there a wave, and how tall is it? All have the same scale in uV, so
 * that before and after the meal can be compared. Dotted where spoiled: what stands there is foretold or disturbed.
 */
export function wavesPicture(
  excerpts: readonly WaveExcerpt[],
  spoiled: readonly Interval[],
): string {
  const reachUv = reachOf(excerpts, spoiled);
  const inRow = Math.min(2, excerpts.length);
  const width = (PLOT_END - GUTTER - (inRow - 1) * BETWEEN) / inRow;
  const rows = Math.ceil(excerpts.length / 2);
  const drawn = excerpts.map((excerpt, i) => {
    const fromX = GUTTER + (i % 2) * (width + BETWEEN);
    return excerptPart(excerpt, spoiled, {
      fromX,
      toX: fromX + width,
      top: Math.floor(i / 2) * ROW,
      reachUv,
    });
  });
  const bars = Array.from({ length: rows }, (_, row) => heightBar(row * ROW + TITLE, reachUv));
  return picture(rows * ROW, 'Slow wave', [...bars, ...drawn]);
}

const liesIn = (stretches: readonly Interval[], time: number): boolean =>
  stretches.some(({ fromS, toS }) => time >= fromS && time <= toS);

interface Place {
  readonly fromX: number;
  readonly toX: number;
  readonly top: number;
  readonly reachUv: number;
}

function excerptPart(
  { name, fromS, toS, signal }: WaveExcerpt,
  spoiled: readonly Interval[],
  { fromX, toX, top, reachUv }: Place,
): string {
  const scale = timeScale(fromS, toS, fromX, toX);
  const plotTop = top + TITLE;
  const bottom = plotTop + PLOT;
  const y = valueScale(-reachUv, reachUv, plotTop, bottom);
  const inside = (uv: number) => Math.min(bottom, Math.max(plotTop, y(uv)));
  const pieces: { readonly spoiled: boolean; readonly points: [number, number][] }[] = [];
  for (let i = 0; i < signal.timesS.length; i += 1) {
    const time = signal.timesS[i];
    if (time < fromS || time > toS) continue;
    const here: [number, number][] = [[scale.x(time), inside(signal.low[i])]];
    if (signal.high[i] !== signal.low[i]) here.push([scale.x(time), inside(signal.high[i])]);
    const isSpoiled = liesIn(spoiled, time);
    const last = pieces.at(-1);
    if (last?.spoiled === isSpoiled) last.points.push(...here);
    else pieces.push({ spoiled: isSpoiled, points: here });
  }
  const drawn = (which: boolean) =>
    pieces.flatMap((one) => (one.spoiled === which ? [pathThrough(one.points)] : [])).join('');
  return [
    hatched(spoiled, scale, plotTop, bottom),
    line(fromX, y(0), toX, y(0), RULE, 'stroke-width="0.5"'),
    `<path d="${drawn(false)}" stroke="${STOMACH}" stroke-width="1.1" stroke-linejoin="round"/>`,
    `<path d="${drawn(true)}" stroke="${STOMACH}" stroke-width="0.7" stroke-dasharray="1 2"/>`,
    label(fromX, top + 9, `${name}, ${formatClock(fromS)}–${formatClock(toS)}`, 'start', INK),
    timeAxis(scale, bottom),
  ].join('');
}

function heightBar(top: number, reachUv: number): string {
  const y = valueScale(-reachUv, reachUv, top, top + PLOT);
  const barUv = niceBar(reachUv);
  const x = GUTTER - 8;
  return (
    `<path d="M${x} ${at(y(barUv / 2))}V${at(y(-barUv / 2))}" stroke="${INK}" stroke-width="2"/>` +
    label(x - 6, y(0) + 3.5, `${barUv} µV`, 'end', QUIET)
  );
}

const BARS_UV = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10000];

/** A round bar of at most half the height of the picture. */
export function niceBar(reachUv: number): number {
  return BARS_UV.findLast((bar) => bar <= reachUv) ?? BARS_UV[0];
}

const NEARLY_ALL = 0.98;
const ROOM = 1.25;

/**
 * The reach in uV for the excerpts, at least 1: a quarter more than nearly all of what is not spoiled, so that the crests of a
 * steady wave have room while one jump does not flatten the rest.
 */
export function reachOf(excerpts: readonly WaveExcerpt[], spoiled: readonly Interval[]): number {
  const heights = excerpts.flatMap(({ fromS, toS, signal }) => {
    const cut = spoiled.filter((one) => one.toS > fromS && one.fromS < toS);
    return Array.from(signal.timesS, (time, i) =>
      liesIn(cut, time) ? Number.NaN : Math.max(-signal.low[i], signal.high[i]),
    ).filter((height) => Number.isFinite(height));
  });
  heights.sort((a, b) => a - b);
  return Math.max(1, ROOM * (heights.at(Math.floor(NEARLY_ALL * (heights.length - 1))) ?? 1));
}
