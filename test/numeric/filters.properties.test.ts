import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { convolveSame } from '../../src/numeric/fir';
import { grunwaldLetnikov } from '../../src/numeric/grunwald-letnikov';
import { createPyramidBuilder } from '../../src/numeric/min-max-pyramid';
import { createOverlapSave, overlapSave } from '../../src/numeric/overlap-save';
import { createInstantSampler } from '../../src/numeric/sample-at';
import { savitzkyGolay, savitzkyGolayWeights } from '../../src/numeric/savitzky-golay';
import { always, cutAt, cuts, mixed, numbers, pairs, signals, sizeOf, times } from '../properties';
import { filteredByDefinition, largestDifference, noise } from './signals';

const ENDS = fc.constantFrom('zero' as const, 'hold' as const, 'reflect-odd' as const);

/** x after `by` zeros. */
const late = (x: Float64Array, by: number) => Float64Array.from([...new Float64Array(by), ...x]);

const joined = (parts: readonly Float64Array[]) =>
  Float64Array.from(parts.flatMap((part) => [...part]));

describe('overlap-save', () => {
  const kernels = fc
    .tuple(fc.integer({ min: 1, max: 60 }), fc.nat(59), fc.nat())
    .map(([count, origin, draw]) => ({ taps: noise(count, draw), origin: origin % count }));

  it('cut at any samples gives the same bits, and those of its definition within 1e-12', () => {
    fc.assert(
      fc.property(
        signals(0, 700),
        kernels,
        kernels,
        fc.integer({ min: 1, max: 9 }),
        ENDS,
        cuts,
        (x, a, b, decimate, ends, shares) => {
          const options = { blockSize: 256, kernels: [a, b] as const, decimate, ends };
          const whole = overlapSave(x, options);
          const stream = createOverlapSave(options);
          const parts = cutAt(x, shares).map((block) => stream.push(block));
          parts.push(stream.finish());
          [a, b].forEach((kernel, k) => {
            expect(joined(parts.map((part) => part[k]))).toEqual(whole[k]);
            const wanted = filteredByDefinition(x, kernel, ends, decimate);
            const size = sizeOf(wanted) + sizeOf(x);
            expect(largestDifference(whole[k], wanted) / size).toBeLessThan(1e-12);
          });
        },
      ),
      always(80),
    );
  });
});

describe('convolution about the centre', () => {
  const taps = fc.tuple(fc.nat(40), fc.nat()).map(([half, draw]) => noise(2 * half + 1, draw));

  it('is linear', () => {
    fc.assert(
      fc.property(pairs(1, 300), taps, numbers(-9, 9), ([x, y], kernel, a) => {
        for (const ends of ['zero', 'reflect-odd'] as const) {
          const sum = convolveSame(mixed(a, x, 1, y), kernel, ends);
          const parts = mixed(a, convolveSame(x, kernel, ends), 1, convolveSame(y, kernel, ends));
          expect(largestDifference(sum, parts) / (1 + sizeOf(parts))).toBeLessThan(1e-12);
        }
      }),
      always(50),
    );
  });

  it('comes as much later as its input, upside down or twice as large to the bit', () => {
    fc.assert(
      fc.property(signals(50, 300), taps, fc.nat(40), (x, kernel, by) => {
        const half = (kernel.length - 1) / 2;
        const padded = late(late(x, half).reverse(), half).reverse();
        const moved = convolveSame(late(padded, by), kernel, 'zero').subarray(by);
        const plain = convolveSame(padded, kernel, 'zero');
        expect(largestDifference(moved, plain) / sizeOf(plain)).toBeLessThan(1e-12);
        expect(convolveSame(times(-1, x), kernel, 'zero')).toEqual(
          times(-1, convolveSame(x, kernel, 'zero')).map((value) => value + 0),
        );
        expect(convolveSame(times(2, x), kernel, 'reflect-odd')).toEqual(
          times(2, convolveSame(x, kernel, 'reflect-odd')),
        );
      }),
      always(50),
    );
  });
});

