import { describe, expect, it } from 'vitest';
import { legibleStretches } from '../../src/heart/legible';
import { decidedPlaces, expectedWrong, loudPlaces } from '../../src/heart/place-odds';
import { rhythmOf } from '../../src/heart/rhythm-path';
import { atOnce } from '../../src/numeric/in-steps';
import type { Interval } from '../../src/recording/span';

const rateHz = 100;
const steady = () => rhythmOf(0.8, 0.06, 0.05);
const at = (timeS: number, score: number, energyUv = 100, likeP = 0, likeT = 0) => ({
  sample: Math.round(timeS * rateHz),
  score,
  energyUv,
  likeP,
  likeT,
});
const usual = Array.from({ length: 20 }, (_, i) => at(0.8 * i, 6));
const decide = (beats: typeof usual, others: typeof usual = []) =>
  atOnce(
    decidedPlaces(
      beats,
      [...beats, ...others].sort((a, b) => a.sample - b.sample),
      rateHz,
      steady,
    ),
  );

describe('the chance that a place was decided wrongly', () => {
  it('is small for plain beats in rhythm, and for weak places beside it', () => {
    expect(expectedWrong(decide(usual), 0, 16)).toBeLessThan(0.01);
    expect(expectedWrong(decide(usual, [at(8.4, -4)]), 0, 16)).toBeLessThan(0.02);
  });

  it('is less for a doubtful beat in rhythm than for one out of it', () => {
    const inside = usual.map((beat, i) => (i === 10 ? at(8, -1) : beat));
    const outside = usual.map((beat, i) => (i === 10 ? at(8.35, -1) : beat));
    const [a, b] = [inside, outside].map((beats) => expectedWrong(decide(beats), 7.5, 8.5));
    expect(a).toBeLessThan(0.3);
    expect(b).toBeGreaterThan(0.7);
  });

  it('is large for a strong place that was not taken in a pause', () => {
    const paused = usual.filter((_, i) => i !== 10);
    expect(expectedWrong(decide(paused, [at(8, 1)]), 7.5, 8.5)).toBeGreaterThan(0.9);
    expect(expectedWrong(decide(paused), 7.5, 8.5)).toBe(0);
  });

  it('does not count what is part of a beat', () => {
    expect(expectedWrong(decide(usual, [at(8.1, 9)]), 8.05, 8.15)).toBe(0);
  });
});

it('a beat may be hidden in what is as loud as one, or weaker where no P or T wave is due, but not in a T wave or a blocked P wave', () => {
  const paused = usual.filter((_, i) => i !== 10);
  const isLoudIn = (doubted: readonly Interval[], ...others: typeof usual) => {
    const places = [...paused, ...others].sort((a, b) => a.sample - b.sample);
    return loudPlaces(paused, places, decide(paused, others), rateHz, doubted)(7.3, 8.7);
  };
  const isLoud = (...others: typeof usual) => isLoudIn([], ...others);
  expect(isLoud(at(7.6, -20, 90))).toBe(true);
  expect(isLoud(at(7.6, -20, 30))).toBe(false);
  expect(isLoud(at(8, -20, 30))).toBe(true);
  expect(isLoud(at(8, -20, 8))).toBe(false);
  expect(isLoud(at(8, -20, 30, 0.95))).toBe(false);
  expect(isLoud(at(8, -20, 60, 0.95))).toBe(true);
  expect(isLoud(at(7.6, -20, 90, 0, 0.95))).toBe(false);
  const burst = [{ fromS: 7, toS: 9 }];
  expect(isLoudIn(burst, at(7.6, -20, 90, 0, 0.95))).toBe(true);
  expect(isLoudIn(burst, at(8, -20, 30, 0.95))).toBe(true);
  expect(isLoud(at(8, -20, 90, 0, 0.95))).toBe(true);
});

describe('a stretch', () => {
  const stretch = [{ fromS: 4, toS: 9 }];
  const usualRrS = () => 0.8;
  const timesOf = (beats: typeof usual) => beats.map(({ sample }) => sample / rateHz);

  it('is legible where its beats are plain, and where nothing in it may be a beat', () => {
    expect(legibleStretches(stretch, timesOf(usual), decide(usual), usualRrS)).toEqual([true]);
    expect(
      legibleStretches([{ fromS: 0.3, toS: 0.5 }], timesOf(usual), decide(usual), usualRrS),
    ).toEqual([true]);
  });

  it('is not where it holds none of the beats that the rhythm lets expect', () => {
    const none = usual.filter(({ sample }) => sample / rateHz < 4 || sample / rateHz > 9);
    expect(legibleStretches(stretch, timesOf(none), decide(none), usualRrS)).toEqual([false]);
  });

  it('is not where places as likely as not lie between them', () => {
    const others = [4.4, 5.2, 6, 6.8].map((s) => at(s, 5));
    expect(legibleStretches(stretch, timesOf(usual), decide(usual, others), usualRrS)).toEqual([
      false,
    ]);
  });
});
