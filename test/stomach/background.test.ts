import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { log } from '../../src/numeric/elementary';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import {
  backgroundAt,
  independentValues,
  peakThreshold,
  standsOut,
} from '../../src/stomach/background';
import { dominantPeak } from '../../src/stomach/dominant-peak';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { leadOf, noise, RATE_HZ, rhythmOfLead, tally, wave } from './leads';

interface Judged {
  readonly peak_cpm: number;
  readonly log_ratio: number;
  readonly leverage: number;
  readonly threshold: number;
  readonly rhythm: boolean;
}
interface Reference {
  readonly false_alarms: {
    exponent: number;
    epoch_s: number;
    asked: number;
    false_alarms: number;
  }[];
  readonly power: { line_over_background: number; cpm: number; found: number }[];
  readonly examples: { exponent: number; x: number[]; judged: Judged }[];
}
const reference: Reference = JSON.parse(
  readFileSync(new URL('../reference/stomach-background.json', import.meta.url), 'utf8'),
);
const BAND = DEFAULT_SETTINGS.rhythmBands;
const OPTIONS = { falseAlarm: 0.05, independent: independentValues(BAND, 240) };

function densityOf(signal: Float64Array) {
  const kept = new Uint8Array(signal.length).fill(1);
  const lengthS = signal.length / RATE_HZ;
  const spectra = windowSpectra({ signal, kept, rateHz: RATE_HZ, lengthS, powerResponse: null });
  return { density: spectra.density(spectra.prepare(0)), binCpm: spectra.binCpm };
}

describe('the background of a peak', () => {
  test.each(reference.examples.map((one, i) => ({ ...one, i })))(
    'epoch $i, noise of 1/f^$exponent: ratio, leverage and threshold as numpy has them',
    ({ x, judged }) => {
      const { density, binCpm } = densityOf(Float64Array.from(x));
      const peak = dominantPeak(density, binCpm, BAND);
      const background = peak && backgroundAt(density, binCpm, peak.cpm, 240);
      if (!peak || !background) throw new Error('a peak and its background were expected');
      expect(peak.cpm).toBeCloseTo(judged.peak_cpm, 9);
      expect(log(peak.density / background.density)).toBeCloseTo(judged.log_ratio, 8);
      expect(background.leverage).toBeCloseTo(judged.leverage, 8);
      const threshold = peakThreshold(0.05, OPTIONS.independent, background.leverage);
      expect(threshold).toBeCloseTo(judged.threshold, 8);
      const spectrum = { density, binCpm, lengthS: 240, spoiledFraction: 0, without: null };
      expect(standsOut(spectrum, peak, OPTIONS)).toBe(judged.rhythm);
    },
  );

  test('is where 1/f noise really lies, within a factor of two at 3 cpm', () => {
    const signal = noise(960 * 60, 1, 50, 3);
    let [expected, fitted] = [0, 0];
    for (let k = 0; k < 60; k++) {
      const { density, binCpm } = densityOf(signal.subarray(960 * k, 960 * (k + 1)));
      expected += density[Math.round(3 / binCpm)] / 60;
      fitted += (backgroundAt(density, binCpm, 3, 240)?.density ?? Number.NaN) / 60;
    }
    expect(fitted / expected).toBeGreaterThan(0.5);
    expect(fitted / expected).toBeLessThan(2);
  });
});

describe('a recording of noise alone', () => {
  test('gave a rhythm in 2.1 to 4.5 % of 4 min epochs in the simulation, where at most 5 % are asked for', () => {
    const rates = reference.false_alarms.filter((one) => one.epoch_s === 240 && one.asked === 0.05);
    expect(rates).toHaveLength(6);
    for (const { false_alarms } of rates) {
      expect(false_alarms).toBeGreaterThan(0.021);
      expect(false_alarms).toBeLessThan(0.045);
    }
  });

  test.each([0, 1, 2])('of 1/f^%d has no rhythm in 95 to 99 %% of its epochs', (exponent) => {
    const settings = {
      ...DEFAULT_SETTINGS,
      epoch: { ...DEFAULT_SETTINGS.epoch, stepS: 240 },
    };
    const signal = noise(960 * 400, exponent, 40, 17 + exponent);
    const counts = tally(rhythmOfLead(signal, { settings }).rhythm.epochs);
    expect(counts.none / 400).toBeGreaterThan(0.95);
  });
});

describe('a wave in noise', () => {
  test('of 25 times the background was found in nearly all epochs at 3 and 5.5 cpm', () => {
    const strong = reference.power.filter((one) => one.line_over_background === 25 && one.cpm > 2);
    for (const { found } of strong) expect(found).toBeGreaterThan(0.96);
  });

  test('of 100 uV in 1/f noise of 60 uV is normo all the time, with DF within 0.1 cpm', () => {
    const background = noise(RATE_HZ * 1800, 1, 60, 5);
    const signal = leadOf(30, (t) => wave(100, 3, t) + background[Math.round(t * RATE_HZ)]);
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(tally(epochs)).toEqual({ normo: 27 });
    for (const { dfCpm } of epochs) expect(Math.abs((dfCpm ?? 0) - 3)).toBeLessThan(0.1);
  });
});
