import { describe, expect, it } from 'vitest';
import { beatsOf } from '../../src/recording/beat';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import type { Edit, Session } from '../../src/session/document';
import {
  addBeat,
  addSpan,
  changeSpan,
  classBeats,
  deleteBeats,
  keepDoubts,
  moveBeat,
  replaceAllBeats,
  setField,
  sign,
} from '../../src/session/edits';
import { fieldDifferences } from '../../src/session/field-differences';
import { appendEdit, appendRedo, appendUndo, beginSession } from '../../src/session/log';
import { LOG_KINDS, logEntries, logWords } from '../../src/session/log-words';
import { secondsToTicks } from '../../src/units/ticks';
import { AT, inventedState, RATE_HZ, signature, span } from './invented-session';
import { doubtAt, workedSession } from './worked-session';

const rates = { rateHzOf: () => RATE_HZ };
const LABELS = inventedState().study.channelLabels;

const done = (session: Session, make: (so: Session) => Edit, by = 'A. Tech'): Session =>
  appendEdit(session, make(session), by, AT);

const lastWords = (session: Session) => {
  const entries = logEntries(session, rates);
  return logWords(entries[entries.length - 1], LABELS);
};

/** The words of one act on the invented session, its fifth beat (at 0:21:09.6) being of class V. */
const wordsOf = (make: (so: Session) => Edit) =>
  lastWords(done(beginSession(inventedState()), make));

const tickAt = (seconds: number) => secondsToTicks(seconds, RATE_HZ);

