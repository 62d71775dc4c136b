import { describe, expect, test } from 'vitest';
import { exp, log } from '../../src/numeric/elementary';
import { bridged } from '../../src/stomach/bridged';
import { overBackground } from '../../src/stomach/over-background';
import { smoothLevel } from '../../src/stomach/smooth-level';
import { rowOf } from '../../src/stomach/window-row';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { BACKGROUNDS, EPOCH_SAMPLES, shapedNoise, sumOf } from './field';
import { leadOf, RATE_HZ, wave } from './leads';

const WINDOWS = 9;
const ROWS = 12;
const LENGTH = ROWS * WINDOWS * EPOCH_SAMPLES;

/** Mean of noise over the background of its row at a place: 1 where the background is right. */
function meanOverLevel(signal: Float64Array, cpm: number): number {
  const options = {
    signal,
    kept: new Uint8Array(signal.length).fill(1),
    rateHz: RATE_HZ,
    lengthS: 240,
    powerResponse: null,
  };
  const spectra = windowSpectra(options);
  const smooth = smoothLevel(spectra.binCpm, spectra.binCount);
  let sum = 0;
  for (let r = 0; r < ROWS; r++) {
    const windows = Array.from({ length: WINDOWS }, (_, k) => {
      const window = spectra.prepare((r * WINDOWS + k) * EPOCH_SAMPLES);
      return { place: k - 4, over: overBackground(spectra.density(window), smooth) };
    });
    const row = rowOf(windows, { binCpm: spectra.binCpm, smooth, options });
    if (!row) throw new Error('nine windows make a row');
    const level = exp(row.levelAt(cpm));
    for (const { over } of windows) sum += over.times[Math.round(cpm / spectra.binCpm)] / level;
  }
  return sum / ROWS / WINDOWS;
}

describe('the background of a row of windows', () => {
  test.each([
    ['1/f', 1.6],
    ['1/f', 3],
    ['1/f^2', 5.5],
    ['white and 1/f^3, equal at 2 cpm', 1.6],
    ['white and 1/f^3, equal at 2 cpm', 3],
  ])('of %s noise is that of the noise at %d cpm, within a third', (name, cpm) => {
    const mean = meanOverLevel(BACKGROUNDS[name](LENGTH, 21), cpm);
    expect(mean).toBeGreaterThan(0.67);
    expect(mean).toBeLessThan(1.2);
  });

  test('follows a hump four times the rest up to its top', () => {
    const hump = shapedNoise(
      LENGTH,
      (cpm) => 1 / cpm + 0.6 * exp(-0.5 * ((cpm - 5) / 1.5) ** 2),
      3,
    );
    expect(meanOverLevel(hump, 5)).toBeLessThan(1.25);
  });

  test('follows a narrower hump by its flanks', () => {
    const hump = shapedNoise(
      LENGTH,
      (cpm) => 1 / cpm + 0.5 * exp(-0.5 * ((cpm - 6) / 0.8) ** 2),
      3,
    );
    expect(meanOverLevel(hump, 6)).toBeLessThan(1.5);
  });

  test('does not follow a line: a steady wave stands as high over it as it does over the noise', () => {
    const quiet = BACKGROUNDS['1/f'](LENGTH, 22);
    const line = leadOf(LENGTH / 240, (t) => wave(40, 3, t));
    const height = meanOverLevel(sumOf(quiet, line), 3) / meanOverLevel(quiet, 3);
    const bare =
      meanOverLevel(
        sumOf(
          quiet,
          line.map((uv) => 2 * uv),
        ),
        3,
      ) / meanOverLevel(quiet, 3);
    expect((bare - 1) / (height - 1)).toBeGreaterThan(3.3);
  });

  test('cannot be told from two windows', () => {
    const smooth = smoothLevel(0.06, 300);
    const over = overBackground(new Float64Array(300).fill(1), smooth);
    const options = { lengthS: 240 } as Parameters<typeof rowOf>[1]['options'];
    const two = [0, 1].map((place) => ({ place, over }));
    expect(rowOf(two, { binCpm: 0.06, smooth, options })).toBeNull();
  });
});

test('a power law is a straight line in log frequency, also under a strong line and breathing', () => {
  const [binCpm, count] = [15 / 256, 320];
  const law = Float64Array.from({ length: count }, (_, k) =>
    k === 0 ? 0 : 2 - 1.3 * log(k * binCpm),
  );
  const marred = law.map((value, k) => (k > 45 && k < 57 ? value + 6 : value));
  const through = smoothLevel(binCpm, count).through(marred, 1, 3);
  for (let k = 10; k < 200; k += 10) expect(Math.abs(through[k] - law[k])).toBeLessThan(0.1);
});

test('the curve of a row is not tilted at 1 cpm by breathing that fills 8 to 12 cpm', () => {
  const [binCpm, count] = [15 / 256, 320];
  const breathing = Float64Array.from({ length: count }, (_, k) =>
    exp(-0.5 * (k * binCpm - 10) ** 2) > 0.1 ? 4 : 0,
  );
  const curve = smoothLevel(binCpm, count).through(breathing, 3, 1.2);
  for (const cpm of [1.1, 1.5])
    expect(Math.abs(curve[Math.round(cpm / binCpm)])).toBeLessThan(0.35);
});

describe('a hole in a window', () => {
  test('in a straight drift is bridged as if nothing were missing', () => {
    const drift = Float64Array.from({ length: 200 }, (_, i) => 3 - 0.4 * i);
    const kept = new Uint8Array(200).fill(1).fill(0, 60, 80);
    const holed = drift.map((value, i) => (kept[i] ? value : 0));
    const filled = bridged(holed, kept, RATE_HZ);
    for (let i = 0; i < 200; i++) expect(Math.abs(filled[i] - drift[i])).toBeLessThan(0.7);
  });

  test('at an end goes on level, and a window without any sample stays 0', () => {
    const kept = new Uint8Array(40).fill(1).fill(0, 30);
    const held = bridged(new Float64Array(40).fill(7), kept, RATE_HZ);
    expect(Array.from(held)).toEqual(Array(40).fill(7));
    expect(Array.from(bridged(new Float64Array(4), new Uint8Array(4), RATE_HZ))).toEqual([
      0, 0, 0, 0,
    ]);
  });
});
