import { describe, expect, test } from 'vitest';
import type { Epoch } from '../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { BACKGROUNDS, EPOCH_SAMPLES, fieldWave, sumOf } from './field';
import { rhythmOfLead } from './leads';

const EPOCHS = 160;
const LENGTH = EPOCHS * EPOCH_SAMPLES;
/** Epochs side by side, so that each stands for itself. */
const SIDE_BY_SIDE = {
  ...DEFAULT_SETTINGS,
  epoch: { ...DEFAULT_SETTINGS.epoch, stepS: DEFAULT_SETTINGS.epoch.lengthS },
};
const epochsOf = (signal: Float64Array) =>
  rhythmOfLead(signal, { settings: SIDE_BY_SIDE }).rhythm.epochs;
const share = (epochs: readonly Epoch[]) =>
  epochs.filter(({ rhythm }) => rhythm === 'normo').length / epochs.length;
const noise = BACKGROUNDS['1/f'](LENGTH, 77);
const wave = (uvAt: (t: number) => number) =>
  fieldWave(LENGTH, { cpmAt: () => 3, uvAt, seed: 3, wanderCpm: 0.05, wanderShare: 0.15 }).uv;
const UV = 13;

/** One epoch in five carries the wave, so that none has a neighbour with it; the others are the same noise. */
const alone = (t: number) => (Math.floor(t / 240) % 5 === 2 ? UV : 0);

describe('the minutes beside an epoch', () => {
  test('lend a weak steady wave what it lacks: it is found far more often than alone', () => {
    const steady = share(
      epochsOf(
        sumOf(
          noise,
          wave(() => UV),
        ),
      ),
    );
    const single = epochsOf(sumOf(noise, wave(alone))).filter((_, i) => i % 5 === 2);
    expect(steady).toBeGreaterThan(0.75);
    expect(steady).toBeGreaterThan(share(single) + 0.2);
  });

  test('lend nothing in noise: at most 5 % of epochs have a rhythm', () => {
    for (const name of ['white', '1/f', '1/f^2', 'Markov sum of 1, 4, 16 and 64 s']) {
      const epochs = epochsOf(BACKGROUNDS[name](LENGTH, 5));
      const claimed = epochs.filter(({ rhythm }) => rhythm !== 'none').length / epochs.length;
      expect(claimed, name).toBeLessThan(0.06);
    }
  });

  test('do not make a rhythm of an epoch that has none of its own', () => {
    const bouts = (t: number) => (Math.floor(t / 960) % 2 === 0 ? 60 : 0);
    const epochs = epochsOf(sumOf(noise, wave(bouts)));
    const without = epochs.filter((_, i) => Math.floor((i * 240) / 960) % 2 === 1);
    expect(share(without)).toBeLessThan(0.12);
    expect(share(epochs.filter((one) => !without.includes(one)))).toBeGreaterThan(0.98);
  });
});
