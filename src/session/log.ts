import { applyChange, inSpanOrder, invert } from './apply-change';
import { BeatDraft } from './beat-draft';
import type { Change, Edit, LogLine, Session, SessionState } from './document';
import { emptyHistory, type History, nextHistory } from './history';

/** Histories by log: kept beside the session, so that an edit at line 5,000 costs what one at line 5 does. */
const HISTORIES = new WeakMap<readonly LogLine[], History>();

/** A session without edits. Spans are put in their one order, so that undoing everything gives this state again. */
export function beginSession(state: SessionState): Session {
  const start = { ...state, spans: inSpanOrder(state.spans) };
  return { start, log: [], state: start };
}

/**
 * The session with one line more: the only way a log grows. Cost: the change itself and one copy of the list of lines.
 * Throws Error where the line's number is not the next one or its undo or redo is not due; RangeError where a change does
 * not fit the state.
 */
export function appendLine(session: Session, line: LogLine): Session {
  if (line.n !== session.log.length + 1)
    throw new Error(`line ${line.n} cannot follow line ${session.log.length}`);
  const { history, edit } = nextHistory(historyOf(session), line);
  const state = changesOf(line, edit).reduce(applyChange, session.state);
  const log = [...session.log, line];
  HISTORIES.set(log, history);
  return { start: session.start, log, state };
}

/** Adds one edit; one without changes leaves the session, and what could be redone, as they were. */
export function appendEdit(session: Session, edit: Edit, reviewer: string, atUtc: string): Session {
  if (edit.changes.length === 0) return session;
  return appendLine(session, {
    n: session.log.length + 1,
    atUtc,
    reviewer,
    act: { kind: 'edit', edit },
  });
}

/** Takes back the last edit that stands, by a line of its own. Throws Error where there is none. */
export function appendUndo(session: Session, reviewer: string, atUtc: string): Session {
  const due = undoableEdit(session);
  if (!due) throw new Error('there is nothing to undo');
  const n = session.log.length + 1;
  return appendLine(session, { n, atUtc, reviewer, act: { kind: 'undo', of: due.n } });
}

/** Does again what was taken back last. Throws Error where there is nothing. */
export function appendRedo(session: Session, reviewer: string, atUtc: string): Session {
  const due = redoableEdit(session);
  if (!due) throw new Error('there is nothing to redo');
  const n = session.log.length + 1;
  return appendLine(session, { n, atUtc, reviewer, act: { kind: 'redo', of: due.n } });
}

/** An edit that undo or redo would act on: its name and its line. */
export interface NamedEdit {
  readonly name: string;
  readonly n: number;
}

/** The edit that undo would take back, null where none is left. O(1) but for the first call on a log read from elsewhere. */
export function undoableEdit(session: Session): NamedEdit | null {
  const { undo } = historyOf(session);
  return undo && { name: undo.edit.name, n: undo.n };
}

/** The edit that redo would do again, null where there is none. */
export function redoableEdit(session: Session): NamedEdit | null {
  const { redo } = historyOf(session);
  return redo && { name: redo.edit.name, n: redo.n };
}

/** An id that no span of this session ever had. */
export function nextSpanId(session: Session): number {
  return historyOf(session).highestSpanId + 1;
}

/**
 * The session that a log makes of a start; cost: the changes themselves, and beats once at the end. Throws as appendLine
 * does.
 */
export function replaySession(start: SessionState, log: readonly LogLine[]): Session {
  let history = emptyHistory(start);
  let rest = start;
  const beats = new BeatDraft(start.beats);
  const apply = (change: Change) => {
    if (change.kind === 'beats') beats.change(change.removed, change.added);
    else if (change.kind === 'all-beats') beats.replace(change.after);
    else rest = applyChange(rest, change);
  };
  log.forEach((line, i) => {
    if (line.n !== i + 1) throw new Error(`line ${line.n} stands in the place of line ${i + 1}`);
    const next = nextHistory(history, line);
    history = next.history;
    for (const change of changesOf(line, next.edit)) apply(change);
  });
  HISTORIES.set(log, history);
  return { start, log, state: { ...rest, beats: beats.list() } };
}

/** The state that a log makes of a start. Throws as appendLine does. */
export function replay(start: SessionState, log: readonly LogLine[]): SessionState {
  return replaySession(start, log).state;
}

function historyOf(session: Session): History {
  const known = HISTORIES.get(session.log);
  if (known) return known;
  const history = session.log.reduce(
    (so, line) => nextHistory(so, line).history,
    emptyHistory(session.start),
  );
  HISTORIES.set(session.log, history);
  return history;
}

/** What a line does to the state: the edit's changes, or what takes them back, last first. */
function changesOf(line: LogLine, edit: Edit): readonly Change[] {
  return line.act.kind === 'undo' ? edit.changes.map(invert).reverse() : edit.changes;
}
