import { expect, test } from 'vitest';
import { LAGRANGE_FIRST, lagrangeWeights } from '../../src/numeric/lagrange';

test.each([0, 0.25, 0.5, 0.9])(
  'six weights give polynomials of degree 5 back, %d after a sample',
  (u) => {
    for (let degree = 0; degree <= 5; degree += 1) {
      let value = 0;
      lagrangeWeights(u).forEach((weight, i) => {
        value += weight * (i + LAGRANGE_FIRST) ** degree;
      });
      expect(value).toBeCloseTo(u ** degree, 11);
    }
  },
);

test.each([
  [5, 0.02],
  [10, 3.1e-4],
])('a wave of %d samples a cycle is within %d of its size', (samples, part) => {
  const wave = (x: number) => Math.cos((2 * Math.PI * x) / samples);
  for (let from = 0; from < samples; from += 0.37) {
    let value = 0;
    lagrangeWeights(0.5).forEach((weight, i) => {
      value += weight * wave(from + i + LAGRANGE_FIRST);
    });
    expect(Math.abs(value - wave(from + 0.5))).toBeLessThan(part);
  }
});
