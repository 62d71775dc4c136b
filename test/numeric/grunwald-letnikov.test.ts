import { describe, expect, it } from 'vitest';
import {
  grunwaldLetnikov,
  grunwaldLetnikovResponse,
  grunwaldLetnikovWeights,
  truncationBound,
} from '../../src/numeric/grunwald-letnikov';
import { reciprocalGamma } from '../../src/numeric/special';
import reference from '../reference/numeric-filters.json';
import fixed from '../reference/numeric-instants.json';
import { largestDifference, sine } from './signals';

// Exact values: Oldham & Spanier 1974, D^a t^n = Gamma(n+1)/Gamma(n+1-a) t^(n-a). Weights and
// responses: mpmath and numpy, test/reference/numeric-filters.py. Fixed memory: scipy.signal.lfilter
// with weights, gain and phase of mpmath, test/reference/numeric-instants.py.

const STEP = 0.01;
const ramp = Float64Array.from({ length: 401 }, (_, i) => i * STEP);

describe('Gruenwald-Letnikov weights', () => {
  it('are 1, -0.5, -0.125, -0.0625, -0.0390625 at order one half (CV-07)', () => {
    expect([...grunwaldLetnikovWeights(0.5, 5)]).toEqual([1, -0.5, -0.125, -0.0625, -0.0390625]);
  });

  it.each(reference.glWeights)('of order $order are signed binomials', ({ order, weights }) => {
    expect(largestDifference(grunwaldLetnikovWeights(order, 40), weights)).toBeLessThan(1e-15);
  });

  it('of order one half, convolved with themselves, are the difference (CV-08d)', () => {
    const w = grunwaldLetnikovWeights(0.5, 50);
    for (let n = 0; n < 50; n++) {
      let sum = 0;
      for (let k = 0; k <= n; k++) sum += w[k] * w[n - k];
      expect(Math.abs(sum - (n === 0 ? 1 : n === 1 ? -1 : 0))).toBeLessThan(1e-12);
    }
  });

  it('sum to 0.1761970520 up to the tenth (CV-08f)', () => {
    const sum = grunwaldLetnikovWeights(0.5, 11).reduce((total, value) => total + value, 0);
    expect(sum).toBeCloseTo(0.176197052, 9);
  });
});

describe('the half derivative', () => {
  it('of t at 1 is 1.1269696 in steps of 0.01 (CV-08), and comes to 2/sqrt pi as they shrink', () => {
    expect(grunwaldLetnikov(ramp, 0.5, STEP)[100]).toBeCloseTo(1.1269696, 6);
    const fine = Float64Array.from({ length: 100_001 }, (_, i) => i * 1e-5);
    const error = grunwaldLetnikov(fine, 0.5, 1e-5)[100_000] - 2 / Math.sqrt(Math.PI);
    expect(error).toBeCloseTo(-0.141e-5, 7);
  });

  it('of t at 4 is twice that of t at 1 within the step’s error (CV-08b)', () => {
    const exact = 2 * reciprocalGamma(1.5);
    expect(exact).toBeCloseTo(2.2567583, 7);
    expect(Math.abs(grunwaldLetnikov(ramp, 0.5, STEP)[400] - exact)).toBeLessThan(1e-3);
  });

  it('of 1 at 1 is 0.5634848, not 0 (CV-08c)', () => {
    const one = new Float64Array(101).fill(1);
    expect(grunwaldLetnikov(one, 0.5, STEP)[100]).toBeCloseTo(0.5634848, 6);
  });

  it('taken twice is the derivative', () => {
    const twice = grunwaldLetnikov(grunwaldLetnikov(ramp, 0.5, STEP), 0.5, STEP);
    for (let i = 1; i < twice.length; i++) expect(twice[i]).toBeCloseTo(1, 10);
  });

  it('forgets what is older than its memory', () => {
    const x = new Float64Array(200);
    x[10] = 1;
    const y = grunwaldLetnikov(x, 0.5, 1, 50);
    expect(y[60]).toBeCloseTo(grunwaldLetnikovWeights(0.5, 51)[50], 14);
    expect(Math.abs(y[61])).toBeLessThan(1e-15);
    expect(grunwaldLetnikov(new Float64Array(0), 0.5, 1).length).toBe(0);
  });
});

