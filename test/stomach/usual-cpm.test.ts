import { expect, test } from 'vitest';
import type { Epoch, Rhythm } from '../../src/recording/rhythm';
import { usualCpm } from '../../src/stomach/usual-cpm';

const epoch = ([rhythm, dfCpm]: readonly [Rhythm, number | null]): Epoch => ({
  lead: '#1',
  phase: 'fasting',
  fromS: 0,
  toS: 240,
  kept: true,
  spoiledFraction: 0,
  dfCpm,
  dpDb: 50,
  peakShare: 0.5,
  rhythm,
  flags: [],
});
const usual = (...made: (readonly [Rhythm, number | null])[]) =>
  usualCpm({ epochs: made.map(epoch) });

test('the usual rhythm of a lead is the median DF, of two middles their mean', () => {
  expect(usual(['normo', 3.2], ['brady', 2], ['normo', 2.8], ['tachy', 5])).toBe(3);
});

test('peaks of epochs without a rhythm, mixed or undecided have no say in it', () => {
  expect(usual(['none', 8], ['undecided', 1.2], ['mixed', 7], ['normo', 2.7])).toBe(2.7);
  expect(usual(['none', 8], ['normo', null])).toBe(3);
});
