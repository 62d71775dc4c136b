import { describe, expect, it } from 'vitest';
import { bookmarkFrom, goToBookmark, placeNow, stepBookmark } from '../../src/review/bookmarks';
import { lookAtMinutes, lookAtSeconds } from '../../src/review/view-store';
import { addBookmark } from '../../src/session/bookmark-edits';
import type { Bookmark } from '../../src/session/document';
import { channel, paneStudy } from './pane-study';

const window = (middleS: number, widthS: number) => ({
  fromS: middleS - widthS / 2,
  toS: middleS + widthS / 2,
});

const at = (id: number, middleS: number, widthS = 10): Bookmark => ({
  id,
  minutes: window(middleS, 100),
  seconds: window(middleS, widthS),
  rows: [],
  note: `n${id}`,
});

describe('stepping through bookmarks', () => {
  const all = [at(1, 400), at(2, 100), at(3, 250)];
  const from = (middleS: number, way: 1 | -1) =>
    bookmarkFrom(all, { minutes: window(300, 600), seconds: window(middleS, 10) }, way);

  it('goes by time, whatever the order in which they were made', () => {
    expect(from(120, 1)).toMatchObject({ bookmark: { id: 3 }, number: 2 });
    expect(from(260, -1)).toMatchObject({ bookmark: { id: 3 }, number: 2 });
  });

  it('begins again at the other end', () => {
    expect(from(500, 1)?.bookmark.id).toBe(2);
    expect(from(50, -1)?.bookmark.id).toBe(1);
  });

  it('comes past two of the same time with other widths', () => {
    const twins = [at(1, 100, 10), at(2, 100, 4), at(3, 300)];
    const seen = [1, 2, 3].map((_, i) => bookmarkFrom(twins, twins[i], 1)?.bookmark.id);
    expect(seen).toEqual([2, 3, 1]);
  });

  it('finds nothing where there is none', () => {
    expect(bookmarkFrom([], at(1, 10), 1)).toBeNull();
  });
});

describe('a bookmarked place', () => {
  it('comes back with both widths and the rows that were shown', () => {
    const roles = { slow: [channel(0), channel(2)], reported: 0, heart: channel(1), breath: null };
    const { stores, state } = paneStudy({}, { roles });
    const { view, session } = stores;
    view.setState({ leadsShown: 'reported' });
    lookAtMinutes(view, 300, 120);
    lookAtSeconds(view, 290, 4);
    session.getState().apply(addBookmark(state(), { ...placeNow(stores), note: 'short pause' }));
    view.setState({ leadsShown: 'all' });
    lookAtMinutes(view, 100, 200);
    lookAtSeconds(view, 20, 30);
    expect(stepBookmark(stores, 1)).toBe('Bookmark 1 of 1, 0:04:50.0: short pause');
    const { minutes, seconds, leadsShown } = view.getState();
    expect(minutes).toEqual({ fromS: 240, toS: 360 });
    expect(seconds).toEqual({ fromS: 288, toS: 292 });
    expect(leadsShown).toBe('reported');
  });

  it('of a longer recording is cut to what there is', () => {
    const { stores } = paneStudy();
    goToBookmark(stores.view, at(1, 5000));
    const { minutes, seconds } = stores.view.getState();
    expect(minutes).toEqual({ fromS: 500, toS: 600 });
    expect(seconds.toS).toBe(600);
  });
});
