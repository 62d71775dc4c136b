import * as v from 'valibot';
import type { Beat } from '../recording/beat';
import { compactBeats } from './compact-beats';
import {
  type Change,
  type LogLine,
  SESSION_VERSION,
  type Session,
  type SessionState,
  type Signature,
} from './document';
import {
  type KeptBeat,
  type KeptChange,
  type KeptLine,
  type KeptState,
  keptLine,
  SESSION_FORMAT,
  type SessionDocument,
  sessionDocument,
} from './schema';

/**
 * A session in the form it is kept in; `program` is the name and version that writes it. Throws Error where the session holds
 * what could not be read again (a number that is not finite, a part that the schema does not know).
 */
export function sessionToDocument(session: Session, program: string): SessionDocument {
  return readable(sessionDocument, documentOf(session, program));
}

/** As sessionToDocument, without the look at every part: for a session whose start and lines were looked at before. */
export function documentOf(session: Session, program: string): SessionDocument {
  const state = keptState(session.state);
  return {
    format: SESSION_FORMAT,
    version: SESSION_VERSION,
    program,
    ...state,
    preparedBy: lastNamed(session.state.signed, 'prepared'),
    readBy: lastNamed(session.state.signed, 'read'),
    start: keptState(session.start),
    log: session.log.map(keptForm),
  };
}

/** The text of a session file: JSON, one line a part and one line a line of the log, ending with a line feed. */
export function documentText(document: SessionDocument): string {
  const { log, ...rest } = document;
  const parts = Object.entries(rest).map(([key, value]) => `"${key}":${JSON.stringify(value)}`);
  const lines = log.map((line) => JSON.stringify(line)).join(',\n');
  return `{\n${[...parts, `"log":[\n${lines}\n]`].join(',\n')}\n}\n`;
}

/** One line of the log in the form it is kept in. Throws Error as sessionToDocument does. */
export function lineToKept(line: LogLine): KeptLine {
  return readable(keptLine, keptForm(line));
}

function readable<S extends v.GenericSchema>(schema: S, value: unknown): v.InferOutput<S> {
  const parsed = v.safeParse(schema, value);
  if (parsed.success) return parsed.output;
  const [issue] = parsed.issues;
  throw new Error(`could not be read again at ${v.getDotPath(issue)}: ${issue.message}`);
}

function keptForm(line: LogLine): KeptLine {
  const { act, ...rest } = line;
  if (act.kind !== 'edit') return { ...rest, act };
  const changes = act.edit.changes.map(keptChange);
  return { ...rest, act: { kind: 'edit', edit: { name: act.edit.name, changes } } };
}

function keptState(state: SessionState): KeptState {
  return { ...state, beats: compactBeats(state.beats) };
}

function keptChange(change: Change): KeptChange {
  switch (change.kind) {
    case 'beats':
      return {
        kind: 'beats',
        removed: change.removed.map(keptBeat),
        added: change.added.map(keptBeat),
      };
    case 'all-beats':
      return {
        kind: 'all-beats',
        before: compactBeats(change.before),
        after: compactBeats(change.after),
      };
    default:
      return change;
  }
}

const keptBeat = ({ tick, beatClass, origin }: Beat): KeptBeat => [tick, beatClass, origin];

const lastNamed = (signed: readonly Signature[], meaning: Signature['meaning']): string =>
  signed.findLast((one) => one.meaning === meaning)?.name ?? '';
