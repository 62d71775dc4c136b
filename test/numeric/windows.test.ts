import { describe, expect, it } from 'vitest';
import {
  effectiveAverages,
  hannPeriodic,
  kaiser,
  kaiserBeta,
  kaiserTaps,
  noiseBandwidthBins,
  overlapCorrelation,
} from '../../src/numeric/windows';
import reference from '../reference/numeric-filters.json';
import { largestDifference } from './signals';

// Reference: scipy.signal, test/reference/numeric-filters.py.

describe('windows', () => {
  it('agree with scipy', () => {
    expect(largestDifference(hannPeriodic(12), reference.hann)).toBeLessThan(1e-15);
    const { beta, window } = reference.kaiser;
    expect(largestDifference(kaiser(31, beta), window)).toBeLessThan(1e-14);
    for (const [attenuationDb, shape] of reference.kaiserBeta)
      expect(kaiserBeta(attenuationDb)).toBeCloseTo(shape, 12);
    expect([...kaiser(1, 5)]).toEqual([1]);
  });

  it('of Kaiser give an odd number of taps and refuse what cannot be', () => {
    expect(kaiserTaps(60, 5, 250)).toBe(reference.lowPass.taps.length);
    expect(kaiserTaps(60, 1.234, 250) % 2).toBe(1);
    expect(() => kaiserTaps(5, 1, 250)).toThrow('8 dB');
    expect(() => kaiserTaps(60, 0, 250)).toThrow('above 0');
  });
});

describe('the periodic Hann taper of 960 points', () => {
  const taper = hannPeriodic(960);

  it('has the noise bandwidth, scalloping and overlap correlation of Harris 1978 (CV-49)', () => {
    expect(noiseBandwidthBins(taper)).toBeCloseTo(1.5, 12);
    expect(overlapCorrelation(taper, 240)).toBeCloseTo(0.65915, 4);
    let halfBin = 0;
    let sum = 0;
    for (let i = 0; i < 960; i++) {
      halfBin += taper[i] * Math.cos((Math.PI * (i - 480)) / 960);
      sum += taper[i];
    }
    expect(-20 * Math.log10(halfBin / sum)).toBeCloseTo(1.4236, 4);
  });

  it('makes 27 and 57 spectra at 75 % overlap worth 14.298 and 29.883 (Welch 1967, CV-50)', () => {
    expect(effectiveAverages(27, taper, 240)).toBeCloseTo(14.298, 3);
    expect(effectiveAverages(57, taper, 240)).toBeCloseTo(29.883, 3);
    expect(effectiveAverages(1, taper, 240)).toBe(1);
  });
});
