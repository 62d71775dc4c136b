import { describe, expect, it } from 'vitest';
import { autoregressiveDensity, burg } from '../../src/numeric/burg';
import { logParabola } from '../../src/numeric/peaks';
import { binHz } from '../../src/numeric/spectrum';
import octave from '../reference/numeric-octave.json';
import reference from '../reference/numeric-pairs.json';
import { largestDifference, noise, sine } from './signals';

// Reference: mpmath at 60 digits from the definition, its density by scipy.signal.freqz
// (test/reference/numeric-pairs.py), and arburg of Octave (test/reference/numeric-octave.m).

describe('Burg’s autoregressive model', () => {
  it('of 1 2 3 4 has the reflections -0.9302326 and 0.9386632 (CV-52)', () => {
    const { reflections } = burg(Float64Array.of(1, 2, 3, 4), 2);
    expect(reflections[0]).toBeCloseTo(-0.9302326, 7);
    expect(reflections[1]).toBeCloseTo(0.9386632, 7);
  });

  it.each(reference.burg)('of order $order is that of 60 digits', (entry) => {
    const model = burg(Float64Array.from(entry.x), entry.order);
    expect(largestDifference(model.reflections, entry.reflections)).toBeLessThan(1e-11);
    const largest = Math.max(...entry.coefficients.map(Math.abs));
    expect(largestDifference(model.coefficients, entry.coefficients) / largest).toBeLessThan(1e-11);
    expect(model.variance / entry.variance).toBeCloseTo(1, 10);
  });

  it.each(octave.burg)('of order $order is Octave’s', (entry) => {
    const model = burg(Float64Array.from(entry.x), entry.order);
    expect(largestDifference(model.coefficients, entry.coefficients)).toBeLessThan(1e-10);
    expect(largestDifference(model.reflections, entry.reflections)).toBeLessThan(1e-10);
    expect(model.variance / entry.variance).toBeCloseTo(1, 10);
  });

  it('of order 0 is the mean square, of zeros nothing', () => {
    expect(burg(Float64Array.of(1, -3), 0)).toEqual({
      coefficients: new Float64Array(0),
      reflections: new Float64Array(0),
      variance: 5,
    });
    expect(burg(new Float64Array(9), 3).variance).toBe(0);
  });

  it('leaves its input as it is and refuses orders that do not fit', () => {
    const x = noise(20, 1);
    const before = x.slice();
    burg(x, 5);
    expect(x).toEqual(before);
    expect(() => burg(x, 20)).toThrow('order of 20');
    expect(() => burg(x, 1.5)).toThrow('order of 1.5');
  });
});

describe('the density of a model', () => {
  it.each(reference.burg)('of order $order is scipy’s at size $density.size', (entry) => {
    const model = burg(Float64Array.from(entry.x), entry.order);
    const { rate, size, density } = entry.density;
    const got = autoregressiveDensity(model, rate, size);
    expect(largestDifference(got, density) / Math.max(...density)).toBeLessThan(1e-9);
  });

  it('of a wave at 3.1 cpm in noise peaks there, sharper than the window', () => {
    const hum = noise(960, 4);
    const x = sine(960, 4, 3.1 / 60, 100, 0.4).map((value, i) => value + 5 * hum[i]);
    const density = autoregressiveDensity(burg(x, 60), 4, 8192);
    const bin = density.indexOf(Math.max(...density));
    const { offset } = logParabola(density[bin - 1], density[bin], density[bin + 1]);
    expect(Math.abs((bin + offset) * binHz(4, 8192) * 60 - 3.1)).toBeLessThan(0.05);
  });

  it('integrates to the mean square of what it models', () => {
    const x = noise(4_000, 6);
    for (let n = 2; n < x.length; n++) x[n] += 1.2 * x[n - 1] - 0.6 * x[n - 2];
    const density = autoregressiveDensity(burg(x, 2), 4, 4096);
    const integral = density.reduce((sum, value) => sum + value, 0) * binHz(4, 4096);
    const meanSquare = x.reduce((sum, value) => sum + value * value, 0) / x.length;
    expect(integral / meanSquare).toBeCloseTo(1, 2);
  });

  it('refuses a transform that does not hold the coefficients', () => {
    expect(() => autoregressiveDensity(burg(noise(20, 1), 8), 4, 8)).toThrow('order 8');
  });
});
