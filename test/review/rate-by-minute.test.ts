import { describe, expect, it } from 'vitest';
import type { BreathingSeries, RrSeries } from '../../src/recording/heart-series';
import { ratesByMinute } from '../../src/review/rate-by-minute';

describe('heart rate and breathing by the minute', () => {
  const rr = {
    timesS: Float64Array.of(10, 11, 12, 65, 125),
    rrMs: Float64Array.of(1000, 500, 400, 750, 1000),
    nn: Uint8Array.of(1, 1, 0, 1, 1),
  } as unknown as RrSeries;
  const breathing = {
    centresS: Float64Array.of(30, 45, 90),
    perMinute: Float64Array.of(12, 14, Number.NaN),
  } as unknown as BreathingSeries;

  it('counts NN intervals by the beat that ends them, in whole minutes of the clock', () => {
    const rows = ratesByMinute(rr, breathing, { fromS: 20, toS: 119 });
    expect(rows).toEqual([
      { fromS: 0, nnBeats: 2, mean: 90, low: 60, high: 120, breaths: 13 },
      { fromS: 60, nnBeats: 1, mean: 80, low: 80, high: 80, breaths: Number.NaN },
    ]);
  });

  it('leaves open what is not known', () => {
    expect(ratesByMinute(null, null, { fromS: 0, toS: 60 })).toEqual([
      {
        fromS: 0,
        nnBeats: 0,
        mean: Number.NaN,
        low: Number.NaN,
        high: Number.NaN,
        breaths: Number.NaN,
      },
    ]);
  });
});
