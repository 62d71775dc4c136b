import { describe, expect, it } from 'vitest';
import { createRandom } from '../../src/numeric/random';
import { numberFigure, withheld } from '../../src/recording/figure';
import type { Epoch } from '../../src/recording/rhythm';
import { stomachHalfWidths } from '../../src/stomach/half-widths';

const SD_CPM = 0.1;
const random = createRandom(4);
const epochs = Array.from(
  { length: 200 },
  (_, k): Epoch => ({
    lead: '#1',
    phase: 'fed',
    fromS: 60 * k,
    toS: 60 * k + 240,
    kept: true,
    spoiledFraction: 0,
    dfCpm: 3 + SD_CPM * random.gaussian(),
    dpDb: 30,
    peakShare: 0.5,
    rhythm: 'normo',
    flags: [],
  }),
);
const shares = (normo: number) => ({
  time_normo_pct: numberFigure(normo),
  time_brady_pct: { kind: 'count', count: 1, of: 4, what: 'epochs', marks: [] } as const,
  time_tachy_pct: withheld('too short'),
  time_none_pct: numberFigure(0),
  time_undecided_pct: numberFigure(0),
});

describe('the half-width of the range of a stomach figure', () => {
  it('of a percentage of time is Wilson’s with one look in four kept minutes', () => {
    // Wilson 1927, written down apart from the program's code: 50 % and 25 % of 10 looks.
    const wilson = (p: number, n: number) => {
      const z = 1.96;
      return (100 * z * Math.sqrt((p * (1 - p)) / n + z ** 2 / (4 * n ** 2))) / (1 + z ** 2 / n);
    };
    const widths = stomachHalfWidths(epochs, shares(50), 40);
    expect(widths.time_normo_pct).toBeCloseTo(wilson(0.5, 10), 1);
    expect(widths.time_brady_pct).toBeCloseTo(wilson(0.25, 10), 1);
    expect(widths.time_tachy_pct).toBeUndefined();
  });

  it('of DF is that of a median of independent normal values', () => {
    // Standard error of the median of n normal values: 1.2533 sd / sqrt(n) (Kenney and Keeping 1962, from memory).
    const widths = stomachHalfWidths(epochs, shares(50), 40);
    const theory = (1.96 * 1.2533 * SD_CPM) / Math.sqrt(epochs.length);
    expect(Math.abs(widths.df_median_cpm / theory - 1)).toBeLessThan(0.4);
  });

  it('is not told of fewer epochs than three blocks hold, nor of power that never changes', () => {
    expect(stomachHalfWidths(epochs.slice(0, 11), shares(50), 40).df_median_cpm).toBeUndefined();
    expect(stomachHalfWidths(epochs, shares(50), 40).dp_mean_spectrum_db).toBeUndefined();
  });
});
