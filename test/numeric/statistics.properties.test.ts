import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { blockBootstrap } from '../../src/numeric/block-bootstrap';
import { removeLine } from '../../src/numeric/detrend';
import { createRandom } from '../../src/numeric/random';
import { runningQuantile } from '../../src/numeric/running-quantile';
import { cubicSpline } from '../../src/numeric/spline';
import {
  mean,
  median,
  medianAbsoluteDeviation,
  quantile,
  standardDeviation,
  wilson,
} from '../../src/numeric/statistics';
import { always, numbers, signals, sizeOf, times } from '../properties';
import { largestDifference } from './signals';

describe('quantiles and spreads', () => {
  it('do not depend on the order, rise with q and count from the other end upside down', () => {
    fc.assert(
      fc.property(signals(1, 200), numbers(0, 1), numbers(0, 1), (x, a, b) => {
        const [low, high] = a < b ? [a, b] : [b, a];
        expect(quantile(x, low)).toBeLessThanOrEqual(quantile(x, high));
        expect(quantile(x.slice().sort(), a)).toBe(quantile(x, a));
        expect(quantile(times(-1, x), 1 - a)).toBeCloseTo(-quantile(x, a), 10);
        expect(quantile(x, 0)).toBe(Math.min(...x));
        expect(quantile(x, 1)).toBe(Math.max(...x));
      }),
      always(80),
    );
  });

  it('move with an offset or stay, and grow with the size', () => {
    fc.assert(
      fc.property(signals(2, 200), numbers(-1e4, 1e4), numbers(0.01, 100), (x, level, gain) => {
        const y = x.map((value) => gain * value + level);
        expect(Math.abs(mean(y) - gain * mean(x) - level)).toBeLessThan(1e-8);
        expect(Math.abs(median(y) - gain * median(x) - level)).toBeLessThan(1e-8);
        expect(Math.abs(standardDeviation(y) - gain * standardDeviation(x))).toBeLessThan(1e-8);
        const spread = medianAbsoluteDeviation(y) - gain * medianAbsoluteDeviation(x);
        expect(Math.abs(spread)).toBeLessThan(1e-8);
      }),
      always(60),
    );
  });

  it('along a window are those of the window', () => {
    fc.assert(
      fc.property(signals(1, 120), fc.nat(20), numbers(0, 1), (x, half, q) => {
        const got = runningQuantile(x, 2 * half + 1, q);
        x.forEach((_, i) => {
          const window = x.slice(Math.max(0, i - half), i + half + 1);
          expect(got[i]).toBeCloseTo(quantile(window, q), 12);
        });
      }),
      always(30),
    );
  });

  it('of a share hold it, narrow with the count and mirror with the complement', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 500 }), numbers(0, 1), (n, share) => {
        const successes = Math.round(share * n);
        const { low, high } = wilson(successes, n);
        expect(low).toBeLessThanOrEqual(successes / n + 1e-12);
        expect(high).toBeGreaterThanOrEqual(successes / n - 1e-12);
        const rest = wilson(n - successes, n);
        expect(rest.low).toBeCloseTo(1 - high, 12);
        const more = wilson(4 * successes, 4 * n);
        expect(more.high - more.low).toBeLessThan(high - low);
      }),
      always(80),
    );
  });
});

describe('a line taken off', () => {
  it('is all there was of a line, whatever it was, and nothing the second time', () => {
    fc.assert(
      fc.property(signals(3, 300), numbers(-1e3, 1e3), numbers(-10, 10), (x, level, slope) => {
        const plain = removeLine(x);
        const tilted = removeLine(x.map((value, i) => value + level + slope * i));
        expect(largestDifference(tilted, plain)).toBeLessThan(1e-9);
        expect(largestDifference(removeLine(plain), plain)).toBeLessThan(1e-12);
      }),
      always(60),
    );
  });
});

describe('the cubic spline', () => {
  const knots = (steps: Float64Array) => {
    let at = 0;
    return steps.map((step) => {
      at += 0.2 + Math.abs(step);
      return at;
    });
  };

  it('goes through its knots and is a cubic where they lie on one', () => {
    fc.assert(
      fc.property(signals(4, 60), numbers(-2, 2), numbers(-2, 2), (steps, b, c) => {
        const x = knots(steps);
        expect(largestDifference(cubicSpline(x, steps)(x), steps)).toBeLessThan(1e-11);
        const last = x[x.length - 1];
        const cubic = (t: number) => {
          const u = t / last;
          return 1 + b * u + c * u * u - u * u * u;
        };
        const at = Float64Array.from({ length: 50 }, (_, i) => (last * (i + 1)) / 50);
        const inside = at.filter((t) => t >= x[0]);
        expect(
          largestDifference(cubicSpline(x, x.map(cubic))(inside), inside.map(cubic)),
        ).toBeLessThan(1e-9);
      }),
      always(60),
    );
  });
});

describe('the block bootstrap', () => {
  it('with one block is the statistic itself, and else lies between the least and the most', () => {
    fc.assert(
      fc.property(signals(2, 60), fc.nat(59), fc.nat(), (x, length, draw) => {
        const count = x.length;
        const run = (blockLength: number) =>
          blockBootstrap(
            {
              count,
              blockLength,
              replicates: 30,
              random: createRandom(draw),
              quantiles: [0, 0.5, 1],
            },
            (places) => mean(Float64Array.from(places, (place) => x[place])),
          ).values;
        expect(largestDifference(run(count), new Float64Array(3).fill(mean(x)))).toBeLessThan(
          1e-14,
        );
        const values = run(1 + (length % count));
        expect(values[0]).toBeLessThanOrEqual(values[1]);
        expect(values[1]).toBeLessThanOrEqual(values[2]);
        expect(sizeOf(values)).toBeLessThanOrEqual(sizeOf(x));
        expect(run(1 + (length % count))).toEqual(values);
      }),
      always(40),
    );
  });

  it('draws every place that a block can begin at, and blocks of neighbours alone', () => {
    fc.assert(
      fc.property(fc.integer({ min: 4, max: 20 }), fc.nat(3), fc.nat(), (count, more, draw) => {
        const blockLength = 1 + more;
        const begun = new Set<number>();
        blockBootstrap(
          { count, blockLength, replicates: 300, random: createRandom(draw), quantiles: [] },
          (places) => {
            places.forEach((place, i) => {
              if (i % blockLength === 0) begun.add(place);
              else expect(place).toBe(places[i - 1] + 1);
            });
            return 0;
          },
        );
        expect(begun.size).toBe(count - blockLength + 1);
      }),
      always(20),
    );
  });
});
