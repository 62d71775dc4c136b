import { describe, expect, it } from 'vitest';
import { addBookmark, removeBookmark, renameBookmark } from '../../src/session/bookmark-edits';
import { appendEdit, appendUndo, beginSession } from '../../src/session/log';
import { AT, inventedState } from './invented-session';

const placeAt = (fromS: number, note: string) => ({
  minutes: { fromS: 0, toS: 1200 },
  seconds: { fromS, toS: fromS + 10 },
  rows: [],
  note,
});

const added = (...places: ReturnType<typeof placeAt>[]) =>
  places.reduce(
    (session, place) => appendEdit(session, addBookmark(session.state, place), 'A. Tech', AT),
    beginSession(inventedState()),
  );

describe('a bookmark', () => {
  it('keeps the place with its widths and note, in the order of time', () => {
    const { bookmarks } = added(placeAt(600, 'pause'), placeAt(60, 'talking')).state;
    expect(bookmarks.map(({ note }) => note)).toEqual(['talking', 'pause']);
    expect(bookmarks[1]).toMatchObject(placeAt(600, 'pause'));
  });

  it('has a number no other has, also after one was removed', () => {
    const two = added(placeAt(60, 'a'), placeAt(600, 'b'));
    const one = appendEdit(two, removeBookmark(two.state, 1), 'A. Tech', AT);
    const again = appendEdit(one, addBookmark(one.state, placeAt(30, 'c')), 'A. Tech', AT);
    expect(again.state.bookmarks.map(({ id }) => id)).toEqual([3, 2]);
  });

  it('is added, renamed and removed by one undo step each', () => {
    const first = added(placeAt(60, 'talk'));
    const renamed = appendEdit(first, renameBookmark(first.state, 1, 'cough'), 'A. Tech', AT);
    const removed = appendEdit(renamed, removeBookmark(renamed.state, 1), 'A. Tech', AT);
    expect(removed.state.bookmarks).toEqual([]);
    const names = removed.log.map(({ act }) => act.kind === 'edit' && act.edit.name);
    expect(names).toEqual([
      'add bookmark 0:01:05.0',
      'rename bookmark 0:01:05.0',
      'remove bookmark 0:01:05.0',
    ]);
    const back = appendUndo(removed, 'A. Tech', AT);
    expect(back.state.bookmarks).toMatchObject([{ note: 'cough' }]);
    expect(appendUndo(back, 'A. Tech', AT).state.bookmarks).toMatchObject([{ note: 'talk' }]);
  });

  it('that is not there is refused', () => {
    const { state } = added(placeAt(60, 'talk'));
    expect(() => renameBookmark(state, 7, 'x')).toThrow(RangeError);
    expect(() => removeBookmark(state, 7)).toThrow(RangeError);
  });
});