describe('Savitzky-Golay smoothing', () => {
  const shapes = fc
    .tuple(fc.integer({ min: 1, max: 40 }), fc.nat(4))
    .filter(([half, order]) => order < 2 * half + 1)
    .map(([half, order]) => ({ window: 2 * half + 1, order }));

  it('leaves every polynomial of its order as it is, ends too, and gives its slope', () => {
    fc.assert(
      fc.property(
        shapes,
        fc.array(numbers(-3, 3), { minLength: 5, maxLength: 5 }),
        fc.nat(60),
        ({ window, order }, coefficients, more) => {
          const n = window + more;
          const at = (i: number) => i / n - 0.4;
          const powers = coefficients.slice(0, order + 1);
          const x = Float64Array.from({ length: n }, (_, i) =>
            powers.reduce((sum, c, k) => sum + c * at(i) ** k, 0),
          );
          const slope = Float64Array.from({ length: n }, (_, i) =>
            powers.reduce((sum, c, k) => (k === 0 ? sum : sum + k * c * at(i) ** (k - 1)), 0),
          );
          expect(largestDifference(savitzkyGolay(x, window, order), x)).toBeLessThan(1e-9);
          const got = savitzkyGolay(x, window, order, 1);
          expect(largestDifference(times(n, got), slope)).toBeLessThan(1e-8);
        },
      ),
      always(120),
    );
  });

  it('treats past and future alike, and a sum as the sum', () => {
    fc.assert(
      fc.property(shapes, pairs(90, 150), ({ window, order }, [x, y]) => {
        const plain = savitzkyGolay(x, window, order);
        const back = savitzkyGolay(x.slice().reverse(), window, order).reverse();
        expect(largestDifference(plain, back)).toBeLessThan(1e-11);
        const sum = savitzkyGolay(mixed(1, x, -3, y), window, order);
        const parts = mixed(1, plain, -3, savitzkyGolay(y, window, order));
        expect(largestDifference(sum, parts)).toBeLessThan(1e-11);
      }),
      always(60),
    );
  });

  it('passes white noise with the variance of its middle weight', () => {
    fc.assert(
      fc.property(shapes, ({ window, order }) => {
        const weights = savitzkyGolayWeights(window, order);
        const gain = weights.reduce((sum, value) => sum + value * value, 0);
        expect(gain).toBeCloseTo(weights[(window - 1) / 2], 12);
      }),
      always(60),
    );
  });
});

describe('the Gruenwald-Letnikov derivative', () => {
  const orders = numbers(-1, 1);

  it('of one order after another is that of their sum (unlimited memory)', () => {
    fc.assert(
      fc.property(signals(1, 400), orders, orders, numbers(0.004, 1), (x, a, b, step) => {
        const twice = grunwaldLetnikov(grunwaldLetnikov(x, a, step), b, step);
        const once = grunwaldLetnikov(x, a + b, step);
        const size = sizeOf(once) + sizeOf(twice) + sizeOf(x) * step ** -Math.max(0, a + b);
        expect(largestDifference(twice, once) / size).toBeLessThan(1e-9);
      }),
      always(80),
    );
  });

  it('of order 0 changes nothing, of order 1 is the difference, of -1 the running sum', () => {
    fc.assert(
      fc.property(signals(1, 300), (x) => {
        expect(largestDifference(grunwaldLetnikov(x, 0, 0.1), x)).toBeLessThan(1e-13);
        const steps = x.map((value, i) => (value - (i > 0 ? x[i - 1] : 0)) / 0.1);
        expect(largestDifference(grunwaldLetnikov(x, 1, 0.1), steps)).toBeLessThan(1e-11);
        let total = 0;
        const sums = x.map((value) => {
          total += 0.1 * value;
          return total;
        });
        expect(largestDifference(grunwaldLetnikov(x, -1, 0.1), sums)).toBeLessThan(1e-12);
      }),
      always(40),
    );
  });

  it('of fixed memory is linear and as late as its input', () => {
    fc.assert(
      fc.property(pairs(1, 300), orders, fc.nat(200), fc.nat(50), ([x, y], order, memory, by) => {
        const d = (z: Float64Array) => grunwaldLetnikov(z, order, 0.25, memory);
        const size = sizeOf(d(x)) + sizeOf(d(y));
        expect(
          largestDifference(d(mixed(2, x, -1, y)), mixed(2, d(x), -1, d(y))) / size,
        ).toBeLessThan(1e-12);
        expect(largestDifference(d(late(x, by)), late(d(x), by)) / size).toBeLessThan(1e-12);
      }),
      always(60),
    );
  });
});

