import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { bandPeaks, densityDb, dominantPeak } from '../../src/stomach/dominant-peak';
import { epochStarts } from '../../src/stomach/epoch-layout';
import { keptSamples } from '../../src/stomach/kept-samples';
import { rhythmOf } from '../../src/stomach/rhythm-class';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { leadOf, RATE_HZ, rhythmOfLead, wave } from './leads';

const reference = JSON.parse(
  readFileSync(new URL('../reference/stomach-epochs.json', import.meta.url), 'utf8'),
);
const BAND = DEFAULT_SETTINGS.rhythmBands;

function spectraOf(signal: Float64Array, spoiled: readonly [number, number][] = []) {
  const intervals = spoiled.map(([fromS, toS]) => ({ fromS, toS }));
  const kept = keptSamples(signal, RATE_HZ, intervals);
  return windowSpectra({ signal, kept, rateHz: RATE_HZ, lengthS: 240, powerResponse: null });
}

describe('epochs of a phase', () => {
  test.each([
    [30, 27],
    [60, 57],
    [15, 12],
    [4, 1],
    [3.9, 0],
  ])('%d min hold %d epochs of 4 min every minute (CV-16)', (minutes, count) => {
    const phase = { fromS: 1234.5, toS: 1234.5 + 60 * minutes };
    expect(epochStarts(phase, DEFAULT_SETTINGS.epoch)).toHaveLength(count);
  });

  test('begin at the phase’s start and lie wholly inside it', () => {
    const starts = epochStarts({ fromS: 100, toS: 500 }, { lengthS: 240, stepS: 60 });
    expect(starts).toEqual([100, 160, 220]);
  });
});

describe('the spectrum of one epoch', () => {
  test('is scipy’s periodogram of density scaling, padded to 4096 points', () => {
    const signal = Float64Array.from(reference.clean.x);
    const spectra = spectraOf(signal);
    const density = spectra.density(spectra.prepare(0));
    const largest = Math.max(...reference.clean.density);
    reference.clean.density.forEach((value: number, k: number) => {
      expect(Math.abs(density[k] - value) / largest).toBeLessThan(1e-12);
    });
  });

  test('leaves spoiled samples out of mean and line, sets them to zero and makes a line’s power whole', () => {
    const signal = Float64Array.from(reference.spoiled.x);
    const spectra = spectraOf(signal, reference.spoiled.spoiled_s);
    const window = spectra.prepare(0);
    expect(window.spoiledFraction).toBeCloseTo(reference.spoiled.spoiled_fraction, 12);
    const density = spectra.density(window);
    const largest = Math.max(...reference.spoiled.density);
    reference.spoiled.density.forEach((value: number, k: number) => {
      expect(Math.abs(density[k] - value) / largest).toBeLessThan(1e-10);
    });
  });

  test('shows 100 uV at 3 cpm as DF 3.000 and 800 000 uV2/Hz, 59.031 dB, 13 333 uV2/cpm (CV-10, CV-59)', () => {
    const spectra = spectraOf(leadOf(4, (t) => wave(100, 3, t)));
    const peak = dominantPeak(spectra.density(spectra.prepare(0)), spectra.binCpm, BAND);
    expect(peak?.cpm).toBeCloseTo(3, 3);
    expect(densityDb(peak?.density ?? 0)).toBeCloseTo(59.031, 2);
    expect((peak?.density ?? 0) / 60).toBeCloseTo(13_333.3, -2);
  });

  test('has the wave’s power of 5000 uV2 under its peak (CV-10)', () => {
    const spectra = spectraOf(leadOf(4, (t) => wave(100, 3, t)));
    const density = spectra.density(spectra.prepare(0));
    const binHz = spectra.binCpm / 60;
    expect(density.reduce((sum, value) => sum + value * binHz, 0)).toBeCloseTo(5000, 0);
  });

  test.each([3.1, 2.87, 1.04, 8.93])('finds a tone between bins, at %d cpm (CV-11)', (cpm) => {
    const spectra = spectraOf(leadOf(4, (t) => wave(100, cpm, t, 0.3)));
    const peak = dominantPeak(spectra.density(spectra.prepare(0)), spectra.binCpm, BAND);
    expect(Math.abs((peak?.cpm ?? 0) - cpm)).toBeLessThan(cpm > 2 ? 0.0005 : 0.02);
  });

  test('never takes the edge of the band for a peak', () => {
    const spectra = spectraOf(leadOf(4, (t) => wave(100, 0.8, t) + wave(1, 5, t)));
    const density = spectra.density(spectra.prepare(0));
    expect(dominantPeak(density, spectra.binCpm, BAND)?.cpm).toBeGreaterThan(1.2);
    expect(bandPeaks(density, spectra.binCpm, BAND).some(({ cpm }) => cpm < 1)).toBe(false);
  });
});

