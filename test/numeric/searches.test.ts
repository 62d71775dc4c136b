import { describe, expect, it } from 'vitest';
import { firstAtOrAfter } from '../../src/numeric/first-at-or-after';
import { nanRuns } from '../../src/numeric/nan-runs';

describe('the first at or after', () => {
  it('is found before, at, between and behind ascending values, of equal ones the first', () => {
    const values = [1, 2, 2, 3];
    expect([0, 1, 1.5, 2, 2.5, 3, 9].map((at) => firstAtOrAfter(values, at))).toEqual([
      0, 0, 1, 1, 3, 3, 4,
    ]);
    expect(firstAtOrAfter(new Float64Array(0), 1)).toBe(0);
  });
});

describe('runs of missing samples', () => {
  it('reach from the first NaN to the next number, also at both ends', () => {
    const x = Number.NaN;
    expect(nanRuns(Float64Array.of(x, x, 1, 0, x, 2, x))).toEqual([
      { from: 0, to: 2 },
      { from: 4, to: 5 },
      { from: 6, to: 7 },
    ]);
    expect(nanRuns(Float64Array.of(1, 2))).toEqual([]);
    expect(nanRuns(Float64Array.of(x))).toEqual([{ from: 0, to: 1 }]);
    expect(nanRuns(new Float64Array(0))).toEqual([]);
  });
});
