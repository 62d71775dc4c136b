import type { Change, LogLine, Session, SessionState } from './document';
import { appendLine, replaySession } from './log';

/** A state of a session that may have had figures of its own. */
export interface FigureState {
  /** Number of the line that led to it; 0 for the start. */
  readonly edit: number;
  readonly state: SessionState;
}

/** The states that a session's figures went through. */
export interface FigureStates {
  readonly start: FigureState;
  /** Lines up to this one are not looked at one by one; 0: all are. */
  readonly together: number;
  /** The state after `together` where that is not 0, and after each later line that can reach a figure, oldest first. */
  readonly along: readonly FigureState[];
}

const FIELDS_OF_FIGURES: ReadonlySet<string> = new Set(['roles', 'phases', 'settings']);

/** True for what figures are computed from. */
function reachesFigures(change: Change): boolean {
  switch (change.kind) {
    case 'beats':
    case 'all-beats':
    case 'spans':
      return true;
    case 'field':
      return FIELDS_OF_FIGURES.has(change.field);
    default:
      return false;
  }
}

function lineReaches(line: LogLine, log: readonly LogLine[]): boolean {
  const { act } = line.act.kind === 'edit' ? line : log[line.act.of - 1];
  return act.kind === 'edit' && act.edit.changes.some(reachesFigures);
}

/**
 * The start of a session and the states after the last lines that can reach a figure, at most `most` of them; what lies
 * before these is taken together.
 */
export function figureStates({ start, log }: Session, most: number): FigureStates {
  const reaching = log.filter((line) => lineReaches(line, log));
  const looked = reaching.slice(-most);
  const together = looked.length < reaching.length ? looked[0].n - 1 : 0;
  let session = replaySession(start, log.slice(0, together));
  const along: FigureState[] = together > 0 ? [{ edit: together, state: session.state }] : [];
  const wanted = new Set(looked.map(({ n }) => n));
  for (const line of log.slice(together)) {
    session = appendLine(session, line);
    if (wanted.has(line.n)) along.push({ edit: line.n, state: session.state });
  }
  return { start: { edit: 0, state: start }, together, along };
}