describe('rhythm by half-open bands', () => {
  test.each([
    [0.999, 'none'],
    [1.999, 'brady'],
    [2, 'normo'],
    [3.999, 'normo'],
    [4, 'tachy'],
    [9, 'none'],
  ])('%d cpm is %s (CV-09)', (cpm, rhythm) => {
    expect(rhythmOf(cpm, BAND)).toBe(rhythm);
  });
});

describe('spoiled stretches', () => {
  const lead = leadOf(8, (t) => wave(100, 3, t) + 5 * Math.sin(t * 1.7) + 3 * Math.sin(t * 0.31));

  test('of up to a quarter of the taper leave an epoch kept and flagged filled', () => {
    const { epochs } = rhythmOfLead(lead, { spoiled: [{ fromS: 0, toS: 70 }] }).rhythm;
    expect(epochs[0].spoiledFraction).toBeGreaterThan(0.1);
    expect(epochs[0].spoiledFraction).toBeLessThan(0.25);
    expect(epochs[0]).toMatchObject({ kept: true, flags: ['filled'], rhythm: 'normo' });
    expect(epochs.at(-1)).toMatchObject({ kept: true, flags: [] });
  });

  test('are weighted by the taper: the same 70 s in the middle lose the epoch', () => {
    const { epochs, spectrogram } = rhythmOfLead(lead, {
      spoiled: [{ fromS: 85, toS: 155 }],
    }).rhythm;
    expect(epochs[0].spoiledFraction).toBeGreaterThan(0.4);
    expect(epochs[0]).toMatchObject({ kept: false, dfCpm: null, dpDb: null, rhythm: null });
    expect(spectrogram.levelDb[0]).toBeNaN();
    expect(spectrogram.levelDb[4 * spectrogram.binCount]).not.toBeNaN();
  });

  test('act like a few missing samples, whatever was recorded in them', () => {
    const spoiled = [{ fromS: 100, toS: 100.75 }];
    const wild = lead.map((value, i) => (i >= 400 && i < 403 ? 1e6 : value));
    const gap = lead.map((value, i) => (i >= 400 && i < 403 ? Number.NaN : value));
    const [a, b] = [rhythmOfLead(wild, { spoiled }), rhythmOfLead(gap)];
    expect(a.rhythm.epochs).toEqual(b.rhythm.epochs);
    expect(b.missing).toEqual(spoiled);
  });

  test('do not move a tone’s power by more than 0.1 dB', () => {
    const clean = rhythmOfLead(leadOf(4, (t) => wave(100, 3, t))).rhythm.epochs[0];
    const torn = rhythmOfLead(
      leadOf(4, (t) => wave(100, 3, t)),
      { spoiled: [{ fromS: 60, toS: 90 }] },
    ).rhythm.epochs[0];
    expect(Math.abs((torn.dpDb ?? 0) - (clean.dpDb ?? 0))).toBeLessThan(0.1);
  });
});

describe('a stop of the recorder', () => {
  const stopped = (fromS: number, toS: number) =>
    leadOf(20, (t) => wave(100, 3, t)).map((value, i) =>
      i >= 4 * fromS && i < 4 * toS ? Number.NaN : value,
    );

  test('is reached across by no epoch, however short it is', () => {
    const { epochs } = rhythmOfLead(stopped(500, 502)).rhythm;
    for (const { fromS, toS, kept } of epochs) expect(kept).toBe(toS <= 500 || fromS >= 502);
    expect(epochs.filter(({ kept }) => kept)).toHaveLength(13);
  });

  test('leaves the epochs beside it as they are', () => {
    const whole = rhythmOfLead(leadOf(20, (t) => wave(100, 3, t))).rhythm.epochs;
    for (const epoch of rhythmOfLead(stopped(500, 502)).rhythm.epochs)
      if (epoch.kept)
        expect(epoch.dfCpm).toBe(whole.find(({ fromS }) => fromS === epoch.fromS)?.dfCpm);
  });
});

describe('the running spectrum of a lead', () => {
  test('has its first column at 2:00 and covers the rhythm bands', () => {
    const { spectrogram } = rhythmOfLead(leadOf(30, (t) => wave(100, 3, t))).rhythm;
    expect(spectrogram.centresS).toHaveLength(27);
    expect(spectrogram.centresS[0]).toBe(120);
    expect(spectrogram.firstCpm).toBeLessThanOrEqual(1);
    const { firstCpm, stepCpm, binCount, levelDb } = spectrogram;
    expect(firstCpm + (binCount - 1) * stepCpm).toBeGreaterThanOrEqual(9);
    const column = levelDb.slice(10 * binCount, 11 * binCount);
    const top = column.indexOf(Math.max(...column));
    expect(firstCpm + top * stepCpm).toBeCloseTo(3, 1);
    expect(Math.max(...column)).toBeCloseTo(59.03, 0);
  });
});
