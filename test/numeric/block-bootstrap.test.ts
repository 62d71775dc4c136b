import { describe, expect, it } from 'vitest';
import { blockBootstrap } from '../../src/numeric/block-bootstrap';
import { createRandom } from '../../src/numeric/random';
import { mean, median } from '../../src/numeric/statistics';
import reference from '../reference/numeric-bootstrap.json';
import { noise } from './signals';

// Reference: the same draws by a Mersenne Twister written in Python and checked against numpy's,
// quantiles by numpy, whose interpolation rounds in another order; test/reference/numeric-bootstrap.py.

type Statistic = (x: Float64Array) => number;

function statisticNamed(name: string): Statistic {
  if (name === 'mean') return mean;
  if (name === 'median') return median;
  if (name === 'odd ones only') return (x) => (x[0] < 0 ? Number.NaN : x[x.length - 1]);
  return (x) =>
    x.reduce((most, value, i) => (i ? Math.max(most, Math.abs(value - x[i - 1])) : 0), 0);
}

const over = (x: Float64Array, statistic: Statistic) => (places: Int32Array) =>
  statistic(Float64Array.from(places, (place) => x[place]));

describe('quantiles by the moving-block bootstrap (Kuensch 1989)', () => {
  it.each(reference.cases)(
    'of the $statistic, blocks of $block, agree with the same draws in Python',
    (entry) => {
      const { values, used } = blockBootstrap(
        {
          count: entry.x.length,
          blockLength: entry.block,
          replicates: entry.replicates,
          random: createRandom(entry.seed),
          quantiles: entry.quantiles.map(([q]) => q),
        },
        over(Float64Array.from(entry.x), statisticNamed(entry.statistic)),
      );
      expect(used).toBe(entry.used);
      entry.quantiles.forEach(([, wanted], i) => {
        expect(Math.abs(values[i] - wanted)).toBeLessThan(1e-13);
      });
    },
  );

  const interval = (x: Float64Array, blockLength: number, seed: number) =>
    blockBootstrap(
      {
        count: x.length,
        blockLength,
        replicates: 300,
        random: createRandom(seed),
        quantiles: [0.025, 0.975],
      },
      over(x, mean),
    ).values;

  it('cover the mean of independent numbers nearly as often as they say', () => {
    let covered = 0;
    for (let seed = 1; seed <= 200; seed++) {
      const [low, high] = interval(noise(100, seed), 1, seed);
      if (low < 0 && high > 0) covered += 1;
    }
    expect(covered / 200).toBeGreaterThan(0.9);
    expect(covered / 200).toBeLessThan(0.985);
  });

  it('are wider by blocks than one by one where neighbours are alike', () => {
    const walk = noise(400, 3);
    for (let i = 1; i < walk.length; i++) walk[i] += 0.9 * walk[i - 1];
    const width = (blockLength: number) => {
      const [low, high] = interval(walk, blockLength, 9);
      return high - low;
    };
    expect(width(40) / width(1)).toBeGreaterThan(2.5);
  });

  it('without a value are NaN, and impossible draws are refused', () => {
    const options = { count: 5, blockLength: 2, replicates: 9, quantiles: [0.5] };
    const made = blockBootstrap({ ...options, random: createRandom(1) }, () => Number.NaN);
    expect(made).toEqual({ values: Float64Array.of(Number.NaN), used: 0 });
    for (const fault of [{ blockLength: 6 }, { blockLength: 0 }, { count: 0 }, { replicates: 0 }])
      expect(() =>
        blockBootstrap({ ...options, ...fault, random: createRandom(1) }, () => 1),
      ).toThrow();
  });
});
