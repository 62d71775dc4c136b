import { describe, expect, test } from 'vitest';
import { exp } from '../../src/numeric/elementary';
import type { Epoch } from '../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { dominantPeak } from '../../src/stomach/dominant-peak';
import { likelihoodRatio } from '../../src/stomach/steady-wave';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { BACKGROUNDS, EPOCH_SAMPLES, fieldWave, shapedNoise, sumOf } from './field';
import { RATE_HZ, rhythmOfLead } from './leads';

const EPOCHS = 200;
const LENGTH = EPOCHS * EPOCH_SAMPLES;
/** Epochs side by side, so that each stands for itself. */
const SIDE_BY_SIDE = {
  ...DEFAULT_SETTINGS,
  epoch: { ...DEFAULT_SETTINGS.epoch, stepS: DEFAULT_SETTINGS.epoch.lengthS },
};
const epochsOf = (signal: Float64Array, settings = SIDE_BY_SIDE) =>
  rhythmOfLead(signal, { settings }).rhythm.epochs;
const claims = ({ rhythm }: Epoch) => rhythm !== 'none' && rhythm !== 'undecided';
const share = (epochs: readonly Epoch[], is: (one: Epoch) => boolean) =>
  epochs.filter(is).length / epochs.length;
const at =
  (cpm: number) =>
  (one: Epoch): boolean =>
    claims(one) && one.dfCpm !== null && Math.abs(one.dfCpm - cpm) < 0.4;

const noise = BACKGROUNDS['1/f'](LENGTH, 77);
const spectra = windowSpectra({
  signal: noise,
  kept: new Uint8Array(LENGTH).fill(1),
  rateHz: RATE_HZ,
  lengthS: 240,
  powerResponse: null,
});
const densities = Array.from({ length: EPOCHS }, (_, k) =>
  spectra.density(spectra.prepare(k * EPOCH_SAMPLES)),
);

/** Peak of a wave as strong as the noise within 1 cpm on either side of it, uV. */
function equalUv(cpm: number): number {
  let power = 0;
  for (const density of densities)
    density.forEach((value, k) => {
      if (Math.abs(k * spectra.binCpm - cpm) < 1)
        power += (value * spectra.binCpm) / 60 / densities.length;
    });
  return Math.sqrt(2 * power);
}

const waveAt = (cpm: number, uvAt: (t: number) => number, cpmAt = (_: number) => cpm) =>
  sumOf(noise, fieldWave(LENGTH, { cpmAt, uvAt, seed: 3, wanderCpm: 0.05, wanderShare: 0.15 }).uv);

describe.each([3, 5.5])('a steady wave of %d cpm as strong as the 1/f noise about it', (cpm) => {
  const uv = equalUv(cpm);
  const epochs = epochsOf(waveAt(cpm, () => uv));

  test('is found in about 95 of 100 epochs', () => {
    expect(share(epochs, at(cpm))).toBeGreaterThanOrEqual(0.93);
  });

  test('is found in the epochs in which slower noise stands higher as well', () => {
    const signal = waveAt(cpm, () => uv);
    const whole = windowSpectra({
      signal,
      kept: new Uint8Array(LENGTH).fill(1),
      rateHz: RATE_HZ,
      lengthS: 240,
      powerResponse: null,
    });
    const hidden = epochs.filter((_, k) => {
      const density = whole.density(whole.prepare(k * EPOCH_SAMPLES));
      const top = dominantPeak(density, whole.binCpm, DEFAULT_SETTINGS.rhythmBands);
      return top !== null && Math.abs(top.cpm - cpm) > 0.4;
    });
    expect(hidden.length).toBeGreaterThan(EPOCHS / 5);
    expect(share(hidden, at(cpm))).toBeGreaterThan(0.8);
  });

  test('has at most half of its epochs found where it comes in one of nine: they stand alone', () => {
    const bouts = epochsOf(waveAt(cpm, (t) => (Math.floor(t / 240) % 9 === 4 ? uv : 0)));
    const single = bouts.filter((_, i) => i % 9 === 4);
    expect(share(single, at(cpm))).toBeLessThan(0.5);
  });

  test('is found in most epochs of a phase of 20 min', () => {
    const signal = waveAt(cpm, () => uv);
    const short = Array.from({ length: EPOCHS / 5 }, (_, k) =>
      epochsOf(signal.subarray(5 * k * EPOCH_SAMPLES, 5 * (k + 1) * EPOCH_SAMPLES)),
    ).flat();
    expect(share(short, at(cpm))).toBeGreaterThan(0.8);
  });
});

