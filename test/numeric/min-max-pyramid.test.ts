import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { minMaxColumns } from '../../src/numeric/min-max-columns';
import { createPyramidBuilder } from '../../src/numeric/min-max-pyramid';
import { always } from '../properties';

const build = (samples: number[], rateHz: number, blockSize: number) => {
  const builder = createPyramidBuilder(rateHz);
  for (let i = 0; i < samples.length; i += blockSize) builder.push(samples.slice(i, i + blockSize));
  return builder.finish();
};

describe('columns for drawing a trace', () => {
  it('a single sample far above the rest stands in exactly one column at any zoom', () => {
    const rateHz = 250;
    const samples = new Array<number>(rateHz * 600).fill(1);
    samples[rateHz * 321 + 17] = 900;
    const pyramid = build(samples, rateHz, 997);
    for (const columns of [60, 200, 600]) {
      const { high, timesS } = pyramid.columns(0, 600, columns);
      const tall = [...high].flatMap((value, i) => (value === 900 ? [timesS[i]] : []));
      expect(tall).toHaveLength(1);
      expect(Math.abs(tall[0] - 321.068)).toBeLessThanOrEqual(600 / columns / 2 + 0.1);
    }
  });

  it('the pyramid never draws outside, nor inside, the true range of a stretch by more than its neighbours', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: -500, max: 500 }), { minLength: 400, maxLength: 2000 }),
        fc.integer({ min: 1, max: 40 }),
        (samples, columns) => {
          const rateHz = 10;
          const pyramid = build(samples, rateHz, 64);
          const seconds = samples.length / rateHz;
          const { low, high } = pyramid.columns(0, seconds, columns);
          const finite = (values: Float32Array) => [...values].filter((v) => !Number.isNaN(v));
          expect(Math.min(...finite(low)) - Math.min(...samples)).toBeCloseTo(0, 12);
          expect(Math.max(...finite(high)) - Math.max(...samples)).toBeCloseTo(0, 12);
        },
      ),
      always(60),
    );
  });

  it('a gap stays a gap: columns of nothing but NaN are NaN', () => {
    const samples = Array.from({ length: 5000 }, (_, i) =>
      i >= 2000 && i < 3000 ? Number.NaN : 3,
    );
    const { low, timesS } = build(samples, 50, 100).columns(0, 100, 50);
    const missing = [...timesS].filter((_, i) => Number.isNaN(low[i]));
    const wellInside = [...timesS].filter((time) => time > 42 && time < 58);
    expect(missing).toEqual(expect.arrayContaining(wellInside));
    expect(missing.every((time) => time > 40 && time < 60)).toBe(true);
  });

  it('few samples come back as themselves, at their own times', () => {
    const { timesS, low, high } = minMaxColumns([5, 6, 7, 8], 4, 8, 2.25, 2.75, 100);
    expect([...timesS]).toEqual([2.25, 2.5, 2.75]);
    expect([...low]).toEqual([6, 7, 8]);
    expect([...high]).toEqual([6, 7, 8]);
  });

  it('many samples are parted without loss or overlap', () => {
    const samples = Float64Array.from({ length: 1000 }, (_, i) => i);
    const { low, high } = minMaxColumns(samples, 100, 0, 0, 10, 10);
    expect([...low]).toEqual([0, 100, 200, 300, 400, 500, 600, 700, 800, 900]);
    expect([...high]).toEqual([99, 199, 299, 399, 499, 599, 699, 799, 899, 999]);
  });
});
