import { describe, expect, it } from 'vitest';
import { beatAt, beatsOf } from '../../src/recording/beat';
import { Refusal } from '../../src/recording/failure';
import { applyChange } from '../../src/session/apply-change';
import { confirmStudy } from '../../src/session/confirm-study';
import type { Edit, SessionState } from '../../src/session/document';
import {
  addBeat,
  addSpan,
  changeSpan,
  classBeats,
  deleteBeats,
  moveBeat,
  removeSpans,
  replaceBeatsWithin,
  setField,
  sign,
} from '../../src/session/edits';
import { beginSession } from '../../src/session/log';
import { secondsToTicks } from '../../src/units/ticks';
import { inventedState, RATE_HZ, signature, span } from './invented-session';

const state = inventedState();
const apply = (to: SessionState, edit: Edit) => edit.changes.reduce(applyChange, to);
const tickAt = (seconds: number) => secondsToTicks(seconds, RATE_HZ);
const originOf = (so: SessionState, index: number) => beatAt(so.beats, index).origin;

describe('edits carry the name that undo shows', () => {
  it('says which beat by its time on the clock of the recording', () => {
    expect(moveBeat(state, tickAt(1266.4), tickAt(1266.5), RATE_HZ).name).toBe(
      'move beat at 0:21:06.4',
    );
    expect(addBeat(state, tickAt(1266), 'N', 'added', RATE_HZ).name).toBe('add beat at 0:21:06.0');
    expect(addBeat(state, tickAt(1266), 'N', 'placed', RATE_HZ).name).toBe(
      'place beat at 0:21:06.0',
    );
    const three = [1266.4, 1267.2, 1268].map(tickAt);
    expect(deleteBeats(state, three, RATE_HZ).name).toBe('delete 3 beats 0:21:06.4-0:21:08.0');
    expect(classBeats(state, three.slice(0, 1), 'V', RATE_HZ).name).toBe(
      'class beat at 0:21:06.4 as V',
    );
  });

  it('says which stretch is excluded or included again', () => {
    const session = beginSession(state);
    expect(addSpan(session, span(0, 1080, 1120)).name).toBe('exclude 0:18:00-0:18:40');
    expect(addSpan(session, span(0, 1080.5, 1120)).name).toBe('exclude 0:18:00.5-0:18:40.0');
    expect(removeSpans(state, [3]).name).toBe('include 0:18:00-0:18:40 again');
    expect(changeSpan(state, 3, { toS: 1130 }).name).toBe('change excluded 0:18:00-0:18:50');
  });
});

describe('beats by hand', () => {
  it('become moved when moved, and stay placed when they were placed', () => {
    const moved = apply(state, moveBeat(state, tickAt(1266.4), tickAt(1266.5), RATE_HZ));
    expect(moved.beats.ticks[0]).toBe(tickAt(1266.5));
    expect(originOf(moved, 0)).toBe('moved');
    const placed = apply(state, addBeat(state, 64, 'N', 'placed', RATE_HZ));
    expect(originOf(apply(placed, moveBeat(placed, 64, 128, RATE_HZ)), 0)).toBe('placed');
    const seen = apply(placed, moveBeat(placed, 64, 128, RATE_HZ, 'moved'));
    expect(originOf(seen, 0)).toBe('moved');
  });

  it('keep their origin when classed, and those in the class already are no part of the change', () => {
    const all = [...state.beats.ticks];
    const classed = classBeats(state, all, 'V', RATE_HZ);
    expect(classed.changes).toHaveLength(1);
    const [change] = classed.changes;
    expect(change.kind === 'beats' && change.added.length).toBe(9);
    expect(originOf(apply(state, classed), 0)).toBe('detected');
    expect(classBeats(apply(state, classed), all, 'V', RATE_HZ).changes).toEqual([]);
  });

  it('cannot stand where a beat stands already', () => {
    expect(() => addBeat(state, tickAt(1266.4), 'N', 'added', RATE_HZ)).toThrow(Refusal);
    expect(() => moveBeat(state, tickAt(1266.4), tickAt(1267.2), RATE_HZ)).toThrow(
      'A beat stands at 0:21:07.2 already.',
    );
    expect(() => deleteBeats(state, [5], RATE_HZ)).toThrow(RangeError);
  });

  it('are replaced within a range only, and only where they differ', () => {
    const found = beatsOf([
      { tick: tickAt(1266.4), beatClass: 'N', origin: 'detected' },
      { tick: tickAt(1267), beatClass: 'N', origin: 'detected' },
      { tick: tickAt(1300), beatClass: 'N', origin: 'detected' },
    ]);
    const edit = replaceBeatsWithin(state, tickAt(1266), tickAt(1268), found, 'detect again');
    const [change] = edit.changes;
    if (change.kind !== 'beats') throw new Error('beats expected');
    expect(change.removed.map((beat) => beat.tick)).toEqual([tickAt(1267.2)]);
    expect(change.added.map((beat) => beat.tick)).toEqual([tickAt(1267)]);
    expect(apply(state, edit).beats.ticks).toHaveLength(10);
  });
});

describe('spans', () => {
  it('want a length', () => {
    const session = beginSession(state);
    expect(() => addSpan(session, span(0, 20, 20))).toThrow(Refusal);
    expect(() => changeSpan(state, 3, { toS: Number.NaN })).toThrow(Refusal);
    expect(() => removeSpans(state, [99])).toThrow('no span of id 99');
  });
});

describe('signing', () => {
  it('wants a name, finite figures, and for an amendment a reason and something to amend', () => {
    expect(() => sign(state, { ...signature(1), name: ' ' })).toThrow('name');
    const amended = { ...signature(1), meaning: 'amended' as const };
    expect(() => sign(state, { ...amended, reason: 'typing error' })).toThrow('nothing signed');
    const signed = apply(state, sign(state, signature(1)));
    expect(() => sign(signed, amended)).toThrow('reason');
    expect(sign(signed, { ...amended, reason: 'typing error' }).name).toBe('amend');
    const { findings } = signature(1);
    const endless = { ...findings, seen: [{ fromS: 0, toS: Number.POSITIVE_INFINITY, text: '' }] };
    expect(() => sign(state, { ...signature(1), findings: endless })).toThrow('finite');
  });
});

describe('fields', () => {
  it('change as a whole, and not at all where the value is the same', () => {
    expect(setField(state, 'protocol', { ...state.protocol }, 'protocol').changes).toEqual([]);
    const edit = setField(state, 'protocol', { ...state.protocol, kcal: 400 }, 'protocol');
    expect(apply(state, edit).protocol).toMatchObject({ meal: 'soup', kcal: 400 });
  });
});

describe('confirming the study', () => {
  const session = beginSession(state);
  const hash = '0f'.repeat(32);
  const { quickKey } = state.study;
  it('writes a hash that was not known yet into the session without a line in its log', () => {
    const confirmed = confirmStudy(session, hash, quickKey);
    expect(confirmed.state.study.sha256).toBe(hash);
    expect(confirmed.start.study.sha256).toBe(hash);
    expect(confirmed.log).toEqual([]);
    expect(confirmStudy(confirmed, hash, quickKey)).toBe(confirmed);
  });
  it('refuses another file also while its own hash is not known', () => {
    expect(() => confirmStudy(session, hash, `other-${quickKey}`)).toThrow(/not the one/);
  });
  it('refuses another file', () => {
    const confirmed = confirmStudy(session, hash, quickKey);
    expect(() => confirmStudy(confirmed, 'ee'.repeat(32), quickKey)).toThrow(
      /not the one that session INV-7 was made on.*eeeeeeee.*0f0f0f0f/,
    );
  });
});
