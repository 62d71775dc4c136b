import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { autoregressiveDensity, burg } from '../../src/numeric/burg';
import { crossSpectrum } from '../../src/numeric/cross-spectrum';
import { dpss } from '../../src/numeric/dpss';
import { lombScargle } from '../../src/numeric/lomb-scargle';
import { localMaxima, logParabola } from '../../src/numeric/peaks';
import { powerDensity, welch } from '../../src/numeric/spectrum';
import { hannPeriodic } from '../../src/numeric/windows';
import { always, mixed, numbers, pairs, signals, sizeOf, times } from '../properties';
import { largestDifference } from './signals';

const sum = (x: ArrayLike<number>) => {
  let total = 0;
  for (let i = 0; i < x.length; i++) total += x[i];
  return total;
};
const rates = numbers(0.5, 1_000);
const flat = (length: number) => new Float64Array(length).fill(1);
/** A line of any level and slope, as long as x. */
const withLine = (x: Float64Array, level: number, slope: number) =>
  x.map((value, i) => value + level + slope * i);

describe('power density', () => {
  it('sums to the mean square of what is under the taper, padded or not (Parseval)', () => {
    fc.assert(
      fc.property(signals(2, 300), fc.nat(300), rates, (x, more, rateHz) => {
        for (const taper of [flat(x.length), hannPeriodic(x.length)]) {
          const size = x.length + more;
          const density = powerDensity(x, taper, rateHz, size);
          const tapered = sum(x.map((value, i) => (value * taper[i]) ** 2));
          const wanted = tapered / sum(taper.map((weight) => weight * weight));
          expect(Math.abs((sum(density) * rateHz) / size / wanted - 1)).toBeLessThan(1e-11);
        }
      }),
      always(60),
    );
  });

  it('is the same upside down, four times as much of twice the signal, to the bit', () => {
    fc.assert(
      fc.property(signals(2, 300), rates, (x, rateHz) => {
        const of = (signal: Float64Array) =>
          powerDensity(signal, hannPeriodic(x.length), rateHz, 2 * x.length);
        expect(of(times(-1, x))).toEqual(of(x));
        expect(of(times(2, x))).toEqual(times(4, of(x)));
      }),
      always(40),
    );
  });

  it('by Welch does not see a line that is taken off each segment', () => {
    fc.assert(
      fc.property(signals(200, 500), numbers(-1e3, 1e3), numbers(-1, 1), (x, level, slope) => {
        const of = (signal: Float64Array) =>
          welch(signal, {
            rateHz: 4,
            taper: hannPeriodic(64),
            step: 16,
            size: 128,
            detrend: 'line',
          });
        expect(
          largestDifference(of(withLine(x, level, slope)), of(x)) / sizeOf(of(x)),
        ).toBeLessThan(1e-9);
      }),
      always(40),
    );
  });
});

describe('Lomb-Scargle', () => {
  const grid = (n: number, rateHz: number) =>
    Float64Array.from({ length: Math.floor((n - 1) / 2) }, (_, k) => ((k + 1) * rateHz) / n);

  it('on even samples is the periodogram, wherever the clock began', () => {
    fc.assert(
      fc.property(signals(4, 300), numbers(0.5, 10), numbers(-5_000, 5_000), (x, rateHz, fromS) => {
        const n = x.length;
        const at = Float64Array.from({ length: n }, (_, i) => fromS + i / rateHz);
        const level = sum(x) / n;
        const centred = x.map((value) => value - level);
        const wanted = powerDensity(centred, flat(n), rateHz, n);
        const freqs = grid(n, rateHz);
        const got = lombScargle(at, x, freqs);
        // Times near 5000 s hold no more than 1e-12 s, and that is all the difference there is.
        expect(
          largestDifference(got, wanted.subarray(1, 1 + freqs.length)) / sizeOf(wanted),
        ).toBeLessThan(1e-8);
      }),
      always(60),
    );
  });

  it('of uneven samples does not see an offset and grows by the square of the size', () => {
    fc.assert(
      fc.property(
        pairs(5, 120),
        numbers(-900, 900),
        numbers(0.1, 50),
        ([x, jitter], level, gain) => {
          const at = jitter.map((value, i) => i * 0.8 + 0.05 * Math.max(-3, Math.min(3, value)));
          const freqs = Float64Array.from({ length: 40 }, (_, k) => 0.01 * (k + 1));
          const plain = lombScargle(at, x, freqs);
          const moved = lombScargle(
            at,
            x.map((value) => gain * (value + level)),
            freqs,
          );
          expect(largestDifference(moved, times(gain * gain, plain)) / sizeOf(moved)).toBeLessThan(
            1e-9,
          );
          expect(lombScargle(at, times(-1, x), freqs)).toEqual(plain);
        },
      ),
      always(60),
    );
  });
});

