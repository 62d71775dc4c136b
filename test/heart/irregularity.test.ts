import { describe, expect, it } from 'vitest';
import { irregularityOf, isIrregularStretch } from '../../src/heart/irregularity';
import { randomIntervals, randomOf, sinusIntervals, withEarlyBeats } from './rhythms';

/** Share of 100 simulated stretches of 5 min that are called irregular. */
function share(make: (random: ReturnType<typeof randomOf>) => Float64Array, seed: number): number {
  const random = randomOf(seed);
  let called = 0;
  for (let i = 0; i < 100; i += 1) if (isIrregularStretch(make(random))) called += 1;
  return called / 100;
}

const sinus =
  (rateBpm: number, breathingSwing: number, breathsPerMinute: number, noise: number) =>
  (random: ReturnType<typeof randomOf>) =>
    sinusIntervals({ lengthS: 300, rateBpm, breathingSwing, breathsPerMinute, noise }, random);

const unforeseeable = (rateBpm: number, spread: number) => (random: ReturnType<typeof randomOf>) =>
  randomIntervals({ lengthS: 300, rateBpm, spread }, random);

describe('irregular rhythm', () => {
  it.each([
    [110, 0.15],
    [80, 0.2],
    [70, 0.25],
    [150, 0.2],
    [100, 0.12],
  ])('is seen in random intervals at %i a minute, spread %f', (rate, spread) => {
    expect(share(unforeseeable(rate, spread), 1)).toBeGreaterThanOrEqual(0.99);
  });

  it('is mostly seen where random intervals spread by a tenth only', () => {
    expect(share(unforeseeable(130, 0.1), 2)).toBeGreaterThanOrEqual(0.9);
  });

  it.each([
    [60, 0.1, 15, 0.01],
    [60, 0.2, 15, 0.02],
    [55, 0.3, 12, 0.02],
    [55, 0.25, 18, 0.02],
    [60, 0.25, 24, 0.02],
    [60, 0.25, 6, 0.02],
    [60, 0.2, 15, 0.04],
    [90, 0.05, 15, 0.02],
    [60, 0.05, 15, 0.05],
  ])(
    'is not seen in a sinus rhythm of %i a minute that swings by %f with %i breaths',
    (...args) => {
      expect(share(sinus(...args), 3)).toBeLessThanOrEqual(0.01);
    },
  );

  it('is not seen in isolated early beats, one in twenty or one in ten', () => {
    const early = (part: number) => (random: ReturnType<typeof randomOf>) =>
      withEarlyBeats(sinus(65, 0.1, 15, 0.01)(random), part, random).rrMs;
    expect(share(early(0.05), 4)).toBeLessThanOrEqual(0.01);
    expect(share(early(0.1), 5)).toBeLessThanOrEqual(0.02);
  });

  it('is not seen where every second beat is early', () => {
    const bigeminy = (random: ReturnType<typeof randomOf>) =>
      sinus(70, 0.03, 15, 0.01)(random).map((one, i) => (i % 2 === 0 ? 0.7 * one : 1.3 * one));
    expect(share(bigeminy, 6)).toBe(0);
  });

  it('is seen where a bout fills half of the stretch', () => {
    const half = (random: ReturnType<typeof randomOf>) => {
      const calm = sinus(65, 0.1, 15, 0.01)(random);
      const wild = unforeseeable(90, 0.2)(random);
      return Float64Array.of(...calm.subarray(0, 160), ...wild.subarray(0, 220));
    };
    expect(share(half, 7)).toBeGreaterThanOrEqual(0.95);
  });

  it('is not judged on fewer than 48 intervals', () => {
    const random = randomOf(8);
    const few = unforeseeable(80, 0.25)(random).subarray(0, 47);
    expect(irregularityOf(few)).toBeNull();
    expect(isIrregularStretch(few)).toBe(false);
    expect(isIrregularStretch(new Float64Array(0))).toBe(false);
    expect(isIrregularStretch(new Float64Array(300).fill(800))).toBe(false);
  });
});
