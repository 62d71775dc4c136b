import { describe, expect, it } from 'vitest';
import { intervalFits } from '../../src/review/interval-fit';

describe('whether an RR interval fits its neighbours', () => {
  it('lets breathing pass: ten per cent up and down', () => {
    const rr = [800, 860, 900, 850, 790, 810, 880];
    expect(rr.every((_, i) => intervalFits(rr, i))).toBe(true);
  });

  it('marks the double interval of a beat that was not found', () => {
    const rr = [850, 840, 860, 1710, 850, 845, 855];
    expect(rr.map((_, i) => intervalFits(rr, i))).toEqual([
      true,
      true,
      true,
      false,
      true,
      true,
      true,
    ]);
  });

  it('marks the short interval and the pause of an early beat', () => {
    const rr = [900, 900, 900, 560, 1240, 900, 900, 900];
    expect(intervalFits(rr, 3)).toBe(false);
    expect(intervalFits(rr, 4)).toBe(false);
    expect(intervalFits(rr, 2)).toBe(true);
  });

  it('draws the line at a fifth of the median', () => {
    expect(intervalFits([1000, 1000, 1200, 1000, 1000], 2)).toBe(true);
    expect(intervalFits([1000, 1000, 1201, 1000, 1000], 2)).toBe(false);
  });

  it('has nothing to say of a lone interval, nor of the missing one before the first beat', () => {
    expect(intervalFits([1700], 0)).toBe(true);
    expect(intervalFits([Number.NaN, 800, 810], 1)).toBe(true);
  });
});
