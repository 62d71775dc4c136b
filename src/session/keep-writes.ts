import { type LogLine, SESSION_VERSION, type Session } from './document';
import { failureOf, type KeepFailure, keepFailure } from './keep-failure';
import type { CopyStore } from './keep-local-storage';
import type { KeptHead, KeptStore, KeptWrite } from './kept-store';
import { documentOf, documentText, lineToKept, sessionToDocument } from './write-document';

/** Lines of the journal after which a new snapshot takes their place. */
const LINES_A_SNAPSHOT = 200;

/** How keeping went in its two places; null where it went well or was not due. */
export interface KeptReport {
  readonly edit: number;
  /** IndexedDB: what counts. */
  readonly journal: KeepFailure | null;
  /** The copy in local storage. */
  readonly copy: KeepFailure | null;
}

/** A session that is being kept; changed by the writes as they succeed. */
export interface OpenSession {
  session: Session;
  readonly writer: string;
  /** Last line that is on disk, -1 before the first writing, and last line in the snapshot. */
  kept: number;
  snapshotAt: number;
  /** Why nothing more may be written for this session. */
  barred: KeepFailure | null;
  /** Whether the copy in local storage is this session's. */
  ownsCopy: boolean;
}

/** Where and how to write. */
export interface Places {
  readonly store: KeptStore | null;
  readonly copies: CopyStore | null;
  readonly program: string;
  readonly nowUtc: () => string;
}

/** What a snapshot may be written over: only this opening's own, also nothing, what the session continues, or anything. */
export type Over = 'own' | 'own-or-none' | 'continued' | 'any';

/** Writes snapshot and copy; `own` writes nothing where the study was forgotten since. */
export async function keepAll(places: Places, open: OpenSession, over: Over): Promise<KeptReport> {
  const { session, barred } = open;
  const edit = session.log.length;
  if (barred) return { edit, journal: barred, copy: barred };
  try {
    const whole = open.kept < 0 ? sessionToDocument : documentOf;
    const text = documentText(whole(session, places.program));
    const allowed = (there: KeptHead | null) => mayReplace(open, there, over);
    const journal = await keep(places, open, edit, { snapshot: text, lines: [], allowed });
    if (journal === 'gone') return { edit, journal: null, copy: null };
    return { edit, journal, copy: open.barred ?? keepCopy(places, open, session, text) };
  } catch (error) {
    return { edit, journal: failureOf(error), copy: failureOf(error) };
  }
}

/** Writes the lines that are not kept yet; the copy too where the journal fails. */
export async function keepLines(places: Places, open: OpenSession): Promise<KeptReport> {
  const { session, barred } = open;
  const edit = session.log.length;
  if (barred) return { edit, journal: barred, copy: barred };
  if (open.kept < 0) return keepAll(places, open, 'continued');
  if (edit - open.snapshotAt >= LINES_A_SNAPSHOT) return keepAll(places, open, 'own-or-none');
  try {
    const lines = session.log.slice(open.kept).map((line) => ({ n: line.n, text: lineText(line) }));
    const allowed = (there: KeptHead | null) => mayReplace(open, there, 'own');
    const journal = await keep(places, open, edit, { snapshot: null, lines, allowed });
    if (journal === 'gone') return keepAll(places, open, 'own-or-none');
    if (journal === null || open.barred) return { edit, journal, copy: open.barred };
    const text = documentText(documentOf(session, places.program));
    return { edit, journal, copy: keepCopy(places, open, session, text) };
  } catch (error) {
    return { edit, journal: failureOf(error), copy: failureOf(error) };
  }
}

function mayReplace(open: OpenSession, there: KeptHead | null, over: Over): boolean {
  switch (over) {
    case 'own':
      return there?.writer === open.writer;
    case 'own-or-none':
      return there === null || there.writer === open.writer;
    case 'continued':
      return continues(open.session, there);
    case 'any':
      return true;
  }
}

/** One writing to the durable store; null when it is on disk, `gone` where nothing was there to go on from. */
async function keep(
  { store, nowUtc }: Places,
  open: OpenSession,
  edit: number,
  what: Omit<KeptWrite, 'head'>,
): Promise<KeepFailure | 'gone' | null> {
  if (!store) return keepFailure('disabled');
  const head = headOf(open, edit, nowUtc());
  const found: { head: KeptHead | null } = { head: null };
  const allowed = (there: KeptHead | null) => {
    found.head = there;
    return what.allowed(there);
  };
  try {
    if (await store.write({ ...what, head, allowed })) {
      open.kept = edit;
      if (what.snapshot !== null) open.snapshotAt = edit;
      return null;
    }
  } catch (error) {
    return failureOf(error);
  }
  if (found.head === null) return 'gone';
  open.barred = refused(found.head, open);
  return open.barred;
}

function refused(there: KeptHead, open: OpenSession): KeepFailure {
  if (there.version > SESSION_VERSION) return keepFailure('newer');
  return keepFailure(open.kept < 0 ? 'occupied' : 'other-tab');
}

function keepCopy(
  { copies, nowUtc }: Places,
  open: OpenSession,
  session: Session,
  text: string,
): KeepFailure | null {
  if (!copies) return keepFailure('disabled');
  const { quickKey } = session.state.study;
  try {
    const there = open.ownsCopy ? null : copies.read(quickKey);
    if (there && !continuesCopy(session, there)) return keepFailure('occupied');
    const edits = session.log.length;
    const failure = copies.write({ quickKey, savedAtUtc: nowUtc(), edits, text });
    if (failure === null) open.ownsCopy = true;
    return failure;
  } catch (error) {
    return failureOf(error);
  }
}

/** Whether a session holds all that is kept, so that it may take its place. */
function continues(session: Session, there: KeptHead | null): boolean {
  if (there === null) return true;
  if (there.version > SESSION_VERSION || there.edits > session.log.length) return false;
  return there.edits === 0 || lineText(session.log[there.edits - 1]) === there.lastLine;
}

function continuesCopy(
  session: Session,
  there: { readonly edits: number; readonly text: string },
): boolean {
  if (there.edits === 0) return true;
  if (there.edits > session.log.length) return false;
  return there.text.endsWith(`${lineText(session.log[there.edits - 1])}\n]\n}\n`);
}

function headOf({ session, writer }: OpenSession, edits: number, savedAtUtc: string): KeptHead {
  const { quickKey, code, start, durationS, invented } = session.state.study;
  const last = session.log.at(edits - 1);
  const lastLine = edits > 0 && last ? lineText(last) : '';
  const version = SESSION_VERSION;
  return {
    quickKey,
    version,
    writer,
    code,
    start,
    durationS,
    invented,
    edits,
    lastLine,
    savedAtUtc,
  };
}

const lineText = (line: LogLine): string => JSON.stringify(lineToKept(line));
