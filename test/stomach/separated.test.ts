import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import { createSeparation } from '../../src/separate/separation';
import { bandPeaks } from '../../src/stomach/dominant-peak';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { ALL_ROUTES } from '../separate/all-routes';
import { tally } from './leads';

function separate(signal: Float64Array, rateHz: number, settings: Settings = DEFAULT_SETTINGS) {
  const separation = createSeparation({
    lead: '#1',
    rateHz,
    sampleCount: signal.length,
    settings,
    routes: ALL_ROUTES,
    wants: { slow: true, heart: false },
  });
  separation.push(signal);
  const { slow } = separation.finish();
  if (!slow) throw new Error('a slow wave was asked for');
  return slow;
}

const analyse = (slow: ReturnType<typeof separate>, minutes: number) =>
  slowWaveRhythm({
    slow,
    spoiled: [],
    phases: [{ name: 'whole', fromS: 0, toS: 60 * minutes }],
    settings: DEFAULT_SETTINGS,
    breathing: null,
  });

const signalOf = (minutes: number, rateHz: number, uvAt: (t: number) => number) =>
  Float64Array.from({ length: minutes * 60 * rateHz }, (_, i) => uvAt(i / rateHz));

/** A beat of 300 uV and 12 ms at a steady rate, times in seconds. */
const beats = (perMinute: number) => (t: number) => {
  const period = 60 / perMinute;
  const from = ((t + period / 2) % period) - period / 2;
  return 300 * Math.exp(-0.5 * (from / 0.012) ** 2);
};

const rms = (x: Float64Array) => Math.sqrt(x.reduce((sum, v) => sum + v * v, 0) / x.length);
const inside = (x: Float64Array, rateHz: number) => {
  const part = x.subarray(30 * rateHz, x.length - 30 * rateHz);
  const mean = part.reduce((sum, v) => sum + v, 0) / part.length;
  return part.map((v) => v - mean);
};

describe('a heartbeat of 63 a minute', () => {
  const RATE_HZ = 250;
  const lead = signalOf(10, RATE_HZ, beats(63));

  test('picked every second without a filter shows lines at multiples of 3 cpm (CV-12)', () => {
    const naive = Float64Array.from({ length: 600 }, (_, i) => lead[i * RATE_HZ]);
    const kept = new Uint8Array(600).fill(1);
    const spectra = windowSpectra({
      signal: naive,
      kept,
      rateHz: 1,
      lengthS: 240,
      powerResponse: null,
    });
    const density = spectra.density(spectra.prepare(0));
    const band = { lowCpm: 1, highCpm: 10 };
    const largest = Math.max(...density);
    const lines = bandPeaks(density, spectra.binCpm, band).filter(
      (peak) => peak.density > 0.1 * largest,
    );
    expect(lines.map(({ cpm }) => Math.round(cpm))).toEqual([3, 6, 9]);
    for (const { cpm } of lines) expect(Math.abs(cpm - 3 * Math.round(cpm / 3))).toBeLessThan(0.02);
  });

  test('leaves under 0.1 % of that in the anti-aliased 4 Hz lead (CV-13)', () => {
    const naive = Float64Array.from({ length: 600 }, (_, i) => lead[i * RATE_HZ]);
    const slow = separate(lead, RATE_HZ);
    expect(rms(inside(naive, 1))).toBeGreaterThan(15);
    expect(rms(inside(slow.recorded, 4)) / rms(inside(naive, 1))).toBeLessThan(1e-3);
    expect(rms(inside(slow.slowWave, 4)) / rms(inside(naive, 1))).toBeLessThan(1e-3);
  });
});

