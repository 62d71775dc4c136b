import type { BreathingSeries, RrSeries } from '../../recording/heart-series';
import type { Phase } from '../../recording/phase';
import type { Epoch } from '../../recording/rhythm';
import type { Interval } from '../../recording/span';
import { phasesBar } from './phases-bar';
import {
  BREATHING,
  HEART,
  hatched,
  label,
  pathThrough,
  picture,
  QUIET,
  STOMACH,
  timeAxis,
  timeScale,
  valueScale,
} from './svg';

export interface TrendInput {
  readonly epochs: readonly Epoch[];
  readonly rr: RrSeries | null;
  readonly breathing: BreathingSeries | null;
  readonly phases: readonly Phase[];
  readonly spoiled: readonly Interval[];
  readonly durationS: number;
}

type Point = readonly [number, number];

const TOP = 4;
const ROW = 46;
const GAP = 8;
const AVERAGED_S = 15;

interface TrendRow {
  readonly name: string;
  readonly unit: string;
  readonly colour: string;
  readonly points: readonly Point[];
}

/** Dominant power, heart rate and breathing over the whole study, one above the other on one clock. */
export function trendPicture(input: TrendInput): string {
  const { phases, spoiled, durationS } = input;
  const x = timeScale(0, durationS);
  const bar = phasesBar(phases, x, TOP);
  const rows = [powerRow(input.epochs), heartRow(input), breathingRow(input)].filter((row) =>
    row.points.some(([, value]) => Number.isFinite(value)),
  );
  const drawn = rows.map((row, i) => {
    const top = bar.bottomY + 4 + i * (ROW + GAP);
    return hatched(spoiled, x, top, top + ROW) + drawRow(row, x, top);
  });
  const bottom = bar.bottomY + 4 + rows.length * (ROW + GAP);
  return picture(bottom + 18, 'Dominant power, heart rate and breathing over the study', [
    bar.svg,
    ...drawn,
    timeAxis(0, durationS, bottom),
  ]);
}

function drawRow(
  { name, unit, colour, points }: TrendRow,
  x: (s: number) => number,
  top: number,
): string {
  const values = points.map(([, value]) => value).filter((value) => Number.isFinite(value));
  const sorted = [...values].sort((a, b) => a - b);
  const low = Math.floor(sorted[Math.floor(0.01 * (sorted.length - 1))]);
  const high = Math.max(low + 1, Math.ceil(sorted[Math.floor(0.99 * (sorted.length - 1))]));
  const y = valueScale(low, high, top, top + ROW);
  const inside = (value: number) => Math.min(top + ROW, Math.max(top, y(value)));
  const path = pathThrough(points.map(([time, value]) => [x(time), inside(value)] as const));
  return [
    label(2, top + 10, name),
    label(2, top + 22, unit, 'start', QUIET),
    label(60, top + 8, String(high), 'end', QUIET),
    label(60, top + ROW, String(low), 'end', QUIET),
    `<path d="${path}" stroke="${colour}" stroke-width="1" stroke-linejoin="round"/>`,
  ].join('');
}

function powerRow(epochs: readonly Epoch[]): TrendRow {
  const points = epochs.map(
    ({ fromS, toS, dpDb }): Point => [(fromS + toS) / 2, dpDb ?? Number.NaN],
  );
  return { name: 'DP', unit: 'dB', colour: STOMACH, points };
}

/** Heart rate as means over 15 s of the NN intervals, since single beats would blacken the paper. */
function heartRow({ rr, durationS }: TrendInput): TrendRow {
  const slots = Math.ceil(durationS / AVERAGED_S);
  const sums = new Float64Array(slots);
  const counts = new Float64Array(slots);
  for (let i = 0; rr && i < rr.timesS.length; i += 1) {
    if (rr.nn[i] === 0) continue;
    const slot = Math.min(slots - 1, Math.floor(rr.timesS[i] / AVERAGED_S));
    sums[slot] += rr.rrMs[i];
    counts[slot] += 1;
  }
  const points = Array.from(
    sums,
    (sum, i): Point => [
      (i + 0.5) * AVERAGED_S,
      counts[i] >= 3 ? (60000 * counts[i]) / sum : Number.NaN,
    ],
  );
  return { name: 'Heart', unit: 'rate, 1/min', colour: HEART, points };
}

function breathingRow({ breathing }: TrendInput): TrendRow {
  const points = breathing
    ? Array.from(breathing.centresS, (time, i): Point => [time, breathing.perMinute[i]])
    : [];
  return { name: 'Breathing', unit: '1/min', colour: BREATHING, points };
}
