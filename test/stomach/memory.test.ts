import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Interval } from '../../src/recording/span';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { createStomachMemory, type StomachMemory } from '../../src/stomach/stomach-memory';
import { leadOf, noise, RATE_HZ, slowOf, steadyBreathing, wave } from './leads';

const MINUTES = 40;
const background = noise(RATE_HZ * 60 * MINUTES, 1, 20, 77);
const slow = slowOf(
  leadOf(MINUTES, (t) => wave(80, t < 1200 ? 3 : 5, t) + background[Math.round(t * RATE_HZ)]),
);
const analyse = (
  memory: StomachMemory | undefined,
  spoiled: readonly Interval[],
  breathing: number | null = null,
  epoch = DEFAULT_SETTINGS.epoch,
) =>
  slowWaveRhythm({
    slow,
    spoiled,
    phases: [{ name: 'whole', fromS: 0, toS: 60 * MINUTES }],
    settings: { ...DEFAULT_SETTINGS, epoch },
    breathing: breathing === null ? null : steadyBreathing(breathing, MINUTES),
    ...(memory && { memory }),
  });

describe('an analysis after an edit, with a memory of the one before', () => {
  test('is the same as one made from nothing', () => {
    const memory = createStomachMemory();
    const spans: Interval[][] = [
      [],
      [{ fromS: 600, toS: 660 }],
      [
        { fromS: 600, toS: 640 },
        { fromS: 1500, toS: 1800 },
      ],
      [],
    ];
    for (const spoiled of spans)
      expect(analyse(memory, spoiled)).toEqual(analyse(undefined, spoiled));
    expect(analyse(memory, [], 5)).toEqual(analyse(undefined, [], 5));
    const shorter = { ...DEFAULT_SETTINGS.epoch, lengthS: 180, falseAlarm: 0.01 };
    expect(analyse(memory, [], 5, shorter)).toEqual(analyse(undefined, [], 5, shorter));
  });

  test('takes over the spectra of epochs the edit has not touched', () => {
    const memory = createStomachMemory();
    const before = analyse(memory, []);
    const after = analyse(memory, [{ fromS: 600, toS: 640 }]);
    expect(after.epochSpectra[0]).toBe(before.epochSpectra[0]);
    expect(after.epochSpectra[9]).not.toBe(before.epochSpectra[9]);
  });
});
