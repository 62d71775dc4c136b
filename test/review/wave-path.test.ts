import { expect, test } from 'vitest';
import { wavePath, waveRange } from '../../src/review/wave-path';

const frame = { width: 100, height: 50, low: -1, high: 1 };

test('a wave runs across the whole width, the greater value higher up', () => {
  expect(wavePath([-1, 0, 1], frame)).toBe('M0.0 50.0L50.0 25.0L100.0 0.0');
});

test('it is broken where nothing is known', () => {
  expect(wavePath([Number.NaN, 1, Number.NaN, -1, -1], frame)).toBe(
    'M25.0 0.0M75.0 50.0L100.0 50.0',
  );
  expect(wavePath([Number.NaN], frame)).toBe('');
});

test('several waves share one range, with room at the edges', () => {
  expect(
    waveRange([
      [0, 100],
      [Number.NaN, 50],
    ]),
  ).toEqual([-5, 105]);
  expect(waveRange([[], [Number.NaN]])).toEqual([-1, 1]);
});
