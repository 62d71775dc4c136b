import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analyticSignal } from '../../src/numeric/analytic-signal';
import { dft, inverseDft } from '../../src/numeric/dft';
import { createFft } from '../../src/numeric/fft';
import { always, mixed, numbers, pairs, signals, sizeOf } from '../properties';
import { largestDifference } from './signals';

const squares = (x: Float64Array) => x.reduce((sum, value) => sum + value * value, 0);

/** Interleaved complex values, from 1 to `most` of them. */
const complexSignals = (most: number) =>
  signals(1, most).map((x) => Float64Array.from([...x, ...x].reverse()));

/** Real values as complex ones. */
function asComplex(x: Float64Array): Float64Array {
  const complex = new Float64Array(2 * x.length);
  x.forEach((value, i) => {
    complex[2 * i] = value;
  });
  return complex;
}

const turned = (x: Float64Array, by: number) => x.map((_, i) => x[(i + x.length - by) % x.length]);

describe('the discrete Fourier transform of any size', () => {
  it('keeps the sum of squares (Parseval)', () => {
    fc.assert(
      fc.property(complexSignals(300), (x) => {
        expect(squares(dft(x)) / (x.length / 2) / squares(x)).toBeCloseTo(1, 12);
      }),
      always(100),
    );
  });

  it('is undone by its inverse', () => {
    fc.assert(
      fc.property(complexSignals(300), (x) => {
        expect(largestDifference(inverseDft(dft(x)), x)).toBeLessThan(1e-12);
      }),
      always(60),
    );
  });

  it('of a sum is the sum of the transforms', () => {
    fc.assert(
      fc.property(pairs(1, 200), numbers(-5, 5), ([x, y], a) => {
        const sum = dft(asComplex(mixed(a, x, 2, y)));
        const parts = mixed(a, dft(asComplex(x)), 2, dft(asComplex(y)));
        expect(largestDifference(sum, parts)).toBeLessThan(1e-11);
      }),
      always(60),
    );
  });

  it('of a signal turned by some samples turns bin k by -2 pi k samples / size', () => {
    fc.assert(
      fc.property(signals(1, 150), fc.nat(150), (x, by) => {
        const n = x.length;
        const [plain, late] = [dft(asComplex(x)), dft(asComplex(turned(x, by % n)))];
        for (let k = 0; k < n; k++) {
          const angle = (-2 * Math.PI * k * (by % n)) / n;
          const [c, s] = [Math.cos(angle), Math.sin(angle)];
          const [re, im] = [plain[2 * k], plain[2 * k + 1]];
          expect(Math.abs(late[2 * k] - (re * c - im * s))).toBeLessThan(1e-11);
          expect(Math.abs(late[2 * k + 1] - (re * s + im * c))).toBeLessThan(1e-11);
        }
      }),
      always(40),
    );
  });

  it('by way of the chirp is that of the power of two', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 8 }), fc.nat(), (log2, draw) => {
        const size = 2 ** log2;
        const x = Float64Array.from({ length: 2 * size }, (_, i) => Math.sin(i * i + draw));
        const plain = new Float64Array(2 * size);
        createFft(size).forward(x, plain);
        const byDefinition = Float64Array.from({ length: 2 * size }, (_, j) => {
          const k = j >> 1;
          let sum = 0;
          for (let n = 0; n < size; n++) {
            const angle = (-2 * Math.PI * ((k * n) % size)) / size;
            const [c, s] = [Math.cos(angle), Math.sin(angle)];
            sum += j % 2 === 0 ? x[2 * n] * c - x[2 * n + 1] * s : x[2 * n] * s + x[2 * n + 1] * c;
          }
          return sum;
        });
        expect(largestDifference(plain, byDefinition) / sizeOf(byDefinition)).toBeLessThan(1e-12);
      }),
      always(20),
    );
  });
});

describe('the analytic signal', () => {
  const part = (z: Float64Array, which: 0 | 1) => z.filter((_, i) => i % 2 === which);

  it('has the signal itself as its real part and half of its energy but for the mean', () => {
    fc.assert(
      fc.property(signals(1, 120), (x) => {
        const odd = x.length % 2 === 1 ? x : x.subarray(1);
        if (odd.length === 0) return;
        const z = analyticSignal(odd);
        expect(largestDifference(part(z, 0), odd)).toBeLessThan(1e-12);
        const mean = odd.reduce((sum, value) => sum + value, 0) / odd.length;
        const wanted = squares(odd.map((value) => value - mean));
        expect(Math.abs(squares(part(z, 1)) - wanted)).toBeLessThan(1e-10);
      }),
      always(60),
    );
  });

  it('taken twice turns the signal over, less its mean', () => {
    fc.assert(
      fc.property(signals(1, 60), (x) => {
        const odd = Float64Array.from([...x, ...x, 0.5]);
        const mean = odd.reduce((sum, value) => sum + value, 0) / odd.length;
        const twice = part(analyticSignal(part(analyticSignal(odd), 1)), 1);
        expect(
          largestDifference(
            twice,
            odd.map((value) => mean - value),
          ),
        ).toBeLessThan(1e-11);
      }),
      always(40),
    );
  });

  it('of a turned signal is turned', () => {
    fc.assert(
      fc.property(signals(2, 100), fc.nat(99), (x, by) => {
        const late = part(analyticSignal(turned(x, by % x.length)), 1);
        const wanted = turned(part(analyticSignal(x), 1), by % x.length);
        expect(largestDifference(late, wanted)).toBeLessThan(1e-12);
      }),
      always(40),
    );
  });
});
