import { useState } from 'react';
import { goToBookmark, placeNow } from '../review/bookmarks';
import {
  addBookmark,
  bookmarkAtS,
  inBookmarkOrder,
  removeBookmark,
  renameBookmark,
} from '../session/bookmark-edits';
import type { Bookmark } from '../session/document';
import { formatClock } from '../units/time';
import { useApp, useSession } from './app-context';
import { Dialog } from './dialog';
import { Field } from './fields';
import { FormActions } from './form-actions';

const NOTE_HINT = 'The note is shown large in the room view: write no name.';

const clock = (bookmark: Pick<Bookmark, 'seconds'>) => formatClock(bookmarkAtS(bookmark), 1);

/** Asks for a note and keeps the place both panes look at. */
export function AddBookmarkDialog() {
  const parts = useApp();
  const { shell, session, controller } = parts;
  const [place] = useState(() => placeNow(parts));
  const [note, setNote] = useState('');
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Bookmark this place"
      subtitle={`Around ${clock(place)}, with the widths of both panes and the rows shown.`}
      size="small"
      onClose={close}
      onSubmit={() => {
        const state = session.getState().session?.state;
        close();
        if (state) controller.edit(addBookmark(state, { ...place, note: note.trim() }));
      }}
      actions={<FormActions stay="Not now" go="Bookmark" onStay={close} />}
    >
      <Field label="Note" value={note} onChange={setNote} hint={NOTE_HINT} autoFocus />
    </Dialog>
  );
}

/** All bookmarks by time: go to one, write another note, take one away. */
export function BookmarksDialog() {
  const { shell, view } = useApp();
  const bookmarks = useSession((state) => state.session?.state.bookmarks) ?? [];
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog title="Bookmarks" onClose={close}>
      {bookmarks.length === 0 ? (
        <p className="quiet">
          No place is bookmarked yet. Look at one and use “Bookmark this place”.
        </p>
      ) : (
        <>
          <p className="small quiet">{NOTE_HINT}</p>
          <ul className="event-list bookmark-list">
            {inBookmarkOrder(bookmarks).map((one) => (
              <BookmarkRow
                key={one.id}
                bookmark={one}
                onGo={() => {
                  close();
                  goToBookmark(view, one);
                }}
              />
            ))}
          </ul>
        </>
      )}
    </Dialog>
  );
}

interface BookmarkRowProps {
  readonly bookmark: Bookmark;
  readonly onGo: () => void;
}

function BookmarkRow({ bookmark, onGo }: BookmarkRowProps) {
  const { session, controller } = useApp();
  const { id } = bookmark;
  const [note, setNote] = useState(bookmark.note);
  const at = clock(bookmark);
  const state = () => session.getState().session?.state;
  const rename = () => {
    const now = state();
    if (now && note.trim() !== bookmark.note) controller.edit(renameBookmark(now, id, note.trim()));
  };
  return (
    <li>
      <button
        type="button"
        className="go"
        data-autofocus
        aria-label={`Go to the bookmark at ${at}`}
        onClick={onGo}
      >
        {at}
      </button>
      <form
        className="bookmark-note"
        onSubmit={(event) => {
          event.preventDefault();
          rename();
        }}
      >
        <Field label={`Note at ${at}`} labelHidden value={note} onChange={setNote} />
        <button
          type="submit"
          className="button slight"
          disabled={note.trim() === bookmark.note}
          aria-label={`Keep the note at ${at}`}
        >
          Keep note
        </button>
      </form>
      <button
        type="button"
        className="button slight"
        aria-label={`Remove the bookmark at ${at}`}
        onClick={() => {
          const now = state();
          if (now) controller.edit(removeBookmark(now, id));
        }}
      >
        Remove
      </button>
    </li>
  );
}
