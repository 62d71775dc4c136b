import { describe, expect, it } from 'vitest';
import { addShifted, crestPlace, valueAt } from '../../src/heart/sub-sample';

/** A sum of sines below a third of the rate, known between samples by its formula. */
const wave = (t: number) => Math.sin(0.9 * t + 0.3) + 0.5 * Math.cos(1.7 * t);
const samples = Float64Array.from({ length: 80 }, (_, i) => wave(i));

describe('values between samples', () => {
  it('are those of the band-limited signal', () => {
    for (const place of [30.25, 33.5, 40.703125, 41])
      expect(Math.abs(valueAt(samples, place) - wave(place))).toBeLessThan(2e-3);
  });

  it('add up shifted by a part of a sample', () => {
    const sum = new Float64Array(20);
    addShifted(sum, samples, 25.375);
    addShifted(sum, samples, 25);
    sum.forEach((value, i) => {
      expect(Math.abs(value - wave(25.375 + i) - wave(25 + i))).toBeLessThan(4e-3);
    });
  });

  it('give the place of a crest of either sign', () => {
    const bump = (centre: number) =>
      Float64Array.from({ length: 60 }, (_, i) => Math.exp(-0.5 * ((i - centre) / 3) ** 2));
    for (const centre of [30, 30.2, 30.47, 29.6]) {
      const up = bump(centre);
      expect(Math.abs(crestPlace(up, Math.round(centre)) - centre)).toBeLessThan(0.005);
      const down = up.map((value) => -value);
      expect(crestPlace(down, Math.round(centre), -1)).toBe(crestPlace(up, Math.round(centre)));
    }
  });
});