describe('slow wave, breathing and beats in one lead of 250 Hz (CV-14)', () => {
  const mixture = signalOf(
    30,
    250,
    (t) =>
      100 * Math.sin((2 * Math.PI * 3 * t) / 60) +
      40 * Math.sin((2 * Math.PI * 15 * t) / 60) +
      beats(75.3)(t),
  );

  test.each(['band', 'fractional'] as const)(
    'by route %s: 27 epochs, all with DF 3.00, all normogastria',
    (slowRoute) => {
      const slow = separate(mixture, 250, { ...DEFAULT_SETTINGS, slowRoute });
      const { epochs } = analyse(slow, 30).rhythm;
      expect(epochs).toHaveLength(27);
      expect(tally(epochs)).toEqual({ normo: 27 });
      for (const { dfCpm, dpDb } of epochs) {
        expect(Math.abs((dfCpm ?? 0) - 3)).toBeLessThan(0.02);
        expect(Math.abs((dpDb ?? 0) - 59.031)).toBeLessThan(0.1);
      }
    },
  );

  test('has three crests a minute on the drawn wave outside its unclean ends', () => {
    const slow = separate(mixture, 250);
    const { crestsS } = analyse(slow, 30).rhythm;
    expect(crestsS[0]).toBeGreaterThan(slow.unclean[0].toS - 1);
    const minutes = (crestsS[crestsS.length - 1] - crestsS[0]) / 60;
    expect((crestsS.length - 1) / minutes).toBeCloseTo(3, 1);
  });
});

describe('a sawtooth at 3 cpm (CV-22)', () => {
  const RATE_HZ = 50;
  const sawtooth = signalOf(20, RATE_HZ, (t) => 300 * ((t / 20) % 1) - 150);

  /** Level of the 6 cpm line over the 3 cpm line in dB, of what spectra are computed on. */
  function secondOverFirst(order: number, divided: boolean): number {
    const slow = separate(sawtooth, RATE_HZ, {
      ...DEFAULT_SETTINGS,
      slowRoute: 'fractional',
      fractional: { ...DEFAULT_SETTINGS.fractional, order, slowWindowMs: 100, memoryS: 240 },
    });
    const spectra = windowSpectra({
      signal: slow.forSpectra,
      kept: new Uint8Array(slow.forSpectra.length).fill(1),
      rateHz: 4,
      lengthS: 240,
      powerResponse: divided ? slow.powerResponse : null,
    });
    const density = spectra.density(spectra.prepare(4 * 480));
    const peaks = bandPeaks(density, spectra.binCpm, { lowCpm: 2, highCpm: 7 });
    const level = (cpm: number) =>
      10 * Math.log10(peaks.find((peak) => Math.abs(peak.cpm - cpm) < 0.1)?.density ?? 0);
    return level(6) - level(3);
  }

  test.each([
    [0, -6.02],
    [0.5, -3.01],
    [1, 0],
  ])('after a derivative of order %d has its 6 cpm line %d dB over the wave', (order, db) => {
    expect(secondOverFirst(order, false)).toBeCloseTo(db, 1);
    expect(Math.abs(secondOverFirst(order, false) - db)).toBeLessThan(0.05);
  });

  test('has it at -6.02 dB again once the response is divided out', () => {
    for (const order of [0.5, 1])
      expect(Math.abs(secondOverFirst(order, true) + 6.02)).toBeLessThan(0.05);
  });

  test.each(['band', 'fractional'] as const)('by route %s: DF 3.00, not tachygastria', (route) => {
    const slow = separate(sawtooth, RATE_HZ, { ...DEFAULT_SETTINGS, slowRoute: route });
    const { epochs } = analyse(slow, 20).rhythm;
    expect(tally(epochs)).toEqual({ normo: 17 });
    for (const { dfCpm } of epochs) expect(Math.abs((dfCpm ?? 0) - 3)).toBeLessThan(0.01);
  });

  test('seen through a lead that lifts the double above the wave: flagged, DF 3.00', () => {
    const lifted = sawtooth.map((uv, i) => uv + 120 * Math.cos((2 * Math.PI * i) / (10 * RATE_HZ)));
    const { epochs } = analyse(separate(lifted, RATE_HZ), 20).rhythm;
    expect(epochs.every(({ flags }) => flags.includes('harmonic'))).toBe(true);
    for (const { dfCpm } of epochs) expect(Math.abs((dfCpm ?? 0) - 3)).toBeLessThan(0.01);
  });
});
