import { describe, expect, it } from 'vitest';
import { trendWords } from '../../src/report/picture-words';
import { trendPicture } from '../../src/report/pictures/trend-picture';
import {
  breathingRow,
  heartRateRow,
  powerRow,
  rangeOf,
} from '../../src/report/pictures/trend-rows';
import { epoch } from '../export/invented-input';

const rr = (rrMs: readonly number[], nn: readonly number[]) => ({
  timesS: Float64Array.from(rrMs, (_, i) => i + 1),
  rrMs: Float64Array.from(rrMs),
  nn: Uint8Array.from(nn),
});

describe('the trend over the study', () => {
  it('heart rate is 60000 over the mean NN of half a minute; other intervals do not count', () => {
    const row = heartRateRow(rr([1000, 1000, 800, 800, 300], [1, 1, 1, 1, 0]), 60);
    expect(row.points[0]).toEqual([15, 60000 / 900]);
    expect(row.points[1][1]).toBeNaN();
  });

  it('fewer than three NN in half a minute break the line', () => {
    expect(heartRateRow(rr([1000, 1000], [1, 1]), 30).points[0][1]).toBeNaN();
  });

  it('a day is averaged over longer stretches, so that its line stays a line', () => {
    expect(heartRateRow(null, 86400).points.length).toBeLessThanOrEqual(480);
  });

  it('an epoch that is not kept breaks the line of power', () => {
    const row = powerRow([epoch({}), epoch({ kept: false, dpDb: null })]);
    expect(row.points[0]).toEqual([60, 31.26]);
    expect(row.points[1][1]).toBeNaN();
  });

  it('the scale holds every value on whole numbers', () => {
    expect(
      rangeOf([
        [0, 61.2],
        [1, Number.NaN],
        [2, 75.4],
      ]),
    ).toEqual([61, 76]);
    expect(
      rangeOf([
        [0, 5],
        [1, 5],
      ]),
    ).toEqual([5, 6]);
    expect(rangeOf([[0, Number.NaN]])).toBeNull();
  });

  it('a series without a value takes no row and no word', () => {
    const rows = [powerRow([epoch({})]), breathingRow(null)];
    const svg = trendPicture({
      rows,
      phases: [],
      spoiled: { stomach: [], heart: [] },
      durationS: 150,
    });
    expect(svg).not.toContain('Breathing');
    expect(trendWords(rows)).toBe('Over the study: DP from 31 to 32 dB.');
  });
});
