import { describe, expect, it } from 'vitest';
import { lombScargle } from '../../src/numeric/lomb-scargle';
import { localMaxima, logParabola } from '../../src/numeric/peaks';
import { binHz, powerDensity, welch } from '../../src/numeric/spectrum';
import { hannPeriodic } from '../../src/numeric/windows';
import octave from '../reference/numeric-octave.json';
import reference from '../reference/numeric-spectra.json';
import { largestDifference, noise, sine } from './signals';

// Reference: scipy.signal.periodogram, welch, lombscargle, test/reference/numeric-spectra.py; pwelch
// of Octave, test/reference/numeric-octave.m.

const sum = (x: ArrayLike<number>) => Array.from(x).reduce((total, value) => total + value, 0);

describe('power density', () => {
  it.each(reference.periodogram)(
    'is scipy’s, size $size at $rate Hz',
    ({ rate, size, x, density }) => {
      const got = powerDensity(Float64Array.from(x), hannPeriodic(x.length), rate, size);
      expect(largestDifference(got, density)).toBeLessThan(1e-13);
    },
  );

  it('of 100 uV at 3 cpm over 240 s is 800 000 uV2/Hz at 3 cpm, 5000 uV2 in all (CV-10)', () => {
    const density = powerDensity(sine(960, 4, 0.05, 100), hannPeriodic(960), 4, 960);
    const bin = density.indexOf(Math.max(...density));
    expect(bin * binHz(4, 960) * 60).toBeCloseTo(3, 12);
    expect(density[bin] / 800_000).toBeCloseTo(1, 6);
    expect(10 * Math.log10(density[bin])).toBeCloseTo(59.031, 3);
    expect((sum(density) * binHz(4, 960)) / 5_000).toBeCloseTo(1, 6);
    expect(density[bin - 1] / density[bin]).toBeCloseTo(0.25, 6);
  });

  it.each([
    [960, 3.103],
    [3840, 3.1],
    [4096, 3.1],
  ])('of a wave at 3.1 cpm peaks by log-parabola, size %i, at %d cpm (CV-11)', (size, cpm) => {
    const density = powerDensity(sine(960, 4, 3.1 / 60, 100, 0.3), hannPeriodic(960), 4, size);
    const bin = density.indexOf(Math.max(...density));
    if (size === 960) expect(bin).toBe(12);
    const { offset } = logParabola(density[bin - 1], density[bin], density[bin + 1]);
    expect(Math.abs((bin + offset) * binHz(4, size) * 60 - cpm)).toBeLessThan(5e-4);
  });

  it.each([32, 33])('sums to the mean square without a taper, %i samples', (length) => {
    const x = noise(length, 1);
    const density = powerDensity(x, new Float64Array(length).fill(1), 4, length);
    const meanSquare = sum(x.map((value) => value * value)) / length;
    expect(sum(density) * binHz(4, length)).toBeCloseTo(meanSquare, 12);
  });

  it('refuses a taper of another length', () => {
    expect(() => powerDensity(noise(8, 1), hannPeriodic(9), 4, 16)).toThrow('taper of 9');
  });
});

describe('Welch spectrum', () => {
  it.each(reference.welch)('is scipy’s with $detrend taken off each segment', (entry) => {
    const got = welch(Float64Array.from(entry.x), {
      rateHz: 4,
      taper: hannPeriodic(128),
      step: 32,
      size: 256,
      detrend: entry.detrend === 'mean' ? 'mean' : entry.detrend === 'line' ? 'line' : 'none',
    });
    const scale = Math.max(...entry.density);
    expect(largestDifference(got, entry.density) / scale).toBeLessThan(1e-13);
  });

  it('is Octave’s', () => {
    const got = welch(Float64Array.from(octave.pair.x), {
      rateHz: 4,
      taper: hannPeriodic(128),
      step: 32,
      size: 128,
      detrend: 'none',
    });
    expect(largestDifference(got, octave.pair.density)).toBeLessThan(1e-13);
  });

  it('gives LF 200, HF 50 ms2 for 20 ms at 0.10 and 10 ms at 0.25 Hz (CV-28)', () => {
    const slow = sine(1200, 4, 0.1, 20);
    const fast = sine(1200, 4, 0.25, 10);
    const x = slow.map((value, i) => value + fast[i]);
    const density = welch(x, {
      rateHz: 4,
      taper: hannPeriodic(1200),
      step: 600,
      size: 2048,
      detrend: 'mean',
    });
    const band = (from: number, to: number) =>
      sum(density.filter((_, k) => (k * 4) / 2048 >= from && (k * 4) / 2048 < to)) * (4 / 2048);
    expect(Math.abs(band(0.04, 0.15) / 200 - 1)).toBeLessThan(0.005);
    expect(Math.abs(band(0.15, 0.4) / 50 - 1)).toBeLessThan(0.005);
  });

  it('refuses a signal shorter than one segment', () => {
    const options = { rateHz: 4, step: 4, size: 16, detrend: 'none' } as const;
    expect(() => welch(noise(8, 1), { ...options, taper: hannPeriodic(16) })).toThrow('do not fit');
  });
});

