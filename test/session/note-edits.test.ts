import { describe, expect, it } from 'vitest';
import { Refusal } from '../../src/recording/failure';
import type { Edit, Session } from '../../src/session/document';
import { appendEdit, appendRedo, appendUndo, beginSession } from '../../src/session/log';
import { changeNote, notesOf, removeNote, writeNote } from '../../src/session/note-edits';
import { AT, inventedState } from './invented-session';

const put = (session: Session, make: (so: Session['state']) => Edit): Session =>
  appendEdit(session, make(session.state), 'A. Tech', AT);

const drank = { kind: 'event', atS: 754, text: ' drank 200 ml ' } as const;
const nausea = { kind: 'symptom', atS: 900.5, text: 'nausea', score: 6 } as const;

describe('events and symptoms', () => {
  it('are named in the log by what was done, when and what', () => {
    const state = inventedState();
    expect(writeNote(state, drank).name).toBe('write event 0:12:34 drank 200 ml');
    expect(writeNote(state, nausea).name).toBe('write symptom 0:15:00.5 nausea 6/10');
    const { state: after } = put(beginSession(state), (so) => writeNote(so, nausea));
    expect(changeNote(after, 1, { ...nausea, score: 3 }).name).toBe(
      'change symptom 0:15:00.5 nausea 3/10',
    );
    expect(removeNote(after, 'symptom', 1).name).toBe('remove symptom 0:15:00.5 nausea 6/10');
  });

  it('stand in the order of time, whichever was written first, each with an id of its own', () => {
    let session = beginSession(inventedState());
    session = put(session, (so) => writeNote(so, drank));
    session = put(session, (so) => writeNote(so, nausea));
    session = put(session, (so) => writeNote(so, { ...nausea, atS: 60, score: 0 }));
    expect(session.state.events).toEqual([
      { id: 2, atS: 754, text: 'drank 200 ml' },
      { id: 1, atS: 1800, text: 'drank 200 ml' },
    ]);
    expect(notesOf(session.state).map(({ kind, atS }) => [kind, atS])).toEqual([
      ['symptom', 60],
      ['event', 754],
      ['symptom', 900.5],
      ['event', 1800],
    ]);
    expect(new Set(session.state.symptoms.map(({ id }) => id)).size).toBe(2);
  });

  it('are changed and taken out one at a time, and each step is undone and done again', () => {
    const begun = beginSession(inventedState());
    const written = put(begun, (so) => writeNote(so, nausea));
    const moved = put(written, (so) => changeNote(so, 1, { ...nausea, atS: 30, score: 2 }));
    expect(moved.state.symptoms).toEqual([{ id: 1, atS: 30, text: 'nausea', score: 2 }]);
    expect(moved.state.events).toBe(begun.state.events);
    const gone = put(moved, (so) => removeNote(so, 'symptom', 1));
    expect(gone.state.symptoms).toEqual([]);
    const back = appendUndo(appendUndo(gone, 'A. Tech', AT), 'A. Tech', AT);
    expect(back.state.symptoms).toEqual(written.state.symptoms);
    expect(appendRedo(back, 'A. Tech', AT).state.symptoms).toEqual(moved.state.symptoms);
  });

  it('are refused without words, outside the recording, and with a score there is none of', () => {
    const state = inventedState();
    const refused = (note: Parameters<typeof writeNote>[1]) =>
      expect(() => writeNote(state, note)).toThrow(Refusal);
    refused({ ...drank, text: '  ' });
    refused({ ...drank, atS: 5400.1 });
    refused({ ...drank, atS: -1 });
    refused({ ...drank, atS: Number.NaN });
    refused({ ...nausea, score: 11 });
    refused({ ...nausea, score: -1 });
    refused({ ...nausea, score: 2.5 });
    expect(() => removeNote(state, 'symptom', 1)).toThrow(RangeError);
  });

  it('changed to what they are make no edit', () => {
    const { state } = put(beginSession(inventedState()), (so) => writeNote(so, nausea));
    expect(changeNote(state, 1, nausea).changes).toEqual([]);
  });
});
