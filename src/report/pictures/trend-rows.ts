import type { BreathingSeries, RrSeries } from '../../recording/heart-series';
import type { Epoch } from '../../recording/rhythm';
import { BREATHING, HEART, STOMACH } from './svg';

export type Point = readonly [timeS: number, value: number];

/** One series of the trend; NaN breaks its line. */
export interface TrendRow {
  readonly organ: 'stomach' | 'heart' | 'breathing';
  readonly name: string;
  readonly unit: string;
  readonly colour: string;
  readonly points: readonly Point[];
}

const LEAST_AVERAGED_S = 30;
/** More points than this blacken the paper. */
const MOST_POINTS = 480;
const LEAST_BEATS = 3;

/** Dominant power of the kept epochs. */
export function powerRow(epochs: readonly Epoch[]): TrendRow {
  const points = epochs.map(
    ({ fromS, toS, dpDb }): Point => [(fromS + toS) / 2, dpDb ?? Number.NaN],
  );
  return { organ: 'stomach', name: 'DP', unit: 'dB', colour: STOMACH, points };
}

/** Heart rate as means of the NN intervals over 30 s, or longer in a long study; NaN where fewer than three fall. */
export function heartRateRow(rr: RrSeries | null, durationS: number): TrendRow {
  const averagedS = Math.max(LEAST_AVERAGED_S, durationS / MOST_POINTS);
  const slots = Math.max(1, Math.ceil(durationS / averagedS));
  const sums = new Float64Array(slots);
  const counts = new Float64Array(slots);
  for (let i = 0; rr && i < rr.timesS.length; i += 1) {
    if (rr.nn[i] === 0) continue;
    const slot = Math.min(slots - 1, Math.floor(rr.timesS[i] / averagedS));
    sums[slot] += rr.rrMs[i];
    counts[slot] += 1;
  }
  const points = Array.from(
    sums,
    (sum, i): Point => [
      (i + 0.5) * averagedS,
      counts[i] >= LEAST_BEATS ? (60000 * counts[i]) / sum : Number.NaN,
    ],
  );
  return { organ: 'heart', name: 'Heart rate', unit: '1/min', colour: HEART, points };
}

export function breathingRow(breathing: BreathingSeries | null): TrendRow {
  const points = breathing
    ? Array.from(breathing.centresS, (time, i): Point => [time, breathing.perMinute[i]])
    : [];
  return { organ: 'breathing', name: 'Breathing', unit: '1/min', colour: BREATHING, points };
}

/** Least and greatest value, on whole numbers at least one apart; null where nothing is known. */
export function rangeOf(points: readonly Point[]): readonly [number, number] | null {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const [, value] of points) {
    if (!Number.isFinite(value)) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  if (low > high) return null;
  const bottom = Math.floor(low);
  return [bottom, Math.max(bottom + 1, Math.ceil(high))];
}
