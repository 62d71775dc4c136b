import { describe, expect, it } from 'vitest';
import { type Beat, beatsOf } from '../../src/recording/beat';
import { beatTally, programsBeats } from '../../src/session/beat-tally';
import type { Edit, Session } from '../../src/session/document';
import {
  addBeat,
  classBeats,
  deleteBeats,
  moveBeat,
  replaceAllBeats,
  replaceBeatsWithin,
} from '../../src/session/edits';
import { appendEdit, appendRedo, appendUndo, beginSession } from '../../src/session/log';
import { secondsToTicks } from '../../src/units/ticks';
import { AT, inventedState, RATE_HZ } from './invented-session';

const tickAt = (seconds: number) => secondsToTicks(seconds, RATE_HZ);
/** The program found ten beats, the first at 1266.4 s, one every 0.8 s; the fifth is of class V. */
const beatNo = (i: number) => tickAt(1266.4 + 0.8 * (i - 1));

const edited = (...edits: readonly ((session: Session) => Edit)[]): Session =>
  edits.reduce(
    (so, make) => appendEdit(so, make(so), 'A. Tech', AT),
    beginSession(inventedState()),
  );

const tallyOf = (session: Session) =>
  beatTally(programsBeats(session), session.state.beats, RATE_HZ);

const NONE = { found: 10, removed: 0, moved: 0, classed: [], added: 0, placed: 0, foundAgain: 0 };

describe('what became of the beats the program found', () => {
  it('is nothing before any edit, and nothing where all was taken back', () => {
    const start = beginSession(inventedState());
    expect(tallyOf(start)).toEqual(NONE);
    const mended = edited(({ state }) => deleteBeats(state, [beatNo(2)], RATE_HZ));
    expect(tallyOf(appendUndo(mended, 'A. Tech', AT))).toEqual(NONE);
  });

  it('counts what was removed, moved, classed, added and placed, each once', () => {
    const session = edited(
      ({ state }) => deleteBeats(state, [beatNo(1), beatNo(2)], RATE_HZ),
      ({ state }) => moveBeat(state, beatNo(4), beatNo(4) + tickAt(0.3), RATE_HZ),
      ({ state }) => classBeats(state, [beatNo(5)], 'N', RATE_HZ),
      ({ state }) => classBeats(state, [beatNo(6), beatNo(7)], 'S', RATE_HZ),
      ({ state }) => classBeats(state, [beatNo(7)], 'N', RATE_HZ),
      ({ state }) => addBeat(state, tickAt(1300), 'N', 'added', RATE_HZ),
      ({ state }) => addBeat(state, tickAt(1301), 'V', 'placed', RATE_HZ),
    );
    expect(tallyOf(session)).toEqual({
      ...NONE,
      removed: 2,
      moved: 1,
      classed: [
        { from: 'N', to: 'S', count: 1 },
        { from: 'V', to: 'N', count: 1 },
      ],
      added: 1,
      placed: 1,
    });
  });

  it('takes a moved beat that was given another class for both', () => {
    const session = edited(
      ({ state }) => moveBeat(state, beatNo(4), beatNo(4) + 64, RATE_HZ),
      ({ state }) => classBeats(state, [beatNo(4) + 64], 'V', RATE_HZ),
    );
    expect(tallyOf(session)).toEqual({
      ...NONE,
      moved: 1,
      classed: [{ from: 'N', to: 'V', count: 1 }],
    });
  });

  it('does not take a removed beat for moved because another one was, nor an added one that was moved', () => {
    const session = edited(
      ({ state }) => deleteBeats(state, [beatNo(3)], RATE_HZ),
      ({ state }) => moveBeat(state, beatNo(4), beatNo(4) - tickAt(0.1), RATE_HZ),
      ({ state }) => addBeat(state, tickAt(1300), 'N', 'added', RATE_HZ),
      ({ state }) => moveBeat(state, tickAt(1300), tickAt(1300.2), RATE_HZ),
    );
    expect(tallyOf(session)).toEqual({ ...NONE, removed: 1, moved: 2 });
  });

  it('begins anew where the program found all beats again, unless that was taken back', () => {
    const found: Beat = { tick: beatNo(1), beatClass: 'N', origin: 'detected' };
    const again = edited(
      ({ state }) => deleteBeats(state, [beatNo(2)], RATE_HZ),
      ({ state }) => replaceAllBeats(state, beatsOf([found]), 'detect beats again'),
    );
    expect(tallyOf(again)).toEqual({ ...NONE, found: 1 });
    const back = appendUndo(again, 'A. Tech', AT);
    expect(tallyOf(back)).toEqual({ ...NONE, removed: 1 });
    expect(tallyOf(appendRedo(back, 'A. Tech', AT))).toEqual({ ...NONE, found: 1 });
  });

  it('tells beats found within a range apart from those a person put in', () => {
    const fresh: Beat = { tick: beatNo(2) + 640, beatClass: 'N', origin: 'detected' };
    const session = edited(({ state }) =>
      replaceBeatsWithin(state, beatNo(2), beatNo(3), beatsOf([fresh]), 'detect within'),
    );
    expect(tallyOf(session)).toEqual({ ...NONE, removed: 1, foundAgain: 1 });
  });
});