describe('a lead sampled at the output’s instants', () => {
  const rates = fc.oneof(fc.constantFrom(10, 50, 128, 200.3, 250, 360), numbers(9, 300));
  const sampled = (blocks: readonly Float64Array[], rateHz: number) => {
    const sampler = createInstantSampler({
      rateHz,
      outputRateHz: 4,
      passHz: 0.5,
      stopHz: 3,
      attenuationDb: 60,
    });
    for (const block of blocks) sampler.push(block);
    return sampler.finish();
  };

  it('cut at any samples gives the same bits, with missing samples too', () => {
    fc.assert(
      fc.property(signals(0, 2_000), rates, cuts, fc.nat(1_999), (x, rateHz, shares, hole) => {
        x.fill(Number.NaN, hole, hole + 25);
        expect(sampled(cutAt(x, shares), rateHz)).toEqual(sampled([x], rateHz));
      }),
      always(60),
    );
  });

  it('keeps a constant, turns over with its input and doubles with it to the bit', () => {
    fc.assert(
      fc.property(signals(200, 1_500), rates, numbers(-2_000, 2_000), (x, rateHz, level) => {
        const plain = sampled([x], rateHz);
        expect(sampled([times(-1, x)], rateHz)).toEqual(times(-1, plain));
        expect(sampled([times(2, x)], rateHz)).toEqual(times(2, plain));
        const moved = sampled([x.map((value) => value + level)], rateHz);
        moved.forEach((value, k) => {
          expect(Number.isNaN(value)).toBe(Number.isNaN(plain[k]));
          if (!Number.isNaN(value)) expect(Math.abs(value - level - plain[k])).toBeLessThan(1e-10);
        });
      }),
      always(40),
    );
  });

  it('comes as many output samples later as its input came', () => {
    fc.assert(
      fc.property(signals(1_500, 2_500), fc.integer({ min: 1, max: 9 }), (x, by) => {
        const rateHz = 200;
        const plain = sampled([x], rateHz);
        const moved = sampled([late(x, 50 * by)], rateHz).subarray(by);
        const inside = (y: Float64Array) => y.subarray(8, plain.length - 8);
        expect(largestDifference(inside(moved), inside(plain))).toBeLessThan(1e-13);
      }),
      always(30),
    );
  });
});

describe('the min-max pyramid', () => {
  it('cut at any samples draws the same columns', () => {
    fc.assert(
      fc.property(signals(1, 3_000), numbers(2, 400), cuts, (x, rateHz, shares) => {
        const built = (blocks: readonly Float64Array[]) => {
          const builder = createPyramidBuilder(rateHz);
          for (const block of blocks) builder.push(block);
          return builder.finish().columns(0, x.length / rateHz, 40);
        };
        expect(built(cutAt(x, shares))).toEqual(built([x]));
      }),
      always(40),
    );
  });

  it('holds the least and greatest of the samples in each column, and of no others', () => {
    fc.assert(
      fc.property(signals(500, 3_000), fc.constantFrom(10, 50, 125, 250), (x, rateHz) => {
        const builder = createPyramidBuilder(rateHz);
        builder.push(x);
        const width = Math.round(0.2 * rateHz);
        const whole = Math.floor(x.length / width);
        const got = builder.finish().columns(0, (whole * width) / rateHz, whole);
        for (let i = 0; i < whole; i += 1) {
          const samples = x.subarray(i * width, (i + 1) * width);
          expect(got.low[i]).toBe(Math.fround(Math.min(...samples)));
          expect(got.high[i]).toBe(Math.fround(Math.max(...samples)));
        }
      }),
      always(40),
    );
  });
});
