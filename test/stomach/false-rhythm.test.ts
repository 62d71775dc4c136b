import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { BACKGROUNDS, EPOCH_SAMPLES, fieldWave, SPOILINGS, spoiledLead, sumOf } from './field';
import { type Circumstances, rhythmOfLead } from './leads';

/** Epochs that share no sample. */
const settings = {
  ...DEFAULT_SETTINGS,
  epoch: { ...DEFAULT_SETTINGS.epoch, stepS: DEFAULT_SETTINGS.epoch.lengthS },
};
const EACH = 80;
const HUMP = '1/f and a broad hump at 5 cpm';

const keptOf = (signal: Float64Array, around: Circumstances = {}) =>
  rhythmOfLead(signal, { settings, ...around }).rhythm.epochs.filter(({ kept }) => kept);
const shareOf = (all: readonly { readonly rhythm: string | null }[], rhythms: readonly string[]) =>
  all.filter(({ rhythm }) => rhythm !== null && rhythms.includes(rhythm)).length / all.length;
const ANY = ['brady', 'normo', 'tachy', 'mixed'];

describe('a background without a wave', () => {
  const kinds = Object.keys(SPOILINGS);
  const shares = new Map(
    Object.entries(BACKGROUNDS).map(([name, make], i) => {
      const signal = make(EACH * EPOCH_SAMPLES, 400 + i);
      const byKind = kinds.map((kind) =>
        shareOf(keptOf(signal, { spoiled: spoiledLead(kind, EACH, 50 + i) }), ANY),
      );
      return [name, byKind] as const;
    }),
  );
  const meanOf = (values: readonly number[]) => values.reduce((a, b) => a + b, 0) / values.length;
  const plain = [...shares.keys()].filter((name) => name !== HUMP);

  test.each(plain)('%s: at most 5 of 100 epochs are called a rhythm', (name) => {
    expect(meanOf(shares.get(name) ?? [])).toBeLessThanOrEqual(0.05);
  });

  test.each(kinds)('spoiled by %s: at most 5 of 100 epochs are called a rhythm', (kind) => {
    const at = kinds.indexOf(kind);
    const all = plain.map((name) => shares.get(name)?.[at] ?? Number.NaN);
    expect(meanOf(all)).toBeLessThanOrEqual(0.05);
  });

  test('with a broad hump four times the rest is called a rhythm in about 5 of 100 all the same', () => {
    expect(meanOf(shares.get(HUMP) ?? [])).toBeLessThanOrEqual(0.07);
  });

  test('coughs every 20 s in a strong drift over white noise make no 3 cpm of their own', () => {
    const drift = BACKGROUNDS['white and 1/f^3, equal at 2 cpm'](2 * EACH * EPOCH_SAMPLES, 9);
    const spoiled = spoiledLead('every 20 s, 3 s', 2 * EACH, 1);
    expect(shareOf(keptOf(drift, { spoiled }), ANY)).toBeLessThanOrEqual(0.05);
  });
});

/** Mean power of a background of known density within 1 cpm on either side, uV2. */
function powerWithin(signal: Float64Array, cpm: number): number {
  const epochs = signal.length / EPOCH_SAMPLES;
  let power = 0;
  for (let e = 0; e < epochs; e++)
    for (let k = Math.ceil(4 * (cpm - 1)); k <= 4 * (cpm + 1); k++) {
      let [re, im] = [0, 0];
      for (let i = 0; i < EPOCH_SAMPLES; i++) {
        const taper = 1 - Math.cos((2 * Math.PI * i) / EPOCH_SAMPLES);
        const value = taper * signal[e * EPOCH_SAMPLES + i];
        re += value * Math.cos((2 * Math.PI * k * i) / EPOCH_SAMPLES);
        im += value * Math.sin((2 * Math.PI * k * i) / EPOCH_SAMPLES);
      }
      power += (2 * (re * re + im * im)) / (1.5 * EPOCH_SAMPLES ** 2) / epochs;
    }
  return power;
}

describe('a wave in 1/f noise, by its power over that of the background within 1 cpm', () => {
  const noise = BACKGROUNDS['1/f'](EACH * EPOCH_SAMPLES, 71);
  const found = (cpm: number, gainDb: number, rhythm: string, around: Circumstances = {}) => {
    const uv = Math.sqrt(2 * powerWithin(noise, cpm) * 10 ** (gainDb / 10));
    const more = { wanderCpm: 0.05, wanderShare: 0.1, seed: 6 };
    const { uv: slow } = fieldWave(noise.length, { cpmAt: () => cpm, uvAt: () => uv, ...more });
    return shareOf(keptOf(sumOf(noise, slow), around), [rhythm]);
  };

  test.each([
    [3, 8, 'normo'],
    [5.5, 8, 'tachy'],
    [1.5, 10, 'brady'],
  ] as const)('%d cpm at %d dB is found in 95 of 100 epochs', (cpm, gainDb, rhythm) => {
    expect(found(cpm, gainDb, rhythm)).toBeGreaterThanOrEqual(0.95);
  });

  test.each([
    [3, 'normo'],
    [5.5, 'tachy'],
    [1.5, 'brady'],
  ] as const)(
    '%d cpm at 10 dB is found in 90 of 100 epochs with eight spans of 5 s in each',
    (cpm, rhythm) => {
      const spoiled = spoiledLead('eight of 5 s', EACH, 3);
      expect(found(cpm, 10, rhythm, { spoiled })).toBeGreaterThanOrEqual(0.9);
    },
  );
});
