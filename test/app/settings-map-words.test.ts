import { describe, expect, it } from 'vitest';
import {
  inUse,
  proposalWords,
  scoreText,
  stretchWords,
} from '../../src/app/evidence/settings-map-words';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { MapScores, OrganMap } from '../../src/recording/settings-map';

const score = (snrDb: number) => ({ snrDb, aheadS: 0 });
const scores = (bandDb: number): MapScores => ({
  cells: [
    [score(3), score(7.04)],
    [score(-2), score(7.045)],
  ],
  asSet: score(-2),
  bars: [{ route: 'band', ...score(bandDb) }],
});
const MAP: OrganMap = {
  kind: 'map',
  organ: 'slow',
  lead: '0',
  fromS: 60,
  toS: 1260,
  target: { kind: 'wave', cpm: 2.98, uv: 119.6 },
  noiseUv: 84.6,
  noiseToHz: 2,
  orders: [0, 0.5],
  windowsMs: [100, 1000],
  order: 0.5,
  windowMs: 100,
  memoryS: 60,
  polynomialOrder: 2,
  recorded: scores(5),
  noisy: scores(5),
};

describe('what a map proposes', () => {
  it('is its best cell and by how much it is better; of cells alike the first', () => {
    expect(proposalWords(MAP, scores(5), DEFAULT_SETTINGS)).toBe(
      'Best of this map: order 0, window 1.0 s: 7.0 dB, 2.0 dB better than what is in use (band: 5.0 dB).',
    );
  });

  it('is nothing where what is in use does better, or as well', () => {
    expect(proposalWords(MAP, scores(20), DEFAULT_SETTINGS)).toMatch(
      /13\.0 dB worse than .*nothing on this map would improve it/,
    );
    expect(proposalWords(MAP, scores(6.8), DEFAULT_SETTINGS)).toMatch(/no better than/);
  });

  it('is held against the fractional route as set where that is in use', () => {
    const settings = { ...DEFAULT_SETTINGS, slowRoute: 'fractional' } as const;
    expect(inUse(MAP, scores(5), settings)).toEqual({
      name: 'fractional, order 0.5, window 100 ms',
      snrDb: -2,
    });
  });

  it('says what is known, in what and where, and what the noise is', () => {
    expect(stretchWords(MAP)).toMatch(
      /120 µV at 2\.98 cpm.*planted in the reported lead’s own leftover, 0:01:00 to 0:21:00\..*85 µV .* up to 2 Hz/,
    );
    expect(scoreText(-0.04)).toBe('0.0 dB');
    expect(scoreText(-3.26)).toBe('−3.3 dB');
  });
});
