import { describe, expect, it } from 'vitest';
import { dpss } from '../../src/numeric/dpss';
import { multitaperDensity } from '../../src/numeric/multitaper';
import { binHz } from '../../src/numeric/spectrum';
import { eigenvectorOf, largestEigenvalues } from '../../src/numeric/tridiagonal';
import reference from '../reference/numeric-tapers.json';
import { largestDifference, noise, sine } from './signals';

// Reference: scipy.signal.windows.dpss, scipy.signal.periodogram, and numpy's dense eigenvectors of
// the sinc matrix; test/reference/numeric-tapers.py.

const dot = (a: Float64Array, b: Float64Array) =>
  a.reduce((sum, value, i) => sum + value * b[i], 0);

describe('discrete prolate spheroidal sequences', () => {
  it.each(reference.long)('of $length samples, NW $nw, are scipy’s', (entry) => {
    const { tapers, concentrations } = dpss(entry.length, entry.nw, entry.count);
    expect(largestDifference(concentrations, entry.concentrations)).toBeLessThan(1e-11);
    entry.tapers.forEach((wanted, k) => {
      const got = wanted.map((_, i) => tapers[k][i * entry.stride]);
      expect(largestDifference(got, wanted)).toBeLessThan(1e-10);
    });
  });

  it.each(reference.short)('of $length, NW $nw, are the sinc matrix’s own vectors', (entry) => {
    const { tapers, concentrations } = dpss(entry.length, entry.nw, entry.count);
    expect(largestDifference(concentrations, entry.concentrations)).toBeLessThan(1e-13);
    // The dense matrix's eigenvalues crowd at 1, so its vectors are good to 1e-9 only.
    entry.tapers.forEach((wanted, k) => {
      expect(largestDifference(tapers[k], wanted)).toBeLessThan(1e-8);
    });
  });

  it('of 960 samples and NW 2.5 are concentrated as the field notes say (CV-55)', () => {
    const { concentrations } = dpss(960, 2.5, 4);
    expect(
      largestDifference(concentrations, [0.999997, 0.999843, 0.996216, 0.952126]),
    ).toBeLessThan(1e-6);
  });

  it.each([
    [960, 4],
    [4_801, 4],
    [2, 0.5],
  ])('of %i samples, NW %d, stand upright on each other, even and odd in turn', (length, nw) => {
    const { tapers } = dpss(length, nw, Math.min(7, length));
    tapers.forEach((taper, k) => {
      const turned = taper.slice().reverse();
      const mirrored = k % 2 === 0 ? turned : turned.map((value) => -value);
      expect(largestDifference(taper, mirrored)).toBeLessThan(1e-10);
      tapers.forEach((other, j) => {
        expect(Math.abs(dot(taper, other) - (j === k ? 1 : 0))).toBeLessThan(1e-10);
      });
    });
  });

  it('are refused where the numbers do not fit', () => {
    expect(() => dpss(1, 0.2, 1)).toThrow('two samples');
    expect(() => dpss(10, 5, 1)).toThrow('does not fit');
    expect(() => dpss(10, 2, 11)).toThrow('no 11 eigenvalues');
  });
});

describe('eigenvalues of a tridiagonal matrix', () => {
  it('with 2 on the diagonal and -1 beside it are 2 - 2 cos(k pi / (n + 1))', () => {
    const n = 40;
    const matrix = {
      main: new Float64Array(n).fill(2),
      beside: new Float64Array(n - 1).fill(-1),
    };
    const values = largestEigenvalues(matrix, n);
    const exact = values.map((_, k) => 2 - 2 * Math.cos(((n - k) * Math.PI) / (n + 1)));
    expect(largestDifference(values, exact)).toBeLessThan(1e-14);
    values.forEach((value) => {
      const vector = eigenvectorOf(matrix, value);
      const image = vector.map(
        (at, i) => 2 * at - (vector[i - 1] ?? 0) - (vector[i + 1] ?? 0) - value * at,
      );
      expect(largestDifference(image, new Float64Array(n))).toBeLessThan(1e-13);
      expect(dot(vector, vector)).toBeCloseTo(1, 13);
    });
  });
});

describe('multitaper density (Thomson 1982)', () => {
  it.each(reference.density)('is the weighted mean of scipy’s, size $size', (entry) => {
    const x = Float64Array.from(entry.x);
    const tapers = dpss(x.length, entry.nw, entry.count);
    const got = multitaperDensity(x, tapers, entry.rate, entry.size);
    const largest = Math.max(...entry.density);
    expect(largestDifference(got, entry.density) / largest).toBeLessThan(1e-10);
  });

  it('spreads a line over the bandwidth and keeps its power of 5000 uV2', () => {
    const tapers = dpss(960, 2.5, 4);
    const density = multitaperDensity(sine(960, 4, 0.05, 100), tapers, 4, 4096);
    const step = binHz(4, 4096);
    const power = (from: number, to: number) =>
      density.reduce((sum, v, k) => (k * step >= from && k * step < to ? sum + v * step : sum), 0);
    expect(power(0, 2) / 5000).toBeCloseTo(1, 2);
    const half = 2.5 / 240;
    expect(power(0.05 - half, 0.05 + half) / 5000).toBeGreaterThan(0.98);
  });

  it('of white noise of 1 uV2 at 4 Hz is about 0.5 uV2/Hz, steadier than one taper', () => {
    const x = noise(960, 5);
    const spread = (count: number) => {
      const density = multitaperDensity(x, dpss(960, 4, count), 4, 960).subarray(1, 480);
      const mean = density.reduce((sum, v) => sum + v, 0) / density.length;
      expect(Math.abs(mean - 0.5)).toBeLessThan(0.06);
      return density.reduce((sum, v) => sum + (v / mean - 1) ** 2, 0) / density.length;
    };
    expect(spread(7)).toBeLessThan(0.3 * spread(1));
  });

  it('refuses tapers of another length, and none', () => {
    expect(() => multitaperDensity(noise(8, 1), dpss(9, 2, 2), 4, 16)).toThrow('taper of 9');
    expect(() => multitaperDensity(noise(9, 1), dpss(9, 2, 0), 4, 16)).toThrow('needs a taper');
  });
});
