import type { Phase } from '../../recording/phase';
import type { Interval } from '../../recording/span';
import { phaseEdges, phasesBar } from './phases-bar';
import {
  GUTTER,
  hatched,
  label,
  line,
  PLOT_END,
  pathThrough,
  picture,
  QUIET,
  RULE,
  type TimeScale,
  timeAxis,
  timeScale,
  valueScale,
} from './svg';
import { rangeOf, type TrendRow } from './trend-rows';

export interface TrendInput {
  readonly rows: readonly TrendRow[];
  readonly phases: readonly Phase[];
  /** What is spoiled for each organ; breathing is read where the heart is. */
  readonly spoiled: Readonly<Record<'stomach' | 'heart', readonly Interval[]>>;
  readonly durationS: number;
}

const TOP = 2;
const ROW = 42;
const GAP = 7;

/** Series over the whole study, one above the other on one clock. Rows without a value are left out. */
export function trendPicture({ rows, phases, spoiled, durationS }: TrendInput): string {
  const scale = timeScale(0, durationS);
  const bar = phasesBar(phases, scale, TOP);
  const first = bar.bottomY + 5;
  const known = rows.flatMap((row) => {
    const range = rangeOf(row.points);
    return range ? [{ row, range }] : [];
  });
  const drawn = known.map(({ row, range }, i) => {
    const top = first + i * (ROW + GAP);
    const lost = row.organ === 'stomach' ? spoiled.stomach : spoiled.heart;
    return hatched(lost, scale, top, top + ROW) + drawRow(row, range, scale, top);
  });
  const bottom = first + known.length * (ROW + GAP);
  return picture(bottom + 16, 'Series over the study', [
    bar.svg,
    phaseEdges(phases, scale, bar.bottomY, bottom),
    ...drawn,
    timeAxis(scale, bottom),
  ]);
}

function drawRow(
  { name, unit, colour, points }: TrendRow,
  [low, high]: readonly [number, number],
  { x }: TimeScale,
  top: number,
): string {
  const bottom = top + ROW;
  const y = valueScale(low, high, top, bottom);
  const path = pathThrough(points.map(([time, value]) => [x(time), y(value)] as const));
  return [
    label(2, top + 19, name),
    label(2, top + 31, unit, 'start', QUIET),
    label(GUTTER - 5, top + 8, String(high), 'end', QUIET),
    label(GUTTER - 5, bottom, String(low), 'end', QUIET),
    ...[top, bottom].map((edge) => line(GUTTER, edge, PLOT_END, edge, RULE, 'stroke-width="0.5"')),
    `<path d="${path}" stroke="${colour}" stroke-width="1.1" stroke-linejoin="round" stroke-linecap="round"/>`,
  ].join('');
}
