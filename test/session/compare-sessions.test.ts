import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { beatsOf } from '../../src/recording/beat';
import { matchBeats } from '../../src/recording/match-beats';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { compareSessions, otherStudy } from '../../src/session/compare-sessions';
import { differenceWords } from '../../src/session/difference';
import type { SessionState } from '../../src/session/document';
import { secondsToTicks } from '../../src/units/ticks';
import { always, numbers } from '../properties';
import { inventedState, RATE_HZ, span } from './invented-session';

type Row = readonly [atS: number, beatClass: 'N' | 'V' | 'S'];

const withBeats = (...rows: readonly Row[]): SessionState => ({
  ...inventedState(),
  spans: [],
  beats: beatsOf(
    rows.map(([atS, beatClass]) => ({
      tick: secondsToTicks(atS, RATE_HZ),
      beatClass,
      origin: 'detected',
    })),
  ),
});

const compared = (here: SessionState, there: SessionState) =>
  compareSessions(here, there, () => RATE_HZ);

const told = (here: SessionState, there: SessionState) =>
  compared(here, there).places.map((one) => [one.kind, one.what, one.here, one.there].join(' | '));

describe('beats matched one to one within 150 ms, nearest first (ANSI/AAMI EC57)', () => {
  it('takes 150 ms for a match and more for none', () => {
    expect(matchBeats([10], [10.15]).pairs).toEqual([[0, 0]]);
    expect(matchBeats([10], [10.151]).pairs).toEqual([]);
    expect(matchBeats([10.15], [10]).pairs).toEqual([[0, 0]]);
  });

  // By hand: 0.20 is 0.04 from 0.16 and 0.06 from 0.14, so it goes with 0.16; 0.14 is then left to 0.00.
  it('gives the nearest pair first and leaves the rest to others', () => {
    expect(matchBeats([0, 0.2], [0.14, 0.16]).pairs).toEqual([
      [0, 0],
      [1, 1],
    ]);
    expect(matchBeats([0.06, 0.2], [0.14]).pairs).toEqual([[1, 0]]);
  });

  it('gives no beat two partners', () => {
    const { pairs, onlyFirst, onlySecond } = matchBeats([1, 1.25], [1.125]);
    expect([pairs, onlyFirst, onlySecond]).toEqual([[[0, 0]], [1], []]);
  });

  it('uses every beat once, within the limit, and leaves no two that could be matched', () => {
    const times = fc
      .array(numbers(0, 5), { maxLength: 25 })
      .map((all) => [...new Set(all)].sort((a, b) => a - b));
    fc.assert(
      fc.property(times, times, (first, second) => {
        const { pairs, onlyFirst, onlySecond } = matchBeats(first, second);
        const used = [...pairs.map(([a]) => a), ...onlyFirst].sort((a, b) => a - b);
        expect(used).toEqual(first.map((_, i) => i));
        const taken = [...pairs.map(([, b]) => b), ...onlySecond].sort((a, b) => a - b);
        expect(taken).toEqual(second.map((_, i) => i));
        for (const [a, b] of pairs)
          expect(Math.abs(first[a] - second[b])).toBeLessThanOrEqual(0.15 + 1e-8);
        for (const a of onlyFirst)
          for (const b of onlySecond) expect(Math.abs(first[a] - second[b])).toBeGreaterThan(0.15);
      }),
      always(200),
    );
  });
});

