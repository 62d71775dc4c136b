import { describe, expect, it } from 'vitest';
import { breathingAtDf, nearMultiple, powerAtDouble } from '../../src/trust/rivals';
import { noise, sine } from '../numeric/signals';

const LENGTH = 7200;
const plus = (a: Float64Array, b: Float64Array) => a.map((value, i) => value + b[i]);

describe('other explanations', () => {
  it('see breathing where it moves RR at DF, and not where it moves it at its own rate alone', () => {
    const slow = plus(sine(LENGTH, 4, 0.05), noise(LENGTH, 1));
    const course = plus(slow, noise(LENGTH, 2));
    const tied = breathingAtDf(course, slow, 4, 3);
    expect(tied.coherence).toBeGreaterThan(tied.level);
    const atOwnRate = plus(sine(LENGTH, 4, 0.25, 5), noise(LENGTH, 3));
    const apart = breathingAtDf(plus(noise(LENGTH, 4), sine(LENGTH, 4, 0.25, 5)), atOwnRate, 4, 3);
    expect(apart.coherence).toBeLessThan(apart.level);
  });

  it('say nothing of breathing where no clean stretch is left', () => {
    const holes = noise(LENGTH, 5).map((value, i) => (i % 300 === 0 ? Number.NaN : value));
    expect(breathingAtDf(holes, noise(LENGTH, 6), 4, 3).coherence).toBeNull();
  });

  it('name the multiple of DF that breathing is near', () => {
    expect(nearMultiple(15, 3)).toBe(5);
    expect(nearMultiple(14.8, 3)).toBe(5);
    expect(nearMultiple(14.5, 3)).toBeNull();
    expect(nearMultiple(3.1, 3)).toBe(1);
    expect(nearMultiple(27, 3)).toBeNull();
    expect(nearMultiple(0.1, 3)).toBeNull();
  });

  it('weigh RR about twice DF against RR at DF', () => {
    const both = plus(sine(LENGTH, 4, 0.05, 2), sine(LENGTH, 4, 0.1, 6));
    expect(powerAtDouble(both, 4, 3)).toBeCloseTo(9, 1);
    const torn = both.map((value, i) => (i % 400 === 0 ? Number.NaN : value));
    expect(powerAtDouble(torn, 4, 3)).toBeNull();
    expect(powerAtDouble(new Float64Array(LENGTH), 4, 3)).toBeNull();
  });
});
