import { describe, expect, it } from 'vitest';
import { isMisread } from '../../src/heart/legible';
import { type BeatClass, beatsOf } from '../../src/recording/beat';

const TICKS_PER_S = 64 * 250;

/** One beat a second from 10 s on, of the classes given by their letters. */
const beats = (letters: string) =>
  beatsOf(
    [...letters].map((letter, i) => ({
      tick: (10 + i) * TICKS_PER_S,
      beatClass: letter as BeatClass,
      origin: 'detected' as const,
    })),
  );
const misread = (letters: string, fromS = 10, toS = 100) =>
  isMisread({ fromS, toS }, beats(letters), TICKS_PER_S);

describe('a stretch that may be spoiled', () => {
  it('is not read where over a third of what was found there fits neither a shape nor the rhythm', () => {
    expect(misread('NQNQQNVQQN')).toBe(true);
    expect(misread('NQNQNQNQNNNNNNNQNN')).toBe(false);
  });

  it('is read where the misfits are single beats, or stand outside of it', () => {
    expect(misread('NQQQQN')).toBe(false);
    expect(misread('QQQQQNNNNNN', 15)).toBe(false);
  });

  it('keeps early beats of known shape: they are no misfits', () => {
    expect(misread('VSVSVSVVNS')).toBe(false);
  });
});
