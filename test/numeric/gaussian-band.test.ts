import { describe, expect, it } from 'vitest';
import { firResponse } from '../../src/numeric/fir';
import { gaussianBandTaps } from '../../src/numeric/gaussian-band';
import { onGrid } from '../../src/numeric/on-grid';
import reference from '../reference/stomach-lead-lag.json';

describe('a Gaussian band', () => {
  it.each(reference.bands)('has the gains of its definition about $centreHz Hz', (want) => {
    const { centreHz, halfWidthHz, freqsHz, gains } = want;
    const taps = gaussianBandTaps({ rateHz: 4, centreHz, halfWidthHz });
    freqsHz.forEach((freqHz, i) => {
      const { re, im } = firResponse(taps, freqHz, 4);
      expect(Math.abs(re - gains[i])).toBeLessThan(2e-3);
      expect(Math.abs(im)).toBeLessThan(1e-12);
    });
    expect(firResponse(taps, 0, 4).re).toBeCloseTo(0, 12);
    expect(firResponse(taps, centreHz, 4).re).toBeCloseTo(1, 9);
  });

  it('needs its centre between 0 and half the rate', () => {
    const band = { rateHz: 4, centreHz: 2, halfWidthHz: 0.01 };
    expect(() => gaussianBandTaps(band)).toThrow('no band');
    expect(() => gaussianBandTaps({ ...band, centreHz: 0 })).toThrow('no band');
  });
});

describe('a course on an even grid', () => {
  it('runs straight between values and leaves long holes open', () => {
    const times = Float64Array.of(1, 2, 6, 7);
    const values = Float64Array.of(10, 20, 60, 50);
    const grid = { firstS: 0.5, rateHz: 2, length: 15 };
    const course = onGrid(times, values, grid, 3);
    expect([...course]).toEqual([
      ...[Number.NaN, 10, 15],
      ...Array.from({ length: 8 }, () => Number.NaN),
      ...[60, 55, Number.NaN, Number.NaN],
    ]);
    expect(onGrid(times, values, grid, 4)[5]).toBe(30);
  });
});
