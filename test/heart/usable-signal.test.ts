import { describe, expect, it } from 'vitest';
import { isUsable, readFilled, usableRanges } from '../../src/heart/usable-signal';

const NONE = Number.NaN;

describe('the usable part of a signal', () => {
  it('leaves out gaps and excluded stretches', () => {
    const samples = Float64Array.from([1, 2, NONE, NONE, 5, 6, 7, 8, 9, 10]);
    expect(usableRanges(samples, 1, [])).toEqual([
      { from: 0, to: 2 },
      { from: 4, to: 10 },
    ]);
    expect(usableRanges(samples, 1, [{ fromS: 5.5, toS: 8 }])).toEqual([
      { from: 0, to: 2 },
      { from: 4, to: 6 },
      { from: 8, to: 10 },
    ]);
    expect(usableRanges(new Float64Array(3).fill(NONE), 1, [])).toEqual([]);
  });

  it('fills a gap with a line and holds the ends', () => {
    const samples = Float64Array.from([1, 2, NONE, NONE, 5, 6]);
    const ranges = usableRanges(samples, 1, []);
    expect([...readFilled(samples, ranges, -2, 8)]).toEqual([1, 1, 1, 2, 3, 4, 5, 6, 6, 6]);
    expect([...readFilled(samples, ranges, 3, 5)]).toEqual([4, 5]);
  });

  it('reads nothing as zeros', () => {
    expect([...readFilled(new Float64Array(3).fill(NONE), [], 0, 3)]).toEqual([0, 0, 0]);
  });

  it('knows whether a sample is clear of what cannot be used', () => {
    const ranges = [{ from: 4, to: 10 }];
    expect(isUsable(ranges, 4)).toBe(true);
    expect(isUsable(ranges, 4, 1)).toBe(false);
    expect(isUsable(ranges, 9)).toBe(true);
    expect(isUsable(ranges, 10)).toBe(false);
  });
});
