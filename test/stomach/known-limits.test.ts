import { describe, expect, test } from 'vitest';
import { createRandom } from '../../src/numeric/random';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { backgroundAt, peakThreshold } from '../../src/stomach/background';
import { dominantPeak } from '../../src/stomach/dominant-peak';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { leadOf, noise, RATE_HZ, wave } from './leads';

// What theory allows: the least error of a tone's frequency (Cramer-Rao; Rife & Boorstyn 1974; Kay
// 1993) and the highest of m independent values of noise (field notes 2.3).

describe('the error of DF of one 240 s epoch in white noise', () => {
  /** Least standard deviation in cpm, `ratio` the tone's power over the noise's variance. */
  const bound = (ratio: number) => {
    const n = 240 * RATE_HZ;
    return (60 * RATE_HZ * Math.sqrt(12 / (ratio * n * (n * n - 1)))) / (2 * Math.PI);
  };

  test('can be no less than 0.0044485 cpm where both have one power (CV-53)', () => {
    expect(bound(1)).toBeCloseTo(0.0044485, 7);
  });

  test.each([
    [1, 1.4, 1.75],
    [20, 1.4, 1.75],
  ])(
    'is near that at %d times the noise’s power: the taper costs a factor of 1.6',
    (ratio, least, most) => {
      const random = createRandom(53);
      const noiseUv = 100 / Math.sqrt(2 * ratio);
      const errors = Array.from({ length: 400 }, (_, i) => {
        const cpm = 2.5 + (3 * i) / 400;
        const signal = leadOf(4, (t) => wave(100, cpm, t, i) + noiseUv * random.gaussian());
        const spectra = windowSpectra({
          signal,
          kept: new Uint8Array(signal.length).fill(1),
          rateHz: RATE_HZ,
          lengthS: 240,
          powerResponse: null,
        });
        const density = spectra.density(spectra.prepare(0));
        const peak = dominantPeak(density, spectra.binCpm, DEFAULT_SETTINGS.rhythmBands);
        return (peak?.cpm ?? Number.NaN) - cpm;
      });
      const rms = Math.sqrt(errors.reduce((sum, error) => sum + error ** 2, 0) / errors.length);
      expect(rms / bound(ratio)).toBeGreaterThan(least);
      expect(rms / bound(ratio)).toBeLessThan(most);
    },
  );
});

test('the highest of 34 values of known noise passes 6.497 times their mean once in twenty (CV-54)', () => {
  const one = -Math.log(0.05);
  const over = Math.exp(peakThreshold(0.05, 34, 0) - peakThreshold(0.05, 1, 0));
  expect(over * one).toBeCloseTo(6.497, 3);
});

test('a strong line far from the peak, as breathing is, leaves the background under the peak as it was', () => {
  const rest = noise(RATE_HZ * 3600, 1, 20, 8);
  const backgroundOf = (signal: Float64Array) => {
    const spectra = windowSpectra({
      signal,
      kept: new Uint8Array(signal.length).fill(1),
      rateHz: RATE_HZ,
      lengthS: 240,
      powerResponse: null,
    });
    return backgroundAt(spectra.density(spectra.prepare(0)), spectra.binCpm, 3, 240)?.density ?? 0;
  };
  const changes = Array.from({ length: 15 }, (_, epoch) => {
    const quiet = rest.slice(960 * epoch, 960 * (epoch + 1));
    const breathing = leadOf(4, (t) => wave(400, 12.3, t, epoch));
    return Math.log(backgroundOf(quiet.map((uv, i) => uv + breathing[i])) / backgroundOf(quiet));
  });
  const mean = changes.reduce((sum, change) => sum + change, 0) / changes.length;
  expect(Math.abs(mean)).toBeLessThan(0.1);
});
