import { describe, expect, test } from 'vitest';
import type { BreathingSeries } from '../../src/recording/heart-series';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import {
  BACKGROUNDS,
  EPOCH_SAMPLES,
  fieldWave,
  SAWTOOTH,
  spoiledLead,
  sumOf,
  type WaveSpec,
} from './field';
import { type Circumstances, RATE_HZ, rhythmOfLead } from './leads';

const settings = {
  ...DEFAULT_SETTINGS,
  epoch: { ...DEFAULT_SETTINGS.epoch, stepS: DEFAULT_SETTINGS.epoch.lengthS },
};
const EACH = 50;
const LENGTH = EACH * EPOCH_SAMPLES;
const noise = BACKGROUNDS['1/f'](LENGTH, 12);
const quiet = noise.map((uv) => uv / 2);

const shareOf = (signal: Float64Array, rhythm: string, around: Circumstances = {}) => {
  const { epochs } = rhythmOfLead(signal, { settings, ...around }).rhythm;
  return epochs.filter((one) => one.rhythm === rhythm).length / epochs.length;
};
const wandering = (cpm: number, uv: number, more: Partial<WaveSpec> = {}) =>
  fieldWave(LENGTH, {
    cpmAt: () => cpm,
    uvAt: () => uv,
    wanderCpm: 0.1,
    wanderShare: 0.2,
    seed: 2,
    ...more,
  });

describe('a change of rhythm inside an epoch', () => {
  const changing = (from: number, to: number, place: number) => {
    const cpmAt = (t: number) => (t % 240 < place * 240 ? from : to);
    const { uv } = fieldWave(LENGTH, {
      cpmAt,
      uvAt: () => 100,
      wanderCpm: 0.05,
      wanderShare: 0.1,
      seed: 3,
    });
    return sumOf(uv, noise);
  };

  test.each([
    [3, 5, 0.5],
    [5, 3, 0.5],
    [3, 6, 0.5],
    [3, 5, 0.35],
    [3, 5, 0.65],
  ])('from %d to %d cpm at %d of it is mixed in 95 of 100 epochs', (from, to, place) => {
    expect(shareOf(changing(from, to, place), 'mixed')).toBeGreaterThanOrEqual(0.95);
  });

  test.each([
    [3, 1.5],
    [1.5, 3],
  ])('from %d to %d cpm, one the double of the other, is mixed in 90 of 100', (from, to) => {
    expect(shareOf(changing(from, to, 0.5), 'mixed')).toBeGreaterThanOrEqual(0.9);
  });

  test.each([1.5, 3])('%d cpm with a second harmonic of its own size or larger is not', (cpm) => {
    for (const size of [0.5, 1, 1.5, 3]) {
      const { uv } = wandering(cpm, 60, { harmonics: [[size, 0.7]] });
      expect(shareOf(sumOf(uv, quiet), 'mixed')).toBeLessThanOrEqual(0.02);
    }
  });

  test('to just the double is a change, since the slow wave is gone after it', () => {
    const louder = sumOf(changing(3.2, 6.4, 0.5), noise);
    expect(shareOf(louder, 'mixed')).toBeGreaterThanOrEqual(0.9);
  });

  test.each([1.5, 2.6, 3, 3.4, 5, 7])('%d cpm that only wanders is hardly ever mixed', (cpm) => {
    const { uv } = wandering(cpm, 80, { wanderCpm: 0.15, wanderShare: 0.3 });
    expect(shareOf(sumOf(uv, noise), 'mixed')).toBeLessThanOrEqual(0.02);
  });
});

describe('a 3 cpm wave that is no sine', () => {
  const shapes = {
    'a sawtooth': SAWTOOTH,
    'with a second harmonic 1.5 times its size': [[1.5, 0.7]],
    'with a second harmonic three times its size': [[3, 0.7]],
  } as const;
  test('with a larger second harmonic is not mixed where its halves show one the wave, one the harmonic', () => {
    const { uv } = wandering(3, 60, { harmonics: [[1.5, 0.7]], wanderCpm: 0.2 });
    expect(shareOf(sumOf(uv, quiet), 'mixed')).toBeLessThanOrEqual(0.02);
  });

  const clean: Circumstances = {};
  const holed: Circumstances = { spoiled: spoiledLead('four of 10 s', EACH, 7) };

  test.each(Object.entries(shapes))(
    '%s is normo, with and without spoiled spans',
    (_, harmonics) => {
      const signal = sumOf(wandering(3, 60, { harmonics }).uv, quiet);
      expect(shareOf(signal, 'normo', clean)).toBe(1);
      expect(shareOf(signal, 'normo', holed)).toBeGreaterThanOrEqual(0.98);
      expect(shareOf(signal, 'tachy', holed)).toBe(0);
    },
  );
});

