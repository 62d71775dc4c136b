import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { NO_BEATS } from '../../src/recording/beat';
import type { Edit, Session } from '../../src/session/document';
import {
  addBeat,
  addSpan,
  classBeats,
  deleteBeats,
  moveBeat,
  removeSpans,
  replaceAllBeats,
  setField,
  setStudy,
  sign,
} from '../../src/session/edits';
import {
  appendEdit,
  appendRedo,
  appendUndo,
  beginSession,
  nextSpanId,
  redoableEdit,
  replay,
  undoableEdit,
} from '../../src/session/log';
import { sameValue } from '../../src/session/same-value';
import { always } from '../properties';
import { AT, inventedState, RATE_HZ, signature, span } from './invented-session';

const note = (session: Session, text: string): Session =>
  appendEdit(session, setField(session.state, 'notes', text, `write ${text}`), 'A. Tech', AT);
const undo = (session: Session) => appendUndo(session, 'A. Tech', AT);
const redo = (session: Session) => appendRedo(session, 'A. Tech', AT);

describe('the log', () => {
  it('numbers its lines from 1 without gaps and says who did what when', () => {
    const session = note(note(beginSession(inventedState()), 'one'), 'two');
    expect(session.log.map((line) => line.n)).toEqual([1, 2]);
    expect(session.log[1]).toMatchObject({ reviewer: 'A. Tech', atUtc: AT });
  });

  it('takes back edits one after the other, by lines of their own, down to the start', () => {
    const start = beginSession(inventedState());
    const back = undo(undo(note(note(start, 'one'), 'two')));
    expect(back.log).toHaveLength(4);
    expect(back.log.slice(2).map((line) => line.act)).toEqual([
      { kind: 'undo', of: 2 },
      { kind: 'undo', of: 1 },
    ]);
    expect(back.state).toEqual(start.state);
    expect(undoableEdit(back)).toBeNull();
    expect(() => undo(back)).toThrow('nothing to undo');
  });

  it('redoes in the order in which it was done, until a new edit clears what could be redone', () => {
    const back = undo(undo(note(note(beginSession(inventedState()), 'one'), 'two')));
    expect(redoableEdit(back)).toEqual({ name: 'write one', n: 1 });
    const again = redo(back);
    expect(again.state.notes).toBe('one');
    expect(redoableEdit(again)?.name).toBe('write two');
    expect(undoableEdit(again)).toEqual({ name: 'write one', n: 1 });
    expect(redoableEdit(note(again, 'three'))).toBeNull();
    expect(() => redo(note(again, 'three'))).toThrow('nothing to redo');
  });

  it('leaves no line for a gesture that changed nothing, and keeps what could be redone', () => {
    const back = undo(note(beginSession(inventedState()), 'one'));
    const same = appendEdit(back, setField(back.state, 'notes', '', 'write nothing'), 'A', AT);
    expect(same).toBe(back);
  });

  it('keeps a signature whatever is undone', () => {
    const written = note(beginSession(inventedState()), 'one');
    const signed = appendEdit(written, sign(written.state, signature(1)), 'A. Reader', AT);
    expect(undoableEdit(signed)?.name).toBe('write one');
    const back = undo(signed);
    expect(back.state.notes).toBe('');
    expect(back.state.signed).toEqual([signature(1)]);
  });

  it('refuses an undo line that is not due, and a line out of its place', () => {
    const session = note(note(beginSession(inventedState()), 'one'), 'two');
    const wrong = { n: 3, atUtc: AT, reviewer: 'A', act: { kind: 'undo', of: 1 } } as const;
    expect(() => replay(session.start, [...session.log, wrong])).toThrow('line 3');
    expect(() => replay(session.start, session.log.slice(1))).toThrow('line 2');
  });

  it('never uses a span id again, also after the span is gone and the log was read from elsewhere', () => {
    let session = beginSession(inventedState());
    expect(nextSpanId(session)).toBe(6);
    session = appendEdit(session, addSpan(session, span(0, 10, 20)), 'A', AT);
    expect(session.state.spans.map((one) => one.id)).toEqual([6, 5, 3]);
    session = appendEdit(session, removeSpans(session.state, [6]), 'A', AT);
    expect(nextSpanId(session)).toBe(7);
    expect(nextSpanId({ ...session, log: [...session.log] })).toBe(7);
    expect(nextSpanId(undo(undo(session)))).toBe(7);
  });

  it('leaves a hash learnt later alone when a code is taken back', () => {
    const start = beginSession(inventedState());
    const coded = appendEdit(
      start,
      setStudy(start.state, { ...start.state.study, code: 'INV-8' }, 'change code'),
      'A',
      AT,
    );
    const known = { ...coded.state.study, sha256: 'ab'.repeat(32) };
    const back = undo({ ...coded, state: { ...coded.state, study: known } });
    expect(back.state.study).toMatchObject({ code: 'INV-7', sha256: 'ab'.repeat(32) });
  });
});

/** Some edit of a session, chosen by two numbers. */
function someEdit({ state, ...rest }: Session, which: number, where: number): Edit {
  const ticks = [...state.beats.ticks];
  const tick = ticks[where % Math.max(1, ticks.length)] ?? 0;
  switch (which % 8) {
    case 0:
      return addBeat(state, (ticks.at(-1) ?? 0) + 1 + where, 'N', 'added', RATE_HZ);
    case 1:
      return deleteBeats(state, ticks.length > 0 ? [tick] : [], RATE_HZ);
    case 2:
      return ticks.length > 0
        ? moveBeat(state, tick, (ticks.at(-1) ?? 0) + 1 + where, RATE_HZ)
        : setField(state, 'notes', String(where), 'write');
    case 3:
      return classBeats(state, ticks, 'S', RATE_HZ);
    case 4:
      return addSpan({ state, ...rest }, span(0, where, where + 1));
    case 5:
      return removeSpans(
        state,
        state.spans.slice(0, 1).map((one) => one.id),
      );
    case 6:
      return replaceAllBeats(state, where % 2 ? NO_BEATS : inventedState().beats, 'detect');
    default:
      return sign(state, signature(where));
  }
}

describe('replay', () => {
  it('gives the state of the session, and undoing everything its start, whatever was done', () => {
    const acts = fc.array(fc.tuple(fc.nat(11), fc.nat(50)), { maxLength: 40 });
    fc.assert(
      fc.property(acts, (list) => {
        let session = beginSession(inventedState());
        for (const [which, where] of list) {
          if (which < 8) session = appendEdit(session, someEdit(session, which, where), 'A', AT);
          else if (which < 10) session = undoableEdit(session) ? undo(session) : session;
          else session = redoableEdit(session) ? redo(session) : session;
        }
        expect(sameValue(replay(session.start, session.log), session.state)).toBe(true);
        const length = session.log.length;
        while (undoableEdit(session)) session = undo(session);
        expect(session.log.length).toBeGreaterThanOrEqual(length);
        expect(sameValue({ ...session.state, signed: [] }, session.start)).toBe(true);
      }),
      always(60),
    );
  });

  it('costs an edit at line 5,000 about what it costs at the beginning', () => {
    const timed = (session: Session): [Session, number] => {
      const from = performance.now();
      let so = session;
      for (let i = 0; i < 200; i += 1) so = undo(note(so, `${so.log.length}`));
      return [so, (performance.now() - from) / 400];
    };
    let [session] = timed(beginSession(inventedState()));
    while (session.log.length < 5000) session = note(session, `${session.log.length}`);
    const [, lateMs] = timed(session);
    expect(lateMs).toBeLessThan(0.5);
  });
});
