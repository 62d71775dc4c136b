import { bookmarkAtS, inBookmarkOrder } from '../session/bookmark-edits';
import type { Bookmark } from '../session/document';
import { formatClock } from '../units/time';
import { leadsShownNow } from './leads-shown';
import type { PaneStores } from './row-view';
import { lookAtMinutes, lookAtSeconds, type TimeWindow, type ViewStore } from './view-store';

/** Stands for the rows of the reported lead alone, whichever lead that is when the bookmark is gone to. */
const REPORTED_ROWS = 'reported';

/** The place both panes look at now, without its note. */
export function placeNow({ view, session }: PaneStores): Omit<Bookmark, 'id' | 'note'> {
  const { minutes, seconds } = view.getState();
  const roles = session.getState().session?.state.roles;
  const several = (roles?.slow.length ?? 0) > 1;
  const rows = several && leadsShownNow(view) === 'reported' ? [REPORTED_ROWS] : [];
  return { minutes, seconds, rows };
}

const middle = ({ fromS, toS }: TimeWindow): number => (fromS + toS) / 2;
const width = ({ fromS, toS }: TimeWindow): number => toS - fromS;

/** Takes both panes to a bookmark, with the rows that were shown. */
export function goToBookmark(view: ViewStore, { minutes, seconds, rows }: Bookmark): void {
  lookAtMinutes(view, middle(minutes), width(minutes));
  lookAtSeconds(view, middle(seconds), width(seconds));
  view.setState({ leadsShown: rows.includes(REPORTED_ROWS) ? 'reported' : 'all' });
}

/** Windows are the same where no pixel tells them apart. */
const same = (a: TimeWindow, b: TimeWindow): boolean =>
  Math.abs(a.fromS - b.fromS) < 1e-6 && Math.abs(a.toS - b.toS) < 1e-6;

/**
 * The bookmark that comes after (way 1) or before (way -1) what the panes show, with its number from 1 by time; the first
 * follows the last. Null where there is none.
 */
export function bookmarkFrom(
  bookmarks: readonly Bookmark[],
  looking: Pick<Bookmark, 'minutes' | 'seconds'>,
  way: 1 | -1,
): { readonly bookmark: Bookmark; readonly number: number } | null {
  const all = inBookmarkOrder(bookmarks);
  if (all.length === 0) return null;
  const here = all.findIndex(
    (one) => same(one.minutes, looking.minutes) && same(one.seconds, looking.seconds),
  );
  const atS = bookmarkAtS(looking);
  const after = all.findIndex((one) => bookmarkAtS(one) > atS);
  const next = after < 0 ? all.length : after;
  const before = all.findLastIndex((one) => bookmarkAtS(one) < atS);
  const index = here >= 0 ? here + way : way > 0 ? next : before;
  const at = (index + all.length) % all.length;
  return { bookmark: all[at], number: at + 1 };
}

/** The bookmark whose middle lies in what Seconds shows, the nearest where there are several; null where there is none. */
export function bookmarkHere(
  bookmarks: readonly Bookmark[],
  { seconds }: Pick<Bookmark, 'seconds'>,
): { readonly bookmark: Bookmark; readonly number: number } | null {
  const all = inBookmarkOrder(bookmarks);
  const off = (one: Bookmark) => Math.abs(bookmarkAtS(one) - middle(seconds));
  const inSight = all.filter((one) => off(one) <= width(seconds) / 2);
  const bookmark = inSight.sort((a, b) => off(a) - off(b)).at(0);
  return bookmark ? { bookmark, number: all.indexOf(bookmark) + 1 } : null;
}

/** A bookmark in words: its number among all, its time, its note. */
export function bookmarkWords(bookmark: Bookmark, number: number, count: number): string {
  const note = bookmark.note === '' ? '' : `: ${bookmark.note}`;
  return `Bookmark ${number} of ${count}, ${formatClock(bookmarkAtS(bookmark), 1)}${note}`;
}

/** Goes to the bookmark after or before what the panes show; the words that tell of it, null where there is none. */
export function stepBookmark({ view, session }: PaneStores, way: 1 | -1): string | null {
  const bookmarks = session.getState().session?.state.bookmarks ?? [];
  const found = bookmarkFrom(bookmarks, view.getState(), way);
  if (!found) return null;
  goToBookmark(view, found.bookmark);
  return bookmarkWords(found.bookmark, found.number, bookmarks.length);
}
