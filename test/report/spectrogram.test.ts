import { describe, expect, it } from 'vitest';
import type { Spectrogram } from '../../src/recording/rhythm';
import { levelRange, spectrogramPixels } from '../../src/report/pictures/spectrogram-pixels';
import {
  RAMP_PALETTE,
  RAMP_STEPS,
  RAMP_STOPS,
  rampColour,
} from '../../src/report/pictures/spectrogram-ramp';
import { THEMES } from '../../src/review/theme-tokens';

/** Columns at the given times; level rises with the column's number, the same at all frequencies. */
const steps = (centresS: readonly number[], levels: readonly number[]): Spectrogram => ({
  centresS: Float64Array.from(centresS),
  firstCpm: 1,
  stepCpm: 2,
  binCount: 5,
  levelDb: Float32Array.from(levels.flatMap((level) => new Array<number>(5).fill(level))),
});

function draw(spectrogram: Spectrogram) {
  const image = spectrogramPixels(spectrogram, 60, [1, 9], [0, 10]);
  if (!image) throw new Error('no image');
  const { pixels, width, fromS, toS } = image;
  const atTime = (timeS: number) => pixels[Math.floor(((timeS - fromS) / (toS - fromS)) * width)];
  return { ...image, atTime };
}

describe('the spectrogram on paper', () => {
  it('levels run smoothly between the centres of columns, half a step beyond the last ones', () => {
    const { fromS, toS, atTime } = draw(steps([120, 180, 240], [0, 10, 0]));
    expect([fromS, toS]).toEqual([90, 270]);
    expect(atTime(100)).toBe(1);
    expect(atTime(180)).toBeGreaterThanOrEqual(RAMP_STEPS - 1);
    expect(Math.abs(atTime(150) - (RAMP_STEPS + 1) / 2)).toBeLessThanOrEqual(1);
    const seen = new Set(Array.from({ length: 60 }, (_, i) => atTime(120 + i)));
    expect(seen.size).toBeGreaterThan(50);
  });

  it('levels run smoothly between bins too, the high frequency at the top', () => {
    const rising = { ...steps([60], [0]), levelDb: Float32Array.of(0, 2.5, 5, 7.5, 10) };
    const { pixels, width, height } = draw(rising);
    const column = Array.from({ length: height }, (_, y) => pixels[y * width + width / 2]);
    expect(column[0]).toBeGreaterThanOrEqual(RAMP_STEPS - 1);
    expect(column[height - 1]).toBeLessThanOrEqual(2);
    expect([...column].sort((a, b) => b - a)).toEqual(column);
  });

  it('a column that is not kept stays clear and mixes into none beside it', () => {
    const { atTime } = draw(steps([60, 120, 180], [10, Number.NaN, 10]));
    expect(atTime(120)).toBe(0);
    expect(atTime(95)).toBe(0);
    expect(atTime(85)).toBe(RAMP_STEPS);
    expect(atTime(155)).toBe(RAMP_STEPS);
  });

  it('a gap between phases stays clear but for half a step beside its columns', () => {
    const { atTime } = draw(steps([60, 300], [10, 10]));
    expect([atTime(85), atTime(95), atTime(265), atTime(275)]).toEqual([
      RAMP_STEPS,
      0,
      0,
      RAMP_STEPS,
    ]);
  });

  it('the scale is on whole fives and at least 20 dB wide', () => {
    expect(levelRange(Float32Array.from({ length: 1001 }, (_, i) => i / 10))).toEqual([10, 100]);
    expect(levelRange(Float32Array.of(31, 32, Number.NaN))).toEqual([15, 35]);
    expect(levelRange(Float32Array.of(Number.NaN))).toEqual([0, 60]);
  });

  it('the colours are those of the light theme, and darken all the way for grey printers', () => {
    expect(RAMP_STOPS).toEqual(THEMES.light.ramp);
    const grey = RAMP_PALETTE.slice(1).map(([r, g, b]) => 0.2126 * r + 0.7152 * g + 0.0722 * b);
    for (let i = 1; i < grey.length; i += 1) expect(grey[i]).toBeLessThan(grey[i - 1]);
    expect(rampColour(0)).toEqual([0xf7, 0xf5, 0xf0]);
    expect(rampColour(1)).toEqual([0x10, 0x1e, 0x28]);
  });
});
