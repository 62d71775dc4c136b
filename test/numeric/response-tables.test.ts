import { describe, expect, test } from 'vitest';
import { firResponse } from '../../src/numeric/fir';
import { grunwaldLetnikovResponse } from '../../src/numeric/grunwald-letnikov';
import { grunwaldLetnikovResponses } from '../../src/numeric/grunwald-letnikov-responses';
import { savitzkyGolayWeights } from '../../src/numeric/savitzky-golay';
import { symmetricResponses } from '../../src/numeric/symmetric-response';

const FREQS = Float64Array.of(
  0,
  1e-4,
  0.002,
  0.0083,
  0.02,
  0.05,
  0.079,
  0.081,
  0.1,
  0.3,
  1,
  7.3,
  40,
  110,
);

describe('responses at many frequencies at once', () => {
  test.each([
    [0, 60],
    [0.05, 60],
    [0.5, 60],
    [0.5, 3],
    [0.5, 600],
    [0.95, 60],
    [1, 60],
  ])('of a derivative of order %d over %d s are the sums of its weights', (order, memoryS) => {
    for (const rateHz of [250, 1000]) {
      const table = grunwaldLetnikovResponses(1 / rateHz, memoryS * rateHz, FREQS)(order);
      FREQS.forEach((hz, k) => {
        const one = grunwaldLetnikovResponse(order, 1 / rateHz, memoryS * rateHz, hz);
        const size = Math.max(1e-6, Math.hypot(one.re, one.im));
        expect(Math.hypot(table.re[k] - one.re, table.im[k] - one.im) / size).toBeLessThan(2e-6);
      });
    }
  });

  test('of smoothing weights are their transform', () => {
    for (const window of [1, 3, 11, 101, 2001]) {
      const weights = savitzkyGolayWeights(window, window > 4 ? 4 : 0);
      const table = symmetricResponses(weights, 1000, FREQS);
      FREQS.forEach((hz, k) => {
        expect(table[k]).toBeCloseTo(firResponse(weights, hz, 1000).re, 8);
      });
    }
  });
});
