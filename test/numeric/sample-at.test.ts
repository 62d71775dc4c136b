import { describe, expect, it } from 'vitest';
import { createInstantSampler, instantCount } from '../../src/numeric/sample-at';
import reference from '../reference/numeric-instants.json';
import { blocksOf, largestDifference, noise, sine } from './signals';

// Reference: scipy.signal.upfirdn and scipy.special.i0, test/reference/numeric-instants.py; elsewhere
// the sums and waves written out below.

const LOW = { outputRateHz: 4, passHz: 0.5, stopHz: 3, attenuationDb: 80 };

function sampled(
  x: Float64Array,
  rateHz: number,
  lengths: readonly number[] = [1000],
  options = LOW,
): Float64Array {
  const sampler = createInstantSampler({ rateHz, ...options });
  for (const block of blocksOf(x, lengths)) sampler.push(block);
  return sampler.finish();
}

describe('a lead sampled at the output’s own instants', () => {
  // 200.3 = 2003/10 and 1001.001.. = 1000/0.999 are rational; 311.127 and 128 pi are not, in 1024 phases.
  it.each([250, 360, 1000, 128, 200.3, 1000 / 0.999, 311.127, 128 * Math.PI, 7.3])(
    'keeps time and height of a wave in the pass band at %d Hz',
    (rateHz) => {
      const length = Math.floor(120 * rateHz) + 1;
      const y = sampled(sine(length, rateHz, 0.3, 100, 0.4), rateHz);
      const wanted = sine(y.length, 4, 0.3, 100, 0.4);
      const inside = (series: Float64Array) => series.subarray(20, series.length - 20);
      // 80 dB: a ripple of 1e-4; at a few taps Kaiser's length formula falls short of its promise.
      expect(largestDifference(inside(y), inside(wanted))).toBeLessThan(rateHz < 10 ? 0.04 : 0.015);
      expect(y.length).toBe(instantCount(length, rateHz, 4));
    },
  );

  it.each(reference.instants)(
    'of $rate Hz at $outputRate Hz is scipy’s low-pass at those instants, ends included',
    ({ rate, outputRate, x, y }) => {
      const options = { ...reference.design, outputRateHz: outputRate };
      const got = sampled(Float64Array.from(x), rate, [117], options);
      const size = Math.max(...y.map(Math.abs));
      expect(largestDifference(got, y) / size).toBeLessThan(1e-9);
    },
  );

  it('lets nothing through that would fold', () => {
    for (const freqHz of [3, 3.95, 4.05, 60, 119.9]) {
      const y = sampled(sine(60_000, 250, freqHz, 100), 250).subarray(20, -20);
      expect(Math.max(...y.map(Math.abs))).toBeLessThan(0.013);
    }
  });

  it.each([50, 50.0123])('agrees with the weighted sum that defines it at %d Hz', (rateHz) => {
    const x = noise(500, 1);
    const y = sampled(x, rateHz);
    const half = (Math.ceil((80 - 7.95) / (2.285 * ((2 * Math.PI * 2.5) / rateHz)) + 1) | 1) >> 1;
    const bessel = (z: number): number => {
      let [sum, term] = [1, 1];
      for (let k = 1; k < 60; k++) {
        term *= (z / (2 * k)) ** 2;
        sum += term;
      }
      return sum;
    };
    const beta = 0.1102 * (80 - 8.7);
    for (const k of [0, 3, 17, 39]) {
      let [total, there] = [0, 0];
      for (let i = 0; i < x.length; i++) {
        const u = (i - (rateHz / 4) * k) / half;
        if (Math.abs(u) > 1) continue;
        const angle = (2 * Math.PI * 1.75 * (i - (rateHz / 4) * k)) / rateHz;
        const weight =
          (bessel(beta * Math.sqrt(1 - u * u)) / bessel(beta)) *
          (angle === 0 ? 1 : Math.sin(angle) / angle);
        total += weight * x[i];
        there += weight;
      }
      expect(y[k]).toBeCloseTo(total / there, rateHz === 50 ? 12 : 10);
    }
  });

  it('gives the same bits whatever the blocks', () => {
    const x = noise(20_000, 2);
    for (const rateHz of [250, 311.127]) {
      const whole = sampled(x, rateHz, [20_000]);
      expect(sampled(x, rateHz, [1])).toEqual(whole);
      expect(sampled(x, rateHz, [3, 700, 0, 41])).toEqual(whole);
    }
  });

  it('keeps a constant to its ends and through a short gap, and is NaN inside a long one', () => {
    const x = new Float64Array(60 * 250).fill(7);
    x.fill(Number.NaN, 2_500, 2_520);
    x.fill(Number.NaN, 7_500, 10_000);
    const y = sampled(x, 250);
    expect(y.length).toBe(240);
    y.forEach((value, k) => {
      const t = k / 4;
      if (t >= 30 && t < 40) expect(value).toBeNaN();
      else expect(value).toBeCloseTo(7, 12);
    });
  });

  it('counts the instants at or before the last sample', () => {
    expect(instantCount(0, 250, 4)).toBe(0);
    expect(instantCount(1, 250, 4)).toBe(1);
    expect(instantCount(63, 250, 4)).toBe(1);
    expect(instantCount(64, 250, 4)).toBe(2);
    expect(instantCount(3_600_000, 1000, 4)).toBe(14_400);
    expect(instantCount(86_400 * 360, 360, 4)).toBe(345_600);
    expect(sampled(new Float64Array(0), 250).length).toBe(0);
    expect([...sampled(Float64Array.of(3), 250)]).toEqual([Number.NaN]);
  });

  it('refuses edges above half the rate', () => {
    expect(() => createInstantSampler({ rateHz: 5, ...LOW })).toThrow('half the rate');
  });

  it('keeps time over an hour at 1 kHz', () => {
    const y = sampled(sine(3_600_000, 1000, 0.05, 100), 1000, [10_000]);
    expect(y.length).toBe(14_400);
    const last = (x: Float64Array) => x.subarray(14_000, 14_380);
    expect(largestDifference(last(y), last(sine(14_400, 4, 0.05, 100)))).toBeLessThan(0.015);
  });
});