describe('a line of the log in words', () => {
  it('names a beat by class and time, and says which class it was given', () => {
    const { act, changes, place } = wordsOf(({ state }) =>
      classBeats(state, [tickAt(1269.6)], 'N', RATE_HZ),
    );
    expect(act).toBe('class beat at 0:21:09.6 as N');
    expect(changes).toEqual(['beat at 0:21:09.600: class V → class N']);
    expect(place).toEqual({ fromS: 1269.6, toS: 1269.6 });
  });

  it('says of beats that they came, went or where they were moved to', () => {
    const first = tickAt(1266.4);
    expect(wordsOf(({ state }) => deleteBeats(state, [first], RATE_HZ)).changes).toEqual([
      'beat N at 0:21:06.400 removed',
    ]);
    expect(
      wordsOf(({ state }) => addBeat(state, tickAt(12.204), 'V', 'added', RATE_HZ)).changes,
    ).toEqual(['beat V at 0:00:12.204 added']);
    expect(
      wordsOf(({ state }) => addBeat(state, tickAt(12.204), 'N', 'placed', RATE_HZ)).changes,
    ).toEqual(['beat N at 0:00:12.204 added: placed']);
    expect(wordsOf(({ state }) => moveBeat(state, first, first + 160, RATE_HZ)).changes).toEqual([
      'beat N: 0:21:06.400 → 0:21:06.410',
    ]);
    expect(
      wordsOf(({ state }) => moveBeat(state, first, first + 160, RATE_HZ, 'placed')).changes,
    ).toEqual(['beat N: 0:21:06.400, class N → 0:21:06.410, class N, placed']);
  });

  it('tells many beats together, with the classes they had and have', () => {
    const { changes, place } = wordsOf(({ state }) =>
      classBeats(state, [...state.beats.ticks], 'Q', RATE_HZ),
    );
    expect(changes).toEqual(['10 beats 0:21:06.400–0:21:13.600: class N, class V → class Q']);
    expect(place).toEqual({ fromS: 1266.4, toS: 1273.6 });
    const gone = wordsOf(({ state }) => deleteBeats(state, [...state.beats.ticks], RATE_HZ));
    expect(gone.changes).toEqual(['10 beats 0:21:06.400–0:21:13.600 removed']);
  });

  it('counts what all beats found anew have in common with those before', () => {
    const { changes } = wordsOf(({ state }) => {
      const kept = [0, 1, 4].map((i) => ({
        tick: state.beats.ticks[i],
        beatClass: 'N' as const,
        origin: 'detected' as const,
      }));
      const fresh = { tick: 64, beatClass: 'N', origin: 'detected' } as const;
      return replaceAllBeats(state, beatsOf([...kept, fresh]), 'detect beats again');
    });
    expect(changes).toEqual(['all beats: 10 → 4, 7 gone, 1 new, 1 of another class']);
  });

  it('says of a span where it is, for what, why and on which lead', () => {
    expect(wordsOf((so) => addSpan(so, span(0, 1100, 1140))).changes).toEqual([
      'span added: 0:18:20–0:19:00 for both, cause talk, all leads',
    ]);
    expect(
      wordsOf(({ state }) => changeSpan(state, 5, { target: 'heart', lead: '#1~#2', toS: 70 }))
        .changes,
    ).toEqual([
      'span: 0:01:00.0–0:01:01.5 for both, cause talk, all leads → 0:01:00–0:01:10 for the heart, cause talk, EGG1 − EGG2',
    ]);
  });

  it('says from when to when a phase was moved, and what settings were', () => {
    const moved = wordsOf(({ state }) =>
      setField(
        state,
        'phases',
        [
          { name: 'fasting', fromS: 0, toS: 1800 },
          { name: 'fed', fromS: 2520, toS: 5400 },
          { name: 'meal', fromS: 1800, toS: 2400 },
        ],
        'change phases',
      ),
    );
    expect(moved.changes).toEqual([
      'phase fed: 0:40:00–1:30:00 → 0:42:00–1:30:00',
      'phase meal added: 0:30:00–0:40:00',
    ]);
    const border = fieldDifferences(
      {
        kind: 'field',
        field: 'phases',
        before: [{ name: 'fed', fromS: 2400, toS: 5400 }],
        after: [{ name: 'fed', fromS: 2520, toS: 5400 }],
      },
      [],
    );
    expect(border.map(({ place }) => place)).toEqual([{ fromS: 2400, toS: 2520 }]);
    const longer = { ...DEFAULT_SETTINGS, epoch: { ...DEFAULT_SETTINGS.epoch, lengthS: 300 } };
    expect(wordsOf(({ state }) => setField(state, 'settings', longer, 'settings')).changes).toEqual(
      ['epoch: 240 s → 300 s'],
    );
  });

  it('says who signed what and why it was amended, and which doubts were kept', () => {
    const first = done(beginSession(inventedState()), ({ state }) => sign(state, signature(0)));
    const amended = done(first, ({ state }) =>
      sign(state, { ...signature(1), meaning: 'amended', reason: 'a beat was missed' }),
    );
    expect(lastWords(amended).changes).toEqual([
      'signature added: amended by A. Reader, figures of edit 1, because “a beat was missed”',
    ]);
    expect(wordsOf(() => keepDoubts([doubtAt(tickAt(1269.6), null)])).changes).toEqual([
      'doubt (early beat) at beat 0:21:09.600: open → kept',
    ]);
  });

  it('names what undo took back and redo did again, from what to what', () => {
    const made = done(beginSession(inventedState()), ({ state }) =>
      classBeats(state, [tickAt(1269.6)], 'N', RATE_HZ),
    );
    const back = appendUndo(made, 'B. Tech', AT);
    expect(lastWords(back)).toMatchObject({
      act: 'undo of edit 1: class beat at 0:21:09.6 as N',
      changes: ['beat at 0:21:09.600: class N → class V'],
    });
    expect(lastWords(appendRedo(back, 'B. Tech', AT))).toMatchObject({
      act: 'redo of edit 1: class beat at 0:21:09.6 as N',
      changes: ['beat at 0:21:09.600: class V → class N'],
    });
  });

  it('follows the rate of the heart lead: ticks before a change of leads are of the lead before', () => {
    const other = { kind: 'channel', channel: 2 } as const;
    const start = beginSession(inventedState());
    const first = done(start, ({ state }) => addBeat(state, 64 * 250, 'N', 'added', 250));
    const moved = done(first, ({ state }) =>
      setField(state, 'roles', { ...state.roles, heart: other }, 'change leads'),
    );
    const second = done(moved, ({ state }) => addBeat(state, 64 * 1000, 'N', 'added', 500));
    const entries = logEntries(second, {
      rateHzOf: ({ heart }) => (heart?.kind === 'channel' && heart.channel === 2 ? 500 : 250),
    });
    const beats = entries.map((entry) => logWords(entry, LABELS).changes[0]);
    expect(beats).toEqual([
      'beat N at 0:00:01.000 added',
      'heart lead: EGG2 → Resp',
      'beat N at 0:00:02.000 added',
    ]);
  });

  it('finds words for every kind of change, and no two states without a difference', () => {
    const entries = logEntries(workedSession(), rates);
    for (const entry of entries) {
      const { act, changes } = logWords(entry, LABELS);
      expect(act).not.toBe('');
      expect(changes.length, act).toBeGreaterThan(0);
      for (const words of changes) expect(words).not.toMatch(/undefined|NaN|\[object/);
    }
    const kinds = new Set(entries.flatMap((entry) => entry.kinds));
    expect(LOG_KINDS.filter((kind) => !kinds.has(kind))).toEqual(['leads']);
  });
});

const OTHER_WORD: Readonly<Record<string, string>> = {
  band: 'fractional',
  fitted: 'even',
  'where-it-helps': 'never',
};

/** A value with each number, word and switch in it changed by itself. */
function changedOnce(value: unknown): readonly unknown[] {
  if (typeof value === 'number') return [value + 1];
  if (typeof value === 'boolean') return [!value];
  if (typeof value === 'string') return [OTHER_WORD[value]];
  if (Array.isArray(value))
    return value.flatMap((one, i) => changedOnce(one).map((other) => value.with(i, other)));
  return Object.entries(Object(value)).flatMap(([key, one]) =>
    changedOnce(one).map((other) => ({ ...Object(value), [key]: other })),
  );
}

describe('settings in words', () => {
  it('misses none: each one changed by itself is one difference', () => {
    const others = changedOnce(DEFAULT_SETTINGS) as readonly Settings[];
    expect(others.length).toBeGreaterThan(25);
    for (const settings of others) {
      const { changes } = wordsOf(({ state }) => setField(state, 'settings', settings, 'settings'));
      expect(changes.length, JSON.stringify(settings)).toBe(1);
    }
  });
});
