import { describe, expect, test } from 'vitest';
import { hannPeriodic } from '../../src/numeric/windows';
import { withoutLines } from '../../src/stomach/without-lines';
import { RATE_HZ, wave } from './leads';

const LENGTH = 960;
const holed = hannPeriodic(LENGTH).map((weight, i) => (i % 80 < 15 ? 0 : weight));
const signal = (uvAt: (t: number) => number) =>
  Float64Array.from({ length: LENGTH }, (_, i) => uvAt(i / RATE_HZ));

describe('lines taken off a stretch with holes', () => {
  test('leave nothing of a constant and two lines at just these frequencies', () => {
    const x = signal((t) => 40 + wave(100, 3, t, 0.4) + wave(30, 3.3, t, 1));
    const rest = withoutLines(x, holed, [0, 3, 3.3], RATE_HZ);
    rest.forEach((value, i) => {
      if (holed[i] > 0) expect(Math.abs(value)).toBeLessThan(1e-7);
    });
  });

  test('leave of anything else what has nothing in common with them under the weights', () => {
    const x = signal((t) => wave(100, 3, t, 0.4) + 25 * Math.sin(t * t));
    const rest = withoutLines(x, holed, [0, 3], RATE_HZ);
    for (const phase of [0, Math.PI / 2]) {
      const line = signal((t) => wave(1, 3, t, phase));
      const shared = rest.reduce((sum, value, i) => sum + holed[i] * value * line[i], 0);
      expect(Math.abs(shared)).toBeLessThan(1e-8);
    }
  });

  test('leave samples without weight as they are', () => {
    const x = signal((t) => wave(100, 3, t));
    const rest = withoutLines(x, holed, [3], RATE_HZ);
    expect(rest[5]).toBe(x[5]);
  });

  test('may be asked for twice: the second fit finds nothing new', () => {
    const x = signal((t) => wave(100, 3, t) + wave(20, 5, t));
    const once = withoutLines(x, holed, [3], RATE_HZ);
    const twice = withoutLines(x, holed, [3, 3], RATE_HZ);
    twice.forEach((value, i) => {
      expect(value).toBeCloseTo(once[i], 8);
    });
  });
});