describe('Burg’s model', () => {
  it('is stable, the same upside down, back to front and at any size', () => {
    fc.assert(
      fc.property(signals(12, 300), fc.nat(10), numbers(0.01, 100), (x, order, gain) => {
        const model = burg(x, order);
        for (const reflection of model.reflections)
          expect(Math.abs(reflection)).toBeLessThanOrEqual(1);
        expect(burg(times(-1, x), order)).toEqual(model);
        const back = burg(x.slice().reverse(), order);
        expect(largestDifference(back.reflections, model.reflections)).toBeLessThan(1e-11);
        const scaled = burg(times(gain, x), order);
        expect(largestDifference(scaled.coefficients, model.coefficients)).toBeLessThan(1e-10);
        expect(scaled.variance / (gain * gain * model.variance)).toBeCloseTo(1, 10);
      }),
      always(60),
    );
  });

  it('has a density that integrates to the power it stands for', () => {
    fc.assert(
      fc.property(signals(100, 300), fc.nat(4), rates, (x, order, rateHz) => {
        const density = autoregressiveDensity(burg(x, order), rateHz, 4096);
        const power = sum(x.map((value) => value * value)) / x.length;
        expect((sum(density) * rateHz) / 4096 / power).toBeCloseTo(1, 6);
      }),
      always(40),
    );
  });
});

describe('coherence and cross-spectrum', () => {
  const options = {
    rateHz: 4,
    taper: hannPeriodic(32),
    step: 8,
    size: 64,
    detrend: 'line',
  } as const;

  it('lie in 0 to 1, see no gain and no line, and turn about when the two are exchanged', () => {
    fc.assert(
      fc.property(pairs(60, 300), numbers(-40, 40), numbers(0.1, 90), ([x, own], level, gain) => {
        const y = mixed(1, x, 1, own);
        const plain = crossSpectrum(x, y, options);
        for (const value of plain.coherence) {
          expect(value).toBeGreaterThanOrEqual(0);
          expect(value).toBeLessThanOrEqual(1);
        }
        const moved = crossSpectrum(times(gain, withLine(x, level, 0.3)), y, options);
        expect(largestDifference(moved.coherence, plain.coherence)).toBeLessThan(1e-8);
        const other = crossSpectrum(y, x, options);
        expect(other.coherence).toEqual(plain.coherence);
        other.cross.forEach((value, i) => {
          expect(value).toBe((i % 2 === 0 ? 1 : -1) * plain.cross[i] + 0);
        });
      }),
      always(40),
    );
  });
});

describe('discrete prolate spheroidal sequences', () => {
  it('of any length and bandwidth are of unit energy, upright on each other, ever less concentrated', () => {
    const shapes = fc
      .tuple(fc.integer({ min: 12, max: 500 }), numbers(1, 5))
      .map(([length, nw]) => ({ length, nw, count: Math.floor(2 * nw) }));
    fc.assert(
      fc.property(shapes, ({ length, nw, count }) => {
        const { tapers, concentrations } = dpss(length, nw, count);
        tapers.forEach((taper, k) => {
          expect(concentrations[k]).toBeLessThanOrEqual(1 + 1e-12);
          if (k > 0) expect(concentrations[k]).toBeLessThan(concentrations[k - 1] + 1e-12);
          for (let j = 0; j <= k; j++) {
            const product = sum(taper.map((value, i) => value * tapers[j][i]));
            expect(Math.abs(product - (j === k ? 1 : 0))).toBeLessThan(1e-9);
          }
        });
      }),
      always(25),
    );
  });
});

describe('peaks', () => {
  it('are the samples above both neighbours, and mirror with the series', () => {
    fc.assert(
      fc.property(signals(3, 200), (x) => {
        const found = [...localMaxima(x, 0, x.length)];
        const wanted = [...x.keys()].filter((i) => x[i] > x[i - 1] && x[i] > x[i + 1]);
        expect(found).toEqual(wanted);
        const mirrored = [...localMaxima(x.slice().reverse(), 0, x.length)];
        expect(mirrored.map((i) => x.length - 1 - i).reverse()).toEqual(found);
      }),
      always(60),
    );
  });

  it('refined by the parabola stay within half a sample, at no less than the top', () => {
    const level = numbers(1e-6, 1e6);
    fc.assert(
      fc.property(level, level, numbers(1.01, 100), numbers(0.001, 1_000), (a, c, over, gain) => {
        const top = over * Math.max(a, c);
        const plain = logParabola(a, top, c);
        expect(Math.abs(plain.offset)).toBeLessThanOrEqual(0.5);
        expect(plain.height / top).toBeGreaterThan(1 - 1e-9);
        expect(logParabola(c, top, a).offset).toBeCloseTo(-plain.offset, 12);
        const scaled = logParabola(gain * a, gain * top, gain * c);
        expect(scaled.offset).toBeCloseTo(plain.offset, 8);
        expect(scaled.height / (gain * plain.height)).toBeCloseTo(1, 8);
      }),
      always(100),
    );
  });
});
