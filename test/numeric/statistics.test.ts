import { describe, expect, it } from 'vitest';
import { fitLine, removeLine } from '../../src/numeric/detrend';
import { localMaxima } from '../../src/numeric/peaks';
import { runningMedian, runningQuantile } from '../../src/numeric/running-quantile';
import { cubicSpline } from '../../src/numeric/spline';
import {
  mean,
  median,
  medianAbsoluteDeviation,
  medianInPlace,
  quantile,
  quantileInPlace,
  standardDeviation,
  variance,
  wilson,
} from '../../src/numeric/statistics';
import reference from '../reference/numeric-statistics.json';
import { largestDifference, noise } from './signals';

// Reference: numpy and scipy, test/reference/numeric-statistics.py.

const values = Float64Array.from(reference.values);

describe('statistics agree with numpy and scipy', () => {
  it('mean, variance, median and median absolute deviation', () => {
    expect(mean(values)).toBeCloseTo(reference.mean, 14);
    expect(variance(values)).toBeCloseTo(reference.variance, 13);
    expect(standardDeviation(values) ** 2).toBeCloseTo(reference.variance, 13);
    expect(median(values)).toBe(reference.median);
    expect(medianAbsoluteDeviation(values)).toBeCloseTo(reference.medianAbsoluteDeviation, 14);
  });

  it('quantiles, however often the array was reordered before', () => {
    const reordered = values.slice();
    for (const [q, value] of reference.quantiles) {
      expect(quantile(values, q)).toBeCloseTo(value, 13);
      expect(quantileInPlace(reordered, q)).toBeCloseTo(value, 13);
    }
    expect([...values]).toEqual(reference.values);
    expect(() => quantile(values, 1.5)).toThrow('0 to 1');
  });

  it('median of part of a buffer, of level values, of one and of none', () => {
    expect(medianInPlace(Float64Array.of(3, 1, 2, 99, 99), 3)).toBe(2);
    expect(medianInPlace(new Float64Array(100_000).fill(4))).toBe(4);
    expect(median([7])).toBe(7);
    expect(median([])).toBeNaN();
    expect(mean([])).toBeNaN();
    expect(variance([1])).toBeNaN();
  });

  it('Wilson intervals (CV-58: 5/7 and 21/30)', () => {
    for (const [successes, n, low, high] of reference.wilson) {
      const interval = wilson(successes, n);
      expect(interval.low).toBeCloseTo(low, 12);
      expect(interval.high).toBeCloseTo(high, 12);
    }
    expect(wilson(5, 7).low).toBeCloseTo(0.359, 3);
    expect(wilson(21, 30).high).toBeCloseTo(0.833, 3);
    expect(() => wilson(1, 0)).toThrow('no share');
  });

  it('local maxima, with the middle of level tops', () => {
    const steps = Float64Array.from(reference.steps);
    expect([...localMaxima(steps, 0, steps.length)]).toEqual(reference.stepMaxima);
    expect([...localMaxima(values, 0, values.length)]).toEqual(reference.valueMaxima);
  });
});

describe('a line taken off', () => {
  it('is that of the kept samples', () => {
    const residual = removeLine(values, Uint8Array.from(reference.kept));
    expect(largestDifference(residual, reference.residual)).toBeLessThan(1e-12);
  });

  it('leaves nothing of a line, and the mean alone where one sample is kept', () => {
    const line = Float64Array.from({ length: 50 }, (_, i) => 3 - 0.25 * i);
    expect(largestDifference(removeLine(line), new Float64Array(50))).toBeLessThan(1e-12);
    expect(
      fitLine(
        line,
        Uint8Array.from({ length: 50 }, (_, i) => (i === 4 ? 1 : 0)),
      ),
    ).toEqual({
      mean: 2,
      slope: 0,
      centre: 4,
    });
    expect([...removeLine(Float64Array.of(1, 2), Uint8Array.of(0, 0))]).toEqual([1, 2]);
    expect(() => removeLine(line, Uint8Array.of(1))).toThrow('do not fit');
  });
});

describe('cubic spline', () => {
  it.each(reference.spline)('is scipy’s not-a-knot CubicSpline, outside its knots too', (entry) => {
    const curve = cubicSpline(Float64Array.from(entry.x), Float64Array.from(entry.y));
    expect(largestDifference(curve(Float64Array.from(entry.at)), entry.values)).toBeLessThan(1e-11);
  });

  it('takes places in any order', () => {
    const curve = cubicSpline(Float64Array.of(0, 1, 2, 3), Float64Array.of(0, 1, 8, 27));
    expect(
      largestDifference(curve(Float64Array.of(2.5, 0.5, 3, 0)), [15.625, 0.125, 27, 0]),
    ).toBeLessThan(1e-12);
  });

  it('refuses places that do not ascend', () => {
    expect(() => cubicSpline(Float64Array.of(0, 2, 2), Float64Array.of(0, 1, 2))).toThrow('knot 2');
    expect(() => cubicSpline(Float64Array.of(0), Float64Array.of(0))).toThrow('two knots');
  });
});

describe('running quantiles', () => {
  it.each(reference.running)(
    'of window $window at $q are numpy’s, with what is there at the ends',
    (entry) => {
      const got = runningQuantile(values, entry.window, entry.q);
      expect(largestDifference(got, entry.values)).toBeLessThan(1e-14);
    },
  );

  it('at one half are scipy’s median filter inside', () => {
    const got = runningMedian(values, 9).subarray(4, -4);
    expect([...got]).toEqual(reference.medianFilter.slice(4, -4));
  });

  it('leave NaN out, and are NaN where there is nothing else', () => {
    const x = Float64Array.of(1, Number.NaN, 3, Number.NaN, Number.NaN, Number.NaN, 7);
    expect([...runningMedian(x, 3)]).toEqual([1, 2, 3, 3, Number.NaN, 7, 7]);
  });

  it('at every tenth sample follow the full ones of a slow series', () => {
    const step = noise(2_000, 1);
    const slow = Float64Array.from(
      { length: 2_000 },
      (_, i) => Math.sin(i / 300) + 0.001 * step[i],
    );
    const full = runningMedian(slow, 301);
    const some = runningMedian(slow, 301, 10);
    expect(some.length).toBe(2_000);
    expect(largestDifference(some.subarray(160, -160), full.subarray(160, -160))).toBeLessThan(
      0.01,
    );
    expect(largestDifference(some, full)).toBeLessThan(0.05);
  });

  it('refuse even windows', () => {
    expect(() => runningMedian(values, 4)).toThrow('odd');
    expect(() => runningMedian(values, 5, 0.5)).toThrow('every');
  });
});
