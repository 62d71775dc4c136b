import { describe, expect, it } from 'vitest';
import type { Span } from '../../src/recording/span';
import { changedLeft, leftWords, timeLeft } from '../../src/review/minutes-left';

const span = (id: number, fromS: number, toS: number, parts: Partial<Span> = {}): Span => ({
  id,
  fromS,
  toS,
  lead: null,
  target: 'both',
  cause: 'other',
  origin: 'drawn',
  note: '',
  ...parts,
});

/** An invented study of 90 minutes: the stomach on the difference of two channels, the heart on the third. */
const STUDY = {
  phases: [
    { name: 'fasting', fromS: 0, toS: 1800 },
    { name: 'meal', fromS: 1800, toS: 2400 },
    { name: 'fed', fromS: 2520, toS: 5400 },
  ],
  spans: [
    span(1, 600, 720),
    span(2, 660, 780, { target: 'stomach' }),
    span(3, 1740, 1860, { target: 'heart' }),
    span(4, 3000, 3060, { lead: '#3' }),
    span(5, 3000, 3600, { lead: '#9' }),
  ],
  roles: {
    slow: [{ kind: 'difference', plus: 0, minus: 1 } as const],
    reported: 0,
    heart: { kind: 'channel', channel: 2 } as const,
    breath: null,
  },
  gaps: [
    { channel: 1, fromS: 5340, toS: 5400 },
    { channel: 6, fromS: 4000, toS: 5000 },
  ],
  durationS: 5400,
};

describe('the time left in each phase', () => {
  it('is its length less what is spoiled or missing for each organ, overlaps counted once', () => {
    expect(timeLeft(STUDY)).toEqual([
      { phase: 'fasting', lengthS: 1800, stomachS: 1800 - 180, heartS: 1800 - 120 - 60 },
      { phase: 'meal', lengthS: 600, stomachS: 600, heartS: 540 },
      { phase: 'fed', lengthS: 2880, stomachS: 2880 - 60, heartS: 2880 - 60 },
    ]);
  });

  it('is that of the whole study where no phase is marked, and none for a heart that is not read', () => {
    expect(
      timeLeft({
        ...STUDY,
        phases: [],
        spans: [],
        gaps: [],
        roles: { ...STUDY.roles, heart: null },
      }),
    ).toEqual([{ phase: 'whole', lengthS: 5400, stomachS: 5400, heartS: null }]);
  });

  it('is told in minutes', () => {
    const [fasting] = timeLeft(STUDY);
    expect(leftWords(fasting)).toBe(
      'fasting 30.0 min, left for the stomach 27.0, for the heart 27.0',
    );
    expect(leftWords({ ...fasting, heartS: null })).toBe(
      'fasting 30.0 min, left for the stomach 27.0',
    );
  });

  it('is told of the phases that a move changes, or of all where it changes none', () => {
    const before = timeLeft(STUDY);
    const [fasting, meal, fed] = STUDY.phases;
    const phases = [{ ...fasting, toS: 1700 }, { ...meal, fromS: 1700 }, fed];
    const after = timeLeft({ ...STUDY, phases });
    expect(changedLeft(before, after).map(({ phase }) => phase)).toEqual(['fasting', 'meal']);
    expect(changedLeft(before, before)).toEqual(before);
  });
});
