import { describe, expect, it } from 'vitest';
import { dft, inverseDft } from '../../src/numeric/dft';
import { createFft, isPowerOfTwo, nextPowerOfTwo } from '../../src/numeric/fft';
import reference from '../reference/numeric-spectra.json';
import { largestDifference, noise } from './signals';

// Reference: numpy.fft, test/reference/numeric-spectra.py.

describe('the transform of powers of two', () => {
  it.each(reference.fft)('of $size complex values agrees with numpy', ({ size, input, output }) => {
    const out = new Float64Array(2 * size);
    createFft(size).forward(Float64Array.from(input), out);
    expect(largestDifference(out, output)).toBeLessThan(1e-13);
  });

  it.each([2, 4, 8, 16, 2048, 4096])('of %i real values is that of complex ones', (size) => {
    const real = noise(size, size);
    const complex = new Float64Array(2 * size);
    for (let i = 0; i < size; i++) complex[2 * i] = real[i];
    const fft = createFft(size);
    const [a, b] = [new Float64Array(2 * size), new Float64Array(2 * size)];
    fft.forwardReal(real, a);
    fft.forward(complex, b);
    expect(largestDifference(a, b)).toBeLessThan(1e-12);
  });

  it.each([2, 8, 64, 8192])('of %i points is undone by the inverse', (size) => {
    const complex = noise(2 * size, 3);
    const fft = createFft(size);
    const [spectrum, back] = [new Float64Array(2 * size), new Float64Array(2 * size)];
    fft.forward(complex, spectrum);
    fft.inverse(spectrum, back);
    expect(largestDifference(back, complex)).toBeLessThan(1e-14);
  });

  it('keeps the sum of squares: 1 2 3 4 give 30 (Parseval, CV-51)', () => {
    const out = new Float64Array(8);
    createFft(4).forwardReal(Float64Array.of(1, 2, 3, 4), out);
    expect(out.reduce((sum, value) => sum + value * value, 0) / 4).toBeCloseTo(30, 12);
  });

  it('refuses sizes and arrays that do not fit', () => {
    expect(() => createFft(12)).toThrow('power of two');
    expect(() => createFft(1)).toThrow('power of two');
    const fft = createFft(4);
    expect(() => fft.forward(new Float64Array(4), new Float64Array(8))).toThrow('not 4 into 8');
    expect(() => fft.forwardReal(new Float64Array(4), new Float64Array(4))).toThrow('into 4');
  });
});

describe('the transform of any size', () => {
  it.each(reference.dft)('of $size complex values agrees with numpy', ({ input, output }) => {
    expect(largestDifference(dft(Float64Array.from(input)), output)).toBeLessThan(1e-12);
  });

  it.each([1, 7, 60, 64])('of %i points is undone by its inverse', (size) => {
    const complex = noise(2 * size, 4);
    expect(largestDifference(inverseDft(dft(complex)), complex)).toBeLessThan(1e-13);
  });
});

it('knows powers of two', () => {
  expect([1, 2, 3, 1023, 1024, 1025].map(nextPowerOfTwo)).toEqual([1, 2, 4, 1024, 1024, 2048]);
  expect([0, 1, 2, 3, 64, 65, 1.5].map(isPowerOfTwo)).toEqual([
    false,
    true,
    true,
    false,
    true,
    false,
    false,
  ]);
  expect(() => nextPowerOfTwo(2 ** 31)).toThrow('2^30');
});