describe('an epoch without a wave', () => {
  const strong = 2.5 * equalUv(3);

  test('between strong ones is called a rhythm in about 10 of 100', () => {
    const pausing = epochsOf(waveAt(3, (t) => (Math.floor(t / 240) % 5 === 2 ? 0 : strong)));
    expect(share(pausing, at(3))).toBeGreaterThan(0.75);
    const silent = pausing.filter((_, i) => i % 5 === 2);
    expect(share(silent, claims)).toBeLessThanOrEqual(0.125);
  });

  test('after a strong one that stopped for good is called a rhythm in at most 10 of 100', () => {
    const stopped = epochsOf(waveAt(3, (t) => (Math.floor(t / 240) % 20 < 10 ? strong : 0)));
    const after = stopped.filter((_, i) => i % 20 >= 10);
    expect(share(after, claims)).toBeLessThanOrEqual(0.1);
  });

  test('of the old frequency has that of the new where a weak wave changes', () => {
    const cpmAt = (t: number) => (Math.floor(t / 2400) % 2 === 0 ? 3 : 5);
    const uv = 1.5 * equalUv(3);
    const changed = epochsOf(waveAt(3, () => uv, cpmAt));
    const right = changed.filter((one) => at(cpmAt(one.fromS))(one)).length;
    const wrong = changed.filter((one) => at(8 - cpmAt(one.fromS))(one)).length;
    expect(right / EPOCHS).toBeGreaterThan(0.93);
    expect(wrong / EPOCHS).toBeLessThanOrEqual(0.02);
  });
});

/** Backgrounds that no constant was set on. */
const OTHERS = {
  'a knee at 4 cpm': (cpm: number) => 1 / (1 + (cpm / 4) ** 2) + 0.02,
  '1/f^1.3 over a floor': (cpm: number) => 1 / cpm / Math.cbrt(cpm) + 0.15,
  'a dip at 3 cpm': (cpm: number) => (1 - 0.7 * exp(-0.5 * ((cpm - 3) / 0.8) ** 2)) / cpm,
  'a hump of three times at 3 cpm': (cpm: number) => 1 / cpm + exp(-0.5 * (cpm - 3) ** 2) / 1.5,
};

describe('noise in which every window lends to its neighbours', () => {
  test.each(Object.entries(OTHERS))(
    'with %s is called a rhythm in at most 5 of 100',
    (_, power) => {
      expect(share(epochsOf(shapedNoise(LENGTH, power, 12)), claims)).toBeLessThanOrEqual(0.05);
    },
  );

  test('whose level jumps fivefold every ten minutes is called a rhythm in at most 5 of 100', () => {
    const jumping = noise.map((uv, i) => uv * (Math.floor(i / 2300) % 3 === 0 ? 5 : 1));
    expect(share(epochsOf(jumping), claims)).toBeLessThanOrEqual(0.05);
  });

  test.each(['white', '1/f', '1/f^2', 'Markov sum of 1, 4, 16 and 64 s'])(
    '%s, in epochs that share three quarters of their samples, in at most 5 of 100',
    (name) => {
      const signal = BACKGROUNDS[name](60 * EPOCH_SAMPLES, 5);
      expect(share(epochsOf(signal, DEFAULT_SETTINGS), claims)).toBeLessThanOrEqual(0.05);
    },
  );
});

describe('the likelihood ratio of a height (Rice 1944)', () => {
  /** Integral over heights of noise, whose density is e^-h. */
  const overNoise = (of: (height: number) => number) => {
    let sum = 0;
    for (let h = 0.005; h < 60; h += 0.01) sum += 0.01 * exp(-h) * of(h);
    return sum;
  };

  test.each([3.5, 7, 14])('with a wave of power %d has the mean 1 on noise', (power) => {
    expect(overNoise((h) => likelihoodRatio(power, h))).toBeCloseTo(1, 3);
  });

  test.each([3.5, 7, 14])('gives the wave of power %d the mean height of 1 more', (power) => {
    expect(overNoise((h) => h * likelihoodRatio(power, h))).toBeCloseTo(power + 1, 1);
  });
});
