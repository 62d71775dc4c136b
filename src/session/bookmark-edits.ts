import { formatClock } from '../units/time';
import type { Bookmark, Edit, SessionState } from './document';
import { setField } from './edits';

/** The middle of what Seconds showed: the time a bookmark is known by, in s. */
export const bookmarkAtS = ({ seconds }: Pick<Bookmark, 'seconds'>): number =>
  (seconds.fromS + seconds.toS) / 2;

/** Bookmarks by their time; of one time, the older first. */
export const inBookmarkOrder = (bookmarks: readonly Bookmark[]): readonly Bookmark[] =>
  [...bookmarks].sort((a, b) => bookmarkAtS(a) - bookmarkAtS(b) || a.id - b.id);

const named = (act: string, one: Omit<Bookmark, 'id'>) =>
  `${act} bookmark ${formatClock(bookmarkAtS(one), 1)}`;

/** One place more, as one undo step. */
export function addBookmark(state: SessionState, place: Omit<Bookmark, 'id'>): Edit {
  const id = state.bookmarks.reduce((most, one) => Math.max(most, one.id), 0) + 1;
  const after = inBookmarkOrder([...state.bookmarks, { ...place, id }]);
  return setField(state, 'bookmarks', after, named('add', place));
}

/** Another note for a bookmark. Throws RangeError where there is none of that id. */
export function renameBookmark(state: SessionState, id: number, note: string): Edit {
  const found = bookmarkOf(state, id);
  const after = state.bookmarks.map((one) => (one.id === id ? { ...one, note } : one));
  return setField(state, 'bookmarks', after, named('rename', found));
}

/** Takes a bookmark away. Throws RangeError where there is none of that id. */
export function removeBookmark(state: SessionState, id: number): Edit {
  const found = bookmarkOf(state, id);
  const after = state.bookmarks.filter((one) => one.id !== id);
  return setField(state, 'bookmarks', after, named('remove', found));
}

function bookmarkOf({ bookmarks }: SessionState, id: number): Bookmark {
  const found = bookmarks.find((one) => one.id === id);
  if (!found) throw new RangeError(`no bookmark ${id}`);
  return found;
}
