import { describe, expect, it } from 'vitest';
import {
  savitzkyGolay,
  savitzkyGolayCutoff,
  savitzkyGolayGain,
  savitzkyGolayWeights,
} from '../../src/numeric/savitzky-golay';
import reference from '../reference/numeric-filters.json';
import octave from '../reference/numeric-octave.json';
import { largestDifference } from './signals';

// Tables: Savitzky & Golay 1964, re-derived (field notes 3.3). Series: scipy.signal.savgol_filter,
// mode 'interp', and sgolayfilt of Octave. Long windows: mpmath at 200 digits.
// test/reference/numeric-filters.py, numeric-octave.m.

const over = (norm: number, ...integers: number[]) => integers.map((value) => value / norm);

describe('Savitzky-Golay weights', () => {
  it('are those of the tables', () => {
    const tables: [number, number, number, number[]][] = [
      [5, 2, 0, over(35, -3, 12, 17, 12, -3)],
      [5, 3, 0, over(35, -3, 12, 17, 12, -3)],
      [9, 2, 0, over(231, -21, 14, 39, 54, 59, 54, 39, 14, -21)],
      [7, 4, 0, over(231, 5, -30, 75, 131, 75, -30, 5)],
      [11, 4, 0, over(429, 18, -45, -10, 60, 120, 143, 120, 60, -10, -45, 18)],
      [5, 2, 1, over(10, -2, -1, 0, 1, 2)],
      [9, 3, 1, over(1188, 86, -142, -193, -126, 0, 126, 193, 142, -86)],
      [7, 2, 2, over(42, 5, 0, -3, -4, -3, 0, 5)],
    ];
    for (const [window, order, derivative, wanted] of tables)
      expect(
        largestDifference(savitzkyGolayWeights(window, order, derivative), wanted),
      ).toBeLessThan(1e-14);
  });

  it('of 25 points, quadratic, have the centre, edge and sum of the table (CV-02)', () => {
    const weights = savitzkyGolayWeights(25, 2);
    expect(weights[12]).toBeCloseTo(467 / 5175, 12);
    expect(weights[0]).toBeCloseTo(-253 / 5175, 12);
    expect(weights.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1, 12);
  });

  it.each(reference.longWeights)('of $window points, order $order, are exact', (entry) => {
    const weights = savitzkyGolayWeights(entry.window, entry.order);
    entry.places.forEach((place, k) => {
      expect(Math.abs(weights[place] - entry.weights[k])).toBeLessThan(1e-14);
    });
  });

  it('refuse even windows and orders that do not fit', () => {
    expect(() => savitzkyGolayWeights(6, 2)).toThrow('odd');
    expect(() => savitzkyGolayWeights(5, 5)).toThrow('order');
    expect([...savitzkyGolayWeights(1, 0)]).toEqual([1]);
  });
});

describe('Savitzky-Golay smoothing', () => {
  it('spreads a unit impulse as the 5-point table (CV-01)', () => {
    const y = savitzkyGolay(Float64Array.of(0, 0, 0, 0, 1, 0, 0, 0, 0), 5, 2);
    const table = [-3 / 35, 12 / 35, 17 / 35, 12 / 35, -3 / 35];
    expect(largestDifference(y.subarray(2, 7), table)).toBeLessThan(1e-12);
  });

  it.each(reference.savgol)(
    'is scipy’s for window $window, order $order, derivative $derivative, ends included',
    (entry) => {
      const y = savitzkyGolay(
        Float64Array.from(entry.x),
        entry.window,
        entry.order,
        entry.derivative,
      );
      expect(largestDifference(y, entry.y)).toBeLessThan(1e-11);
    },
  );

  it.each(octave.savgol)(
    'is Octave’s for window $window, order $order, derivative $derivative, ends included',
    ({ x, y, window, order, derivative }) => {
      const got = savitzkyGolay(Float64Array.from(x), window, order, derivative);
      expect(largestDifference(got, y)).toBeLessThan(1e-11);
    },
  );

  it.each([5, 25, 1001, 5001])(
    'leaves a cubic as it is over %i points, ends too (CV-03)',
    (window) => {
      const cubic = Float64Array.from({ length: 6_000 }, (_, i) => {
        const t = i / 3_000 - 1;
        return 2 * t * t * t - t * t + 5;
      });
      for (const order of [3, 4])
        expect(largestDifference(savitzkyGolay(cubic, window, order), cubic)).toBeLessThan(5e-9);
    },
  );

  it('has slope 6 for t squared at t = 3 (CV-05)', () => {
    const y = savitzkyGolay(Float64Array.of(0, 1, 4, 9, 16, 25, 36), 5, 2, 1);
    expect(y[3]).toBeCloseTo(6, 12);
  });

  it('refuses a window longer than the signal', () => {
    expect(() => savitzkyGolay(new Float64Array(4), 5, 2)).toThrow('longer');
  });
});

describe('the smoother’s gain', () => {
  it('of 5 points is 23/35 at a quarter of the rate and -13/35 at half of it (CV-04)', () => {
    const weights = savitzkyGolayWeights(5, 2);
    expect(savitzkyGolayGain(weights, 0.5)).toBeCloseTo(23 / 35, 12);
    expect(savitzkyGolayGain(weights, 1)).toBeCloseTo(-13 / 35, 12);
    expect(savitzkyGolayGain(weights, 0.25)).toBeCloseTo(0.9705875, 7);
  });

  it('falls to 1/sqrt 2 where the field notes 3.3 say (CV-06)', () => {
    const wanted: [number, number, number][] = [
      [5, 2, 0.47587],
      [9, 2, 0.24357],
      [25, 2, 0.08544],
      [51, 2, 0.04177],
      [101, 2, 0.02108],
      [51, 4, 0.06652],
      [51, 6, 0.09146],
    ];
    for (const [window, order, fraction] of wanted)
      expect(Math.abs(savitzkyGolayCutoff(window, order) - fraction)).toBeLessThan(1e-5);
    expect(savitzkyGolayCutoff(5, 4)).toBe(1);
    expect(savitzkyGolayCutoff(1, 0)).toBe(1);
  });
});
