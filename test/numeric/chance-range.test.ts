import { describe, expect, it } from 'vitest';
import { blockReplicates, sumReplicates } from '../../src/numeric/block-bootstrap';
import { chanceRange, differenceRange, termsFor } from '../../src/numeric/chance-range';
import { blockVariance, cosineDegrees, cosineVariance } from '../../src/numeric/long-run-variance';
import { createRandom } from '../../src/numeric/random';
import { mean } from '../../src/numeric/statistics';
import { studentT95 } from '../../src/numeric/student-t';
import reference from '../reference/numeric-ranges.json';
import { noise } from './signals';

// Reference: numpy and scipy; test/reference/numeric-ranges.py.

describe('the 95 % point of Student’s t', () => {
  it('is scipy’s for whole degrees of freedom, and for any from 12 on', () => {
    for (const [degrees, t] of reference.t)
      expect(Math.abs(studentT95(degrees) / t - 1), String(degrees)).toBeLessThan(2e-6);
  });

  it('is at most 1.5 % too wide, and never too narrow, between whole ones', () => {
    for (const [degrees, t] of reference.t_between) {
      expect(studentT95(degrees) / t, String(degrees)).toBeGreaterThanOrEqual(1);
      expect(studentT95(degrees) / t, String(degrees)).toBeLessThan(1.015);
    }
  });

  it('is refused under one degree', () => {
    expect(() => studentT95(0.9)).toThrow();
  });
});

describe('the variance of a mean in the long run', () => {
  it.each(reference.variances)(
    'by $terms cosines is that of scipy’s DCT, by blocks of $length that of every block',
    ({ x, terms, length, cosine, block }) => {
      const values = Float64Array.from(x);
      expect(Math.abs(cosineVariance(values, terms) / cosine - 1)).toBeLessThan(1e-9);
      expect(Math.abs(blockVariance(values, length) / block - 1)).toBeLessThan(1e-9);
    },
  );

  it('has as many degrees of freedom by equal weights, fewer by falling ones', () => {
    expect(cosineDegrees(1)).toBe(1);
    // (3 + 2 + 1)^2 / (9 + 4 + 1).
    expect(cosineDegrees(3)).toBeCloseTo(36 / 14, 12);
    expect(() => cosineVariance(noise(5, 1), 5)).toThrow();
  });
});

describe('block draws of two sums', () => {
  it('are the same as of places, added up one by one', () => {
    const [above, below] = [noise(103, 1), noise(103, 2)];
    const draws = () => ({ count: 103, blockLength: 10, replicates: 20, random: createRandom(4) });
    const bySums = sumReplicates(draws(), above, below, (a, b) => a - 2 * b);
    const byPlaces = blockReplicates(draws(), (places) =>
      places.reduce((sum, place) => sum + above[place] - 2 * below[place], 0),
    );
    bySums.forEach((value, i) => {
      expect(Math.abs(value - byPlaces[i])).toBeLessThan(1e-10);
    });
  });
});

/** A series that forgets itself to a third in `steps` steps (an autoregressive process of order 1), mean 0. */
function wandering(count: number, steps: number, seed: number): Float64Array {
  const random = createRandom(seed);
  const keep = Math.exp(-1 / steps);
  let value = random.gaussian();
  return Float64Array.from({ length: count }, () => {
    value = keep * value + Math.sqrt(1 - keep * keep) * random.gaussian();
    return value;
  });
}

const ordered = { count: 60, blockLength: 4, minutes: 60 };
const rangeOfMean = (x: Float64Array) =>
  chanceRange(
    {
      kind: 'sums',
      above: x,
      below: new Float64Array(x.length).fill(1),
      figure: (sum, count) => sum / count,
    },
    mean(x),
    ordered,
    'linear',
  );

describe('a range by chance', () => {
  it.each([0.3, 2, 5])(
    'covers the mean of what hangs together over %f things nearly as often as it says',
    (steps) => {
      let covered = 0;
      for (let seed = 1; seed <= 400; seed += 1) {
        const range = rangeOfMean(wandering(60, steps, seed));
        if (range && range.low < 0 && range.high > 0) covered += 1;
      }
      expect(covered / 400).toBeGreaterThan(0.91);
      expect(covered / 400).toBeLessThan(0.985);
    },
  );

  it('is the same for places as for sums, since both draw the same', () => {
    const x = wandering(60, 2, 7);
    const byPlaces = chanceRange(
      {
        kind: 'places',
        influence: x,
        figure: (places) => places.reduce((sum, place) => sum + x[place], 0) / places.length,
      },
      mean(x),
      ordered,
      'linear',
    );
    const bySums = rangeOfMean(x);
    expect(byPlaces?.low).toBeCloseTo(bySums?.low ?? Number.NaN, 10);
    expect(byPlaces?.high).toBeCloseTo(bySums?.high ?? Number.NaN, 10);
  });

  it('of a share stays inside 0 to 100 %, of a level above 0', () => {
    const x = wandering(60, 2, 3).map((value) => (value > 1.2 ? 1 : 0.001));
    const from = {
      kind: 'sums',
      above: x,
      below: new Float64Array(60).fill(1),
      figure: (sum: number, count: number) => (100 * sum) / count,
    } as const;
    const share = chanceRange(from, 100 * mean(x), ordered, 'percent');
    expect(share?.low).toBeGreaterThan(0);
    expect(share?.high).toBeLessThan(100);
    expect(chanceRange(from, 100 * mean(x), ordered, 'log')?.low ?? 1).toBeGreaterThan(0);
  });

  it('is not told where nothing moves, or of fewer things than two blocks', () => {
    expect(rangeOfMean(new Float64Array(60).fill(3))).toBeNull();
    const x = noise(7, 1);
    const few = { count: 7, blockLength: 4, minutes: 7 };
    const from = { kind: 'sums', above: x, below: x, figure: (a: number) => a } as const;
    expect(chanceRange(from, 1, few, 'linear')).toBeNull();
  });

  it('takes more cosines of longer stretches, three at least', () => {
    expect([10, 30, 60, 120, 1440].map(termsFor)).toEqual([3, 3, 4, 6, 21]);
  });
});

describe('the range of a change', () => {
  it.each(reference.newcombe)('of two shares is Newcombe’s', ({ before, after, low, high }) => {
    const ranged = ([value, from, to]: readonly number[]) => ({
      value,
      low: from,
      high: to,
      degrees: null,
    });
    const range = differenceRange(ranged(before), ranged(after));
    expect(range.low).toBeCloseTo(low, 10);
    expect(range.high).toBeCloseTo(high, 10);
  });

  it('of two alike has twice the degrees of freedom of one (Welch 1947)', () => {
    const one = { value: 10, low: 10 - studentT95(6), high: 10 + studentT95(6), degrees: 6 };
    const range = differenceRange(one, { ...one, value: 10 });
    // Both have a standard error of 1, so that the difference has that of sqrt 2, with 12 degrees of freedom.
    expect(range.high).toBeCloseTo(Math.SQRT2 * studentT95(12), 10);
    expect(range.low).toBeCloseTo(-range.high, 10);
  });
});