describe('two reviews of one study', () => {
  it('agree wholly where nothing differs', () => {
    const state = withBeats([1, 'N'], [2, 'V']);
    const { beats, places, others } = compared(state, state);
    expect(beats).toMatchObject({ both: 2, sameClass: 2, placePct: 100, classPct: 100 });
    expect([places, others]).toEqual([[], []]);
  });

  // By hand: of the beats at 1, 2, 3, 4, 5 and 6 s, four are in both (2, 3, 4, 5), 1 only here, 6 only there: 4 of 6 agree;
  // the one at 4 s has another class: 3 of 6.
  it('agree in percent of all beats that either has, and in fewer where classes differ', () => {
    const here = withBeats([1, 'N'], [2, 'N'], [3, 'N'], [4, 'N'], [5, 'N']);
    const there = withBeats([2, 'N'], [3.04, 'N'], [4, 'V'], [5, 'N'], [6, 'S']);
    expect(compared(here, there).beats).toEqual({
      here: 5,
      there: 5,
      both: 4,
      sameClass: 3,
      placePct: 400 / 6,
      classPct: 50,
    });
    expect(told(here, there)).toEqual([
      'only-here | beat | class N at 0:00:01.000 | none',
      'moved | beat at 0:00:03.000 | at 0:00:03.000 | at 0:00:03.040',
      'class | beat at 0:00:04.000 | class N | class V',
      'only-there | beat | none | class S at 0:00:06.000',
    ]);
    expect(told(there, here)).toHaveLength(4);
  });

  it('have no agreement to speak of without beats', () => {
    expect(compared(withBeats(), withBeats()).beats).toMatchObject({ placePct: null, both: 0 });
  });

  it('are compared in seconds where their heart leads have other rates', () => {
    const here = withBeats([1, 'N'], [2, 'N']);
    const slower = {
      ...here,
      beats: beatsOf([{ tick: 64 * 100, beatClass: 'N', origin: 'added' }]),
    };
    const { beats } = compareSessions(here, slower, (state) => (state === here ? RATE_HZ : 100));
    expect(beats).toMatchObject({ both: 1, placePct: 50 });
    expect(compareSessions(here, slower, () => null).beats).toMatchObject({ here: 0, there: 0 });
  });

  // By hand: for the stomach 40 s here, 30 s there, 20 s in both, 50 s in either: 40 %. For the heart 40 s here, none there.
  it('exclude so many seconds by organ, and differ in the stretches that only one excludes', () => {
    const here = { ...withBeats(), spans: [span(1, 100, 140)] };
    const there = {
      ...withBeats(),
      spans: [
        { ...span(7, 120, 130), target: 'stomach' as const },
        { ...span(8, 125, 150), target: 'stomach' as const, cause: 'move' as const },
      ],
    };
    const { spans } = compared(here, there);
    expect(spans).toEqual([
      { organ: 'stomach', lead: 'EGG1 − EGG2', hereS: 40, thereS: 30, bothS: 20, pct: 40 },
      { organ: 'heart', lead: 'EGG2', hereS: 40, thereS: 0, bothS: 0, pct: 0 },
    ]);
    expect(told(here, there)).toEqual([
      'span | 0:01:40–0:02:00 | excluded for stomach (EGG1 − EGG2), cause talk | counts',
      'span | 0:01:40–0:02:20 | excluded for heart (EGG2), cause talk | counts',
      'span | 0:02:20–0:02:30 | counts | excluded for stomach (EGG1 − EGG2), cause move',
    ]);
  });

  it('tell a stretch that both organs lose once', () => {
    const here = { ...withBeats(), spans: [span(1, 100, 140)] };
    expect(told(here, withBeats())).toEqual([
      'span | 0:01:40–0:02:20 | excluded for stomach (EGG1 − EGG2), heart (EGG2), cause talk | counts',
    ]);
  });

  it('differ in leads, phases, settings and events in words; ids do not count', () => {
    const here = inventedState();
    const there: SessionState = {
      ...here,
      roles: { ...here.roles, heart: { kind: 'channel', channel: 0 } },
      phases: [here.phases[0], { name: 'fed', fromS: 2520, toS: 5400 }],
      settings: {
        ...DEFAULT_SETTINGS,
        rhythmBands: { ...DEFAULT_SETTINGS.rhythmBands, highCpm: 10 },
      },
      events: [
        { id: 4, atS: 1800, text: 'drank 200 ml' },
        { id: 1, atS: 2000, text: 'turned over' },
      ],
    };
    expect(compared(here, there).others.map(differenceWords)).toEqual([
      'heart lead: EGG2 → EGG1',
      'limits of the rhythm: 1-2-4-9 cpm → 1-2-4-10 cpm',
      'phase fed: 0:40:00–1:30:00 → 0:42:00–1:30:00',
      'event added: 0:33:20 “turned over”',
    ]);
  });

  it('are refused where the recording is another, or the same read in another way', () => {
    const { study } = inventedState();
    const confirmed = { ...study, sha256: 'ab'.repeat(32) };
    expect(otherStudy(study, study)).toBeNull();
    expect(otherStudy(confirmed, study)).toBeNull();
    expect(otherStudy(confirmed, { ...confirmed, sha256: 'cd'.repeat(32), code: 'INV-9' })).toBe(
      'That session is of another recording (INV-9), not of the open one.',
    );
    expect(otherStudy(study, { ...study, quickKey: 'other' })).toContain('another recording');
    expect(otherStudy(study, { ...study, channelLabels: ['EGG1'] })).toContain(
      'read in another way',
    );
  });
});
