import { describe, expect, it } from 'vitest';
import { crossSpectrum } from '../../src/numeric/cross-spectrum';
import { binHz, welch } from '../../src/numeric/spectrum';
import { hannPeriodic } from '../../src/numeric/windows';
import octave from '../reference/numeric-octave.json';
import reference from '../reference/numeric-pairs.json';
import { largestDifference, noise, sine } from './signals';

// Reference: scipy.signal.csd and coherence (test/reference/numeric-pairs.py), pwelch of Octave
// (test/reference/numeric-octave.m).

const OPTIONS = {
  rateHz: 4,
  taper: hannPeriodic(128),
  step: 32,
  size: 128,
  detrend: 'none',
} as const;

describe('cross-spectrum and coherence', () => {
  it.each(reference.pairs)('are scipy’s, size $size, $detrend taken off', (entry) => {
    const { cross, coherence } = crossSpectrum(
      Float64Array.from(entry.x),
      Float64Array.from(entry.y),
      {
        rateHz: entry.rate,
        taper: hannPeriodic(128),
        step: entry.step,
        size: entry.size,
        detrend: entry.detrend === 'mean' ? 'mean' : entry.detrend === 'line' ? 'line' : 'none',
      },
    );
    const largest = Math.max(...entry.cross.map(Math.abs));
    expect(largestDifference(cross, entry.cross) / largest).toBeLessThan(1e-12);
    expect(largestDifference(coherence, entry.coherence)).toBeLessThan(1e-10);
  });

  it('are Octave’s', () => {
    const { x, y, cross_re, cross_im, coherence } = octave.pair;
    const got = crossSpectrum(Float64Array.from(x), Float64Array.from(y), OPTIONS);
    const part = (which: 0 | 1) => got.cross.filter((_, i) => i % 2 === which);
    expect(largestDifference(part(0), cross_re)).toBeLessThan(1e-12);
    expect(largestDifference(part(1), cross_im)).toBeLessThan(1e-12);
    expect(largestDifference(got.coherence, coherence)).toBeLessThan(1e-11);
  });

  it('have a falling phase where y is the later one, by the delay', () => {
    const shared = noise(4_000, 1);
    const [own, other] = [noise(4_000, 2), noise(4_000, 3)];
    const x = shared.map((value, i) => value + 0.2 * own[i]);
    const y = shared.map((_, i) => (shared[i - 3] ?? 0) + 0.2 * other[i]);
    const { cross, coherence, segments } = crossSpectrum(x, y, OPTIONS);
    expect(segments).toBe(122);
    for (let k = 1; k < 20; k++) {
      const delayS =
        Math.atan2(cross[2 * k + 1], cross[2 * k]) / (-2 * Math.PI * binHz(4, 128) * k);
      expect(Math.abs(delayS - 0.75)).toBeLessThan(0.1);
      expect(coherence[k]).toBeGreaterThan(0.8);
    }
  });

  it('of unrelated noise is low, of a signal with itself 1 and its Welch density', () => {
    const [x, y] = [noise(8_000, 4), noise(8_000, 5)];
    const loose = crossSpectrum(x, y, OPTIONS).coherence;
    expect(loose.reduce((sum, value) => sum + value, 0) / loose.length).toBeLessThan(0.02);
    const same = crossSpectrum(x, x, OPTIONS);
    expect(largestDifference(same.coherence, new Float64Array(65).fill(1))).toBeLessThan(1e-12);
    const own = same.cross.filter((_, i) => i % 2 === 0);
    expect(largestDifference(own, welch(x, OPTIONS))).toBeLessThan(1e-14);
  });

  it('leave out segments with a NaN in either signal, and say how many are left', () => {
    const x = sine(1_000, 4, 0.3);
    const y = noise(1_000, 6);
    const torn = y.slice();
    torn[950] = Number.NaN;
    const short = crossSpectrum(x.slice(0, 928), y.slice(0, 928), OPTIONS);
    expect(crossSpectrum(x, torn, OPTIONS)).toEqual(short);
    expect(short.segments).toBe(26);
    expect(() =>
      crossSpectrum(
        x,
        x.map(() => Number.NaN),
        OPTIONS,
      ),
    ).toThrow('no whole segment');
    expect(() => crossSpectrum(x, y.slice(1), OPTIONS)).toThrow('do not pair');
    expect(() => crossSpectrum(x, y, { ...OPTIONS, step: 0 })).toThrow('every 0');
  });

  it('without power have coherence 0, not NaN', () => {
    const { coherence } = crossSpectrum(new Float64Array(256), noise(256, 7), OPTIONS);
    expect([...coherence]).toEqual(Array.from({ length: 65 }, () => 0));
  });
});