describe('the operator of fixed memory', () => {
  it.each(fixed.glMemory)('of $memory samples, order $order, is scipy’s filter', (entry) => {
    const { x, y, order, step, memory } = entry;
    const got = grunwaldLetnikov(Float64Array.from(x), order, step, memory);
    const size = Math.max(...y.map(Math.abs));
    expect(largestDifference(got, y) / size).toBeLessThan(1e-12);
  });

  it.each(fixed.glMemory)('of $memory samples, order $order, has mpmath’s gain', (entry) => {
    const { order, step, memory, response } = entry;
    const scale = step ** -order;
    for (const [freqHz, re, im] of response) {
      const got = grunwaldLetnikovResponse(order, step, memory, freqHz);
      expect(Math.abs(got.re - re) / scale).toBeLessThan(1e-12);
      expect(Math.abs(got.im - im) / scale).toBeLessThan(1e-12);
    }
  });
});

describe('the operator’s response', () => {
  it('at 250 Hz, order one half, has gain 2.802438 and 0.560499, ratio 4.9999 (CV-08e)', () => {
    const gain = (freqHz: number) => {
      const { re, im } = grunwaldLetnikovResponse(0.5, 1 / 250, Number.POSITIVE_INFINITY, freqHz);
      return Math.hypot(re, im);
    };
    expect(gain(1.25)).toBeCloseTo(2.802438, 5);
    expect(gain(0.05)).toBeCloseTo(0.560499, 5);
    expect(gain(1.25) / gain(0.05)).toBeCloseTo(4.9999, 4);
  });

  it('leads by 43.875 degrees at 0.05 Hz and a rate of 4 Hz (field notes 3.2)', () => {
    const { re, im } = grunwaldLetnikovResponse(0.5, 0.25, Number.POSITIVE_INFINITY, 0.05);
    expect((Math.atan2(im, re) * 180) / Math.PI).toBeCloseTo(43.875, 3);
    expect(Math.hypot(re, im)).toBeCloseTo(0.560427, 6);
  });

  it.each(reference.glResponse)(
    'with a memory of $memory samples is the sum of its weights',
    (entry) => {
      const got = grunwaldLetnikovResponse(entry.order, entry.step, entry.memory, entry.freq);
      const size = Math.hypot(entry.re, entry.im);
      expect(Math.abs(got.re - entry.re) / size).toBeLessThan(1e-11);
      expect(Math.abs(got.im - entry.im) / size).toBeLessThan(1e-11);
    },
  );

  it('is what a sine settles to', () => {
    const y = grunwaldLetnikov(sine(4_000, 4, 0.05), 0.5, 0.25, 240);
    const { re, im } = grunwaldLetnikovResponse(0.5, 0.25, 240, 0.05);
    for (let i = 1_000; i < 1_080; i++) {
      const angle = (2 * Math.PI * 0.05 * i) / 4;
      expect(y[i]).toBeCloseTo(re * Math.sin(angle) + im * Math.cos(angle), 10);
    }
  });

  it('at 0 Hz is 0 for a derivative of unlimited memory', () => {
    expect(grunwaldLetnikovResponse(0.5, 1, Number.POSITIVE_INFINITY, 0)).toEqual({ re: 0, im: 0 });
  });
});

describe('the bound of the short memory principle (Podlubny 1999)', () => {
  it('is memory^-order / Gamma(1 - order)', () => {
    for (const [order, memoryS, bound] of reference.truncation)
      expect(truncationBound(order, memoryS)).toBeCloseTo(bound, 13);
    expect(truncationBound(0.5, 31.8)).toBeCloseTo(0.1, 3);
    expect(() => truncationBound(1.5, 60)).toThrow('orders');
  });

  it('is kept by a constant, its worst case', () => {
    const one = new Float64Array(40_000).fill(1);
    const all = grunwaldLetnikov(one, 0.5, 0.01)[39_999];
    const some = grunwaldLetnikov(one, 0.5, 0.01, 6_000)[39_999];
    expect(Math.abs(all - some)).toBeLessThan(truncationBound(0.5, 60));
  });
});
