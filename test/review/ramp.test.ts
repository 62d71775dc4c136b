import { describe, expect, it } from 'vitest';
import { colourLevels, fittedLevels, rampTable } from '../../src/review/ramp';
import { THEMES } from '../../src/review/theme-tokens';

describe('the colours of the spectrogram', () => {
  const table = rampTable(['#000000', '#ff0000', '#ffffff']);
  const pixel = (pixels: Uint8ClampedArray, i: number) => [...pixels.subarray(4 * i, 4 * i + 4)];

  it('run from the first stop through each to the last', () => {
    expect(pixel(table, 0)).toEqual([0, 0, 0, 255]);
    expect(pixel(table, 255)).toEqual([255, 255, 255, 255]);
    expect(pixel(table, 127)[0]).toBeGreaterThan(250);
    expect(pixel(table, 127)[1]).toBeLessThan(3);
  });

  it('put the lowest rate at the bottom and leave out what is not kept', () => {
    const levels = [0, 10, Number.NaN, 5];
    const pixels = colourLevels(levels, 2, 2, [0, 10], table);
    expect(pixel(pixels, 2)).toEqual([0, 0, 0, 255]);
    expect(pixel(pixels, 0)).toEqual([255, 255, 255, 255]);
    expect(pixel(pixels, 3)).toEqual([0, 0, 0, 0]);
  });

  it('hold levels beyond the scale at its ends', () => {
    const pixels = colourLevels([-50, 99], 2, 1, [0, 10], table);
    expect([pixel(pixels, 0)[1], pixel(pixels, 1)[1]]).toEqual([0, 255]);
  });

  it('use every stop of both themes exactly', () => {
    for (const { ramp } of [THEMES.light, THEMES.dark]) {
      const all = rampTable(ramp);
      expect(all).toHaveLength(1024);
      expect(
        `#${[...all.subarray(1020, 1023)].map((v) => v.toString(16).padStart(2, '0')).join('')}`,
      ).toBe(ramp[ramp.length - 1]);
    }
  });
});

describe('the fitted level scale', () => {
  it('stands on whole fives, at least 20 dB wide', () => {
    expect(fittedLevels(Array.from({ length: 1000 }, (_, i) => 12 + (i % 41)))).toEqual([15, 55]);
    expect(fittedLevels([30, 31, 32])).toEqual([15, 35]);
    expect(fittedLevels([])).toEqual([0, 60]);
    expect(fittedLevels([Number.NaN, Number.NEGATIVE_INFINITY])).toEqual([0, 60]);
  });
});
