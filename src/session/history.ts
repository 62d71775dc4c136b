import type { Edit, LogLine, SessionState } from './document';

/** A stack that is shared and never changed: pushing makes a new top over the old one, O(1). */
interface Stack {
  readonly n: number;
  readonly edit: Edit;
  readonly below: Stack | null;
}

/** What a log says beside the state it leads to. */
export interface History {
  /** Edits that stand, the latest on top. */
  readonly undo: Stack | null;
  /** Edits taken back that may come again. */
  readonly redo: Stack | null;
  /** The highest span id ever used. */
  readonly highestSpanId: number;
}

/** The history of an empty log. */
export function emptyHistory(start: SessionState): History {
  const highestSpanId = start.spans.reduce((highest, span) => Math.max(highest, span.id), 0);
  return { undo: null, redo: null, highestSpanId };
}

/**
 * The history after one more line, and the edit that the line applies or takes back; O(size of the edit), whatever the
 * length of the log. A signature stands: it joins neither stack and clears none. Throws Error where an undo or redo names
 * another line than the one that is due, or where a signature is mixed with other changes.
 */
export function nextHistory(
  history: History,
  line: LogLine,
): { readonly history: History; readonly edit: Edit } {
  const { act } = line;
  if (act.kind === 'edit') return { history: afterEdit(history, line.n, act.edit), edit: act.edit };
  const [from, other] =
    act.kind === 'undo' ? (['undo', 'redo'] as const) : (['redo', 'undo'] as const);
  const top = history[from];
  if (top === null || top.n !== act.of)
    throw new Error(`line ${line.n}: ${act.kind} of line ${act.of} is not what is due`);
  const pushed: Stack = { n: top.n, edit: top.edit, below: history[other] };
  return { history: { ...history, [from]: top.below, [other]: pushed }, edit: top.edit };
}

function afterEdit(history: History, n: number, edit: Edit): History {
  if (edit.changes.some((change) => change.kind === 'sign')) {
    if (edit.changes.length > 1) throw new Error('a signature is an edit of its own');
    return history;
  }
  const highestSpanId = edit.changes.reduce(
    (highest, change) =>
      change.kind === 'spans'
        ? change.added.reduce((top, span) => Math.max(top, span.id), highest)
        : highest,
    history.highestSpanId,
  );
  return { undo: { n, edit, below: history.undo }, redo: null, highestSpanId };
}
