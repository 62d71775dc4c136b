import { beatsOf } from '../../src/recording/beat';
import type { Doubt, Mend } from '../../src/recording/doubt';
import type { Session } from '../../src/session/document';
import {
  addBeat,
  addSpan,
  changeSpan,
  classBeats,
  deleteBeats,
  keepDoubts,
  mendDoubts,
  moveBeat,
  removeSpans,
  replaceAllBeats,
  setField,
  setStudy,
  sign,
} from '../../src/session/edits';
import { appendEdit, appendRedo, appendUndo, beginSession } from '../../src/session/log';
import { AT, inventedState, RATE_HZ, signature, span } from './invented-session';

/** An invented doubt at a beat. */
export const doubtAt = (tick: number, mend: Mend | null): Doubt => ({
  id: `early-beat ${tick}`,
  kind: 'early-beat',
  fromS: 1,
  toS: 2,
  tick,
  lead: null,
  why: 'It comes early.',
  mend,
  effect: null,
});

/** An invented session with every kind of change, undo and redo in its log. */
export function workedSession(): Session {
  let session = beginSession(inventedState());
  const [first, second, third] = session.state.beats.ticks;
  const put = (make: (so: Session) => Parameters<typeof appendEdit>[1]) => {
    session = appendEdit(session, make(session), 'A. Tech', AT);
  };
  put(({ state }) => moveBeat(state, first, first + 640, RATE_HZ));
  put(({ state }) => addBeat(state, 64, 'Q', 'placed', RATE_HZ));
  put(({ state }) => classBeats(state, [second, third], 'V', RATE_HZ));
  put(({ state }) => deleteBeats(state, [third], RATE_HZ));
  session = appendUndo(session, 'A. Tech', AT);
  session = appendUndo(session, 'A. Tech', AT);
  session = appendRedo(session, 'A. Tech', AT);
  put((so) => addSpan(so, { ...span(0, 200, 230), lead: '#1~#2', note: 'coughs, "twice"' }));
  put(({ state }) => changeSpan(state, 6, { target: 'heart', cause: 'cough' }));
  put(({ state }) => removeSpans(state, [3]));
  put(({ state }) =>
    setField(state, 'symptoms', [{ id: 1, atS: 900.5, text: 'nausea', score: 4 }], 'symptom'),
  );
  const window = { fromS: 600, toS: 610 };
  const bookmark = { id: 1, minutes: { fromS: 0, toS: 1200 }, seconds: window, rows: ['rate'] };
  put(({ state }) => setField(state, 'bookmarks', [{ ...bookmark, note: 'early' }], 'bookmark'));
  put(() => keepDoubts([doubtAt(second, null)]));
  const asV = { tick: third, beatClass: 'V', origin: 'detected' } as const;
  put((so) =>
    mendDoubts(so, [
      doubtAt(third, {
        kind: 'beats',
        words: 'class beat N',
        removed: [asV],
        added: [{ ...asV, beatClass: 'N' }],
      }),
      doubtAt(0, { kind: 'exclude', words: 'exclude', span: span(0, 240, 250) }),
      doubtAt(1, { kind: 'include', words: 'include', spanId: 5 }),
    ]),
  );
  session = appendUndo(session, 'A. Tech', AT);
  session = appendRedo(session, 'A. Tech', AT);
  put(({ state }) => setField(state, 'notes', 'calm\nπ ≈ 3', 'write remarks'));
  put(({ state }) => setField(state, 'protocol', { ...state.protocol, ml: 250.5 }, 'protocol'));
  put(({ state }) => setStudy(state, { ...state.study, code: 'INV-8' }, 'change code'));
  const found = beatsOf([{ tick: 700, beatClass: 'S', origin: 'detected' }]);
  put(({ state }) => replaceAllBeats(state, found, 'detect again'));
  session = appendUndo(session, 'A. Tech', AT);
  put(({ state }) => sign(state, { ...signature(13), meaning: 'prepared', name: 'A. Tech' }));
  put(({ state }) => sign(state, signature(13)));
  return session;
}