/** Mean rates of minutes, every 30 s, times a factor: 2 where each breath is counted twice. */
function ratesOf(cpm: Float64Array, times = 1): BreathingSeries {
  const count = Math.floor(cpm.length / RATE_HZ / 30) - 1;
  return {
    centresS: Float64Array.from({ length: count }, (_, k) => 30 * k + 30),
    perMinute: Float64Array.from({ length: count }, (_, k) => {
      const minute = cpm.subarray(30 * k * RATE_HZ, (30 * k + 60) * RATE_HZ);
      return (times * minute.reduce((sum, one) => sum + one, 0)) / minute.length;
    }),
    from: 'derived',
  };
}

describe('breathing in the band of the stomach', () => {
  const breath = (perMinute: number, more: Partial<WaveSpec>) =>
    wandering(perMinute, 100, { wanderS: 20, seed: 5, ...more });

  test.each([5, 6, 7, 8])('at %d a minute, its rate changing, is no rhythm', (perMinute) => {
    const { uv, cpm } = breath(perMinute, { wanderCpm: 0.6, harmonics: [[0.5, 0.4]] });
    const signal = sumOf(uv, quiet);
    const around = { breathing: ratesOf(cpm) };
    expect(shareOf(signal, 'tachy', around)).toBe(0);
    expect(shareOf(signal, 'undecided', around)).toBeGreaterThanOrEqual(0.9);
  });

  test('with two humps a breath, so that its rate was read twice as fast, is no rhythm', () => {
    const { uv, cpm } = breath(6, { wanderCpm: 0.1, harmonics: [[1.2, 0.5]] });
    expect(shareOf(sumOf(uv, quiet), 'undecided', { breathing: ratesOf(cpm, 2) })).toBe(1);
  });

  test.each([8, 10, 12])(
    'at %d a minute, strong and uneven, leaves no rhythm in the noise beneath it',
    (perMinute) => {
      const { uv, cpm } = breath(perMinute, { wanderCpm: 1, harmonics: [[0.5, 0.4]] });
      const signal = sumOf(uv, BACKGROUNDS['1/f^2'](LENGTH, 12));
      const around = { breathing: ratesOf(cpm) };
      const claimed = ['brady', 'normo', 'tachy'].map((one) => shareOf(signal, one, around));
      expect(claimed.reduce((a, b) => a + b, 0)).toBeLessThanOrEqual(0.06);
    },
  );

  test('just above it leaves no tachygastria on its flank', () => {
    const { uv, cpm } = breath(9.6, { wanderCpm: 0.6 });
    const signal = sumOf(
      uv.map((value) => 3 * value),
      quiet,
    );
    expect(shareOf(signal, 'tachy', { breathing: ratesOf(cpm) })).toBeLessThanOrEqual(0.05);
  });

  test('at 11.6 a minute and stronger leaves a true 5.5 cpm wave of its own way tachygastria', () => {
    const { uv, cpm } = breath(11.6, { wanderCpm: 0.3 });
    const slow = wandering(5.5, 60, { wanderCpm: 0.05 }).uv;
    const signal = sumOf(uv, slow, quiet);
    expect(shareOf(signal, 'tachy', { breathing: ratesOf(cpm) })).toBeGreaterThanOrEqual(0.95);
  });

  test('read now as 5 and now as 15 a minute leaves a 3 cpm wave normogastria', () => {
    const slow = sumOf(wandering(3, 60, { wanderCpm: 0.05 }).uv, quiet);
    const { centresS } = ratesOf(slow);
    const perMinute = centresS.map((_, k) => (k % 2 === 0 ? 5 : 15));
    const breathing: BreathingSeries = { centresS, perMinute, from: 'derived' };
    expect(shareOf(slow, 'normo', { breathing })).toBe(1);
  });
});
