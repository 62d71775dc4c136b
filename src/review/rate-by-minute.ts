import type { BreathingSeries, RrSeries } from '../recording/heart-series';
import { heartRateLine } from './heart-rate';
import type { TimeWindow } from './view-store';

/** Heart rate and breathing of one minute of the clock, in beats and breaths a minute; NaN where nothing is known. */
export interface MinuteRate {
  readonly fromS: number;
  readonly nnBeats: number;
  readonly mean: number;
  readonly low: number;
  readonly high: number;
  readonly breaths: number;
}

const meanOf = (values: readonly number[]): number =>
  values.length > 0 ? values.reduce((sum, one) => sum + one, 0) / values.length : Number.NaN;

/**
 * The rates of each whole minute of the clock that reaches into a window, as the rate rows draw them: heart rate of NN
 * intervals by the beat that ends them, breathing by its centres.
 */
export function ratesByMinute(
  rr: RrSeries | null,
  breathing: BreathingSeries | null,
  { fromS, toS }: TimeWindow,
): readonly MinuteRate[] {
  const line = rr && heartRateLine(rr);
  const within = (timesS: ArrayLike<number>, values: ArrayLike<number>, startS: number) =>
    Array.from(values).filter(
      (value, i) => !Number.isNaN(value) && timesS[i] >= startS && timesS[i] < startS + 60,
    );
  const first = Math.floor(fromS / 60);
  const count = Math.max(0, Math.ceil(toS / 60) - first);
  return Array.from({ length: count }, (_, i) => {
    const startS = (first + i) * 60;
    const rates = line ? within(line.timesS, line.perMinute, startS) : [];
    const breaths = breathing ? within(breathing.centresS, breathing.perMinute, startS) : [];
    return {
      fromS: startS,
      nnBeats: rates.length,
      mean: meanOf(rates),
      low: rates.length > 0 ? Math.min(...rates) : Number.NaN,
      high: rates.length > 0 ? Math.max(...rates) : Number.NaN,
      breaths: meanOf(breaths),
    };
  });
}
