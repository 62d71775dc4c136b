import { describe, expect, it } from 'vitest';
import { choleskySolve } from '../../src/numeric/cholesky';

describe("Cholesky's factorisation", () => {
  it('solves a system worked by hand', () => {
    // [4 2; 2 5] x = [8; 9] has x = [1.375, 1.25]: 4 * 1.375 + 2 * 1.25 = 8, 2 * 1.375 + 5 * 1.25 = 9.
    const side = Float64Array.of(8, 9);
    choleskySolve(Float64Array.of(4, 0, 2, 5), 2, [side]);
    expect(side[0]).toBeCloseTo(1.375, 14);
    expect(side[1]).toBeCloseTo(1.25, 14);
  });

  it('solves the Hilbert matrix of order 6 for the sums of its rows: all ones', () => {
    const n = 6;
    const matrix = Float64Array.from(
      { length: n * n },
      (_, i) => 1 / (Math.floor(i / n) + (i % n) + 1),
    );
    const sums = Float64Array.from({ length: n }, (_, i) =>
      matrix.subarray(i * n, i * n + n).reduce((sum, one) => sum + one, 0),
    );
    const twice = sums.map((one) => 2 * one);
    choleskySolve(matrix, n, [sums, twice]);
    for (const one of sums) expect(Math.abs(one - 1)).toBeLessThan(1e-9);
    for (const one of twice) expect(Math.abs(one - 2)).toBeLessThan(1e-9);
  });

  it('refuses a matrix that is not positive definite', () => {
    expect(() => choleskySolve(Float64Array.of(1, 2, 2, 1), 2, [Float64Array.of(1, 1)])).toThrow(
      /not positive definite: pivot 1/,
    );
  });
});
