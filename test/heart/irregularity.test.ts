import { describe, expect, it } from 'vitest';
import { irregularityOf, isIrregularStretch } from '../../src/heart/irregularity';
import {
  bombardedIntervals,
  dividedIntervals,
  groupedIntervals,
  modulatedIntervals,
  patternIntervals,
  randomIntervals,
  randomOf,
  sinusIntervals,
  wanderingIntervals,
  withEarlyBeats,
} from './rhythms';

/**
 * Share of so many simulated stretches of 5 min that are called irregular. Over the rhythms of this file, 100 each: 0.1 % of
 * the normal ones with up to one early beat in ten, 100 % of the random ones of spread 0.1 and more.
 */
function share(
  make: (random: ReturnType<typeof randomOf>) => Float64Array,
  seed: number,
  count = 100,
): number {
  const random = randomOf(seed);
  let called = 0;
  for (let i = 0; i < count; i += 1) if (isIrregularStretch(make(random))) called += 1;
  return called / count;
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
    expect(share(early(0.1), 5)).toBeLessThanOrEqual(0.03);
  });

  const calm = sinus(70, 0.04, 15, 0.01);

  it.each([0.55, 0.65, 0.75, 0.82])(
    'is seen where every second, third or fourth beat comes after %f of the usual time',
    (early) => {
      for (const pattern of [
        [early, 2 - early],
        [early, 1.08],
        [1, early, 2 - early],
        [1, 1, early, 2 - early],
      ]) {
        const make = (random: ReturnType<typeof randomOf>) =>
          patternIntervals(calm(random), pattern);
        expect(share(make, 6), `${pattern}`).toBeGreaterThanOrEqual(0.95);
      }
    },
  );

  it('is seen where early beats are many and come at random', () => {
    const early = (random: ReturnType<typeof randomOf>) =>
      withEarlyBeats(calm(random), 0.3, random).rrMs;
    expect(share(early, 6)).toBeGreaterThanOrEqual(0.95);
  });

  it('is seen in beats in groups, in pacemakers that take over, and in a divided rapid rhythm', () => {
    expect(share((random) => groupedIntervals(300, 0.75, random), 7)).toBeGreaterThanOrEqual(0.95);
    expect(
      share((random) => wanderingIntervals(300, [60, 85, 110], random), 8),
    ).toBeGreaterThanOrEqual(0.95);
    for (const waveS of [0.2, 0.25])
      expect(share((random) => dividedIntervals(300, waveS, random), 9)).toBeGreaterThanOrEqual(
        0.95,
      );
  });

  it.each([60, 80, 110, 150])(
    'is seen in ventricles bombarded at random, at %i a minute',
    (rate) => {
      for (const refractoryShare of [0.4, 0.6, 0.75, 0.85]) {
        const make = (random: ReturnType<typeof randomOf>) =>
          bombardedIntervals({ lengthS: 300, rateBpm: rate, refractoryShare }, random);
        expect(share(make, 10), `${refractoryShare}`).toBeGreaterThanOrEqual(0.99);
      }
    },
  );

  it('is not seen in beats whose rate is modulated: deep breathing at any pace, strong waves of 0.1 Hz, getting up', () => {
    const modulated =
      (breathingSwing: number, breathsPerMinute: number, lowSwing: number, rate = 60) =>
      (random: ReturnType<typeof randomOf>) =>
        modulatedIntervals(
          { lengthS: 300, rateBpm: () => rate, breathingSwing, breathsPerMinute, lowSwing },
          random,
        );
    const gettingUp = (random: ReturnType<typeof randomOf>) =>
      modulatedIntervals(
        {
          lengthS: 300,
          rateBpm: (timeS) => 60 + 35 / (1 + Math.exp(-(timeS - 150) / 4)),
          breathingSwing: 0.08,
          breathsPerMinute: 15,
          lowSwing: 0.05,
        },
        random,
      );
    const all = [
      modulated(0.1, 15, 0.05),
      modulated(0.25, 12, 0.05),
      modulated(0.3, 10, 0.05, 50),
      modulated(0.15, 20, 0.03),
      modulated(0.1, 24, 0.05, 72),
      modulated(0.02, 15, 0.15),
      modulated(0.05, 15, 0.2),
      gettingUp,
    ];
    const shares = all.map((make) => share(make, 11, 25));
    expect(Math.max(...shares)).toBe(0);
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
