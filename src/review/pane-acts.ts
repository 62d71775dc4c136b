import { Refusal } from '../recording/failure';
import type { Edit, Session } from '../session/document';
import type { PaneStores } from './row-view';

/** What the panes ask of the shell. */
export interface PaneActs {
  /** Adds an edit to the session; the shell asks who edits first, where nobody has said so. */
  edit(edit: Edit): void;
  /** Tells the person in the live region. */
  say(text: string): void;
  reportError(text: string): void;
}

/**
 * Makes an edit from the open session and hands it over; nothing happens without a session or where nothing would change.
 * A refusal is told to the person. Returns the edit handed over, else null.
 */
export function tryEdit(
  { session }: PaneStores,
  act: PaneActs,
  make: (session: Session) => Edit | null,
): Edit | null {
  const open = session.getState().session;
  if (!open) return null;
  try {
    const edit = make(open);
    if (!edit || edit.changes.length === 0) return null;
    act.edit(edit);
    return edit;
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    act.reportError(`${error.failure.message} ${error.failure.remedy}`);
    return null;
  }
}
