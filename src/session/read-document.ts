import * as v from 'valibot';
import type { Beat } from '../recording/beat';
import { type Failure, Refusal } from '../recording/failure';
import { expandBeats } from './compact-beats';
import {
  type Change,
  type LogLine,
  SESSION_VERSION,
  type Session,
  type SessionState,
} from './document';
import { replaySession } from './log';
import { sameValue } from './same-value';
import {
  type KeptBeat,
  type KeptChange,
  type KeptLine,
  type KeptState,
  keptLine,
  SESSION_FORMAT,
  sessionDocument,
} from './schema';
import { migrate } from './versions';

/** The session in the text of a session file. Throws Refusal as documentToSession does, and where the text is no JSON. */
export function textToSession(fileText: string): Session {
  let value: unknown;
  try {
    value = JSON.parse(fileText);
  } catch (error) {
    throw damaged(null, error instanceof Error ? error.message : String(error));
  }
  return documentToSession(value);
}

/**
 * The session in a parsed document. Throws Refusal where it is no session, comes from a newer program, does not hold what its
 * version holds (the path is named), or where its log does not lead to its state. The document is not changed.
 */
export function documentToSession(value: unknown): Session {
  const document = migrated(value);
  const parsed = v.safeParse(sessionDocument, document);
  if (!parsed.success) throw damagedAt(parsed.issues);
  const { start, log, ...state } = parsed.output;
  const named = <T>(path: string, read: () => T): T => reading(path, read);
  const session = named('log', () =>
    replaySession(
      named('start', () => stateOf(start)),
      log.map((line) => named(`log.${line.n - 1}`, () => keptToLine(line))),
    ),
  );
  const kept = named('beats', () => stateOf(state));
  const differing = parts(kept).filter((key) => !sameValue(kept[key], session.state[key]));
  if (differing.length > 0)
    throw damaged('log', `replayed, it leads to other ${differing.join(', ')} than the file holds`);
  return session;
}

/** One line of the log from the form it is kept in. Throws Refusal where it holds something else. */
export function readLine(value: unknown): LogLine {
  const parsed = v.safeParse(keptLine, value);
  if (!parsed.success) throw damagedAt(parsed.issues);
  return reading('line', () => keptToLine(parsed.output));
}

function migrated(value: unknown): Readonly<Record<string, unknown>> {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) throw noSession();
  const document = value as Readonly<Record<string, unknown>>;
  if (document.format !== SESSION_FORMAT) throw noSession();
  const { version } = document;
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 1)
    throw damaged('version', 'it is no whole number from 1 on');
  if (version > SESSION_VERSION) throw newer(version, document.program);
  return migrate(document, version);
}

function stateOf(kept: KeptState): SessionState {
  const { study, protocol, events, roles, leadChoice, phases, settings } = kept;
  const { spans, notes, conclusion, signed, symptoms, doubts, bookmarks } = kept;
  return {
    study,
    protocol,
    roles,
    leadChoice,
    phases,
    settings,
    beats: expandBeats(kept.beats),
    spans,
    events,
    symptoms,
    doubts,
    bookmarks,
    notes,
    conclusion,
    signed,
  };
}

function keptToLine(line: KeptLine): LogLine {
  const { act, ...rest } = line;
  if (act.kind !== 'edit') return { ...rest, act };
  const changes = act.edit.changes.map(changeOf);
  return { ...rest, act: { kind: 'edit', edit: { name: act.edit.name, changes } } };
}

function changeOf(kept: KeptChange): Change {
  switch (kept.kind) {
    case 'beats':
      return { kind: 'beats', removed: kept.removed.map(beatOf), added: kept.added.map(beatOf) };
    case 'all-beats':
      return {
        kind: 'all-beats',
        before: expandBeats(kept.before),
        after: expandBeats(kept.after),
      };
    default:
      return kept;
  }
}

const beatOf = ([tick, beatClass, origin]: KeptBeat): Beat => ({ tick, beatClass, origin });

const parts = (state: SessionState) => Object.keys(state) as (keyof SessionState)[];

/** Runs a reading; what it throws is said to be found at the path, a refusal goes through as it is. */
function reading<T>(path: string, read: () => T): T {
  try {
    return read();
  } catch (error) {
    if (error instanceof Refusal) throw error;
    throw damaged(path, error instanceof Error ? error.message : String(error));
  }
}

const refusal = (kind: Failure['kind'], message: string, place: string | null, remedy: string) =>
  new Refusal({ kind, message, place, remedy });

const noSession = () =>
  refusal(
    'wrong-input',
    'This is not a session of Bicadence.',
    null,
    'Choose a file that ends with .bicadence.json.',
  );

const newer = (version: number, program: unknown) =>
  refusal(
    'not-supported',
    `This session was written by a newer program${typeof program === 'string' ? ` (${program})` : ''}: version ${version} of the document, and this program reads up to ${SESSION_VERSION}.`,
    'version',
    'Open it with that program. Nothing was changed.',
  );

const damaged = (path: string | null, why: string) =>
  refusal(
    'broken-format',
    `This session is damaged${path === null ? '' : ` at ${path}`}: ${why}.`,
    path,
    'Use another copy of the session. Nothing was changed.',
  );

function damagedAt(issues: readonly [v.BaseIssue<unknown>, ...v.BaseIssue<unknown>[]]): Refusal {
  const [issue] = issues;
  return damaged(v.getDotPath(issue) ?? null, issue.message);
}
