import { expect, test } from 'vitest';
import { keepDoubts, mendDoubts } from '../../src/session/edits';
import { appendEdit, appendUndo, beginSession } from '../../src/session/log';
import { AT, inventedState, span } from './invented-session';
import { doubtAt } from './worked-session';

const begun = () => beginSession(inventedState());
const done = (edit: Parameters<typeof appendEdit>[1], session = begun()) =>
  appendEdit(session, edit, 'A. Tech', AT);

test('keeping a doubt changes no beat and no span, and undo opens it again', () => {
  const session = done(keepDoubts([doubtAt(84426, null)]));
  expect(session.state.doubts).toEqual([{ id: 'early-beat 84426', ending: 'kept', tick: 84426 }]);
  expect(session.state.beats).toEqual(begun().state.beats);
  expect(appendUndo(session, 'A. Tech', AT).state).toEqual(begun().state);
});

test('look-alikes mended together are one undo step', () => {
  const session = begun();
  const { ticks } = session.state.beats;
  const toS = (tick: number) =>
    doubtAt(tick, {
      kind: 'beats',
      words: 'class beat S',
      removed: [{ tick, beatClass: 'N', origin: 'detected' }],
      added: [{ tick, beatClass: 'S', origin: 'detected' }],
    });
  const after = done(mendDoubts(session, [toS(ticks[0]), toS(ticks[1])]), session);
  expect([...after.state.beats.classes.subarray(0, 3)]).toEqual([1, 1, 0]);
  expect(after.state.doubts.map(({ ending }) => ending)).toEqual(['mended', 'mended']);
  expect(after.log).toHaveLength(1);
  expect(appendUndo(after, 'A. Tech', AT).state).toEqual(session.state);
});

test('a span is excluded or freed with the doubt that proposes it', () => {
  const session = begun();
  const exclude = { kind: 'exclude', words: 'exclude', span: span(0, 240, 250) } as const;
  const include = { kind: 'include', words: 'include', spanId: 3 } as const;
  const edit = mendDoubts(session, [doubtAt(0, exclude), doubtAt(1, include)]);
  const { spans } = done(edit, session).state;
  expect(spans.map(({ fromS }) => fromS)).toEqual([60, 240]);
});

test('a doubt that proposes nothing cannot be mended, and one is not settled twice', () => {
  expect(() => mendDoubts(begun(), [doubtAt(5, null)])).toThrow('proposes nothing');
  const once = done(keepDoubts([doubtAt(5, null)]));
  expect(() => done(keepDoubts([doubtAt(5, null)]), once)).toThrow('settled already');
});
