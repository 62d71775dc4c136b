import { describe, expect, it } from 'vitest';
import * as elementary from '../../src/numeric/elementary';
import { createRandom } from '../../src/numeric/random';
import { besselI0, logGamma, reciprocalGamma } from '../../src/numeric/special';
import reference from '../reference/numeric-elementary.json';

// Reference: mpmath at 50 digits and numpy's MT19937, test/reference/numeric-elementary.py.

interface Entry {
  at: number[];
  value: number;
}

const EPSILON = 2 ** -52;

function worstRelative(entries: Entry[], f: (...at: number[]) => number): number {
  let worst = 0;
  for (const { at, value } of entries) {
    const error = Math.abs(f(...at) - value);
    if (error > 0) worst = Math.max(worst, error / Math.abs(value));
  }
  return worst;
}

describe('elementary functions agree with mpmath', () => {
  const { sin, cos, exp, log, log10, pow, atan2 } = elementary;
  it.each([
    ['sin', reference.sin, sin],
    ['cos', reference.cos, cos],
    ['exp', reference.exp, exp],
    ['log', reference.log, log],
    ['pow', reference.pow, pow],
    ['atan2', reference.atan2, atan2],
  ])('%s to the last bit but one', (_, entries, f) => {
    expect(worstRelative(entries, f)).toBeLessThanOrEqual(EPSILON);
  });

  it('log10 to two last bits', () => {
    expect(worstRelative(reference.log10, log10)).toBeLessThanOrEqual(2 * EPSILON);
  });

  it('sinc is 1 at 0 and vanishes at whole numbers', () => {
    expect(elementary.sinc(0)).toBe(1);
    expect(Math.abs(elementary.sinc(3))).toBeLessThan(1e-16);
    expect(elementary.sinc(0.5)).toBeCloseTo(2 / Math.PI, 15);
  });
});

describe('special functions agree with mpmath', () => {
  it('Bessel I0', () => {
    expect(worstRelative(reference.besselI0, besselI0)).toBeLessThan(1e-14);
  });

  it('logarithm of gamma, near its zeros too', () => {
    for (const { at, value } of reference.logGamma)
      expect(Math.abs(logGamma(at[0]) - value)).toBeLessThan(2e-14 * Math.max(1, Math.abs(value)));
    expect(() => logGamma(0)).toThrow('above 0');
  });

  it('reciprocal of gamma, 0 at its poles', () => {
    for (const { at, value } of reference.reciprocalGamma)
      expect(Math.abs(reciprocalGamma(at[0]) - value)).toBeLessThan(1e-13);
    expect(reciprocalGamma(0)).toBe(0);
    expect(reciprocalGamma(-3)).toBe(0);
  });
});

describe('the seeded generator is the published Mersenne Twister', () => {
  it.each(reference.random)('seed $seed gives the numbers numpy gives', (entry) => {
    const bits = createRandom(entry.seed);
    const drawn = Array.from({ length: 700 }, () => bits.uint32());
    expect(drawn.slice(-10)).toEqual(entry.uint32);
    const uniform = createRandom(entry.seed);
    expect(entry.uniform.map(() => uniform.uniform())).toEqual(entry.uniform);
    const normal = createRandom(entry.seed);
    for (const value of entry.gaussian) expect(normal.gaussian()).toBeCloseTo(value, 13);
  });

  it('draws every whole number below a count about equally often', () => {
    const random = createRandom(5);
    const counts = new Float64Array(7);
    for (let i = 0; i < 70_000; i++) counts[random.below(7)] += 1;
    for (const count of counts) expect(Math.abs(count - 10_000)).toBeLessThan(400);
  });
});