describe('Lomb-Scargle spectrum', () => {
  it.each(reference.lombScargle)('is scipy’s times 2 T / n', ({ times, values, freqs, power }) => {
    const n = times.length;
    const scale = (2 * (times[n - 1] - times[0])) / (n - 1);
    const got = lombScargle(
      Float64Array.from(times),
      Float64Array.from(values),
      Float64Array.from(freqs),
    );
    const wanted = power.map((value) => value * scale);
    expect(largestDifference(got, wanted) / Math.max(...wanted)).toBeLessThan(1e-9);
  });

  it('of an uneven sine at 0.25 Hz peaks at 0.2501 Hz (CV-31)', () => {
    const times = Float64Array.of(0, 0.8, 1.7, 2.5, 3.6, 4.4, 5.1, 6.3, 7, 8.2);
    const freqs = Float64Array.from({ length: 5_000 }, (_, k) => 0.05 + k * 1e-4);
    const values = times.map((t) => Math.sin(2 * Math.PI * 0.25 * t));
    const density = lombScargle(times, values, freqs);
    expect(Math.abs(freqs[density.indexOf(Math.max(...density))] - 0.2501)).toBeLessThan(0.005);
  });

  it('at equal spacing is the periodogram, so its integral is the variance', () => {
    const x = noise(300, 5);
    const level = sum(x) / 300;
    const centred = x.map((value) => value - level);
    const times = Float64Array.from({ length: 300 }, (_, i) => 40 + i / 4);
    const freqs = Float64Array.from({ length: 150 }, (_, k) => ((k + 1) * 4) / 300);
    const flat = new Float64Array(300).fill(1);
    const wanted = powerDensity(centred, flat, 4, 300).subarray(1);
    const got = lombScargle(times, x, freqs);
    expect(largestDifference(got, wanted)).toBeLessThan(1e-10);
    const variance = sum(centred.map((value) => value * value)) / 300;
    expect((sum(got) * 4) / 300).toBeCloseTo(variance, 10);
  });

  it('gives LF 200 and HF 50 ms2 for 20 ms at 0.10 and 10 ms at 0.25 Hz on uneven beats (CV-28)', () => {
    const jitter = noise(400, 6);
    const times = Float64Array.from({ length: 375 }, (_, i) => i * 0.8 + 0.05 * jitter[i]);
    const values = times.map(
      (t) => 800 + 20 * Math.sin(2 * Math.PI * 0.1 * t) + 10 * Math.sin(2 * Math.PI * 0.25 * t + 1),
    );
    const step = 1 / 1200;
    const freqs = Float64Array.from({ length: 600 }, (_, k) => k * step);
    const density = lombScargle(times, values, freqs);
    const band = (from: number, to: number) =>
      sum(density.filter((_, k) => freqs[k] >= from && freqs[k] < to)) * step;
    expect(Math.abs(band(0.04, 0.15) / 200 - 1)).toBeLessThan(0.03);
    expect(Math.abs(band(0.15, 0.4) / 50 - 1)).toBeLessThan(0.05);
    expect(density[0]).toBe(0);
  });

  it('turned from frequency to frequency is that of each frequency alone', () => {
    const times = Float64Array.from({ length: 400 }, (_, i) => i * 0.8);
    const freqs = Float64Array.from({ length: 1_000 }, (_, k) => 0.01 + k * 5e-4);
    const values = noise(400, 7);
    const alone = freqs.map((freq) => lombScargle(times, values, Float64Array.of(freq))[0]);
    const got = lombScargle(times, values, freqs);
    expect(largestDifference(got, alone) / Math.max(...alone)).toBeLessThan(1e-9);
  });
});

describe('peaks', () => {
  it('by log-parabola are exact for a Gaussian and safe for zeros', () => {
    const at = (place: number) => 5 * Math.exp(-((place - 0.2) ** 2) / 2);
    const top = logParabola(at(-1), at(0), at(1));
    expect(top.offset).toBeCloseTo(0.2, 12);
    expect(top.height).toBeCloseTo(5, 12);
    expect(logParabola(0, 4, 0)).toEqual({ offset: 0, height: expect.closeTo(4, 12) });
    expect(logParabola(0, 4, 2).offset).toBeGreaterThan(0);
    expect(logParabola(0, 0, 0)).toEqual({ offset: 0, height: 0 });
    expect(logParabola(1, 1, 1)).toEqual({ offset: 0, height: 1 });
  });

  it('stand only where both neighbours are lower, within the range asked for', () => {
    const x = Float64Array.of(5, 1, 2, 1, 3, 1, 6);
    expect([...localMaxima(x, 0, 7)]).toEqual([2, 4]);
    expect([...localMaxima(x, 3, 7)]).toEqual([4]);
    expect([...localMaxima(x, 2, 4)]).toEqual([2]);
  });
});
